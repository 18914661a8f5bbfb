import type { UploadTotals } from '../../lib/uploads/totals.ts';
import type { UploadView } from '../../lib/uploads/upload-item.ts';

/** What is uploaded, in one and in many. */
export interface Noun {
  one: string;
  many: string;
}

/** "1 frame", "1 204 frames" with a thin space. */
export function counted(count: number, noun: Noun): string {
  return `${String(count).replace(/\B(?=(\d{3})+$)/g, '\u2009')} ${count === 1 ? noun.one : noun.many}`;
}

/** What the panel says first. */
export function headline(totals: UploadTotals, noun: Noun): string {
  const { counts } = totals;
  const going = counts.waiting + counts.reading + counts.sending + counts.retrying;
  if (totals.running && going === 0) return `Checking ${counted(counts.checking, noun)}`;
  if (totals.running) return `Uploading ${counted(totals.files - counts.held - counts.failed, noun)}`;
  if (totals.paused) return 'Upload paused';
  if (counts.held > 0) return `${counted(counts.held, noun)} from an earlier visit unfinished`;
  if (counts.done > 0) return `${counted(counts.done, noun)} uploaded`;
  return counts.failed > 0 ? `${counted(counts.failed, noun)} not uploaded` : 'Nothing to upload';
}

/** The counts behind the headline, those that are none left out: "114 done · 3 waiting to retry". */
export function countWords(totals: UploadTotals): string {
  const { counts } = totals;
  const parts: [number, string][] = [
    [totals.running || totals.paused ? counts.done : 0, 'done'],
    [counts.checking, 'being checked'],
    [counts.retrying, 'waiting to retry'],
    [counts.known, 'already there'],
    [counts.failed, 'failed'],
    [totals.running || totals.paused ? counts.held : 0, 'to be chosen again'],
    [counts['left-out'], 'left out'],
  ];
  return parts.flatMap(([count, words]) => (count > 0 ? [`${count} ${words}`] : [])).join(' · ');
}

/** The word for a file's state. */
export function stateWords(file: UploadView): string {
  switch (file.state) {
    case 'held':
      return 'Choose it again';
    case 'waiting':
      return 'Waiting';
    case 'reading':
      return 'Reading';
    case 'sending':
      return file.size > 0 ? `${Math.floor((file.sent / file.size) * 100)}%` : 'Sending';
    case 'retrying':
      return 'Waiting to retry';
    case 'checking':
      return 'Being checked';
    case 'done':
      return 'Done';
    case 'known':
      return 'Already there';
    case 'failed':
      return 'Failed';
    case 'left-out':
      return 'Left out';
  }
}
