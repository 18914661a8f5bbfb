import { type WrittenMail, writeMail } from '../mail/layout.ts';
import { t } from '../mail/words.ts';
import type { Link } from './find-link.ts';

/** To a guest who asked for a link in place of an older one. */
export function newLinkMail(link: Link, address: string): WrittenMail {
  const { kind, number, title } = link;
  return writeMail({
    subject: t('newLink.subject', { title }),
    studioName: link.studioName,
    replyTo: link.replyTo,
    greeting: t('newLink.greeting', { name: link.name }),
    paragraphs: [t(`newLink.${kind}`, { number, title })],
    action: { words: t(`newLink.${kind}Action`), address },
    why: t('newLink.why'),
  });
}
