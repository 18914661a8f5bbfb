import { createHash } from 'node:crypto';
import type { Context } from '../../context.ts';
import type { FinalVersion } from '../../models/FinalVersion.ts';
import { webSizeKey } from '../../services/storage-keys.ts';
import { withUploadedFile } from '../uploads/fetch-upload.ts';

/** A version's web size in the store: 2048 px, sRGB, JPEG. */
export interface StoredWebSize {
  key: string;
  size: number;
  sha256: string;
}

/** Makes and stores the web size of a version from a copy of its file on this machine. */
export async function storeWebSize(ctx: Context, version: FinalVersion, commissionId: string, file: string): Promise<Buffer> {
  const { data } = await ctx.pixels.webSize(file);
  await ctx.store.put(webSizeKey(version, commissionId), data, 'image/jpeg');
  return data;
}

/** The web size of a version; made now where it is not there yet. */
export async function findWebSize(ctx: Context, version: FinalVersion, commissionId: string, signal: AbortSignal): Promise<StoredWebSize> {
  const key = webSizeKey(version, commissionId);
  const data = (await ctx.store.head(key))
    ? await ctx.store.getBuffer(key)
    : await withUploadedFile(ctx, version, signal, (file) => storeWebSize(ctx, version, commissionId, file));
  return { key, size: data.length, sha256: createHash('sha256').update(data).digest('hex') };
}
