import type { Knex } from 'knex';
import type { Context } from '../../context.ts';
import type { ChangeSheet } from '../../contract/sheets.ts';
import { watermarkHash } from '../../imaging/watermark-hash.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { invalid, problem } from '../../middleware/problem.ts';
import { Sheet } from '../../models/Sheet.ts';
import { addToRecord } from '../record/add-to-record.ts';
import { ownImage } from '../watermark/own-image.ts';
import { touchSheet } from './change-proofs.ts';
import { findSheet } from './find-sheet.ts';

/** The end of a day in the studio's time zone, as SQL: PostgreSQL knows the zones' rules. */
export function endOfDay(trx: Knex, day: string, studioId: string): Knex.Raw {
  return trx.raw('((?::date + 1)::timestamp at time zone (select time_zone from studios where id = ?))', [day, studioId]);
}

/** Changes the terms of a sheet. @throws Problem 412 where somebody changed it meanwhile, 422 for a last date that has passed. */
export async function changeSheet(ctx: Context, actor: StaffActor, sheetId: string, version: number, input: ChangeSheet): Promise<Sheet> {
  if (input.watermark) ownImage(actor, input.watermark);
  await ctx.knex.transaction(async (trx) => {
    const before = await findSheet(actor, sheetId, trx);
    if (before.withdrawnAt || before.sentAt)
      throw problem(409, 'This sheet was sent or taken back. Reopen it to change it.', { code: 'sheet-closed' });
    if (input.extraPrice !== undefined && input.extraPrice !== before.extraPrice && actor.role !== 'owner') {
      throw problem(403, 'Only the owner of the studio may change prices.', { code: 'owner-only' });
    }
    const terms = {
      ...(input.allowance !== undefined ? { allowance: input.allowance } : {}),
      ...(input.extraPrice !== undefined ? { extraPrice: input.extraPrice } : {}),
      ...(input.watermark ? { watermark: input.watermark, watermarkHash: watermarkHash(input.watermark) } : {}),
    };
    const changed = await Sheet.within(actor, trx)
      .findById(sheetId)
      .where({ version })
      .patch({ ...terms, version: version + 1 });
    if (changed === 0) throw problem(412);
    if (input.chooseBy !== undefined) await setLastDate(trx, sheetId, actor.studioId, input.chooseBy, Boolean(before.issuedAt));
    await touchSheet(trx, sheetId, before.commissionId);
    if (before.issuedAt) await tellRecord(trx, actor, before, input);
  });
  return findSheet(actor, sheetId);
}

/** Sets the last day to choose; its end is reckoned in the studio's time zone. */
export async function setLastDate(
  trx: Knex.Transaction,
  sheetId: string,
  studioId: string,
  day: string | null,
  issued: boolean,
): Promise<void> {
  if (day === null && issued) throw invalid([{ path: 'chooseBy', message: 'An open sheet needs a last date.' }]);
  const [row] = await trx('sheets')
    .where({ id: sheetId })
    .update({ chooseBy: day, endsAt: day === null ? null : endOfDay(trx, day, studioId) })
    .returning<{ endsAt: Date | null }[]>('endsAt');
  if (row?.endsAt && row.endsAt <= new Date()) throw invalid([{ path: 'chooseBy', message: 'The last date has passed already.' }]);
}

async function tellRecord(trx: Knex.Transaction, actor: StaffActor, sheet: Sheet, input: ChangeSheet): Promise<void> {
  const said = [
    input.chooseBy ? `the last date to ${input.chooseBy}` : '',
    input.allowance !== undefined && input.allowance !== sheet.allowance ? `the allowance to ${input.allowance}` : '',
    input.extraPrice !== undefined && input.extraPrice !== sheet.extraPrice ? 'the price of an extra' : '',
    input.watermark ? 'the watermark' : '',
  ].filter(Boolean);
  if (said.length === 0) return;
  await addToRecord(trx, {
    studioId: actor.studioId,
    commissionId: sheet.commissionId,
    actor,
    did: 'sheet.changed',
    says: `Changed ${said.join(', ')} of proof sheet ${sheet.number}`,
    about: { sheetId: sheet.id, ...input },
  });
}
