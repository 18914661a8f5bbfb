import { type WrittenMail, writeMail } from '../mail/layout.ts';
import { t } from '../mail/words.ts';
import { type GuestMail, sheetFacts } from './sheet-invitation.mail.ts';

/** "The sheet is open again", with the studio's reason and a new link. */
export function sheetReopenedMail(mail: GuestMail): WrittenMail {
  const { studio, commission } = mail;
  return writeMail({
    subject: t('sheetReopened.subject', { title: commission.title }),
    studioName: studio.name,
    replyTo: studio.replyTo,
    greeting: t('sheet.greeting', { name: mail.guest }),
    paragraphs: [t('sheetReopened.what', { title: commission.title })],
    quote: { by: t('sheetReopened.reason', { studio: studio.name }), words: mail.words },
    facts: sheetFacts(mail),
    action: { words: t('sheetReopened.action'), address: mail.link },
    after: [t('sheet.yourLink')],
    why: t('sheetReopened.why'),
  });
}
