import type { StudioScope } from '../../db/scope.ts';
import { problem } from '../../middleware/problem.ts';
import { Upload } from '../../models/Upload.ts';

/** An upload of the studio. @throws Problem 404 */
export async function findUpload(scope: StudioScope, uploadId: string): Promise<Upload> {
  const upload = await Upload.within(scope).findById(uploadId);
  if (!upload) throw problem(404);
  return upload;
}
