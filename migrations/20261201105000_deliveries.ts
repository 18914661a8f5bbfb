import type { Knex } from 'knex';

/** Finished files with their versions, deliveries to named recipients, archives and every download. */
export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
    create table finals (
      id uuid primary key default gen_random_uuid(),
      studio_id uuid not null,
      commission_id uuid not null,
      frame_id uuid,
      title text not null default '',
      match text not null check (match in ('by-name', 'by-hand', 'ask', 'none')),
      candidates jsonb not null default '[]',
      deleted_at timestamptz,
      version integer not null default 1,
      created_at timestamptz not null default now(),
      unique (studio_id, id),
      foreign key (studio_id, commission_id) references commissions (studio_id, id) on delete cascade,
      foreign key (studio_id, frame_id) references frames (studio_id, id),
      check ((match in ('by-name', 'by-hand')) = (frame_id is not null))
    );
    comment on column finals.frame_id is 'The picked frame this is the finished file of';
    create unique index finals_frame on finals (commission_id, frame_id) where frame_id is not null and deleted_at is null;
    create index finals_commission on finals (commission_id);

    create table final_versions (
      id uuid primary key default gen_random_uuid(),
      studio_id uuid not null,
      final_id uuid not null,
      upload_id uuid,
      number integer not null check (number > 0),
      original_name text not null,
      name text not null,
      media_type text not null,
      size_bytes bigint not null check (size_bytes > 0),
      sha256 char(64) not null check (sha256 ~ '^[0-9a-f]{64}$'),
      storage_key text not null,
      width integer not null check (width > 0),
      height integer not null check (height > 0),
      placeholder text,
      recipe integer,
      taken_local timestamp(6),
      deleted_at timestamptz,
      created_by uuid references accounts on delete set null,
      created_at timestamptz not null default now(),
      unique (studio_id, id),
      unique (final_id, number),
      foreign key (studio_id, final_id) references finals (studio_id, id) on delete cascade
    );

    create table deliveries (
      id uuid primary key default gen_random_uuid(),
      studio_id uuid not null,
      commission_id uuid not null,
      number integer not null check (number > 0),
      words text not null default '',
      fetch_by date not null,
      ends_at timestamptz not null,
      sent_at timestamptz,
      withdrawn_at timestamptz,
      idempotency_key text,
      version integer not null default 1,
      created_by uuid references accounts on delete set null,
      created_at timestamptz not null default now(),
      unique (studio_id, id),
      unique (commission_id, number),
      unique (commission_id, idempotency_key),
      foreign key (studio_id, commission_id) references commissions (studio_id, id) on delete cascade
    );

    create table delivery_files (
      id uuid primary key default gen_random_uuid(),
      studio_id uuid not null,
      delivery_id uuid not null,
      final_version_id uuid not null,
      position integer not null,
      name text not null,
      title text not null default '',
      unique (studio_id, id),
      unique (delivery_id, final_version_id),
      foreign key (studio_id, delivery_id) references deliveries (studio_id, id) on delete cascade,
      foreign key (studio_id, final_version_id) references final_versions (studio_id, id)
    );
    create unique index delivery_files_name on delivery_files (delivery_id, lower(name));

    create table delivery_recipients (
      id uuid primary key default gen_random_uuid(),
      studio_id uuid not null,
      delivery_id uuid not null,
      account_id uuid not null references accounts on delete cascade,
      name text not null check (length(name) between 1 and 120),
      token_hash text unique,
      invited_at timestamptz,
      first_opened_at timestamptz,
      last_seen_at timestamptz,
      withdrawn_at timestamptz,
      unique (studio_id, id),
      unique (delivery_id, account_id),
      foreign key (studio_id, delivery_id) references deliveries (studio_id, id) on delete cascade
    );
    create index delivery_recipients_account on delivery_recipients (account_id);

    create table archives (
      id uuid primary key default gen_random_uuid(),
      studio_id uuid not null,
      delivery_id uuid,
      pick_list_id uuid,
      kind text not null check (kind in ('full', 'web', 'picks')),
      state text not null default 'building' check (state in ('building', 'ready', 'failed')),
      problem text,
      name text not null,
      file_count integer not null default 0,
      size_bytes bigint,
      written_bytes bigint not null default 0,
      sha256 char(64),
      storage_key text not null,
      created_at timestamptz not null default now(),
      ready_at timestamptz,
      unique (studio_id, id),
      foreign key (studio_id, delivery_id) references deliveries (studio_id, id) on delete cascade,
      foreign key (studio_id, pick_list_id) references pick_lists (studio_id, id) on delete cascade,
      check ((kind = 'picks') = (pick_list_id is not null)),
      check ((kind <> 'picks') = (delivery_id is not null)),
      check (state <> 'ready' or (size_bytes is not null and sha256 is not null))
    );
    create unique index archives_delivery on archives (delivery_id, kind) where delivery_id is not null;
    create unique index archives_pick_list on archives (pick_list_id) where pick_list_id is not null;

    create table downloads (
      id uuid primary key default gen_random_uuid(),
      studio_id uuid not null,
      delivery_id uuid not null,
      account_id uuid references accounts on delete set null,
      what text not null check (what in ('file', 'web', 'full')),
      delivery_file_id uuid,
      size_bytes bigint not null,
      sent_bytes bigint not null default 0,
      started_at timestamptz not null default now(),
      last_at timestamptz not null default now(),
      finished_at timestamptz,
      foreign key (studio_id, delivery_id) references deliveries (studio_id, id) on delete cascade,
      foreign key (studio_id, delivery_file_id) references delivery_files (studio_id, id) on delete cascade,
      check ((what = 'file') = (delivery_file_id is not null))
    );
    create index downloads_delivery on downloads (delivery_id, account_id);
  `);
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw('drop table downloads, archives, delivery_recipients, delivery_files, deliveries, final_versions, finals');
}
