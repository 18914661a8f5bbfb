import type { Knex } from 'knex';

/** The outbox of mails, and the append-only record of what was done by whom. */
export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
    create table mails (
      id uuid primary key default gen_random_uuid(),
      studio_id uuid references studios on delete cascade,
      commission_id uuid references commissions on delete cascade,
      account_id uuid references accounts on delete set null,
      kind text not null,
      to_address text not null,
      to_name text not null default '',
      from_name text not null,
      reply_to text,
      subject text not null,
      text text not null,
      html text not null,
      state text not null default 'waiting' check (state in ('waiting', 'handing-over', 'sent', 'failed', 'unsure', 'withdrawn')),
      attempts integer not null default 0,
      problem text,
      created_at timestamptz not null default now(),
      handed_over_at timestamptz,
      sent_at timestamptz
    );
    comment on column mails.state is 'unsure: the process died between handing over and hearing the answer; a person decides';
    create index mails_studio on mails (studio_id, created_at desc, id);
    create index mails_open on mails (created_at) where state in ('waiting', 'handing-over');

    create table record_entries (
      id bigint generated always as identity primary key,
      studio_id uuid not null references studios on delete cascade,
      commission_id uuid,
      at timestamptz not null default now(),
      account_id uuid,
      by_name text not null,
      by_kind text not null check (by_kind in ('staff', 'guest', 'oriel')),
      did text not null,
      says text not null,
      about jsonb not null default '{}'
    );
    create index record_of_commission on record_entries (commission_id, id desc);
    create index record_of_studio on record_entries (studio_id, id desc);
    create trigger record_is_append_only before update on record_entries for each row execute function refuse_change();
  `);
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw('drop table record_entries, mails');
}
