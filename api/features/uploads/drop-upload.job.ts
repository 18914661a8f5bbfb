import type { Job } from '../../jobs/job.ts';
import { Upload } from '../../models/Upload.ts';

/** Removes from the store what an upload left that failed or was given up. */
export const dropUpload: Job<{ uploadId: string }> = {
  name: 'drop-upload',
  async run(ctx, { uploadId }) {
    const upload = await Upload.query().findById(uploadId);
    if (!upload || !['failed', 'cancelled'].includes(upload.state)) return;
    if (upload.multipartId !== null) await ctx.store.abortMultipart(upload.storageKey, upload.multipartId);
    await ctx.store.remove(upload.storageKey);
    await upload.$query().patch({ multipartId: null });
  },
};
