import type { Job } from '../../jobs/job.ts';
import { Frame } from '../../models/Frame.ts';
import { Upload } from '../../models/Upload.ts';
import { DERIVATIVE_SIZES } from '../../imaging/derivative-sizes.ts';
import { frameKey, RECIPE } from '../../services/storage-keys.ts';

/** Removes the file and the pictures of an upload whose bytes became a frame by another upload. */
export const dropTwin: Job<{ uploadId: string }> = {
  name: 'drop-twin',
  async run(ctx, { uploadId }) {
    const upload = await Upload.query().findById(uploadId);
    if (!upload || upload.frameId === upload.id || (await Frame.query().findOne({ storageKey: upload.storageKey }))) return;
    const pictures = DERIVATIVE_SIZES.map((size) => frameKey({ ...upload, recipe: RECIPE }, size));
    await ctx.store.remove(upload.storageKey, ...pictures);
  },
};
