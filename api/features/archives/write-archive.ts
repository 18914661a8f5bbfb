import { createHash } from 'node:crypto';
import { once } from 'node:events';
import { addAbortSignal, PassThrough, type Readable, type Writable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import { ZipArchive } from 'archiver';
import './native-crc.ts';
import type { ArchiveEntry, ArchivePlan } from './plan-archive.ts';

/** The store gave other bytes than the row promises. Trying again may help only where the store was at fault. */
export class DamagedFile extends Error {
  override name = 'DamagedFile';
}

/**
 * Writes a stored archive to `output`, one file after the other, holding no more than a few chunks in memory. Settles when
 * output has taken everything; rejects, with everything destroyed, when a source fails, ends early, has other bytes than
 * promised, when output fails, or when `signal` breaks it off.
 * @throws DamagedFile where size or SHA-256 of a source differ
 */
export async function writeArchive(plan: ArchivePlan, output: Writable, signal: AbortSignal): Promise<void> {
  const broken = new AbortController();
  const either = AbortSignal.any([signal, broken.signal]);
  const zip = new ZipArchive({ store: true });
  // The pipeline listens as long as it runs; a late complaint of a destroyed archive must not end the process.
  zip.on('error', (error) => broken.abort(error));
  zip.on('warning', (error) => broken.abort(error));
  const flowing = pipeline(zip, output, { signal: either });
  const filling = fill(zip, plan, either);
  try {
    await Promise.all([flowing, filling]);
  } catch (error) {
    broken.abort(error);
    zip.abort();
    zip.destroy();
    output.destroy();
    await Promise.allSettled([flowing, filling]);
    throw either.reason instanceof Error && isAbort(error) ? either.reason : error;
  }
}

function isAbort(error: unknown): boolean {
  return error instanceof Error && error.name === 'AbortError';
}

async function fill(zip: ZipArchive, plan: ArchivePlan, signal: AbortSignal): Promise<void> {
  for (const entry of plan.entries) await append(zip, entry, signal);
  const { path, content, date } = plan.manifest;
  const appended = once(zip, 'entry', { signal });
  zip.append(content, { name: path, date, mode: 0o644 });
  await appended;
  await zip.finalize();
}

/**
 * One entry. archiver gets a stream of ours and never the source: a source that errors would end the process, one that is
 * destroyed silently would leave the archive waiting for ever. The next source is opened only after this entry is through,
 * so that no connection to the store idles until it is closed.
 */
async function append(zip: ZipArchive, entry: ArchiveEntry, signal: AbortSignal): Promise<void> {
  const pass = new PassThrough();
  const appended = once(zip, 'entry', { signal });
  appended.catch(() => undefined);
  zip.append(pass, { name: entry.path, date: entry.date, mode: 0o644 });
  await copyChecked(entry, pass, signal);
  await appended;
}

async function copyChecked(entry: ArchiveEntry, into: Writable, signal: AbortSignal): Promise<void> {
  const source: Readable = addAbortSignal(signal, await entry.open(signal));
  const hash = createHash('sha256');
  let size = 0;
  // The loop throws when the source is destroyed before its end, with or without an error.
  for await (const chunk of source as AsyncIterable<Buffer>) {
    size += chunk.length;
    if (size > entry.size) break;
    hash.update(chunk);
    if (!into.write(chunk)) await once(into, 'drain', { signal });
  }
  if (size !== entry.size || hash.digest('hex') !== entry.sha256) {
    throw new DamagedFile(`"${entry.name}" in the store is not the file that was taken in: its size or SHA-256 differs.`);
  }
  into.end();
}
