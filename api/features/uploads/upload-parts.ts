import type { Context } from '../../context.ts';
import { Upload } from '../../models/Upload.ts';
import type { StoredPart } from '../../services/storage.ts';

export const MEBIBYTE = 1024 * 1024;
/** What the browser sends at a time; also what one part in flight costs in memory. */
const USUAL_PART = 8 * MEBIBYTE;
/** S3 takes parts numbered 1 to 10 000 (Amazon S3 User Guide, multipart upload limits). */
const MOST_PARTS = 10_000;

type Measured = Pick<Upload, 'sizeBytes' | 'partSize'>;

/** Bytes of a part: 8 MiB, more only for files that would need more than 10 000 of them. */
export function partSizeFor(sizeBytes: number): number {
  return Math.max(USUAL_PART, Math.ceil(sizeBytes / MOST_PARTS / MEBIBYTE) * MEBIBYTE);
}

export function partCount({ sizeBytes, partSize }: Measured): number {
  return Math.ceil(sizeBytes / partSize);
}

/** Bytes that part `number` must have: the last one has what is left. */
export function partLength({ sizeBytes, partSize }: Measured, number: number): number {
  return Math.min(partSize, sizeBytes - (number - 1) * partSize);
}

/** Whether the store does not know a multipart upload: it was completed, aborted, or cleared away by the store's own rules. */
export function isUnknownUpload(error: unknown): boolean {
  return (error as { name?: string }).name === 'NoSuchUpload';
}

/** Parts in the store that have the length they must have; others count as missing and are sent again. */
export function wholeParts(upload: Measured, parts: StoredPart[]): StoredPart[] {
  const count = partCount(upload);
  return parts.filter((part) => part.number >= 1 && part.number <= count && part.size === partLength(upload, part.number));
}

/** Numbers of the parts that are not there yet. */
export function missingParts(upload: Measured, parts: StoredPart[]): number[] {
  const there = new Set(parts.map((part) => part.number));
  return Array.from({ length: partCount(upload) }, (_, index) => index + 1).filter((number) => !there.has(number));
}

/**
 * Opens the multipart upload in the store where the row has none, or where the store has lost the one it names. Two
 * requests may do so at once: the row keeps the first, the other is aborted.
 */
export async function openMultipart(ctx: Context, upload: Upload): Promise<Upload> {
  const opened = await ctx.store.createMultipart(upload.storageKey, 'application/octet-stream');
  const kept = await Upload.within(upload)
    .patch({ multipartId: opened })
    .where({ id: upload.id, state: 'receiving', multipartId: upload.multipartId })
    .returning('*')
    .first();
  if (kept) return kept;
  await ctx.store.abortMultipart(upload.storageKey, opened);
  return Upload.within(upload).findById(upload.id).throwIfNotFound();
}

/** Whether the whole file lies in the store: a call joined the parts and was cut off, or another one is doing so just now. */
export async function isWhole(ctx: Context, upload: Upload): Promise<boolean> {
  return (await ctx.store.head(upload.storageKey))?.size === upload.sizeBytes;
}

/** The upload with the parts that the store holds, in order. */
export interface PartsThere {
  upload: Upload;
  parts: StoredPart[];
  /** The parts are joined already; nothing is left to send. */
  joined: boolean;
}

function everyPart(upload: Upload): StoredPart[] {
  return missingParts(upload, []).map((number) => ({ number, size: partLength(upload, number), etag: '' }));
}

/** Asks the store which parts are there. Where it has lost all of them, the sending begins anew. */
export async function readParts(ctx: Context, upload: Upload): Promise<PartsThere> {
  if (upload.state !== 'receiving') return { upload, parts: [], joined: true };
  if (upload.multipartId === null) return { upload: await openMultipart(ctx, upload), parts: [], joined: false };
  try {
    const parts = wholeParts(upload, await ctx.store.listParts(upload.storageKey, upload.multipartId));
    return { upload, parts, joined: false };
  } catch (error) {
    if (!isUnknownUpload(error)) throw error;
    if (await isWhole(ctx, upload)) return { upload, parts: everyPart(upload), joined: true };
    return { upload: await openMultipart(ctx, upload), parts: [], joined: false };
  }
}
