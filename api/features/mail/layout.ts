import { htmlOf } from './html.ts';
import { t } from './words.ts';

/** What a mail says, in the order it is read. Every text is plain; the layout escapes it. */
export interface Letter {
  subject: string;
  /** The studio it comes from; Oriel itself where none is given. */
  studioName?: string;
  /** Where answers go; said at the foot. */
  replyTo?: string | null;
  greeting?: string;
  paragraphs: string[];
  /** Somebody's own words, kept line by line; left out where empty. */
  quote?: { by: string; words: string };
  /** Labelled figures, as in a title block: "Choose by", "17 November 2026". */
  facts?: { label: string; value: string }[];
  /** The one button, and the address behind it. */
  action?: { words: string; address: string };
  /** Below the button. */
  after?: string[];
  /** Why the reader gets this. */
  why: string;
}

/** A mail's words in their three forms, ready for `queueMail`. */
export interface WrittenMail {
  subject: string;
  text: string;
  html: string;
}

/** Lays a letter out as text and as HTML. Both say the same. */
export function writeMail(letter: Letter): WrittenMail {
  return { subject: oneLine(letter.subject), text: textOf(letter), html: htmlOf(letter, footOf(letter)) };
}

/** A header is one line; what would break it becomes a space. */
export function oneLine(words: string): string {
  return words.replace(/\p{Cc}+/gu, ' ').trim();
}

function footOf(letter: Letter): string[] {
  const sent = letter.studioName ? t('layout.sentWith', { studio: letter.studioName }) : t('layout.sentByOriel');
  const answers = letter.replyTo ? t('layout.answer', { address: letter.replyTo }) : t('layout.noAnswer');
  return [letter.why, `${sent} ${answers}`];
}

function textOf(letter: Letter): string {
  const { quote } = letter;
  const blocks = [
    letter.greeting ?? '',
    ...letter.paragraphs,
    quote && quote.words.trim() ? `${quote.by}:\n${quote.words.trim().replace(/^/gm, '> ')}` : '',
    (letter.facts ?? []).map((fact) => `${fact.label}: ${fact.value}`).join('\n'),
    letter.action ? `${letter.action.words}:\n${letter.action.address}` : '',
    ...(letter.after ?? []),
    // The signature delimiter of RFC 3676 4.3.
    `-- \n${footOf(letter).join('\n')}`,
  ];
  return `${blocks.filter(Boolean).join('\n\n')}\n`;
}
