import type { Knex } from 'knex';

/** Views and contacts are edited one by one, so each says which version of it a change was made from. */
export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
    alter table views add column version integer not null default 1;
    alter table contacts add column version integer not null default 1;
  `);
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw('alter table views drop column version; alter table contacts drop column version');
}
