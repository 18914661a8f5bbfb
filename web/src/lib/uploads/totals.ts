import type { UploadItem, UploadState } from './upload-item.ts';

/** The set as a whole, as the page shows it. */
export interface UploadTotals {
  /** Files in each state. */
  counts: Record<UploadState, number>;
  /** Files that were worth sending, whatever became of them. */
  files: number;
  /** Bytes of the files that have to be sent (not those known or left out). */
  bytes: number;
  /** Of these, the bytes with the server or on their way. */
  sent: number;
  /** Bytes a second, once there is a second to judge by. */
  perSecond: number | undefined;
  secondsLeft: number | undefined;
  /** Something is being read, sent or checked, or will be without anybody doing anything. */
  running: boolean;
  paused: boolean;
  /** Why nothing moves, where it concerns all files: the line is lost, the server asks to wait, the session is over. */
  problem: string | undefined;
}

const NONE: Record<UploadState, number> = {
  held: 0,
  waiting: 0,
  reading: 0,
  sending: 0,
  retrying: 0,
  checking: 0,
  done: 0,
  known: 0,
  failed: 0,
  'left-out': 0,
};

/** States of files that will go on by themselves. */
const GOING: UploadState[] = ['waiting', 'reading', 'sending', 'retrying', 'checking'];

/** Counts and bytes over all items, and the bytes still to go on the line. */
export function addUp(items: Iterable<UploadItem>): Pick<UploadTotals, 'counts' | 'files' | 'bytes' | 'sent'> & {
  going: number;
  left: number;
} {
  const sum = { counts: { ...NONE }, files: 0, bytes: 0, sent: 0, going: 0, left: 0 };
  for (const item of items) {
    const { state, sent, size } = item.view();
    sum.counts[state] += 1;
    if (state === 'left-out') continue;
    sum.files += 1;
    if (state === 'known') continue;
    sum.bytes += size;
    sum.sent += sent;
    if (!GOING.includes(state)) continue;
    sum.going += 1;
    sum.left += size - sent;
  }
  return sum;
}
