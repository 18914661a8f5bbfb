import type { Context } from '../../context.ts';
import { announce } from '../../db/live.ts';
import { watermarkHash } from '../../imaging/watermark-hash.ts';
import { enqueue } from '../../jobs/queue.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { problem } from '../../middleware/problem.ts';
import { Commission } from '../../models/Commission.ts';
import { Sheet } from '../../models/Sheet.ts';
import { Studio } from '../../models/Studio.ts';
import { addToRecord } from '../record/add-to-record.ts';
import { renumber } from './change-proofs.ts';
import { layFrames } from './put-frames.ts';

/** Makes a draft from chosen frames, under the terms of the commission and the studio's watermark. */
export async function makeSheet(ctx: Context, actor: StaffActor, commissionId: string, frameIds: string[]): Promise<Sheet> {
  return ctx.knex.transaction(async (trx) => {
    // Holding the commission keeps two people from giving the same number.
    const commission = await Commission.within(actor, trx).findById(commissionId).whereNull('deletedAt').forUpdate();
    if (!commission) throw problem(404);
    const studio = await Studio.query(trx).findById(actor.studioId).throwIfNotFound();
    const before = await Sheet.within(actor, trx)
      .where({ commissionId })
      .max('number as number')
      .first()
      .castTo<{ number: number | null }>();
    const sheet = await Sheet.query(trx).insertAndFetch({
      studioId: actor.studioId,
      commissionId,
      number: (before.number ?? 0) + 1,
      allowance: commission.allowance,
      extraPrice: commission.extraPrice,
      currency: commission.currency,
      watermark: studio.watermark,
      watermarkHash: watermarkHash(studio.watermark),
      createdBy: actor.accountId,
    });
    const put = await layFrames(trx, sheet, frameIds);
    await renumber(trx, sheet.id);
    await enqueue(trx, 'watermark-proofs', { sheetId: sheet.id }, { key: `watermark-proofs:${sheet.id}`, priority: -2 });
    await announce(trx, `commission:${commissionId}`, { what: 'sheet', sheetId: sheet.id });
    await addToRecord(trx, {
      studioId: actor.studioId,
      commissionId,
      actor,
      did: 'sheet.made',
      says: `Made proof sheet ${sheet.number} with ${put} ${put === 1 ? 'proof' : 'proofs'}`,
      about: { sheetId: sheet.id, proofs: put },
    });
    return sheet;
  });
}
