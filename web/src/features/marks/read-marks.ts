import type { GuestProof, GuestSheet, SheetMarks } from '../../../../api/contract/guest-sheets.ts';
import { placePicks } from '../../../../api/domain/allowance.ts';

export type Person = GuestSheet['people'][number];

/** What the guests have said about one proof. */
export interface ProofMarks {
  mine: boolean;
  /** Everybody else who marked it, leads first. */
  others: Person[];
  /** A lead marked it. */
  picked: boolean;
}

export interface PlaceOfPick {
  number: number;
  extra: boolean;
}

const NOTHING: ProofMarks = { mine: false, others: [], picked: false };

/** The marks of each marked proof, by the proof's id. Marks of people who are no longer on the sheet are left out. */
export function readMarks(marks: SheetMarks['marks'], people: readonly Person[], me: string): Map<string, ProofMarks> {
  const known = new Map(people.map((person) => [person.accountId, person]));
  const read = new Map<string, ProofMarks>();
  for (const { proofId, accountId } of marks) {
    const person = known.get(accountId);
    if (!person) continue;
    const before = read.get(proofId) ?? NOTHING;
    const others = accountId === me ? before.others : [...before.others, person];
    read.set(proofId, {
      mine: before.mine || accountId === me,
      picked: before.picked || person.role === 'lead',
      others: others.sort((one, other) => Number(other.role === 'lead') - Number(one.role === 'lead')),
    });
  }
  return read;
}

/** What is said about a proof nobody has marked. */
export function marksOf(read: ReadonlyMap<string, ProofMarks>, proofId: string): ProofMarks {
  return read.get(proofId) ?? NOTHING;
}

/** The picks in the order of the sheet, with their numbers; those beyond the allowance are extras. */
export function numberPicks(
  proofs: readonly GuestProof[],
  marks: ReadonlyMap<string, ProofMarks>,
  allowance: number,
): Map<string, PlaceOfPick> {
  const picks = proofs.filter((proof) => marksOf(marks, proof.id).picked);
  return new Map(placePicks(picks, allowance).map(({ pick, number, extra }) => [pick.id, { number, extra }]));
}
