import type { Knex } from 'knex';

/** Moments of a commission's rows, by table; `of` finds the rows of a commission. */
const moments: readonly { table: string; columns: readonly string[]; of: string }[] = [
  { table: 'commissions', columns: ['created_at', 'updated_at'], of: 'id = :id' },
  { table: 'views', columns: ['created_at'], of: 'commission_id = :id' },
  { table: 'uploads', columns: ['created_at', 'updated_at'], of: 'commission_id = :id' },
  { table: 'frames', columns: ['created_at'], of: 'commission_id = :id' },
  { table: 'brackets', columns: ['created_at'], of: 'commission_id = :id' },
  { table: 'sheets', columns: ['created_at', 'issued_at', 'sent_at'], of: 'commission_id = :id' },
  { table: 'sheet_guests', columns: ['invited_at', 'first_opened_at', 'last_seen_at'], of: 'sheet_id in (select id from sheets where commission_id = :id)' },
  { table: 'marks', columns: ['marked_at'], of: 'sheet_id in (select id from sheets where commission_id = :id)' },
  { table: 'pick_lists', columns: ['sent_at'], of: 'commission_id = :id' },
  { table: 'finals', columns: ['created_at'], of: 'commission_id = :id' },
  { table: 'final_versions', columns: ['created_at'], of: 'final_id in (select id from finals where commission_id = :id)' },
  { table: 'deliveries', columns: ['created_at', 'sent_at'], of: 'commission_id = :id' },
  { table: 'delivery_recipients', columns: ['invited_at', 'first_opened_at', 'last_seen_at'], of: 'delivery_id in (select id from deliveries where commission_id = :id)' },
  { table: 'downloads', columns: ['started_at', 'last_at', 'finished_at'], of: 'delivery_id in (select id from deliveries where commission_id = :id)' },
  { table: 'record_entries', columns: ['at'], of: 'commission_id = :id' },
  { table: 'mails', columns: ['created_at', 'handed_over_at', 'sent_at'], of: 'commission_id = :id' },
]; // prettier-ignore

/** Tables whose rows a trigger keeps from being changed: only a demo that makes up its past may move them. */
const guarded = { record_entries: 'record_is_append_only', pick_lists: 'pick_lists_are_final' };

/**
 * Lets time pass for one commission: everything that has happened so far moves back by so many hours, as if the next step
 * came so much later. Last dates stay where they are.
 */
export async function letTimePass(knex: Knex, commissionId: string, hours: number): Promise<void> {
  await knex.transaction(async (trx) => {
    for (const [table, trigger] of Object.entries(guarded)) await trx.raw(`alter table ${table} disable trigger ${trigger}`);
    for (const { table, columns, of } of moments) {
      const back = columns.map((column) => `${column} = ${column} - make_interval(mins => :minutes)`).join(', ');
      await trx.raw(`update ${table} set ${back} where ${of}`, { id: commissionId, minutes: Math.round(hours * 60) });
    }
    for (const [table, trigger] of Object.entries(guarded)) await trx.raw(`alter table ${table} enable trigger ${trigger}`);
  });
}
