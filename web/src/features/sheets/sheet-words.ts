import type { StudioSheet } from '../../../../api/contract/sheets.ts';
import { formatAge, formatDay } from '../../lib/dates.ts';

/** "one proof", "42 proofs". */
export function counted(count: number, one: string, many = `${one}s`): string {
  return `${count.toLocaleString('en-GB')} ${count === 1 ? one : many}`;
}

/** Where a sheet stands, in one sentence. */
export function whereItStands(sheet: StudioSheet): string {
  if (sheet.withdrawnAt) return `Taken back ${formatAge(sheet.withdrawnAt)}. Nobody can open it.`;
  if (sheet.state === 'Draft') return 'Not sent yet. Nobody sees it but your studio.';
  if (sheet.state === 'Sent') return `The picks were sent ${formatAge(sheet.sentAt ?? '')}. The sheet is closed.`;
  if (sheet.state === 'Ended') return `The last date, ${formatDay(sheet.chooseBy ?? '')}, has passed and no picks were sent.`;
  const opened = sheet.reopenedAt
    ? `Open again since ${formatAge(sheet.reopenedAt)}`
    : `With the client since ${formatAge(sheet.issuedAt ?? '')}`;
  return `${opened}: ${counted(sheet.pickCount, 'pick')} of ${sheet.allowance} included.`;
}

/** What happened to the mail of a guest, and whether they came. */
export function guestState(guest: StudioSheet['guests'][number]): { words: string; tone: 'plain' | 'attention' | 'settled' } {
  if (guest.withdrawnAt) return { words: 'link taken back', tone: 'plain' };
  if (guest.lastSeenAt) return { words: `seen ${formatAge(guest.lastSeenAt)}`, tone: 'settled' };
  if (guest.mail === 'failed') return { words: 'mail not delivered', tone: 'attention' };
  if (guest.mail === 'unsure') return { words: 'mail perhaps not delivered', tone: 'attention' };
  if (guest.mail === 'waiting' || guest.mail === 'handing-over') return { words: 'mail on its way', tone: 'plain' };
  return { words: 'link not opened yet', tone: 'plain' };
}
