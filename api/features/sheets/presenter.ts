import type { SheetGuestRow, StudioProof, StudioSheet } from '../../contract/sheets.ts';
import type { Context } from '../../context.ts';
import { initials } from '../../domain/initials.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import type { Bracket } from '../../models/Bracket.ts';
import type { Frame } from '../../models/Frame.ts';
import { Proof } from '../../models/Proof.ts';
import { Sheet } from '../../models/Sheet.ts';
import { SheetGuest } from '../../models/SheetGuest.ts';
import { pictureAddress } from '../../services/picture-address.ts';
import { type Exposed, exposuresOfProofs } from '../brackets/count-exposures.ts';
import { exposuresOf, shownPicture } from '../brackets/shown-picture.ts';
import { presentOpenLink } from '../open-links/presenter.ts';
import { countsOf, presentSummary } from './list-sheets.ts';
import { sheetCan } from './policy.ts';

type Marks = Map<string, { name: string; role: 'lead' | 'reviewer' }[]>;

const iso = (moment: Date | null) => moment?.toISOString() ?? null;

/** A sheet with everything the studio's Proofs page shows. */
export async function presentSheet(ctx: Context, actor: StaffActor, sheet: Sheet): Promise<StudioSheet> {
  const now = new Date();
  const [counted, proofs, guests, marks, openLink] = await Promise.all([
    Sheet.query()
      .findById(sheet.id)
      .select(...countsOf(ctx.knex))
      .castTo<{ proofCount: number; proofsReady: number; pickCount: number; guestCount: number }>(),
    proofsInOrder(sheet),
    guestRows(ctx, sheet),
    marksOf(ctx, sheet.id),
    presentOpenLink(ctx, sheet),
  ]);
  const exposed = await exposuresOfProofs(ctx.knex, proofs);
  return {
    ...presentSummary(sheet, { ...counted }, now),
    watermark: sheet.watermark,
    reopenedAt: iso(sheet.reopenedAt),
    reopenReason: sheet.reopenReason,
    proofs: await Promise.all(proofs.map((proof) => presentProof(ctx, sheet, proof, marks, exposed))),
    guests,
    openLink,
    can: sheetCan(sheet, counted.proofCount, now, actor.role),
  };
}

/** A proof with what it is of: its frame, and the bracket where it stands for one. */
export type ProofWithPicture = Proof & { frame: Frame; bracket: Bracket | null };

/** Proofs storey by storey, those under no view last, with their frames and brackets. */
export async function proofsInOrder(sheet: Pick<Sheet, 'id' | 'studioId'>): Promise<ProofWithPicture[]> {
  return Proof.within(sheet)
    .where({ 'proofs.sheetId': sheet.id })
    .joinRaw('left join views on views.id = proofs.view_id')
    .orderByRaw('views.position nulls last, proofs.position, proofs.id')
    .select('proofs.*')
    .withGraphFetched('[frame, bracket]')
    .castTo<ProofWithPicture[]>();
}

async function presentProof(ctx: Context, sheet: Sheet, proof: ProofWithPicture, marks: Marks, exposed: Exposed): Promise<StudioProof> {
  const { frame, bracket } = proof;
  const shown = shownPicture(frame, bracket);
  const by = marks.get(proof.id) ?? [];
  const [small, medium] = await Promise.all([pictureAddress(ctx, shown.key(480)), pictureAddress(ctx, shown.key(960))]);
  return {
    id: proof.id,
    number: proof.number,
    frameId: frame.id,
    frameName: frame.name,
    bracketId: proof.bracketId,
    exposures: bracket && exposuresOf(bracket, exposed.get(bracket.id)?.count ?? 0, shown),
    viewId: proof.viewId,
    width: shown.width,
    height: shown.height,
    placeholder: shown.placeholder,
    ready: proof.watermarkHash === sheet.watermarkHash,
    pictures: { small, medium },
    markedBy: by.map((guest) => initials(guest.name)),
    picked: by.some((guest) => guest.role === 'lead'),
  };
}

async function marksOf(ctx: Context, sheetId: string): Promise<Marks> {
  const rows = await ctx
    .knex('marks')
    .join('sheetGuests', (on) => on.on('sheetGuests.sheetId', 'marks.sheetId').andOn('sheetGuests.accountId', 'marks.accountId'))
    .where({ 'marks.sheetId': sheetId })
    .whereNull('sheetGuests.withdrawnAt')
    .orderBy(['sheetGuests.role', 'sheetGuests.invitedAt'])
    .select<{ proofId: string; name: string; role: 'lead' | 'reviewer' }[]>('marks.proofId', 'sheetGuests.name', 'sheetGuests.role');
  const marks: Marks = new Map();
  for (const { proofId, name, role } of rows) marks.set(proofId, [...(marks.get(proofId) ?? []), { name, role }]);
  return marks;
}

async function guestRows(ctx: Context, sheet: Sheet): Promise<SheetGuestRow[]> {
  const guests = await SheetGuest.within(sheet)
    .where({ 'sheetGuests.sheetId': sheet.id })
    .joinRelated('account')
    .select(
      'sheetGuests.*',
      'account.email',
      ctx.knex.raw(
        '(select count(*)::int from marks m where m.sheet_id = sheet_guests.sheet_id and m.account_id = sheet_guests.account_id) as marks',
      ),
      ctx.knex.raw(
        `(select state from mails where mails.account_id = sheet_guests.account_id and mails.commission_id = ?
        and mails.kind like 'sheet-%' order by created_at desc limit 1) as mail`,
        [sheet.commissionId],
      ),
    )
    .orderBy(['sheetGuests.role', 'sheetGuests.invitedAt', 'sheetGuests.id'])
    .castTo<(SheetGuest & { email: string; marks: number; mail: SheetGuestRow['mail'] })[]>();
  return guests.map((guest) => ({
    id: guest.id,
    name: guest.name,
    email: guest.email,
    role: guest.role,
    invitedAt: guest.invitedAt.toISOString(),
    firstOpenedAt: iso(guest.firstOpenedAt),
    lastSeenAt: iso(guest.lastSeenAt),
    remindedAt: iso(guest.remindedAt),
    withdrawnAt: iso(guest.withdrawnAt),
    byOpenLink: guest.byOpenLink,
    marks: guest.marks,
    mail: guest.mail,
  }));
}
