import type { Knex } from 'knex';

/** Proof sheets, the proofs on them, the guests invited to them and their marks. */
export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
    create table sheets (
      id uuid primary key default gen_random_uuid(),
      studio_id uuid not null,
      commission_id uuid not null,
      number integer not null check (number > 0),
      choose_by date,
      ends_at timestamptz,
      allowance integer not null check (allowance between 0 and 10000),
      extra_price bigint not null check (extra_price between 0 and 100000000000),
      currency char(3) not null check (currency ~ '^[A-Z]{3}$'),
      watermark jsonb not null,
      watermark_hash text not null default '',
      issued_at timestamptz,
      withdrawn_at timestamptz,
      sent_at timestamptz,
      reopened_at timestamptz,
      reopen_reason text,
      revision bigint not null default 1,
      version integer not null default 1,
      created_by uuid references accounts on delete set null,
      created_at timestamptz not null default now(),
      unique (studio_id, id),
      unique (commission_id, number),
      foreign key (studio_id, commission_id) references commissions (studio_id, id) on delete cascade
    );
    comment on column sheets.sent_at is 'When the last pick list was sent; null again once the sheet is reopened';
    comment on column sheets.revision is 'Counts up whenever what a guest sees of the proofs changes; marks do not count';

    create table proofs (
      id uuid primary key default gen_random_uuid(),
      studio_id uuid not null,
      sheet_id uuid not null,
      frame_id uuid not null,
      view_id uuid,
      number integer not null check (number > 0),
      position integer not null,
      watermark_hash text,
      created_at timestamptz not null default now(),
      unique (studio_id, id),
      unique (sheet_id, frame_id),
      unique (sheet_id, number),
      foreign key (studio_id, sheet_id) references sheets (studio_id, id) on delete cascade,
      foreign key (studio_id, frame_id) references frames (studio_id, id),
      foreign key (studio_id, view_id) references views (studio_id, id) on delete set null (view_id)
    );
    comment on column proofs.watermark_hash is 'The watermark its derivatives carry; null until they are made';
    create index proofs_in_order on proofs (sheet_id, position, id);
    create index proofs_frame on proofs (frame_id);

    create table sheet_guests (
      id uuid primary key default gen_random_uuid(),
      studio_id uuid not null,
      sheet_id uuid not null,
      account_id uuid not null references accounts on delete cascade,
      role text not null check (role in ('lead', 'reviewer')),
      name text not null check (length(name) between 1 and 120),
      words text not null default '',
      token_hash text unique,
      invited_by uuid references accounts on delete set null,
      invited_at timestamptz not null default now(),
      first_opened_at timestamptz,
      last_seen_at timestamptz,
      reminded_at timestamptz,
      withdrawn_at timestamptz,
      unique (studio_id, id),
      unique (sheet_id, account_id),
      foreign key (studio_id, sheet_id) references sheets (studio_id, id) on delete cascade
    );
    create index sheet_guests_account on sheet_guests (account_id);

    create table marks (
      sheet_id uuid not null,
      proof_id uuid not null,
      account_id uuid not null references accounts on delete cascade,
      studio_id uuid not null,
      marked_at timestamptz not null default now(),
      primary key (sheet_id, proof_id, account_id),
      foreign key (studio_id, sheet_id) references sheets (studio_id, id) on delete cascade,
      foreign key (studio_id, proof_id) references proofs (studio_id, id) on delete cascade
    );
    create index marks_proof on marks (proof_id);
  `);
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw('drop table marks, sheet_guests, proofs, sheets');
}
