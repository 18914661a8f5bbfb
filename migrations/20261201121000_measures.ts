import type { Knex } from 'knex';

/** What is measured on a frame. In a table of its own, since lists of frames and proofs do not need it. */
export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
    create table frame_measures (
      frame_id uuid primary key,
      studio_id uuid not null,
      measures jsonb not null,
      foreign key (studio_id, frame_id) references frames (studio_id, id) on delete cascade
    );
    alter table frames
      add column measures_recipe integer,
      add column alike jsonb;
    comment on column frames.measures_recipe is 'Version of the measuring that was done, also where nothing could be measured';
    comment on column frames.alike is 'The group of near-doubles it belongs to, and its place among them';
    create index frames_unmeasured on frames (created_at) where measures_recipe is null and deleted_at is null;
  `);
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw(`
    alter table frames drop column alike, drop column measures_recipe;
    drop table frame_measures;
  `);
}
