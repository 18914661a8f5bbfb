import { formatMoney } from '../../domain/money.ts';
import { type WrittenMail, writeMail } from '../mail/layout.ts';
import { dayInWords, t } from '../mail/words.ts';
import type { SheetForMail } from './sheet-for-mail.ts';

/** What a mail to one guest of a sheet is made from. */
export interface GuestMail extends SheetForMail {
  guest: string;
  role: 'lead' | 'reviewer';
  /** The sender's own words. */
  words: string;
  link: string;
  /** Name of the person who sends it. */
  from: string;
}

/** The facts of a sheet as every mail about it shows them. */
export function sheetFacts({ commission, sheet, proofs }: SheetForMail): { label: string; value: string }[] {
  return [
    { label: t('sheet.commission'), value: commission.title },
    { label: t('sheet.proofs'), value: String(proofs) },
    ...(sheet.chooseBy ? [{ label: t('sheet.chooseBy'), value: dayInWords(sheet.chooseBy) }] : []),
    { label: t('sheet.included'), value: String(sheet.allowance) },
    { label: t('sheet.extra'), value: formatMoney({ minor: sheet.extraPrice, currency: sheet.currency }) },
  ];
}

/** "The proofs are ready", with the person's own link. */
export function sheetInvitationMail(mail: GuestMail): WrittenMail {
  const { studio, commission } = mail;
  return writeMail({
    subject: t('sheetInvitation.subject', { studio: studio.name, title: commission.title }),
    studioName: studio.name,
    replyTo: studio.replyTo,
    greeting: t('sheet.greeting', { name: mail.guest }),
    paragraphs: [t(`sheetInvitation.${mail.role}`, { title: commission.title })],
    quote: { by: mail.from, words: mail.words },
    facts: sheetFacts(mail),
    action: { words: t('sheetInvitation.action'), address: mail.link },
    after: [t('sheet.yourLink')],
    why: t('sheetInvitation.why', { from: mail.from }),
  });
}
