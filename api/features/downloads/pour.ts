import { once } from 'node:events';
import { addAbortSignal, type Readable } from 'node:stream';
import type { Response } from 'express';
import { problem } from '../../middleware/problem.ts';
import type { Store } from '../../services/storage.ts';
import type { ByteRange } from '../../domain/byte-ranges.ts';
import type { Part, Parts } from './multipart-ranges.ts';
import type { StoredObject, TransferWatch } from './send-object.ts';

/** What an answer says of the file must not stand over a problem. */
const OF_THE_FILE = ['Content-Length', 'Content-Type', 'Content-Disposition', 'Content-Range', 'ETag', 'Last-Modified', 'Accept-Ranges'];
/** A client that takes nothing for so long has gone without saying so. */
const IDLE_MS = 5 * 60 * 1000;

/**
 * Sends the parts one after the other. When the client goes, the store is not read any further; when the store fails, the
 * connection is cut, since an answer that ends early and looks whole would be kept by the client as the file.
 */
export async function pour(
  res: Response,
  store: Pick<Store, 'get'>,
  object: StoredObject,
  parts: Parts,
  watch: TransferWatch,
): Promise<void> {
  const gone = new AbortController();
  const leave = () => gone.abort();
  res.once('close', leave);
  res.setTimeout(IDLE_MS, () => res.destroy());
  try {
    // Opened before the head goes out: a store that does not answer is still a 503.
    const first = parts.list[0] && (await openSpan(store, object, parts.list[0], gone.signal));
    await watch.begin?.(parts.list.map((part) => part.range));
    for (const part of parts.list) {
      const source = part === parts.list[0] && first ? first : await openSpan(store, object, part, gone.signal);
      if (part.before) await write(res, Buffer.from(part.before), gone.signal);
      await copy(source, res, part.range, gone.signal, watch);
    }
    if (parts.after) await write(res, Buffer.from(parts.after), gone.signal);
    await finish(res);
  } catch (error) {
    if (res.headersSent || gone.signal.aborted) return void res.destroy();
    for (const name of OF_THE_FILE) res.removeHeader(name);
    throw error;
  } finally {
    res.off('close', leave);
    gone.abort();
    await watch.end?.();
  }
}

async function openSpan(store: Pick<Store, 'get'>, object: StoredObject, { range }: Part, signal: AbortSignal): Promise<Readable> {
  try {
    return addAbortSignal(signal, await store.get(object.key, range, signal));
  } catch (error) {
    if (signal.aborted) throw error;
    throw problem(503, 'The file store does not answer at the moment. Please try again in a minute.', { retryAfter: 30 });
  }
}

async function write(res: Response, chunk: Buffer, signal: AbortSignal): Promise<void> {
  if (!res.write(chunk)) await once(res, 'drain', { signal });
}

async function copy(source: Readable, res: Response, range: ByteRange, signal: AbortSignal, watch: TransferWatch): Promise<void> {
  let at = range.start;
  for await (const chunk of source as AsyncIterable<Buffer>) {
    if (at + chunk.length - 1 > range.end) break;
    await write(res, chunk, signal);
    watch.sent?.({ start: at, end: at + chunk.length - 1 });
    at += chunk.length;
  }
  if (at !== range.end + 1) throw new Error('The store gave fewer or more bytes than the file has.');
}

/** Waits until everything is handed to the operating system, so that a transfer is not called finished before. */
async function finish(res: Response): Promise<void> {
  await new Promise<void>((resolve, reject) => {
    res.once('close', () => (res.writableFinished ? resolve() : reject(new Error('the client went'))));
    res.end(() => resolve());
  });
}
