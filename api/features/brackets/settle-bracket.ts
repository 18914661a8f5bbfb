import type { Transaction } from 'objection';
import { middleFrame } from '../../domain/brackets/arrange.ts';
import { FEWEST_EXPOSURES } from '../../domain/brackets/candidate.ts';
import { Bracket } from '../../models/Bracket.ts';
import type { Frame } from '../../models/Frame.ts';
import { framesOfBrackets } from './bracket-frames.ts';
import { mergeName } from './merge-name.ts';
import { queueDrop, queueMerge } from './queue-grouping.ts';
import { layBracketProofs, layLeadProofs } from './settle-proofs.ts';

/** What settling is to bring about beside what the frames say. */
export interface Settling {
  /** More frames may come: the merge waits a moment. */
  mayGrow?: boolean;
  /** What the proof shows has been changed. */
  shows?: Bracket['shows'];
  leadFrameId?: string;
}

/**
 * Brings a bracket in line with the frames that now point to it, within the transaction that changed them and holds the commission: a lead,
 * the merged picture that is wanted, one proof on each sheet. Of fewer than two frames it goes. Run again it changes nothing.
 */
export async function settleBracket(trx: Transaction, bracket: Bracket, settling: Settling = {}): Promise<Bracket | null> {
  const arranged = (await framesOfBrackets(bracket, [bracket], trx)).get(bracket.id);
  const frames = arranged?.frames ?? [];
  if (frames.length < FEWEST_EXPOSURES) {
    await dissolveBracket(trx, bracket);
    return null;
  }
  const leadFrameId = leadAmong(frames, settling.leadFrameId ?? bracket.leadFrameId);
  const wanted = mergeName(frames, leadFrameId);
  const shows = settling.shows ?? bracket.shows;
  const same = wanted === bracket.wanted && shows === bracket.shows && leadFrameId === bracket.leadFrameId;
  const settled = same ? bracket : await patch(trx, bracket, { leadFrameId, wanted, shows });
  if (settled.wanted !== settled.madeOf && settled.problem === null) await queueMerge(trx, bracket, settling.mayGrow ?? false);
  await layBracketProofs(trx, settled, frames, !same);
  return settled;
}

function leadAmong(frames: readonly Frame[], leadFrameId: string): string {
  return frames.some(({ id }) => id === leadFrameId) ? leadFrameId : middleFrame(frames).id;
}

async function patch(trx: Transaction, bracket: Bracket, values: Pick<Bracket, 'leadFrameId' | 'wanted' | 'shows'>): Promise<Bracket> {
  const problem = values.wanted === bracket.wanted ? bracket.problem : null;
  await Bracket.within(bracket, trx)
    .findById(bracket.id)
    .patch({ ...values, problem });
  return Bracket.within(bracket, trx).findById(bracket.id).throwIfNotFound();
}

/** Makes a bracket's frames single frames. On drafts its proof becomes that of the lead frame. */
export async function dissolveBracket(trx: Transaction, bracket: Bracket): Promise<void> {
  await layLeadProofs(trx, bracket);
  await Bracket.within(bracket, trx).deleteById(bracket.id);
  await queueDrop(trx, bracket);
}
