import { formatMoney, timesMoney } from '../../domain/money.ts';
import type { PickList } from '../../models/PickList.ts';
import { type WrittenMail, writeMail } from '../mail/layout.ts';
import { t } from '../mail/words.ts';
import type { SheetForMail } from '../sheets/sheet-for-mail.ts';
import type { MarkedProof } from './picks-in-order.ts';

/** A mail names so many picks and counts the rest: the page has them all. */
const MOST_LINES = 40;

/** Tells the studio that a pick list is in, with a summary. */
export function pickListMail(mail: SheetForMail & { list: PickList; picks: MarkedProof[]; link: string }): WrittenMail {
  const { list, picks, commission } = mail;
  return writeMail({
    subject: t('pickList.subject', { number: list.number, title: commission.title }),
    paragraphs: [t('pickList.what', { name: list.sentByName, number: list.number, count: list.pickCount })],
    quote: { by: list.sentByName, words: list.words },
    facts: factsOf(mail),
    action: { words: t('pickList.action'), address: mail.link },
    after: [lines(picks)],
    why: t('pickList.why'),
  });
}

/** What was picked, and what it comes to. */
function factsOf({ list, commission }: SheetForMail & { list: PickList }): { label: string; value: string }[] {
  const cost = formatMoney({ minor: timesMoney(list.extraPrice, list.extraCount), currency: list.currency });
  return [
    { label: t('sheet.commission'), value: commission.title },
    { label: t('pickList.picks'), value: String(list.pickCount) },
    { label: t('pickList.included'), value: String(list.allowance) },
    { label: t('pickList.extras'), value: String(list.extraCount) },
    ...(list.extraCount > 0 ? [{ label: t('pickList.cost'), value: cost }] : []),
  ];
}

/** One line a pick. A client is told no file names. */
function lines(picks: readonly MarkedProof[], forClient = false): string {
  const named = picks.slice(0, MOST_LINES).map((pick, index) =>
    t(forClient ? 'pickListReceipt.line' : 'pickList.line', {
      number: index + 1,
      proof: pick.proofNumber,
      view: pick.viewTitle ?? t('pickList.alsoMade'),
      frame: pick.frameName,
    }),
  );
  const more = picks.length - named.length;
  return [...named, ...(more > 0 ? [t('pickList.more', { count: more })] : [])].join('\n');
}

/** Tells the lead that the list has arrived, what is on it and what it comes to, and what happens next. */
export function pickListReceiptMail(
  mail: SheetForMail & { list: PickList; picks: MarkedProof[]; guest: string; link: string },
): WrittenMail {
  const { list, studio, commission } = mail;
  return writeMail({
    subject: t('pickListReceipt.subject', { title: commission.title }),
    studioName: studio.name,
    replyTo: studio.replyTo,
    greeting: t('sheet.greeting', { name: mail.guest }),
    paragraphs: [t('pickListReceipt.what', { number: list.number, count: list.pickCount, studio: studio.name })],
    quote: { by: list.sentByName, words: list.words },
    facts: factsOf(mail),
    action: { words: t('pickListReceipt.action'), address: mail.link },
    after: [lines(mail.picks, true), t('pickListReceipt.next')],
    why: t('pickListReceipt.why'),
  });
}
