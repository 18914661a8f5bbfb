import type { Knex } from 'knex';
import type { Context } from '../../context.ts';
import type { ReopenSheet } from '../../contract/sheets.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { invalid, problem } from '../../middleware/problem.ts';
import { Sheet } from '../../models/Sheet.ts';
import { SheetGuest } from '../../models/SheetGuest.ts';
import { linkAddress, newToken } from '../guests/tokens.ts';
import { queueMail } from '../mail/queue-mail.ts';
import { addToRecord } from '../record/add-to-record.ts';
import { announceSheet } from './announce-sheet.ts';
import { setLastDate } from './change-sheet.ts';
import { findSheet, holdSheet } from './find-sheet.ts';
import { sheetCan } from './policy.ts';
import { sheetForMail } from './sheet-for-mail.ts';
import { sheetReopenedMail } from './sheet-reopened.mail.ts';

/** Opens a sheet again that was sent or has ended, with a reason that its leads read. Lists already sent stay as they are. */
export async function reopenSheet(ctx: Context, actor: StaffActor, sheetId: string, input: ReopenSheet): Promise<Sheet> {
  await ctx.knex.transaction(async (trx) => {
    const sheet = await holdSheet(actor, sheetId, trx);
    if (!sheetCan(sheet, 1, new Date()).reopen)
      throw problem(409, 'Only a sheet that was sent or has ended can be reopened.', { code: 'not-closed' });
    await Sheet.within(actor, trx)
      .findById(sheetId)
      .patch({ sentAt: null, reopenedAt: new Date(), reopenReason: input.reason, version: sheet.version + 1 });
    if (input.chooseBy) await setLastDate(trx, sheetId, actor.studioId, input.chooseBy, true);
    else if (sheet.endsAt && sheet.endsAt <= new Date()) {
      throw invalid([{ path: 'chooseBy', message: 'The last date has passed: set a new one.' }]);
    }
    await mailLeads(ctx, trx, actor, await findSheet(actor, sheetId, trx), input.reason);
    await announceSheet(trx, sheet, 'sheet');
    await addToRecord(trx, {
      studioId: actor.studioId,
      commissionId: sheet.commissionId,
      actor,
      did: 'sheet.reopened',
      says: `Reopened proof sheet ${sheet.number}: ${input.reason}`,
      about: { sheetId },
    });
  });
  return findSheet(actor, sheetId);
}

async function mailLeads(ctx: Context, trx: Knex.Transaction, actor: StaffActor, sheet: Sheet, reason: string): Promise<void> {
  const about = await sheetForMail(trx, sheet);
  const leads = await SheetGuest.within(actor, trx)
    .where({ sheetId: sheet.id, role: 'lead' })
    .whereNull('withdrawnAt')
    .withGraphFetched('account');
  for (const lead of leads) {
    const { token, hash } = newToken();
    await SheetGuest.within(actor, trx).findById(lead.id).patch({ tokenHash: hash });
    await queueMail(trx, {
      studioId: sheet.studioId,
      commissionId: sheet.commissionId,
      accountId: lead.accountId,
      kind: 'sheet-reopened',
      to: { address: lead.account?.email ?? '', name: lead.name },
      fromName: about.studio.name,
      replyTo: about.studio.replyTo,
      ...sheetReopenedMail({
        ...about,
        guest: lead.name,
        role: 'lead',
        words: reason,
        link: linkAddress(ctx.config, token),
        from: actor.name,
      }),
    });
  }
}
