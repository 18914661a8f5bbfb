import { createHash } from 'node:crypto';
import type { Frame } from '../../models/Frame.ts';

/** Version of the merging; counts up whenever the same frames would give another picture. */
const MERGE_RECIPE = 1;

/** Names a merged picture by everything that its look depends on: the frames in their order, their pictures, the lead. */
export function mergeName(frames: readonly Pick<Frame, 'id' | 'recipe'>[], leadFrameId: string): string {
  const made = [MERGE_RECIPE, leadFrameId, frames.map(({ id, recipe }) => [id, recipe])];
  return createHash('sha256').update(JSON.stringify(made)).digest('hex').slice(0, 16);
}
