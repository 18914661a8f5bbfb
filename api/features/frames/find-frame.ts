import type { StudioScope } from '../../db/scope.ts';
import { problem } from '../../middleware/problem.ts';
import { Frame } from '../../models/Frame.ts';

/** A frame of the studio, also a deleted one that can still be restored. @throws Problem 404 */
export async function findFrame(scope: StudioScope, frameId: string): Promise<Frame> {
  const frame = await Frame.within(scope).findById(frameId);
  if (!frame) throw problem(404);
  return frame;
}
