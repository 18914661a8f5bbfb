import type { TransactionOrKnex } from 'objection';
import type { StudioScope } from '../../db/scope.ts';
import { Frame } from '../../models/Frame.ts';
import type { Pick as PickRow } from '../../models/Pick.ts';

type Picked = Pick<PickRow, 'frameId' | 'frameIds'>;

/** Ids of the frames that a pick brings: all of a bracket, darkest first, or the frame alone. */
export function pickedIds({ frameId, frameIds }: Picked): string[] {
  return frameIds.length > 0 ? frameIds : [frameId];
}

/** Every frame of some picks, by id. */
export async function framesOfPicks(scope: StudioScope, picks: readonly Picked[], db?: TransactionOrKnex): Promise<Map<string, Frame>> {
  const frames = await Frame.within(scope, db).findByIds([...new Set(picks.flatMap(pickedIds))]);
  return new Map(frames.map((frame) => [frame.id, frame]));
}

/** The frames of one pick, in its order. */
export function framesOfPick(pick: Picked, frames: ReadonlyMap<string, Frame>): Frame[] {
  return pickedIds(pick).flatMap((id) => frames.get(id) ?? []);
}
