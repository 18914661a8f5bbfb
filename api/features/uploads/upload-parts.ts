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

/** The upload with the parts that the store holds, in order. Where the store has lost all of them, it begins anew. */
export async function readParts(ctx: Context, upload: Upload): Promise<{ upload: Upload; parts: StoredPart[] }> {
  if (upload.state !== 'receiving') return { upload, parts: [] };
  if (upload.multipartId === null) return { upload: await openMultipart(ctx, upload), parts: [] };
  try {
    return { upload, parts: wholeParts(upload, await ctx.store.listParts(upload.storageKey, upload.multipartId)) };
  } catch (error) {
    if (!isUnknownUpload(error)) throw error;
    return { upload: await openMultipart(ctx, upload), parts: [] };
  }
}
