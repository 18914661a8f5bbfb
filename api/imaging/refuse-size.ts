import { Refusal } from './refusal.ts';

/** "8.4 MB"; megabytes are millions of bytes, as cards and disks are sold. */
function megabytes(bytes: number): string {
  return `${new Intl.NumberFormat('en-GB', { maximumFractionDigits: 1 }).format(bytes / 1_000_000)} MB`;
}

/** @throws Refusal for an empty file or one beyond the limit. */
export function refuseSize(bytes: number, limits: { bytes: number }): void {
  if (bytes === 0) throw new Refusal('empty', 'The file is empty.');
  if (bytes > limits.bytes) {
    throw new Refusal('too-large', `The file has ${megabytes(bytes)}; at most ${megabytes(limits.bytes)} are taken in.`);
  }
}
