import type { MailState } from '../../../../api/contract/mail.ts';

const WORDS: Record<MailState, string> = {
  waiting: 'Waiting',
  'handing-over': 'Being sent',
  sent: 'Sent',
  failed: 'Failed',
  unsure: 'May have gone out',
  withdrawn: 'Withdrawn',
};

/** The state in a word; what needs attention in copper, what is settled in verdigris. */
export function MailStateWord({ state }: { state: MailState }) {
  const tone = state === 'failed' || state === 'unsure' ? 'font-bold text-copper' : state === 'sent' ? 'text-verdigris' : '';
  return <span className={tone}>{WORDS[state]}</span>;
}
