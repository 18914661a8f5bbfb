import type { Bracket as BracketAnswer, MergedPicture } from '../../contract/brackets.ts';
import type { Context } from '../../context.ts';
import type { ArrangedBracket } from '../../domain/brackets/arrange.ts';
import type { Bracket } from '../../models/Bracket.ts';
import type { Commission } from '../../models/Commission.ts';
import type { Frame } from '../../models/Frame.ts';
import { pictureAddress } from '../../services/picture-address.ts';
import { type DerivativeSize, mergedKey } from '../../services/storage-keys.ts';
import { bracketCan } from './policy.ts';
import type { Shown } from './shown-frames.ts';
import { mergeState } from './shown-picture.ts';

const WHY_LEFT_OUT = {
  moved: 'It cannot be laid over the lead frame: the camera moved.',
  size: 'It has another size than the lead frame.',
};

async function presentMerged(ctx: Context, bracket: Bracket): Promise<MergedPicture> {
  const state = mergeState(bracket);
  const address = (size: DerivativeSize) => pictureAddress(ctx, mergedKey(bracket, size));
  const ready = state === 'ready';
  return {
    state,
    width: ready ? bracket.width : null,
    height: ready ? bracket.height : null,
    placeholder: ready ? bracket.placeholder : null,
    pictures: ready ? { '480': await address(480), '960': await address(960), '2560': await address(2560) } : null,
    leftOut: state === 'waiting' ? [] : bracket.leftOut.map(({ frameId, why }) => ({ frameId, says: WHY_LEFT_OUT[why] })),
    problem: bracket.problem,
  };
}

/** A bracket as the Frames page shows it. */
export async function presentBracket(
  ctx: Context,
  commission: Commission,
  bracket: Bracket,
  { frames, steps, says }: ArrangedBracket<Frame>,
  shown: Shown | undefined,
): Promise<BracketAnswer> {
  const times = frames.flatMap(({ takenLocal }) => takenLocal ?? []).sort();
  return {
    id: bracket.id,
    leadFrameId: bracket.leadFrameId,
    frameIds: frames.map(({ id }) => id),
    steps,
    says,
    byHand: bracket.byHand,
    shows: bracket.shows,
    merged: await presentMerged(ctx, bracket),
    takenLocal: times[0] ?? null,
    viewId: frames.find(({ id }) => id === bracket.leadFrameId)?.viewId ?? null,
    can: bracketCan(commission, shown),
  };
}
