import type { StudioScope } from '../../db/scope.ts';
import { problem } from '../../middleware/problem.ts';
import { Frame } from '../../models/Frame.ts';
import { findCommission } from '../commissions/find-commission.ts';

/** A frame of a commission that is there, also a deleted one that can still be restored. @throws Problem 404 */
export async function findFrame(scope: StudioScope, frameId: string): Promise<Frame> {
  const frame = await Frame.within(scope).findById(frameId);
  if (!frame) throw problem(404);
  await findCommission(scope, frame.commissionId);
  return frame;
}
