import { createHash } from 'node:crypto';
import { PassThrough, Transform } from 'node:stream';
import type { Store } from '../../services/storage.ts';
import type { ArchivePlan } from './plan-archive.ts';
import { writeArchive } from './write-archive.ts';

/** What became of an archive that was written. */
export interface StoredArchive {
  size: number;
  sha256: string;
}

/**
 * Writes an archive straight into the store in parts, a few of them in memory at a time. Nothing is kept when it fails.
 * `onBytes` hears how many bytes the store has taken.
 * @throws Error where what was written is not as long as planned
 */
export async function storeArchive(
  store: Store,
  key: string,
  plan: ArchivePlan,
  tools: { signal: AbortSignal; onBytes?: (written: number) => void },
): Promise<StoredArchive> {
  const broken = new AbortController();
  const signal = AbortSignal.any([tools.signal, broken.signal]);
  const hash = createHash('sha256');
  let size = 0;
  const counted = new Transform({
    transform(chunk: Buffer, _encoding, done) {
      hash.update(chunk);
      size += chunk.length;
      done(null, chunk);
    },
  });
  const body = counted.pipe(new PassThrough());
  const stopTogether = (error: unknown): never => {
    broken.abort(error);
    body.destroy(error instanceof Error ? error : undefined);
    throw error;
  };
  const stored = store.putStream(key, body, 'application/zip', { signal, ...(tools.onBytes ? { onBytes: tools.onBytes } : {}) });
  const written = writeArchive(plan, counted, signal);
  const [first, second] = await Promise.allSettled([written.catch(stopTogether), stored.catch(stopTogether)]);
  if (first.status === 'rejected' || second.status === 'rejected') throw broken.signal.reason;
  if (size !== plan.length) {
    await store.remove(key);
    throw new Error(`The archive has ${size} bytes instead of the ${plan.length} it was planned with.`);
  }
  return { size, sha256: hash.digest('hex') };
}
