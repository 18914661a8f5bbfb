import type { TransactionOrKnex } from 'objection';
import type { StudioScope } from '../../db/scope.ts';
import { splitExtension } from '../../domain/file-names.ts';
import { DeliveryFile } from '../../models/DeliveryFile.ts';
import { Final } from '../../models/Final.ts';
import type { FinalVersion } from '../../models/FinalVersion.ts';
import type { CurrentPick } from './current-picks.ts';

/** A final with the versions that were not removed, newest first; there is at least one. */
export type LoadedFinal = Final & { versions: FinalVersion[] };

/** The finals of a commission in the order they came, with their versions. */
export async function loadFinals(scope: StudioScope, commissionId: string, db?: TransactionOrKnex): Promise<LoadedFinal[]> {
  const finals = await Final.within(scope, db)
    .where({ commissionId })
    .whereNull('deletedAt')
    .orderBy(['createdAt', 'id'])
    .withGraphFetched('versions')
    .modifyGraph('versions', (versions) => void versions.whereNull('deletedAt').orderBy('number', 'desc'));
  return finals.filter((final): final is LoadedFinal => (final.versions?.length ?? 0) > 0);
}

/** Numbers of the deliveries that each version is part of, withdrawn ones left out. */
export async function deliveriesOfVersions(
  scope: StudioScope,
  commissionId: string,
  db?: TransactionOrKnex,
): Promise<Map<string, number[]>> {
  const rows = (await DeliveryFile.within(scope, db)
    .join('deliveries', 'deliveries.id', 'deliveryFiles.deliveryId')
    .where('deliveries.commissionId', commissionId)
    .whereNull('deliveries.withdrawnAt')
    .orderBy('deliveries.number')
    .select('deliveryFiles.finalVersionId', 'deliveries.number')) as unknown as { finalVersionId: string; number: number }[];
  const numbers = new Map<string, number[]>();
  for (const { finalVersionId, number } of rows) numbers.set(finalVersionId, [...(numbers.get(finalVersionId) ?? []), number]);
  return numbers;
}

/** What a final is called: its own title, else its view's, else the name of its newest file. */
export function titleOf(final: LoadedFinal, pick: Pick<CurrentPick, 'viewTitle'> | undefined): string {
  return final.title || pick?.viewTitle || splitExtension(final.versions[0]?.name ?? '')[0];
}
