import type { Transaction } from 'objection';
import type { FoundBracket } from '../../domain/brackets.ts';
import { Bracket } from '../../models/Bracket.ts';
import { Commission } from '../../models/Commission.ts';
import { Frame } from '../../models/Frame.ts';
import { holdSheets } from './hold-commission.ts';
import { matchBrackets } from './match-brackets.ts';
import { mergeName } from './merge-name.ts';
import { openToGrouping, type OpenToGrouping } from './open-to-grouping.ts';
import { dissolveBracket, settleBracket } from './settle-bracket.ts';

/**
 * Brings a commission's brackets in line with what was found among `compared` frames, in one transaction.
 * @returns false, and nothing is written, where some of those frames are not open to the machine any more
 */
export function writeBrackets(commission: Commission, compared: readonly Frame[], found: readonly FoundBracket[]): Promise<boolean> {
  return Commission.transaction(async (trx) => {
    const held = await Commission.query(trx).findById(commission.id).whereNull('deletedAt').forUpdate();
    if (!held) return true;
    await holdSheets(held, held.id, trx);
    const open = await openToGrouping(trx, held, { hold: true });
    if (!stillHolds(compared, open)) return false;
    await write(trx, held, open, found);
    return true;
  });
}

/**
 * Frames that were measured meanwhile change nothing: each has queued a grouping of its own. One that stands in a bracket already means that
 * a later grouping came first.
 */
function stillHolds(compared: readonly Frame[], { frames }: OpenToGrouping): boolean {
  const now = new Map(frames.map((frame) => [frame.id, frame]));
  const known = new Set(compared.map(({ id }) => id));
  const unchanged = compared.every(({ id, measuresRecipe }) => now.get(id)?.measuresRecipe === measuresRecipe);
  return unchanged && frames.every(({ id, bracketId }) => known.has(id) || bracketId === null);
}

async function write(trx: Transaction, commission: Commission, open: OpenToGrouping, found: readonly FoundBracket[]): Promise<void> {
  const { kept, gone } = matchBrackets(found, open.brackets, open.frames);
  for (const bracket of gone) {
    await Frame.within(bracket, trx).where({ bracketId: bracket.id }).patch({ bracketId: null });
    await dissolveBracket(trx, bracket);
  }
  const frameOf = new Map(open.frames.map((frame) => [frame.id, frame]));
  for (const [one, bracket] of kept) if (!isAsFound(one, bracket, frameOf)) await bringAbout(trx, commission, one, bracket);
}

const leadOf = (found: FoundBracket, there: Bracket | undefined) =>
  there?.leadByHand && found.frameIds.includes(there.leadFrameId) ? there.leadFrameId : found.leadId;

/** Whether a bracket is already what was found: of thousands only few are new each time. */
function isAsFound(found: FoundBracket, there: Bracket | undefined, frameOf: ReadonlyMap<string, Frame>): boolean {
  if (!there || there.leadFrameId !== leadOf(found, there)) return false;
  const frames = found.frameIds.flatMap((id) => frameOf.get(id) ?? []);
  // The name tells a frame too many or too few as well.
  return frames.every(({ bracketId }) => bracketId === there.id) && there.wanted === mergeName(frames, there.leadFrameId);
}

/** Makes the bracket that was found, or brings the one that is there in line with it. */
async function bringAbout(trx: Transaction, commission: Commission, found: FoundBracket, there: Bracket | undefined): Promise<void> {
  const { studioId, id: commissionId } = commission;
  const bracket = there ?? (await Bracket.query(trx).insertAndFetch({ studioId, commissionId, leadFrameId: found.leadId, wanted: '' }));
  const mine = Frame.within(commission, trx);
  await mine.clone().where({ bracketId: bracket.id }).whereNotIn('id', found.frameIds).patch({ bracketId: null });
  await mine.clone().whereIn('id', found.frameIds).whereRaw('bracket_id is distinct from ?', [bracket.id]).patch({ bracketId: bracket.id });
  await settleBracket(trx, bracket, { leadFrameId: leadOf(found, bracket), mayGrow: true });
}
