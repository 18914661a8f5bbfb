import type { Knex } from 'knex';
import { problem } from '../../middleware/problem.ts';
import { Commission } from '../../models/Commission.ts';
import { Proof } from '../../models/Proof.ts';
import type { Sheet } from '../../models/Sheet.ts';
import { Studio } from '../../models/Studio.ts';

/** What every mail about a sheet needs to know. */
export interface SheetForMail {
  studio: { name: string; replyTo: string; timeZone: string };
  commission: { title: string };
  sheet: { id: string; number: number; chooseBy: string | null; allowance: number; extraPrice: number; currency: string };
  proofs: number;
}

export async function sheetForMail(trx: Knex.Transaction, sheet: Sheet): Promise<SheetForMail> {
  const [studio, commission, proofs] = [
    await Studio.query(trx).findById(sheet.studioId),
    await Commission.within(sheet, trx).findById(sheet.commissionId),
    await Proof.within(sheet, trx).where({ sheetId: sheet.id }).resultSize(),
  ];
  if (!studio || !commission) throw problem(404);
  return { studio, commission, sheet, proofs };
}
