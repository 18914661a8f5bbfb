import type { Knex } from 'knex';

/** Uploads on their way in, and the frames they become. */
export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
    create table uploads (
      id uuid primary key default gen_random_uuid(),
      studio_id uuid not null,
      commission_id uuid not null,
      purpose text not null check (purpose in ('frame', 'final')),
      state text not null default 'receiving' check (state in ('receiving', 'checking', 'done', 'failed', 'cancelled')),
      original_name text not null,
      name text not null check (length(name) between 1 and 255),
      size_bytes bigint not null check (size_bytes > 0),
      part_size integer not null check (part_size >= 5242880),
      sha256 char(64) not null check (sha256 ~ '^[0-9a-f]{64}$'),
      last_modified timestamptz,
      storage_key text not null,
      multipart_id text,
      problem text,
      frame_id uuid,
      created_by uuid references accounts on delete set null,
      created_at timestamptz not null default now(),
      updated_at timestamptz not null default now(),
      unique (studio_id, id),
      foreign key (studio_id, commission_id) references commissions (studio_id, id) on delete cascade
    );
    create index uploads_commission on uploads (commission_id, state);
    create unique index uploads_under_way on uploads (commission_id, purpose, sha256) where state in ('receiving', 'checking');
    create index uploads_stale on uploads (updated_at) where state = 'receiving';

    create table frames (
      id uuid primary key default gen_random_uuid(),
      studio_id uuid not null,
      commission_id uuid not null,
      upload_id uuid,
      view_id uuid,
      state text not null default 'reading' check (state in ('reading', 'ready', 'failed')),
      problem text,
      original_name text not null,
      name text not null check (length(name) between 1 and 255),
      media_type text not null,
      size_bytes bigint not null check (size_bytes > 0),
      sha256 char(64) not null check (sha256 ~ '^[0-9a-f]{64}$'),
      storage_key text not null,
      width integer not null check (width > 0),
      height integer not null check (height > 0),
      placeholder text,
      recipe integer,
      taken_local timestamp(6),
      taken_offset_minutes smallint,
      taken_at timestamptz(6),
      make text,
      model text,
      lens text,
      serial text,
      f_number double precision,
      exposure_time double precision,
      iso integer,
      focal_length double precision,
      focal_length35 double precision,
      exposure_bias double precision,
      exposure_mode smallint,
      orientation smallint not null default 1,
      latitude double precision,
      longitude double precision,
      hidden_at timestamptz,
      deleted_at timestamptz,
      created_by uuid references accounts on delete set null,
      created_at timestamptz not null default now(),
      unique (studio_id, id),
      foreign key (studio_id, commission_id) references commissions (studio_id, id) on delete cascade,
      foreign key (studio_id, view_id) references views (studio_id, id) on delete set null (view_id)
    );
    comment on column frames.taken_local is 'As the camera wrote it: wall-clock time without a zone';
    comment on column frames.exposure_time is 'Seconds';
    comment on column frames.width is 'Pixels, upright';
    create unique index frames_once on frames (commission_id, sha256) where deleted_at is null;
    create index frames_by_time on frames (commission_id, taken_local, name, id) where deleted_at is null;
    create index frames_by_name on frames (commission_id, name, id) where deleted_at is null;
    create index frames_deleted on frames (deleted_at) where deleted_at is not null;
    create index frames_view on frames (view_id);
  `);
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw('drop table frames, uploads');
}
