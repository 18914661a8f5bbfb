import type { Knex } from 'knex';

/**
 * Links that were replaced by newer ones: whoever opens an older mail can be told so and sent a new link. And the password of
 * somebody who was a guest when they signed up: it counts once they confirm that the address is theirs.
 */
export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
    create table replaced_links (
      token_hash text primary key,
      sheet_guest_id uuid references sheet_guests on delete cascade,
      delivery_recipient_id uuid references delivery_recipients on delete cascade,
      replaced_at timestamptz not null default now(),
      check (num_nonnulls(sheet_guest_id, delivery_recipient_id) = 1)
    );
    create index replaced_links_guest on replaced_links (sheet_guest_id);
    create index replaced_links_recipient on replaced_links (delivery_recipient_id);

    create function remember_replaced_link() returns trigger language plpgsql as $$
    begin
      if tg_table_name = 'sheet_guests' then
        insert into replaced_links (token_hash, sheet_guest_id) values (old.token_hash, old.id) on conflict do nothing;
      else
        insert into replaced_links (token_hash, delivery_recipient_id) values (old.token_hash, old.id) on conflict do nothing;
      end if;
      return null;
    end $$;
    create trigger remember_replaced_link after update of token_hash on sheet_guests for each row
      when (old.token_hash is not null and old.token_hash is distinct from new.token_hash) execute function remember_replaced_link();
    create trigger remember_replaced_link after update of token_hash on delivery_recipients for each row
      when (old.token_hash is not null and old.token_hash is distinct from new.token_hash) execute function remember_replaced_link();

    alter table account_tokens add column password_hash text;
    comment on column account_tokens.password_hash is 'Of a sign-up with the address of a guest: taken over when the address is confirmed';
  `);
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw(`
    alter table account_tokens drop column password_hash;
    drop trigger remember_replaced_link on sheet_guests;
    drop trigger remember_replaced_link on delivery_recipients;
    drop function remember_replaced_link;
    drop table replaced_links;
  `);
}
