import type { Request } from 'express';
import type { DeliveryRecipient } from '../models/DeliveryRecipient.ts';
import { Membership } from '../models/Membership.ts';
import type { SheetGuest } from '../models/SheetGuest.ts';
import { invitationTo, placeInDelivery } from './invitations.ts';
import { carriesLooking, type Looker, readLooker } from './lookers.ts';
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
    /** Who looks at the sheet in the address by its open link; there is no `actor` then. */
    looker?: Looker;
    /** The guest's place among the recipients of the delivery in the address. */
    recipient?: DeliveryRecipient;
  }
}

/** The stations that tell who may pass. Made once, since they need the sessions. */
export interface Gates {
  /** Somebody of a studio; with a role, only that role. The actor's studio is the scope of all that follows. */
  staff(role?: 'owner'): Station;
  /** Anybody with a guest session. Below `:sheetId`, somebody who looks by its open link is told what to do instead. */
  guest(): Station;
  /** A guest invited to the sheet named by `:sheetId`; with a role, only that role. Otherwise there is no such sheet; 410 once its time is over. */
  guestOfSheet(role?: 'lead'): Station;
  /** The same without a role, or somebody who looks at that sheet by its open link: for what may be seen, never for what changes something. */
  looksAtSheet(): Station;
  /** A recipient of the delivery named by `:deliveryId`. */
  guestOfDelivery(): Station;
}

/** What stands in the way of somebody who only looks; undefined where nobody looks by the sheet's open link. */
async function refusalOfLooker(req: Request): Promise<Error | undefined> {
  const { sheetId } = req.params;
  if (typeof sheetId !== 'string' || !(await readLooker(req, sheetId))) return undefined;
  return problem(403, 'You are looking. To mark, give your name and confirm your e-mail address.', { code: 'looking' });
}

const noGuest = () => problem(401, 'Please open the link in your e-mail again.', { code: 'no-guest' });

export function createGates(sessions: Sessions): Gates {
  const readGuest = async (...[req, res]: Parameters<Station>): Promise<GuestActor | undefined> => {
    const session = await sessions.read(req, res, 'guest');
    if (!session) return undefined;
    const { accountId, name, email, id: sessionId } = session;
    return { kind: 'guest', accountId, name, email, sessionId };
  };
  const signIn = async (...[req, res, next]: Parameters<Station>): Promise<GuestActor> => {
    const actor = await readGuest(req, res, next);
    if (!actor) throw (await refusalOfLooker(req)) ?? noGuest();
    req.actor = actor;
    return actor;
  };
  /** Lets a guest with a place on the sheet in; gives false where there is none. */
  const letIn = async (req: Request, actor: GuestActor | undefined): Promise<boolean> => {
    const invitation = actor && (await invitationTo(String(req.params.sheetId), actor.accountId));
    if (!invitation) return false;
    req.actor = actor;
    req.invitation = invitation;
    return true;
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
      const actor = await signIn(req, res, next);
      // A guest of other sheets may look here by the open link, and has no place on this one yet.
      if (carriesLooking(req) && !(await letIn(req, actor))) {
        const refusal = await refusalOfLooker(req);
        if (refusal) throw refusal;
      }
      next();
    },
    guestOfSheet: (role) => async (req, res, next) => {
      const actor = await signIn(req, res, next);
      if (!(await letIn(req, actor))) throw (await refusalOfLooker(req)) ?? problem(404);
      if (role && req.invitation?.role !== role) throw problem(403, 'Only the lead of this sheet may do this.', { code: 'lead-only' });
      next();
    },
    looksAtSheet: () => async (req, res, next) => {
      const actor = await readGuest(req, res, next);
      if (await letIn(req, actor)) return next();
      const looker = await readLooker(req, String(req.params.sheetId));
      if (!looker) throw actor ? problem(404) : noGuest();
      req.looker = looker;
      next();
    },
    guestOfDelivery: () => async (req, res, next) => {
      const actor = await signIn(req, res, next);
      const recipient = await placeInDelivery(String(req.params.deliveryId), actor.accountId);
      if (!recipient) throw problem(404);
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
