import { type WrittenMail, writeMail } from '../mail/layout.ts';
import { t } from '../mail/words.ts';
import type { FoundOpenLink } from './find-open-link.ts';

/** To the address that somebody who looks by the open link has given. */
export function beginMarkingMail(link: FoundOpenLink, name: string, address: string): WrittenMail {
  const { title, number, studioName, replyTo } = link;
  return writeMail({
    subject: t('beginMarking.subject', { title }),
    studioName,
    replyTo,
    greeting: t('beginMarking.greeting', { name }),
    paragraphs: [t('beginMarking.what', { number, title })],
    action: { words: t('beginMarking.action'), address },
    after: [t('beginMarking.once')],
    why: t('beginMarking.why'),
  });
}
