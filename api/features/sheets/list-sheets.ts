import type { Knex } from 'knex';
import type { SheetSummary } from '../../contract/sheets.ts';
import type { StudioScope } from '../../db/scope.ts';
import { sheetState } from '../../domain/sheet-state.ts';
import { problem } from '../../middleware/problem.ts';
import { Commission } from '../../models/Commission.ts';
import { Sheet } from '../../models/Sheet.ts';

type Counts = Pick<SheetSummary, 'proofCount' | 'proofsReady' | 'pickCount' | 'guestCount'>;

const iso = (moment: Date | null) => moment?.toISOString() ?? null;

/** Row and counts -> answer. */
export function presentSummary(sheet: Sheet, counts: Counts, now: Date): SheetSummary {
  return {
    id: sheet.id,
    commissionId: sheet.commissionId,
    number: sheet.number,
    state: sheetState(sheet, now),
    chooseBy: sheet.chooseBy,
    endsAt: iso(sheet.endsAt),
    issuedAt: iso(sheet.issuedAt),
    sentAt: iso(sheet.sentAt),
    withdrawnAt: iso(sheet.withdrawnAt),
    allowance: sheet.allowance,
    extraPrice: sheet.extraPrice,
    currency: sheet.currency,
    version: sheet.version,
    ...counts,
  };
}

/** The counts of a sheet in one go; picks are the proofs that a lead marked. */
export function countsOf(knex: Knex): Knex.Raw[] {
  return [
    knex.raw('(select count(*)::int from proofs where proofs.sheet_id = sheets.id) as proof_count'),
    knex.raw(
      '(select count(*)::int from proofs where proofs.sheet_id = sheets.id and proofs.watermark_hash = sheets.watermark_hash) as proofs_ready',
    ),
    knex.raw('(select count(*)::int from sheet_guests g where g.sheet_id = sheets.id and g.withdrawn_at is null) as guest_count'),
    knex.raw(`(select count(distinct m.proof_id)::int from marks m
      join sheet_guests g on g.sheet_id = m.sheet_id and g.account_id = m.account_id and g.role = 'lead' and g.withdrawn_at is null
      where m.sheet_id = sheets.id) as pick_count`),
  ];
}

/** The sheets of a commission in their order. */
export async function listSheets(knex: Knex, scope: StudioScope, commissionId: string): Promise<SheetSummary[]> {
  const commission = await Commission.within(scope).findById(commissionId).whereNull('deletedAt').select('id');
  if (!commission) throw problem(404);
  const sheets = await Sheet.within(scope)
    .where({ commissionId })
    .select('sheets.*', ...countsOf(knex))
    .orderBy('number')
    .castTo<(Sheet & Counts)[]>();
  const now = new Date();
  return sheets.map((sheet) => {
    const { proofCount, proofsReady, pickCount, guestCount } = sheet;
    return presentSummary(sheet, { proofCount, proofsReady, pickCount, guestCount }, now);
  });
}
