import { sheetIsOver } from '../domain/sheet-state.ts';
import { Commission } from '../models/Commission.ts';
import { Delivery } from '../models/Delivery.ts';
import { DeliveryRecipient } from '../models/DeliveryRecipient.ts';
import { Membership } from '../models/Membership.ts';
import { Sheet } from '../models/Sheet.ts';
import { SheetGuest } from '../models/SheetGuest.ts';
import { problem } from './problem.ts';
import type { Station } from './station.ts';
import type { Sessions } from './sessions.ts';

interface Person {
  accountId: string;
  name: string;
  email: string;
  sessionId: string;
}
export interface StaffActor extends Person {
  kind: 'staff';
  studioId: string;
  role: 'owner' | 'assistant';
}
export interface GuestActor extends Person {
  kind: 'guest';
}
export type Actor = StaffActor | GuestActor;

declare module 'express-serve-static-core' {
  interface Request {
    actor?: Actor;
    /** The guest's invitation to the sheet in the address. */
    invitation?: SheetGuest;
    /** The guest's place among the recipients of the delivery in the address. */
    recipient?: DeliveryRecipient;
  }
}

/** The stations that tell who may pass. Made once, since they need the sessions. */
export interface Gates {
  /** Somebody of a studio; with a role, only that role. The actor's studio is the scope of all that follows. */
  staff(role?: 'owner'): Station;
  /** Anybody with a guest session. */
  guest(): Station;
  /** A guest invited to the sheet named by `:sheetId`; with a role, only that role. Otherwise there is no such sheet; 410 once its time is over. */
  guestOfSheet(role?: 'lead'): Station;
  /** A recipient of the delivery named by `:deliveryId`. */
  guestOfDelivery(): Station;
}

/** The commission of a sheet or a delivery; one that was deleted takes its links along. */
function commissionOf(table: 'sheets' | 'deliveries') {
  return Commission.query()
    .select('commissions.id')
    .whereColumn('commissions.id', `${table}.commissionId`)
    .whereNull('commissions.deletedAt');
}

export function createGates(sessions: Sessions): Gates {
  const signIn = async (...[req, res]: Parameters<Station>): Promise<GuestActor> => {
    const session = await sessions.read(req, res, 'guest');
    if (!session) throw problem(401, 'Please open the link in your e-mail again.', { code: 'no-guest' });
    const actor: GuestActor = {
      kind: 'guest',
      accountId: session.accountId,
      name: session.name,
      email: session.email,
      sessionId: session.id,
    };
    req.actor = actor;
    return actor;
  };
  return {
    staff: (role) => async (req, res, next) => {
      const session = await sessions.read(req, res, 'staff');
      const membership = session && (await Membership.query().findOne({ accountId: session.accountId }));
      if (!session || !membership) throw problem(401, undefined, { code: 'no-staff' });
      if (role && membership.role !== role) throw problem(403, 'Only the owner of the studio may do this.');
      const { accountId, name, email, id: sessionId } = session;
      req.actor = { kind: 'staff', accountId, name, email, sessionId, studioId: membership.studioId, role: membership.role };
      next();
    },
    guest: () => async (req, res, next) => {
      await signIn(req, res, next);
      next();
    },
    guestOfSheet: (role) => async (req, res, next) => {
      const actor = await signIn(req, res, next);
      const { sheetId } = req.params;
      const invitation = await SheetGuest.query().findOne({ sheetId, accountId: actor.accountId }).whereNull('withdrawnAt');
      const sheet =
        invitation &&
        (await Sheet.query()
          .findById(invitation.sheetId)
          .whereNotNull('issuedAt')
          .whereNull('withdrawnAt')
          .whereExists(commissionOf('sheets'))
          .select('id', 'endsAt'));
      if (!invitation || !sheet) throw problem(404);
      // A session outlives the sheet it was opened for.
      if (sheetIsOver(sheet, new Date()))
        throw problem(410, 'The time of this proof sheet is over. Please write to the studio if you still need it.', { code: 'ended' });
      if (role && invitation.role !== role) throw problem(403, 'Only the lead of this sheet may do this.', { code: 'lead-only' });
      req.invitation = invitation;
      next();
    },
    guestOfDelivery: () => async (req, res, next) => {
      const actor = await signIn(req, res, next);
      const { deliveryId } = req.params;
      const recipient = await DeliveryRecipient.query().findOne({ deliveryId, accountId: actor.accountId }).whereNull('withdrawnAt');
      const delivery =
        recipient &&
        (await Delivery.query()
          .findById(recipient.deliveryId)
          .whereNotNull('sentAt')
          .whereNull('withdrawnAt')
          .whereExists(commissionOf('deliveries'))
          .select('id'));
      if (!recipient || !delivery) throw problem(404);
      req.recipient = recipient;
      next();
    },
  };
}

/** The studio's person behind a request that passed `staff()`. */
export function staffOf(req: { actor?: Actor }): StaffActor {
  if (req.actor?.kind !== 'staff') throw problem(401);
  return req.actor;
}

/** The guest behind a request that passed one of the guests' gates. */
export function guestOf(req: { actor?: Actor }): GuestActor {
  if (req.actor?.kind !== 'guest') throw problem(401);
  return req.actor;
}

/** The invitation behind a request that passed `guestOfSheet()`. */
export function invitationOf(req: { invitation?: SheetGuest }): SheetGuest {
  if (!req.invitation) throw problem(404);
  return req.invitation;
}

/** The recipient behind a request that passed `guestOfDelivery()`. */
export function recipientOf(req: { recipient?: DeliveryRecipient }): DeliveryRecipient {
  if (!req.recipient) throw problem(404);
  return req.recipient;
}
