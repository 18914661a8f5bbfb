import type { StudioScope } from '../../db/scope.ts';
import { problem } from '../../middleware/problem.ts';
import { Upload } from '../../models/Upload.ts';
import { findCommission } from '../commissions/find-commission.ts';

/** An upload to a commission of the studio that is there. @throws Problem 404 */
export async function findUpload(scope: StudioScope, uploadId: string): Promise<Upload> {
  const upload = await Upload.within(scope).findById(uploadId);
  if (!upload) throw problem(404);
  await findCommission(scope, upload.commissionId);
  return upload;
}
