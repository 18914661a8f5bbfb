import type { StaffActor } from '../../middleware/actor.ts';

/** Name, addresses, zone and currency are the owner's to change. */
export function mayChangeStudio({ role }: StaffActor): boolean {
  return role === 'owner';
}
