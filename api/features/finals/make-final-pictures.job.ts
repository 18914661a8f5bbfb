import type { Context } from '../../context.ts';
import { announce } from '../../db/live.ts';
import type { Job } from '../../jobs/job.ts';
import { Final } from '../../models/Final.ts';
import { FinalVersion } from '../../models/FinalVersion.ts';
import { finalKey, RECIPE } from '../../services/storage-keys.ts';
import { withUploadedFile } from '../uploads/fetch-upload.ts';
import { storeWebSize } from './web-size.ts';

/** Makes the pictures of a final's version, and its web size for deliveries. Stops quietly where they are made. */
export const makeFinalPictures: Job<{ versionId: string }> = {
  name: 'make-final-pictures',
  async run(ctx, { versionId }, { signal }) {
    const version = await FinalVersion.query(ctx.knex).findById(versionId);
    const final = version && (await Final.query(ctx.knex).findById(version.finalId));
    if (!version || !final || version.recipe === RECIPE) return;
    const placeholder = await withUploadedFile(ctx, version, signal, (file) => storePictures(ctx, version, final.commissionId, file));
    await ctx.knex.transaction(async (trx) => {
      await FinalVersion.query(trx).findById(versionId).patch({ placeholder, recipe: RECIPE });
      await announce(trx, `commission:${final.commissionId}`, { what: 'final-ready', finalId: final.id, versionId });
    });
  },
};

async function storePictures(ctx: Context, version: FinalVersion, commissionId: string, file: string): Promise<string> {
  const { pictures, placeholder } = await ctx.pixels.prepare(file);
  const now = { studioId: version.studioId, id: version.id, recipe: RECIPE };
  for (const { size, data } of pictures) await ctx.store.put(finalKey(now, commissionId, size), data, 'image/jpeg');
  await storeWebSize(ctx, version, commissionId, file);
  return placeholder;
}
