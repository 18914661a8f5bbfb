import { createHash } from 'node:crypto';
import type { Context } from '../../context.ts';
import type { StudioScope } from '../../db/scope.ts';
import { watermarkKey } from '../../services/storage-keys.ts';

/** What a watermark then names; pixels of the kept picture. */
interface KeptImage {
  imageKey: string;
  width: number;
  height: number;
}

/** Keeps a PNG, cleaned, as a watermark of the studio; the same picture twice is one. @throws Refusal where it is no PNG that can be read */
export async function keepImage(ctx: Context, { studioId }: StudioScope, png: Buffer): Promise<KeptImage> {
  const { data, width, height } = await ctx.pixels.cleanWatermark(png);
  const imageKey = watermarkKey(studioId, createHash('sha256').update(data).digest('hex'));
  await ctx.store.put(imageKey, data, 'image/png');
  return { imageKey, width, height };
}
