import sharp from 'sharp';
import type { Context } from '../../context.ts';
import type { PreviewWatermark } from '../../contract/watermark.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { Frame } from '../../models/Frame.ts';
import { frameKey } from '../../services/storage-keys.ts';
import { ownImage } from './own-image.ts';

/**
 * A watermark tried on a frame of the studio, or on a plain grey where none is named. JPEG, 960 px.
 * @throws Problem 422 where its picture is another studio's
 */
export async function previewWatermark(ctx: Context, actor: StaffActor, wish: PreviewWatermark): Promise<Buffer | undefined> {
  const { watermark, frameId } = wish;
  ownImage(actor, watermark);
  const picture = await pictureToTry(ctx, actor, frameId);
  const logo = watermark.kind === 'image' && watermark.imageKey ? await ctx.store.getBuffer(watermark.imageKey) : null;
  const [preview] = await ctx.pixels.watermark(picture, watermark, logo, [960]);
  return preview?.data;
}

async function pictureToTry(ctx: Context, actor: StaffActor, frameId: string | undefined): Promise<Buffer> {
  const frame = frameId ? await Frame.within(actor).findById(frameId).whereNull('deletedAt') : undefined;
  if (frame?.state === 'ready') return ctx.store.getBuffer(frameKey(frame, 2560));
  return sharp({ create: { width: 960, height: 640, channels: 3, background: '#777777' } })
    .jpeg()
    .toBuffer();
}
