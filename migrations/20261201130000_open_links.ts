import type { Knex } from 'knex';

/**
 * Open links of sheets, the browsers that look by one, and the tokens that confirm the address of somebody who looks and wants to mark.
 * A link that was withdrawn stays as a row, so that whoever still has its address is told so.
 */
export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
    create table open_links (
      id uuid primary key default gen_random_uuid(),
      studio_id uuid not null,
      sheet_id uuid not null,
      token_hash text not null unique,
      sealed_token text,
      passphrase_hash text,
      round integer not null default 1,
      ends_on date,
      ends_at timestamptz,
      created_by uuid references accounts on delete set null,
      created_at timestamptz not null default now(),
      withdrawn_at timestamptz,
      unique (studio_id, id),
      check ((ends_on is null) = (ends_at is null)),
      check (withdrawn_at is null or sealed_token is null),
      foreign key (studio_id, sheet_id) references sheets (studio_id, id) on delete cascade
    );
    comment on column open_links.sealed_token is 'Sealed with the secret of the installation, so that the studio can see the address again';
    comment on column open_links.round is 'Counts up when another passphrase is set: who looks since an earlier round has to give the new one';
    comment on column open_links.ends_on is 'Null: it ends with the sheet';
    create unique index open_links_of_sheet on open_links (sheet_id) where withdrawn_at is null;
    create index open_links_sheet on open_links (sheet_id);

    create table lookers (
      id uuid primary key default gen_random_uuid(),
      studio_id uuid not null,
      open_link_id uuid not null,
      token_hash text not null unique,
      round integer not null,
      opened_at timestamptz not null default now(),
      expires_at timestamptz not null,
      foreign key (studio_id, open_link_id) references open_links (studio_id, id) on delete cascade
    );
    create index lookers_of_link on lookers (open_link_id);
    create index lookers_expired on lookers (expires_at);

    alter table sheet_guests add column by_open_link boolean not null default false;

    alter table account_tokens add column open_link_id uuid references open_links on delete cascade;
    alter table account_tokens drop constraint account_tokens_purpose_check;
    alter table account_tokens drop constraint account_tokens_check;
    alter table account_tokens add constraint account_tokens_purpose_check
      check (purpose in ('reset-password', 'confirm-email', 'join-studio', 'begin-marking'));
    alter table account_tokens add constraint account_tokens_check
      check (purpose in ('join-studio', 'begin-marking') or account_id is not null);
    alter table account_tokens add constraint account_tokens_open_link_check
      check (purpose <> 'begin-marking' or (open_link_id is not null and name is not null));
    create index account_tokens_open_link on account_tokens (open_link_id) where open_link_id is not null;
  `);
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw(`
    delete from account_tokens where purpose = 'begin-marking';
    alter table account_tokens drop constraint account_tokens_purpose_check;
    alter table account_tokens drop constraint account_tokens_check;
    alter table account_tokens drop column open_link_id;
    alter table account_tokens add constraint account_tokens_purpose_check
      check (purpose in ('reset-password', 'confirm-email', 'join-studio'));
    alter table account_tokens add constraint account_tokens_check check (purpose = 'join-studio' or account_id is not null);
    alter table account_tokens drop constraint if exists account_tokens_open_link_check;
    alter table sheet_guests drop column by_open_link;
    drop table lookers, open_links;
  `);
}
