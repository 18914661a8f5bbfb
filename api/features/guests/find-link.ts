import type { Knex } from 'knex';
import { SHEET_STAYS_DAYS } from '../../domain/sheet-state.ts';
import { hashToken } from './tokens.ts';

/** What a link was made for. */
export interface Link {
  kind: 'sheet' | 'delivery';
  /** The invitation's row: sheet_guests or delivery_recipients. */
  id: string;
  accountId: string;
  name: string;
  studioId: string;
  studioName: string;
  replyTo: string;
  timeZone: string;
  commissionId: string;
  /** Of the commission. */
  title: string;
  /** Of the sheet or the delivery. */
  number: number;
  goTo: string;
  /** The invitation, or the whole sheet or delivery, was taken back, or the commission deleted. */
  withdrawn: boolean;
  /** Nothing can be opened any more because its time is over. */
  ended: boolean;
  /** A newer link was sent to the same person since. */
  replaced: boolean;
}

const GUESTS = `
  select 'sheet' as kind, g.id, g.account_id, g.name, g.studio_id, st.name as studio_name, st.reply_to, st.time_zone, s.commission_id, c.title,
         s.number, '/sheets/' || s.id as go_to, (g.withdrawn_at is not null or s.withdrawn_at is not null or c.deleted_at is not null) as withdrawn,
         coalesce(s.ends_at + make_interval(days => ${SHEET_STAYS_DAYS}) <= now(), false) as ended,
         g.token_hash is distinct from :hash as replaced
    from sheet_guests g
    join sheets s on s.id = g.sheet_id join studios st on st.id = g.studio_id join commissions c on c.id = s.commission_id
   where s.issued_at is not null and g.id = any (
           select id from sheet_guests where token_hash = :hash
           union all select sheet_guest_id from replaced_links where token_hash = :hash)`;

const RECIPIENTS = `
  select 'delivery' as kind, r.id, r.account_id, r.name, r.studio_id, st.name as studio_name, st.reply_to, st.time_zone, d.commission_id, c.title,
         d.number, '/deliveries/' || d.id as go_to, (r.withdrawn_at is not null or d.withdrawn_at is not null or c.deleted_at is not null) as withdrawn,
         d.ends_at <= now() as ended, r.token_hash is distinct from :hash as replaced
    from delivery_recipients r
    join deliveries d on d.id = r.delivery_id join studios st on st.id = r.studio_id join commissions c on c.id = d.commission_id
   where d.sent_at is not null and r.id = any (
           select id from delivery_recipients where token_hash = :hash
           union all select delivery_recipient_id from replaced_links where token_hash = :hash)`;

/** Finds what a token, present or replaced, was made for. A sheet or delivery that was not sent yet is not found. */
export async function findLink(db: Knex, token: string): Promise<Link | undefined> {
  const { rows } = await db.raw<{ rows: Link[] }>(`${GUESTS} union all ${RECIPIENTS} limit 1`, { hash: hashToken(token) });
  return rows[0];
}
