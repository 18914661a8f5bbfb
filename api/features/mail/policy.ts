import type { StaffActor } from '../../middleware/actor.ts';
import type { Mail } from '../../models/Mail.ts';

/** Kinds of mail that concern the team, which is the owner's. */
const OWNERS_KINDS = ['join-studio'];

/** The kinds of mail this person does not see in the outbox. */
export function hiddenKinds(actor: StaffActor): string[] {
  return actor.role === 'owner' ? [] : OWNERS_KINDS;
}

/** What was sent or withdrawn has lost its links; what waits is sent anyway. */
export function maySendAgain(mail: Pick<Mail, 'state'>): boolean {
  return mail.state === 'failed' || mail.state === 'unsure';
}

export function mayWithdraw(mail: Pick<Mail, 'state'>): boolean {
  return mail.state === 'waiting' || mail.state === 'failed' || mail.state === 'unsure';
}
