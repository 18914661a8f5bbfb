import { type WrittenMail, writeMail } from '../mail/layout.ts';
import { momentInWords, t } from '../mail/words.ts';

/** The link to choose a new password. */
export function resetPasswordMail({ name, address, until }: { name: string; address: string; until: Date }): WrittenMail {
  return writeMail({
    subject: t('resetPassword.subject'),
    greeting: t('resetPassword.greeting', { name }),
    paragraphs: [t('resetPassword.what', { until: momentInWords(until, 'UTC') })],
    action: { words: t('resetPassword.action'), address },
    why: t('resetPassword.why'),
  });
}
