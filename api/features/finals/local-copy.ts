import { createHash } from 'node:crypto';
import { createWriteStream } from 'node:fs';
import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { Transform } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import type { Store } from '../../services/storage.ts';

/**
 * Copies an object of the store to this machine for as long as `work` runs: the pixels' child processes read files.
 * @throws Error where the store's bytes are not those of the SHA-256
 */
export async function withLocalCopy<T>(
  store: Store,
  object: { storageKey: string; sha256: string },
  signal: AbortSignal,
  work: (file: string) => Promise<T>,
): Promise<T> {
  const folder = await mkdtemp(path.join(tmpdir(), 'oriel-final-'));
  try {
    const file = path.join(folder, 'original');
    const hash = createHash('sha256');
    const hashed = new Transform({
      transform: (chunk: Buffer, _encoding, done) => {
        hash.update(chunk);
        done(null, chunk);
      },
    });
    await pipeline(await store.get(object.storageKey, undefined, signal), hashed, createWriteStream(file), { signal });
    if (hash.digest('hex') !== object.sha256) throw new Error(`${object.storageKey} in the store is not the file that was taken in.`);
    return await work(file);
  } finally {
    await rm(folder, { recursive: true, force: true });
  }
}
