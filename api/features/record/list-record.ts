import type { ListRecord, RecordLine, RecordNoun, RecordPage } from '../../contract/record.ts';
import { keyOf, pageOf } from '../../db/page.ts';
import type { StudioScope } from '../../db/scope.ts';
import { RecordEntry } from '../../models/RecordEntry.ts';

/** A page of a commission's record, newest first. */
export async function listRecord(scope: StudioScope, commissionId: string, { noun, after, limit }: ListRecord): Promise<RecordPage> {
  const question = RecordEntry.query()
    .where({ studioId: scope.studioId, commissionId })
    .orderBy('id', 'desc')
    .limit(limit + 1);
  if (noun) void question.where('did', 'like', `${noun}.%`);
  const before = Number(keyOf(after, 1)?.[0]);
  if (Number.isSafeInteger(before)) void question.where('id', '<', before);
  const page = pageOf(await question, limit, (entry) => [entry.id]);
  return { items: page.items.map(presentEntry), next: page.next };
}

function presentEntry(entry: RecordEntry): RecordLine {
  return {
    id: entry.id,
    at: entry.at.toISOString(),
    by: { name: entry.byName, kind: entry.byKind },
    noun: entry.did.split('.')[0] as RecordNoun,
    did: entry.did,
    says: entry.says,
  };
}
