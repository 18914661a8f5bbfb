import type { Transaction } from 'objection';
import type { Actor } from '../../middleware/actor.ts';
import { RecordEntry } from '../../models/RecordEntry.ts';

/** What was done, as "noun.verb"; the record's filter knows these nouns. */
export type Did =
  `${'studio' | 'team' | 'client' | 'commission' | 'frame' | 'sheet' | 'guest' | 'pick-list' | 'final' | 'delivery' | 'download' | 'mail'}.${string}`;

export interface RecordLine {
  studioId: string;
  commissionId?: string | null;
  /** Who did it; Oriel itself where nobody is named. */
  actor?: Pick<Actor, 'kind' | 'accountId' | 'name'>;
  did: Did;
  /** One sentence for people, in the past tense: "Sent proof sheet 1 to 3 people". */
  says: string;
  /** Ids and figures for programs. */
  about?: Record<string, unknown>;
}

/** Writes one line of the append-only record, within the transaction of what it tells. */
export async function addToRecord(trx: Transaction, line: RecordLine): Promise<void> {
  await RecordEntry.query(trx).insert({
    studioId: line.studioId,
    commissionId: line.commissionId ?? null,
    accountId: line.actor?.accountId ?? null,
    byName: line.actor?.name ?? 'Oriel',
    byKind: line.actor?.kind ?? 'oriel',
    did: line.did,
    says: line.says,
    about: line.about ?? {},
  });
}
