import type { TransactionOrKnex } from 'objection';
import type { KnownFile, NewUpload } from '../../contract/uploads.ts';
import type { Commission } from '../../models/Commission.ts';
import { Final } from '../../models/Final.ts';
import { Frame } from '../../models/Frame.ts';

/** The same bytes among the frames, or the current finals, of a commission. */
export async function knownFile(
  commission: Commission,
  input: Pick<NewUpload, 'purpose' | 'sha256'>,
  trx?: TransactionOrKnex,
): Promise<KnownFile | null> {
  if (input.purpose === 'frame') {
    const frame = await Frame.within(commission, trx)
      .findOne({ commissionId: commission.id, sha256: input.sha256 })
      .whereNull('deletedAt')
      .select('id', 'name');
    return frame ? { state: 'known', frameId: frame.id, finalId: null, name: frame.name } : null;
  }
  const final = await Final.within(commission, trx)
    .joinRelated('versions')
    .where({ 'finals.commissionId': commission.id, 'versions.sha256': input.sha256 })
    .whereNull('finals.deletedAt')
    .whereNull('versions.deletedAt')
    .select('finals.id', 'versions.name as name')
    .first()
    .castTo<{ id: string; name: string } | undefined>();
  return final ? { state: 'known', frameId: null, finalId: final.id, name: final.name } : null;
}
