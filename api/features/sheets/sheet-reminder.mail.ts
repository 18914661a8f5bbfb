import { type WrittenMail, writeMail } from '../mail/layout.ts';
import { dayInWords, t } from '../mail/words.ts';
import { type GuestMail, sheetFacts } from './sheet-invitation.mail.ts';

/** "You can choose until …", with a new link. */
export function sheetReminderMail(mail: GuestMail): WrittenMail {
  const { studio, commission, sheet } = mail;
  const day = sheet.chooseBy ? dayInWords(sheet.chooseBy) : '';
  return writeMail({
    subject: t('sheetReminder.subject', { day, title: commission.title }),
    studioName: studio.name,
    replyTo: studio.replyTo,
    greeting: t('sheet.greeting', { name: mail.guest }),
    paragraphs: [t('sheetReminder.what', { title: commission.title, day })],
    quote: { by: mail.from, words: mail.words },
    facts: sheetFacts(mail),
    action: { words: t('sheetReminder.action'), address: mail.link },
    after: [t('sheetReminder.link'), t('sheet.yourLink')],
    why: t('sheetReminder.why'),
  });
}
