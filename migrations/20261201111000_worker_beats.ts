import type { Knex } from 'knex';

/** Signs of life of the worker's lanes, by which the jobs of a killed one are found. */
export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
    create unlogged table worker_beats (
      worker_id text primary key,
      beat_at timestamptz not null default now()
    )
  `);
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw('drop table worker_beats');
}
