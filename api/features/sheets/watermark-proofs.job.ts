import type { Context } from '../../context.ts';
import { announce } from '../../db/live.ts';
import type { Job } from '../../jobs/job.ts';
import type { Frame } from '../../models/Frame.ts';
import { Proof } from '../../models/Proof.ts';
import { Sheet } from '../../models/Sheet.ts';
import { frameKey, proofKey } from '../../services/storage-keys.ts';

/** Proofs under way at once: enough to keep every child at work while others are fetched and stored. */
const ABREAST = 4;
/** The guest's page is told after so many, not after each. */
const TELL_EVERY = 12;

type ProofToMark = Proof & { frame: Frame };

/**
 * Lays the sheet's watermark over every proof that does not carry it yet. Killed or run twice it goes on with what is missing; a watermark
 * changed meanwhile leaves the old pictures unused, since their keys carry its name.
 */
export const watermarkProofs: Job<{ sheetId: string }> = {
  name: 'watermark-proofs',
  timeoutSeconds: 3600,
  async run(ctx, { sheetId }, { signal }) {
    const sheet = await Sheet.query().findById(sheetId);
    if (!sheet) return;
    const missing = await Proof.within(sheet)
      .where({ sheetId })
      .where((any) => any.whereNull('watermarkHash').orWhereNot('watermarkHash', sheet.watermarkHash))
      .orderBy('position')
      .withGraphFetched('frame')
      .castTo<ProofToMark[]>();
    if (missing.length === 0) return;
    const image = sheet.watermark.kind === 'image' && sheet.watermark.imageKey ? await ctx.store.getBuffer(sheet.watermark.imageKey) : null;
    let made = 0;
    const lane = async () => {
      for (let proof = missing.shift(); proof && !signal.aborted; proof = missing.shift()) {
        await watermarkProof(ctx, sheet, proof, image);
        made += 1;
        if (made % TELL_EVERY === 0 || missing.length === 0) await tell(ctx, sheet);
      }
    };
    await Promise.all(Array.from({ length: ABREAST }, lane));
    signal.throwIfAborted();
    await tell(ctx, sheet);
  },
};

async function watermarkProof(ctx: Context, sheet: Sheet, proof: ProofToMark, image: Buffer | null): Promise<void> {
  const picture = await ctx.store.getBuffer(frameKey(proof.frame, 2560));
  const marked = await ctx.pixels.watermark(picture, sheet.watermark, image);
  const target = { studioId: proof.studioId, sheetId: sheet.id, id: proof.id, watermarkHash: sheet.watermarkHash };
  await Promise.all(marked.map(({ size, data }) => ctx.store.put(proofKey(target, sheet.commissionId, size), data, 'image/jpeg')));
  // The watermark may have been changed meanwhile and its own run be through with this proof: then this one comes too late.
  const stillWanted = Sheet.within(sheet).where({ id: sheet.id, watermarkHash: sheet.watermarkHash });
  await Proof.within(sheet).findById(proof.id).whereExists(stillWanted).patch({ watermarkHash: sheet.watermarkHash });
}

async function tell(ctx: Context, sheet: Sheet): Promise<void> {
  await ctx.knex('sheets').where({ id: sheet.id }).increment('revision', 1);
  await announce(ctx.knex, `sheet:${sheet.id}`, { what: 'proofs' });
  await announce(ctx.knex, `commission:${sheet.commissionId}`, { what: 'sheet', sheetId: sheet.id });
}
