import { type WrittenMail, writeMail } from '../mail/layout.ts';
import { momentInWords, t } from '../mail/words.ts';

/** Tells the holder of an account that its password is another one now. `address` is where Oriel is. */
export function passwordChangedMail({ name, address, at }: { name: string; address: string; at: Date }): WrittenMail {
  return writeMail({
    subject: t('passwordChanged.subject'),
    greeting: t('passwordChanged.greeting', { name }),
    paragraphs: [t('passwordChanged.what', { at: momentInWords(at, 'UTC') }), t('passwordChanged.notYou')],
    action: { words: t('passwordChanged.action'), address: `${address}/reset-password` },
    why: t('passwordChanged.why'),
  });
}
