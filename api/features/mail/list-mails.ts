import type { Context } from '../../context.ts';
import type { ListMails, MailsPage } from '../../contract/mail.ts';
import { momentKeyOf, momentText } from '../../db/moment-key.ts';
import { pageOf } from '../../db/page.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { Mail } from '../../models/Mail.ts';
import { hiddenKinds } from './policy.ts';
import { type MailWithCommission, presentMail } from './presenter.ts';

/** The studio's mails, without those that concern somebody's account alone: they hold no studio. */
export function mailsOf(ctx: Context, actor: StaffActor) {
  return Mail.query(ctx.knex)
    .where('mails.studioId', actor.studioId)
    .whereNotIn('mails.kind', hiddenKinds(actor))
    .leftJoin('commissions', (join) => join.on('commissions.id', 'mails.commissionId').on('commissions.studioId', 'mails.studioId'))
    .select('mails.*', 'commissions.title as commissionTitle');
}

/** One page of the outbox, newest first, and how many mails a person has to look at. */
export async function listMails(ctx: Context, actor: StaffActor, input: ListMails): Promise<MailsPage> {
  const { state, commissionId, after, limit } = input;
  const key = momentKeyOf(after);
  const query = mailsOf(ctx, actor)
    .select(ctx.knex.raw(`${momentText('mails.created_at')} as moment`))
    .orderBy([
      { column: 'mails.createdAt', order: 'desc' },
      { column: 'mails.id', order: 'asc' },
    ])
    .limit(limit + 1);
  if (state === 'waiting') void query.whereIn('mails.state', ['waiting', 'handing-over']);
  else if (state === 'open') void query.whereIn('mails.state', ['failed', 'unsure']);
  else if (state !== 'all') void query.where('mails.state', state);
  if (commissionId) void query.where('mails.commissionId', commissionId);
  if (key) {
    // The index runs down in time and up in id.
    void query.whereRaw('(mails.created_at < ?::timestamptz or (mails.created_at = ?::timestamptz and mails.id > ?::uuid))', [
      key.moment,
      key.moment,
      key.id,
    ]);
  }
  const rows = (await query) as (MailWithCommission & { moment: string })[];
  const page = pageOf(rows, limit, (row) => [row.moment, row.id]);
  const open = await Mail.query(ctx.knex)
    .where('studioId', actor.studioId)
    .whereNotIn('kind', hiddenKinds(actor))
    .whereIn('state', ['failed', 'unsure'])
    .resultSize();
  return { items: page.items.map(presentMail), next: page.next, open };
}
