import type { Job } from '../../jobs/job.ts';
import { Account } from '../../models/Account.ts';
import { Commission } from '../../models/Commission.ts';
import { Frame } from '../../models/Frame.ts';
import { addToRecord } from '../record/add-to-record.ts';

/** Writes one line of the record for the frames that somebody brought since the last such line. */
export const noteFrames: Job<{ commissionId: string; accountId: string }> = {
  name: 'note-frames',
  async run(_ctx, { commissionId, accountId }) {
    await Frame.transaction(async (trx) => {
      const commission = await Commission.query(trx).findById(commissionId).forUpdate();
      const account = await Account.query(trx).findById(accountId);
      if (!commission || !account) return;
      const count = await Frame.within(commission, trx)
        .where({ commissionId, createdBy: accountId })
        .whereRaw(
          `created_at > coalesce(
             (select max(at) from record_entries where commission_id = ? and account_id = ? and did = 'frame.added'), '-infinity')`,
          [commissionId, accountId],
        )
        .resultSize();
      if (count === 0) return;
      await addToRecord(trx, {
        studioId: commission.studioId,
        commissionId,
        actor: { kind: 'staff', accountId, name: account.name },
        did: 'frame.added',
        says: `Brought in ${count === 1 ? 'a frame' : `${count} frames`}`,
        about: { frames: count },
      });
    });
  },
};
