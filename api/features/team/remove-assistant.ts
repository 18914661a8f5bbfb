import type { Context } from '../../context.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { problem } from '../../middleware/problem.ts';
import { Account } from '../../models/Account.ts';
import { Membership } from '../../models/Membership.ts';
import { addToRecord } from '../record/add-to-record.ts';
import { endSessions } from '../sign-in/end-sessions.ts';

/** Removes an assistant; their sessions at the studio end in the same moment. @throws Problem 404, also for the owner */
export async function removeAssistant(ctx: Context, actor: StaffActor, accountId: string): Promise<void> {
  await ctx.knex.transaction(async (trx) => {
    const gone = await Membership.query(trx).where({ studioId: actor.studioId, accountId, role: 'assistant' }).delete();
    if (gone === 0) throw problem(404);
    await endSessions(trx, accountId, 'staff');
    const account = await Account.query(trx).findById(accountId).throwIfNotFound();
    await addToRecord(trx, {
      studioId: actor.studioId,
      actor,
      did: 'team.removed',
      says: `Removed ${account.name} from the team`,
      about: { accountId },
    });
  });
}

/** Leaves the studio. @throws Problem 409 for the owner */
export async function leaveStudio(ctx: Context, actor: StaffActor): Promise<void> {
  if (actor.role === 'owner') throw problem(409, 'The owner cannot leave: nobody could run the studio then.', { code: 'owner-stays' });
  await ctx.knex.transaction(async (trx) => {
    const gone = await Membership.query(trx).where({ studioId: actor.studioId, accountId: actor.accountId, role: 'assistant' }).delete();
    if (gone === 0) throw problem(404);
    await endSessions(trx, actor.accountId, 'staff');
    await addToRecord(trx, { studioId: actor.studioId, actor, did: 'team.left', says: `${actor.name} left the team` });
  });
}
