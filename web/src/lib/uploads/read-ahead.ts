import type { Hasher } from './hash-pool.ts';
import type { Shelves } from './shelves.ts';
import type { UploadItem } from './upload-item.ts';

/** Files whose sum is known before they are begun: enough that the line never waits for the disk. */
const READ_AHEAD = 12;

/** What becomes of a file that was read. */
export interface ReadResult {
  started(item: UploadItem): void;
  read(item: UploadItem, sha256: string): void;
  unreadable(item: UploadItem): void;
}

/**
 * Computes the sums of the next files, as many at once as the hasher likes and not far ahead of what is being sent: the
 * disk belongs to the parts that are going out.
 */
export function readAhead(shelves: Shelves, hasher: Hasher, result: ReadResult): void {
  for (const item of shelves.in('new')) {
    if (shelves.in('reading').size >= hasher.width || shelves.in('read').size >= READ_AHEAD) return;
    shelves.move(item, 'reading');
    result.started(item);
    void read(item, hasher, result);
  }
}

async function read(item: UploadItem, hasher: Hasher, result: ReadResult): Promise<void> {
  const { signal } = item.stop;
  try {
    if (!item.file) throw new Error('There is no file to read.');
    // A file of an earlier visit has been read before; the server compares the sum with what arrived anyway.
    const sha256 = item.sha256 ?? (await hasher.sum(item.file, signal));
    if (!signal.aborted) result.read(item, sha256);
  } catch {
    if (!signal.aborted) result.unreadable(item);
  }
}
