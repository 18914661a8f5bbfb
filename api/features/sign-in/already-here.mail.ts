import { type WrittenMail, writeMail } from '../mail/layout.ts';
import { t } from '../mail/words.ts';

/** To somebody with an account, when their address is given to sign up again. `address` is where Oriel is. */
export function alreadyHereMail(address: string): WrittenMail {
  return writeMail({
    subject: t('alreadyHere.subject'),
    paragraphs: [t('alreadyHere.what')],
    action: { words: t('alreadyHere.action'), address: `${address}/sign-in` },
    after: [t('alreadyHere.forgotten', { address: `${address}/reset-password` })],
    why: t('alreadyHere.why'),
  });
}
