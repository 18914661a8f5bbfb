import { formatByteSize } from '../../domain/byte-size.ts';
import { type WrittenMail, writeMail } from '../mail/layout.ts';
import { dayInWords, t } from '../mail/words.ts';

/** What the mail to one recipient is made from. */
export interface DeliveryMail {
  studio: { name: string; replyTo: string };
  commission: { title: string };
  delivery: { number: number; words: string; fetchBy: string };
  recipient: string;
  files: { count: number; bytes: number };
  link: string;
}

/** "Your pictures are ready", with the person's own link. */
export function deliveryMail({ studio, commission, delivery, recipient, files, link }: DeliveryMail): WrittenMail {
  return writeMail({
    subject: t('delivery.subject', { studio: studio.name, title: commission.title }),
    studioName: studio.name,
    replyTo: studio.replyTo,
    greeting: t('delivery.greeting', { name: recipient }),
    paragraphs: [t('delivery.what', { count: files.count, title: commission.title })],
    quote: { by: studio.name, words: delivery.words },
    facts: [
      { label: t('delivery.commission'), value: commission.title },
      { label: t('delivery.number'), value: String(delivery.number) },
      { label: t('delivery.files'), value: `${files.count}, ${formatByteSize(files.bytes)}` },
      { label: t('delivery.fetchBy'), value: dayInWords(delivery.fetchBy) },
    ],
    action: { words: t('delivery.action'), address: link },
    after: [t('delivery.goesOn'), t('delivery.yourLink')],
    why: t('delivery.why', { studio: studio.name }),
  });
}
