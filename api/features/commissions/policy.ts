import type { StaffActor } from '../../middleware/actor.ts';

/** What a policy needs to know of a commission. */
export interface CommissionStanding {
  closedAt: Date | null;
  openSheets: number;
}

/** What this person may do to a commission. Prices and deletion are the owner's; a closed commission is reopened first. */
export function mayOnCommission(actor: StaffActor, commission: CommissionStanding) {
  const open = commission.closedAt === null;
  return {
    edit: open,
    price: open && actor.role === 'owner',
    close: open && commission.openSheets === 0,
    reopen: !open,
    remove: actor.role === 'owner',
  };
}
