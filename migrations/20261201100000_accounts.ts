import type { Knex } from 'knex';

/** People who sign in, the studios they work for, their sessions and the single-use tokens sent by mail. */
export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
    create table studios (
      id uuid primary key default gen_random_uuid(),
      name text not null check (length(name) between 1 and 120),
      reply_to text not null,
      time_zone text not null default 'Europe/London',
      currency char(3) not null default 'GBP' check (currency ~ '^[A-Z]{3}$'),
      watermark jsonb not null default '{"kind":"text","text":"","opacity":0.35,"size":0.5,"tiled":false}',
      demo_state text check (demo_state in ('seeding', 'ready')),
      version integer not null default 1,
      created_at timestamptz not null default now()
    );

    create table accounts (
      id uuid primary key default gen_random_uuid(),
      email text not null check (email = lower(email) and length(email) between 3 and 254),
      name text not null check (length(name) between 1 and 120),
      password_hash text,
      email_confirmed_at timestamptz,
      shortcuts boolean not null default true,
      created_at timestamptz not null default now()
    );
    create unique index accounts_email on accounts (email);

    create table memberships (
      studio_id uuid not null references studios on delete cascade,
      account_id uuid not null unique references accounts on delete cascade,
      role text not null check (role in ('owner', 'assistant')),
      created_at timestamptz not null default now(),
      primary key (studio_id, account_id)
    );

    -- The columns id, user_id and expires_at are the session library's; id is a SHA-256 of what the cookie holds.
    create table sessions (
      id text primary key,
      user_id uuid not null references accounts on delete cascade,
      expires_at timestamptz not null,
      kind text not null check (kind in ('staff', 'guest')),
      created_at timestamptz not null default now()
    );
    create index sessions_user on sessions (user_id);

    create table account_tokens (
      id uuid primary key default gen_random_uuid(),
      purpose text not null check (purpose in ('reset-password', 'confirm-email', 'join-studio')),
      token_hash text not null unique,
      email text not null,
      account_id uuid references accounts on delete cascade,
      studio_id uuid references studios on delete cascade,
      name text,
      expires_at timestamptz not null,
      used_at timestamptz,
      created_by uuid references accounts on delete set null,
      created_at timestamptz not null default now(),
      check (purpose = 'join-studio' or account_id is not null),
      check (purpose <> 'join-studio' or studio_id is not null)
    );
    create index account_tokens_studio on account_tokens (studio_id) where used_at is null;

    create table rate_limits (
      key text primary key,
      points integer not null default 0,
      expire bigint
    );
  `);
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw('drop table rate_limits, account_tokens, sessions, memberships, accounts, studios');
}
