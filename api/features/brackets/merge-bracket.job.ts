import { DERIVATIVE_SIZES } from '../../imaging/derivative-sizes.ts';
import type { Transaction } from 'objection';
import type { Context } from '../../context.ts';
import type { ArrangedBracket } from '../../domain/brackets/arrange.ts';
import { FEWEST_EXPOSURES } from '../../domain/brackets/candidate.ts';
import { isInVain } from '../../jobs/in-vain.ts';
import type { Job } from '../../jobs/job.ts';
import { Bracket } from '../../models/Bracket.ts';
import type { Frame } from '../../models/Frame.ts';
import { Proof } from '../../models/Proof.ts';
import { Sheet } from '../../models/Sheet.ts';
import { frameKey, mergedKey } from '../../services/storage-keys.ts';
import { touchSheet } from '../sheets/change-proofs.ts';
import { announceBrackets } from './announce-brackets.ts';
import { framesOfBrackets } from './bracket-frames.ts';
import { holdSheets } from './hold-commission.ts';
import { queueDrop } from './queue-grouping.ts';

const ALONE = 'No other frame could be laid over the lead frame, so that stands alone.';
const FAILED = 'The frames could not be merged.';

/**
 * Fuses a bracket's frames at viewer size. Killed or run twice it does no more than is missing; where the bracket changed meanwhile, what was
 * made is thrown away and the next run makes the picture that is wanted then.
 */
export const mergeBracket: Job<{ bracketId: string }> = {
  name: 'merge-bracket',
  timeoutSeconds: 600,
  async run(ctx, { bracketId }, tools) {
    const bracket = await Bracket.query().findById(bracketId);
    if (!bracket || bracket.madeOf === bracket.wanted || bracket.problem !== null) return;
    const arranged = (await framesOfBrackets(bracket, [bracket])).get(bracketId);
    if (!arranged || arranged.frames.length === 0) return;
    try {
      await merge(ctx, bracket, arranged);
    } catch (error) {
      if (tools.signal.aborted || !isInVain(error, tools)) throw error;
      ctx.log.warn({ bracketId, err: error }, 'a bracket could not be merged');
      await conclude(bracket, { problem: FAILED, leftOut: [] });
    }
  },
};

async function merge(ctx: Context, bracket: Bracket, { frames, steps }: ArrangedBracket<Frame>): Promise<void> {
  const pictures = await Promise.all(
    frames.map(async (frame, index) => ({ jpeg: await ctx.store.getBuffer(frameKey(frame, 2560)), ev: steps[index] ?? 0 })),
  );
  const lead = frames.findIndex(({ id }) => id === bracket.leadFrameId);
  const merged = await ctx.pixels.merge(pictures, lead);
  const leftOut = merged.leftOut.map(({ index, why }) => ({ frameId: frames[index]?.id ?? '', why }));
  if (frames.length - leftOut.length < FEWEST_EXPOSURES) return void (await conclude(bracket, { problem: ALONE, leftOut }));
  const made = { ...bracket, madeOf: bracket.wanted };
  await Promise.all(merged.pictures.map(({ size, data }) => ctx.store.put(mergedKey(made, size), data, 'image/jpeg')));
  const { width, height, placeholder } = merged;
  const stands = await conclude(bracket, { madeOf: bracket.wanted, width, height, placeholder, leftOut });
  if (!stands) await ctx.store.remove(...DERIVATIVE_SIZES.map((size) => mergedKey(made, size)));
}

/** Writes down what came of it, unless another picture is wanted by now, and has the proofs made that waited. */
async function conclude(bracket: Bracket, values: Partial<Bracket>): Promise<boolean> {
  return Bracket.transaction(async (trx) => {
    await holdSheets(bracket, bracket.commissionId, trx);
    const changed = await Bracket.within(bracket, trx).where({ id: bracket.id, wanted: bracket.wanted }).patch(values);
    if (changed === 0) return false;
    if (values.madeOf !== undefined) await queueDrop(trx, bracket);
    await touchSheets(trx, bracket);
    await announceBrackets(trx, bracket.commissionId);
    return true;
  });
}

async function touchSheets(trx: Transaction, bracket: Bracket): Promise<void> {
  const sheets = await Sheet.within(bracket, trx).whereExists(
    Proof.query(trx).whereColumn('proofs.sheetId', 'sheets.id').where({ bracketId: bracket.id }),
  );
  for (const { id, commissionId } of sheets) await touchSheet(trx, id, commissionId);
}
