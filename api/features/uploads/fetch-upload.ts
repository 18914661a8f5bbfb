import { createHash } from 'node:crypto';
import { createWriteStream } from 'node:fs';
import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { Transform } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import type { Context } from '../../context.ts';
import { Refusal } from '../../imaging/refusal.ts';
import type { Upload } from '../../models/Upload.ts';

/** Temporary folders begin so; what a killed worker leaves is swept by this name. */
export const FOLDER = 'oriel-take-in-';

/** Lets bytes through and takes their SHA-256 and number. */
function measure(): { tap: Transform; result(): { sha256: string; bytes: number } } {
  const hash = createHash('sha256');
  let bytes = 0;
  const tap = new Transform({
    transform(chunk: Buffer, _encoding, done) {
      hash.update(chunk);
      bytes += chunk.length;
      done(null, chunk);
    },
  });
  return { tap, result: () => ({ sha256: hash.digest('hex'), bytes }) };
}

/**
 * Brings an upload's file from the store to a temporary file, the only time it is read, and checks what the store holds
 * against what the browser said of it. The file is gone when `use` is done.
 * @throws Refusal where bytes or SHA-256 are others
 */
export async function withUploadedFile<T>(
  ctx: Context,
  upload: Pick<Upload, 'storageKey' | 'sha256' | 'sizeBytes'>,
  signal: AbortSignal,
  use: (path: string) => Promise<T>,
): Promise<T> {
  const folder = await mkdtemp(path.join(tmpdir(), FOLDER));
  try {
    const file = path.join(folder, 'original');
    const { tap, result } = measure();
    await pipeline(await ctx.store.get(upload.storageKey, undefined, signal), tap, createWriteStream(file), { signal });
    const { sha256, bytes } = result();
    if (sha256 !== upload.sha256 || bytes !== upload.sizeBytes) {
      throw new Refusal('damaged', 'The file arrived changed: its SHA-256 is not the one it was sent with. Upload it again.');
    }
    return await use(file);
  } finally {
    await rm(folder, { recursive: true, force: true });
  }
}
