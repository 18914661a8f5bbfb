import type { Context } from '../../context.ts';
import type { Job } from '../../jobs/job.ts';
import { Bracket } from '../../models/Bracket.ts';
import type { Frame } from '../../models/Frame.ts';
import { Proof } from '../../models/Proof.ts';
import { Sheet } from '../../models/Sheet.ts';
import { proofKey } from '../../services/storage-keys.ts';
import { shownPicture } from '../brackets/shown-picture.ts';
import { announceSheet } from './announce-sheet.ts';

/** Proofs under way at once: enough to keep every child at work while others are fetched and stored. */
const ABREAST = 4;
/** The guest's page is told after so many, not after each. */
const TELL_EVERY = 12;

type ProofToMark = Proof & { frame: Frame; bracket: Bracket | null };

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
    const unmarked = await Proof.within(sheet)
      .where({ sheetId })
      .where((any) => any.whereNull('watermarkHash').orWhereNot('watermarkHash', sheet.watermarkHash))
      .orderBy('position')
      .withGraphFetched('[frame, bracket]')
      .castTo<ProofToMark[]>();
    const waiting = (proof: ProofToMark) => !shownPicture(proof.frame, proof.bracket).settled;
    // What waits for its merged picture has its turn when that is made.
    const missing = unmarked.filter((proof) => !waiting(proof));
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
  const shown = shownPicture(proof.frame, proof.bracket);
  const picture = await ctx.store.getBuffer(shown.key(2560));
  const marked = await ctx.pixels.watermark(picture, sheet.watermark, image);
  const target = {
    studioId: proof.studioId,
    sheetId: sheet.id,
    id: proof.id,
    watermarkHash: sheet.watermarkHash,
    pictured: shown.pictured,
  };
  await Promise.all(marked.map(({ size, data }) => ctx.store.put(proofKey(target, sheet.commissionId, size), data, 'image/jpeg')));
  // Watermark or bracket may have been changed meanwhile and its own run be through with this proof: then this one comes too late.
  const stillWanted = Sheet.within(sheet).where({ id: sheet.id, watermarkHash: sheet.watermarkHash });
  const proofNow = Proof.within(sheet)
    .findById(proof.id)
    .where({ bracketId: proof.bracketId, frameId: proof.frameId })
    .whereExists(stillWanted);
  if (proof.bracket) {
    const { id, shows, wanted, madeOf } = proof.bracket;
    void proofNow.whereExists(Bracket.within(sheet).where({ id, shows, wanted, madeOf }));
  }
  await proofNow.patch({ watermarkHash: sheet.watermarkHash, pictured: shown.pictured });
}

async function tell(ctx: Context, sheet: Sheet): Promise<void> {
  await ctx.knex('sheets').where({ id: sheet.id }).increment('revision', 1);
  await announceSheet(ctx.knex, sheet, 'proofs');
}
