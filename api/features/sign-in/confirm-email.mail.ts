import { type WrittenMail, writeMail } from '../mail/layout.ts';
import { momentInWords, t } from '../mail/words.ts';

interface Confirmation {
  address: string;
  name: string;
  studioName: string;
  until: Date;
  /** The account waits for its confirmation since an earlier sign-up. */
  again: boolean;
}

/** To whoever signed up, or was signed up by somebody else. */
export function confirmEmailMail({ address, name, studioName, until, again }: Confirmation): WrittenMail {
  return writeMail({
    subject: t('confirmEmail.subject', { studio: studioName }),
    greeting: t('confirmEmail.greeting', { name }),
    paragraphs: again ? [t('confirmEmail.again'), t('confirmEmail.forgotten')] : [t('confirmEmail.what', { studio: studioName })],
    action: { words: t('confirmEmail.action'), address },
    after: [t('confirmEmail.until', { until: momentInWords(until, 'UTC') })],
    why: t('confirmEmail.why'),
  });
}
