import type { Knex } from 'knex';
import { announce } from '../../db/live.ts';
import type { Sheet } from '../../models/Sheet.ts';

/** Tells the guests who look at a sheet, and the studio's pages of its commission, that the sheet or what lies on it has changed. */
export async function announceSheet(db: Knex, { id, commissionId }: Pick<Sheet, 'id' | 'commissionId'>, what: 'sheet' | 'proofs') {
  await announce(db, `sheet:${id}`, { what });
  await announce(db, `commission:${commissionId}`, { what: 'sheet', sheetId: id });
}
