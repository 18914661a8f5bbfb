import { makeSheet } from '../../../api/features/sheets/make-sheet.ts';
import { Sheet } from '../../../api/models/Sheet.ts';
import { SheetGuest } from '../../../api/models/SheetGuest.ts';
import type { House } from '../house.ts';
import { makeCommission } from './commission.ts';
import { makeFrame } from './frame.ts';
import { type GuestPerson, makeAccount, makeGuestAgent, type MadeStudio } from './studio.ts';

/** A guest of a sheet, signed in. */
export interface SheetPerson extends GuestPerson {
  guest: SheetGuest;
}

/** Invites somebody by row, without a mail, and signs them in. */
export async function makeSheetGuest(
  house: House,
  sheet: { id: string; studioId: string },
  values: { name?: string; role?: 'lead' | 'reviewer' } = {},
): Promise<SheetPerson> {
  const { name = 'Oskar Lind', role = 'lead' } = values;
  const account = await makeAccount({ name });
  const guest = await SheetGuest.query().insertAndFetch({ studioId: sheet.studioId, sheetId: sheet.id, accountId: account.id, role, name });
  return { ...(await makeGuestAgent(house, account)), guest };
}

/** An open sheet with so many proofs, an allowance, a lead and a reviewer. */
export async function makeOpenSheet(
  house: House,
  made: MadeStudio,
  values: { proofs?: number; allowance?: number; views?: string[] } = {},
) {
  const commission = await makeCommission(made.studio, {
    allowance: values.allowance ?? 2,
    views: values.views ?? ['East front', 'Forecourt'],
  });
  const frames = [];
  for (let index = 0; index < (values.proofs ?? 4); index += 1) {
    const view = commission.views[index % (commission.views.length + 1)];
    frames.push(await makeFrame(house, commission, { viewId: view?.id ?? null }));
  }
  const draft = await makeSheet(
    house.ctx,
    made.owner.actor,
    commission.id,
    frames.map((frame) => frame.id),
  );
  const endsAt = new Date(Date.now() + 14 * 24 * 3600 * 1000);
  const sheet = await Sheet.query().patchAndFetchById(draft.id, {
    issuedAt: new Date(),
    endsAt,
    chooseBy: endsAt.toISOString().slice(0, 10),
  });
  const lead = await makeSheetGuest(house, sheet, { name: 'Oskar Lind', role: 'lead' });
  const reviewer = await makeSheetGuest(house, sheet, { name: 'Petra Thorn', role: 'reviewer' });
  return { commission, frames, sheet, lead, reviewer };
}
