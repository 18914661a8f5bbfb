import type { NextRequest } from './next-request.ts';
import type { UploadTransport } from './transport.ts';
import type { UploadItem } from './upload-item.ts';

/** What the file has come to by a request that went through. */
export type Outcome = { kind: 'going' } | { kind: 'sent' } | { kind: 'known'; sentence: string };

/**
 * Makes one request and writes down in the item what it brought. Where the item was halted meanwhile nothing is written.
 * @param moved is told of bytes that left
 * @throws what the transport throws
 */
export async function perform(next: NextRequest, transport: UploadTransport, moved: (bytes: number) => void): Promise<Outcome> {
  const { item } = next;
  const { signal } = item.stop;
  if (next.kind === 'part') return sendPart(item, next.number, transport, moved, signal);
  item.asking = true;
  try {
    return next.kind === 'offer' ? await offer(item, transport, signal) : await complete(item, transport, signal);
  } finally {
    if (!signal.aborted) item.asking = false;
  }
}

async function offer(item: UploadItem, transport: UploadTransport, signal: AbortSignal): Promise<Outcome> {
  const { name, size, lastModified, sha256 = '' } = item;
  const answer = await transport.offer({ name, size, lastModified, sha256 }, signal);
  if (signal.aborted) return { kind: 'going' };
  if (answer.kind === 'known') return answer;
  item.uploadId = answer.uploadId;
  if (answer.kind === 'checking') return { kind: 'sent' };
  item.partSize = answer.partSize;
  item.partsThere.clear();
  for (const number of answer.partsThere) item.partsThere.add(number);
  item.unsure = false;
  return { kind: 'going' };
}

async function complete(item: UploadItem, transport: UploadTransport, signal: AbortSignal): Promise<Outcome> {
  await transport.complete(item.uploadId ?? '', signal);
  return signal.aborted ? { kind: 'going' } : { kind: 'sent' };
}

async function sendPart(
  item: UploadItem,
  number: number,
  transport: UploadTransport,
  moved: (bytes: number) => void,
  signal: AbortSignal,
): Promise<Outcome> {
  const { file, uploadId = '' } = item;
  if (!file) throw new Error('There is no file to send from.');
  const bytes = item.bytesOf(number);
  const start = (number - 1) * item.partSize;
  const progress = (loaded: number) => {
    if (signal.aborted) return;
    // The body is a little longer than the part: its frame of multipart/form-data counts too.
    const now = Math.min(loaded, bytes);
    moved(Math.max(0, now - (item.partsFlying.get(number) ?? 0)));
    item.partsFlying.set(number, now);
  };
  item.partsFlying.set(number, 0);
  try {
    await transport.putPart(uploadId, number, file.slice(start, start + bytes), progress, signal);
    progress(bytes);
    if (!signal.aborted) item.partsThere.add(number);
    return { kind: 'going' };
  } finally {
    if (!signal.aborted) item.partsFlying.delete(number);
  }
}
