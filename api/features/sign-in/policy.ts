import type { Me } from '../../contract/sign-in.ts';
import type { StaffActor } from '../../middleware/actor.ts';

/** What somebody may do in their studio, beyond frames, proofs, finals and deliveries, which are everybody's. */
export function permissionsOf({ role }: Pick<StaffActor, 'role'>): Me['can'] {
  const owner = role === 'owner';
  return { changeStudio: owner, team: owner, money: owner, deleteCommissions: owner, leave: !owner };
}
