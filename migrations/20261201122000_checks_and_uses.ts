import type { Knex } from 'knex';

/** From where on a studio's frames are pointed out, and what its pictures are wanted for; null means as Oriel has it. */
export async function up(knex: Knex): Promise<void> {
  await knex.raw('alter table studios add column check_thresholds jsonb, add column uses jsonb');
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw('alter table studios drop column uses, drop column check_thresholds');
}
