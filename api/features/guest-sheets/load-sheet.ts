import type { GuestSheet } from '../../contract/guest-sheets.ts';
import { initials } from '../../domain/initials.ts';
import { sheetState } from '../../domain/sheet-state.ts';
import type { Looker } from '../../middleware/lookers.ts';
import { problem } from '../../middleware/problem.ts';
import { PickList } from '../../models/PickList.ts';
import { Proof } from '../../models/Proof.ts';
import { Sheet } from '../../models/Sheet.ts';
import { SheetGuest } from '../../models/SheetGuest.ts';
import { Studio } from '../../models/Studio.ts';
import { usesOf } from '../studios/studio-uses.ts';

/** Who looks: a guest by invitation, somebody by the open link, or the studio in a preview. */
export type Viewer = GuestSheet['me'];

/** The sheet besides its pictures, as this person sees it. */
export async function loadGuestSheet(sheetId: string, me: Viewer): Promise<GuestSheet> {
  const sheet = await Sheet.query().findById(sheetId).withGraphFetched('commission.client');
  const studio = sheet && (await Studio.query().findById(sheet.studioId));
  if (!sheet || !studio) throw problem(404);
  const [of, proofCount, guests, list] = await Promise.all([
    Sheet.within(sheet).where({ commissionId: sheet.commissionId }).whereNotNull('issuedAt').resultSize(),
    Proof.within(sheet).where({ sheetId }).resultSize(),
    SheetGuest.within(sheet).where({ sheetId }).whereNull('withdrawnAt').orderBy(['role', 'invitedAt', 'id']),
    PickList.within(sheet).where({ sheetId }).orderBy('number', 'desc').first(),
  ]);
  const open = sheetState(sheet, new Date()) === 'Open';
  return {
    id: sheet.id,
    number: sheet.number,
    of: Math.max(of, sheet.number),
    studio: { name: studio.name, replyTo: studio.replyTo, timeZone: studio.timeZone },
    commission: { title: sheet.commission?.title ?? '', client: sheet.commission?.client?.name ?? '' },
    state: sheetState(sheet, new Date()),
    issuedAt: sheet.issuedAt?.toISOString() ?? null,
    chooseBy: sheet.chooseBy,
    endsAt: sheet.endsAt?.toISOString() ?? null,
    allowance: sheet.allowance,
    extraPrice: sheet.extraPrice,
    currency: sheet.currency,
    proofCount,
    revision: sheet.revision,
    me,
    people: guests.map(({ accountId, name, role }) => ({ accountId, name, initials: initials(name), role })),
    reopened: sheet.reopenedAt && !sheet.sentAt ? { at: sheet.reopenedAt.toISOString(), reason: sheet.reopenReason ?? '' } : null,
    lastPickList: list
      ? { number: list.number, sentAt: list.sentAt.toISOString(), sentBy: list.sentByName, picks: list.pickCount, extras: list.extraCount }
      : null,
    uses: usesOf(studio),
    can: {
      mark: open && me.role !== 'looker',
      ask: open && me.role === 'looker',
      send: open && me.role === 'lead',
      invite: open && me.role === 'lead',
    },
  };
}

/** The same for somebody who looks by the open link: initials in place of names, and no words that were written to the client. */
export async function loadSheetForLooker(looker: Looker): Promise<GuestSheet> {
  const sheet = await loadGuestSheet(looker.sheetId, { accountId: looker.id, name: '', email: '', role: 'looker', shortcuts: true });
  return {
    ...sheet,
    people: sheet.people.map((person) => ({ ...person, name: person.initials })),
    reopened: null,
    lastPickList: sheet.lastPickList && { ...sheet.lastPickList, sentBy: initials(sheet.lastPickList.sentBy) },
  };
}
