import type { Transaction } from 'objection';
import { FEWEST_EXPOSURES, type JoinFrames } from '../../contract/brackets.ts';
import { middleFrame } from '../../domain/brackets/arrange.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { invalid, problem } from '../../middleware/problem.ts';
import { Bracket } from '../../models/Bracket.ts';
import type { Commission } from '../../models/Commission.ts';
import { Frame } from '../../models/Frame.ts';
import { addToRecord } from '../record/add-to-record.ts';
import { announceBrackets } from './announce-brackets.ts';
import { holdForGrouping } from './hold-commission.ts';
import { whyNotRegrouped } from './policy.ts';
import { settleBracket } from './settle-bracket.ts';
import { shownFrames } from './shown-frames.ts';

/**
 * Joins frames to one bracket, by hand: the machine leaves them alone from now on. A bracket that some of them belonged to goes on without them.
 * Joined again they stay as they are. @throws Problem 404, 409 for what a client has been shown or picked, 422
 */
export async function joinFrames(actor: StaffActor, commissionId: string, input: JoinFrames): Promise<Bracket> {
  return Bracket.transaction(async (trx) => {
    const commission = await holdForGrouping(actor, commissionId, trx);
    const frames = await framesToJoin(trx, actor, commission, input);
    const before = await Bracket.within(actor, trx).findByIds([...new Set(frames.flatMap(({ bracketId }) => bracketId ?? []))]);
    const whole = await sameBracket(trx, frames, before);
    const bracket = whole ?? (await insertBracket(trx, commission, frames));
    await Frame.within(actor, trx).findByIds(input.frameIds).patch({ bracketId: bracket.id, groupedByHand: true });
    for (const other of before) if (other.id !== bracket.id) await leaveByHand(trx, other);
    const leadByHand = input.leadFrameId !== undefined || bracket.leadByHand;
    await Bracket.within(actor, trx).findById(bracket.id).patch({ byHand: true, leadByHand });
    const { leadFrameId = bracket.leadFrameId } = input;
    const settled = await settleBracket(trx, { ...bracket, byHand: true, leadByHand } as Bracket, { leadFrameId });
    await addToRecord(trx, {
      studioId: actor.studioId,
      commissionId,
      actor,
      did: 'frame.joined',
      says: `Joined ${frames.length} frames to a bracket`,
      about: { bracketId: bracket.id, frameIds: input.frameIds },
    });
    await announceBrackets(trx, commissionId);
    return settled ?? bracket;
  });
}

/** Somebody took frames out of it: what is left is as decided as what went. */
export async function leaveByHand(trx: Transaction, bracket: Bracket): Promise<Bracket | null> {
  await Frame.within(bracket, trx).where({ bracketId: bracket.id }).patch({ groupedByHand: true });
  await Bracket.within(bracket, trx).findById(bracket.id).patch({ byHand: true });
  return settleBracket(trx, await Bracket.within(bracket, trx).findById(bracket.id).throwIfNotFound());
}

async function framesToJoin(trx: Transaction, actor: StaffActor, { id }: Commission, input: JoinFrames): Promise<Frame[]> {
  const { leadFrameId } = input;
  const frameIds = [...new Set(input.frameIds)];
  if (frameIds.length < FEWEST_EXPOSURES) throw invalid([{ path: 'frameIds', message: 'Choose at least two frames.' }]);
  const frames = await Frame.within(actor, trx)
    .where({ commissionId: id })
    .whereIn('id', frameIds)
    .whereNull('deletedAt')
    .orderBy('id')
    .forUpdate();
  if (frames.length < frameIds.length)
    throw invalid([{ path: 'frameIds', message: 'Some of these frames are no longer in this commission.' }]);
  if (frames.some(({ state }) => state !== 'ready'))
    throw invalid([{ path: 'frameIds', message: 'Some of these frames are still being read. Wait a moment and try again.' }]);
  if (leadFrameId !== undefined && !frameIds.includes(leadFrameId))
    throw invalid([{ path: 'leadFrameId', message: 'The lead frame has to be one of them.' }]);
  const shown = await shownFrames(trx, { studioId: actor.studioId, commissionId: id });
  const kept = frames.find((frame) => shown.has(frame.id));
  if (kept) throw problem(409, `${kept.name} stays as it is. ${whyNotRegrouped(shown.get(kept.id))}`, { code: 'shown' });
  return frames;
}

/** The bracket that these very frames are already. */
async function sameBracket(trx: Transaction, frames: readonly Frame[], before: readonly Bracket[]): Promise<Bracket | undefined> {
  const [only] = before;
  if (!only || frames.some(({ bracketId }) => bracketId !== only.id)) return undefined;
  const size = await Frame.within(only, trx).where({ bracketId: only.id }).whereNull('deletedAt').resultSize();
  return size === frames.length ? only : undefined;
}

/** The wanted picture is named by the settling that follows. */
async function insertBracket(trx: Transaction, { id: commissionId, studioId }: Commission, frames: readonly Frame[]): Promise<Bracket> {
  return Bracket.query(trx).insertAndFetch({ studioId, commissionId, leadFrameId: middleFrame(frames).id, byHand: true, wanted: '' });
}
