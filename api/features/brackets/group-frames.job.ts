import { setImmediate } from 'node:timers/promises';
import { raw, type Transaction } from 'objection';
import { groupInSteps, type BracketCandidate, type FoundBracket } from '../../domain/brackets.ts';
import type { Job } from '../../jobs/job.ts';
import { Bracket } from '../../models/Bracket.ts';
import { Commission } from '../../models/Commission.ts';
import { Frame } from '../../models/Frame.ts';
import { announceBrackets } from './announce-brackets.ts';
import { holdSheets } from './hold-commission.ts';
import { findDoubles } from './find-doubles.ts';
import { mergeName } from './merge-name.ts';
import { matchBrackets } from './match-brackets.ts';
import { dissolveBracket, settleBracket } from './settle-bracket.ts';
import { shownFrames } from './shown-frames.ts';

type MeasuredFrame = Frame & { thumb: string | null };

/**
 * Groups the frames of a commission into brackets. What somebody decided by hand, and what a client has been shown or has picked, stays as it
 * is; brackets whose frames are the same keep their ids. Everything is decided in one transaction, so it may be cut off and run again.
 */
export const groupFrames: Job<{ commissionId: string }> = {
  name: 'group-frames',
  async run(ctx, { commissionId }) {
    const commission = await Commission.transaction(async (trx) => {
      const held = await Commission.query(trx).findById(commissionId).whereNull('deletedAt').forUpdate();
      if (held) await regroup(trx, held);
      return held;
    });
    if (!commission) return;
    await findDoubles(commission);
    await announceBrackets(ctx.knex, commissionId);
  },
};

async function regroup(trx: Transaction, commission: Commission): Promise<void> {
  await holdSheets(commission, commission.id, trx);
  const frames = await framesToGroup(trx, commission);
  const known = await Bracket.within(commission, trx).where({ commissionId: commission.id }).orderBy(['createdAt', 'id']);
  const open = new Map(known.filter((bracket) => !bracket.byHand).map((bracket) => [bracket.id, bracket]));
  // A bracket with a frame that is left alone is left alone as a whole.
  const free = frames.filter(({ bracketId }) => bracketId === null || open.has(bracketId));
  const there = [...open.values()].filter(({ id }) => free.some(({ bracketId }) => bracketId === id));
  const found = await groupWithPauses(free.map(candidateOf));
  const { kept, gone } = matchBrackets(found, there, free);
  const frameOf = new Map(free.map((frame) => [frame.id, frame]));
  for (const bracket of gone) {
    await Frame.within(bracket, trx).where({ bracketId: bracket.id }).patch({ bracketId: null });
    await dissolveBracket(trx, bracket);
  }
  for (const [one, bracket] of kept) if (!isAsFound(one, bracket, frameOf)) await bringAbout(trx, commission, one, bracket);
}

/** Milliseconds at a stretch; a worker that gives no sign of life for long is taken for dead, and its jobs are begun again by others. */
const A_STRETCH = 50;

/** Groups frames, and lets everything else the worker does have its turn in between. */
async function groupWithPauses(frames: BracketCandidate[]): Promise<FoundBracket[]> {
  const steps = groupInSteps(frames);
  let begun = Date.now();
  for (let step = steps.next(); ; step = steps.next()) {
    if (step.done) return step.value;
    if (Date.now() - begun < A_STRETCH) continue;
    await setImmediate();
    begun = Date.now();
  }
}

/** Measured frames that neither a person nor a client's eyes have settled, held. */
async function framesToGroup(trx: Transaction, commission: Commission): Promise<MeasuredFrame[]> {
  const shown = await shownFrames(trx, { studioId: commission.studioId, commissionId: commission.id });
  const frames = await Frame.within(commission, trx)
    .where({ commissionId: commission.id, state: 'ready', groupedByHand: false })
    .whereNull('deletedAt')
    .whereNotNull('measuresRecipe')
    .orderBy('id')
    .forUpdate()
    .select('frames.*', raw(`(select measures->>'thumb' from frame_measures m where m.frame_id = frames.id)`).as('thumb'))
    .castTo<MeasuredFrame[]>();
  return frames.filter(({ id }) => !shown.has(id));
}

function candidateOf(frame: MeasuredFrame) {
  return { ...pickSettings(frame), takenAt: frame.takenAt?.getTime() ?? null };
}

function pickSettings(frame: MeasuredFrame) {
  const { id, name, takenLocal, exposureTime, fNumber, iso, exposureBias, exposureMode } = frame;
  const { make, model, serial, lens, focalLength, width, height, thumb } = frame;
  return {
    ...{ id, name, takenLocal, exposureTime, fNumber, iso, exposureBias, exposureMode },
    ...{ make, model, serial, lens, focalLength, width, height, thumb },
  };
}

const leadOf = (found: FoundBracket, there: Bracket | undefined) =>
  there?.leadByHand && found.frameIds.includes(there.leadFrameId) ? there.leadFrameId : found.leadId;

/** Whether a bracket is already what was found: of thousands only few are new each time. */
function isAsFound(found: FoundBracket, there: Bracket | undefined, frameOf: ReadonlyMap<string, MeasuredFrame>): boolean {
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
