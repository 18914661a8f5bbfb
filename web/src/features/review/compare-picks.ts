import type { GuestProof } from '../../../../api/contract/guest-sheets.ts';

export interface PickChanges {
  added: GuestProof[];
  gone: GuestProof[];
}

/** What has changed between the picks somebody looked at and those of now, in the order of the sheet. */
export function comparePicks(proofs: readonly GuestProof[], seen: ReadonlySet<string>, now: ReadonlySet<string>): PickChanges {
  return {
    added: proofs.filter((proof) => now.has(proof.id) && !seen.has(proof.id)),
    gone: proofs.filter((proof) => seen.has(proof.id) && !now.has(proof.id)),
  };
}
