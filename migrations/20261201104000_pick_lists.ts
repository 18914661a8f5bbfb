import type { Knex } from 'knex';

/** What a lead sent: numbered copies of the picks at that moment, which nobody can change afterwards. */
export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
    create table pick_lists (
      id uuid primary key default gen_random_uuid(),
      studio_id uuid not null,
      sheet_id uuid not null,
      commission_id uuid not null,
      number integer not null check (number > 0),
      sent_by uuid references accounts on delete set null,
      sent_by_name text not null,
      sent_at timestamptz not null default now(),
      words text not null default '',
      pick_count integer not null check (pick_count > 0),
      allowance integer not null,
      extra_count integer not null check (extra_count >= 0),
      extra_price bigint not null,
      currency char(3) not null,
      unique (studio_id, id),
      unique (sheet_id, number),
      foreign key (studio_id, sheet_id) references sheets (studio_id, id) on delete cascade,
      foreign key (studio_id, commission_id) references commissions (studio_id, id) on delete cascade
    );
    create index pick_lists_commission on pick_lists (commission_id, sent_at desc);

    create table picks (
      id uuid primary key default gen_random_uuid(),
      studio_id uuid not null,
      pick_list_id uuid not null,
      number integer not null check (number > 0),
      proof_id uuid not null,
      proof_number integer not null,
      frame_id uuid not null,
      frame_name text not null,
      view_id uuid,
      view_title text,
      extra boolean not null,
      marked_by jsonb not null,
      unique (studio_id, id),
      unique (pick_list_id, number),
      unique (pick_list_id, proof_id),
      foreign key (studio_id, pick_list_id) references pick_lists (studio_id, id) on delete cascade,
      foreign key (studio_id, proof_id) references proofs (studio_id, id),
      foreign key (studio_id, frame_id) references frames (studio_id, id)
    );
    create index picks_frame on picks (frame_id);

    create function refuse_change() returns trigger language plpgsql as $$
    begin
      raise exception '% is written once and never changed', tg_table_name using errcode = 'integrity_constraint_violation';
    end $$;
    create trigger pick_lists_are_final before update of number, sent_at, words, pick_count, allowance, extra_count, extra_price, currency
      on pick_lists for each row execute function refuse_change();
    create trigger picks_are_final before update on picks for each row execute function refuse_change();
  `);
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw('drop table picks, pick_lists; drop function refuse_change()');
}
