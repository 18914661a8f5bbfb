import type { StaffActor } from '../../middleware/actor.ts';

/** The owner removes assistants; the owner stays, since a studio without one could never be changed again. */
export function mayRemove(actor: StaffActor, member: { role: 'owner' | 'assistant' }): boolean {
  return actor.role === 'owner' && member.role === 'assistant';
}
