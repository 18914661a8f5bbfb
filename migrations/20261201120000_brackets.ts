import type { Knex } from 'knex';

/** Frames of one composition at different exposures, their merged picture, and the proofs and picks that are made of them. */
export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
    create table brackets (
      id uuid primary key default gen_random_uuid(),
      studio_id uuid not null,
      commission_id uuid not null,
      lead_frame_id uuid not null,
      lead_by_hand boolean not null default false,
      by_hand boolean not null default false,
      shows text not null default 'merged' check (shows in ('merged', 'lead')),
      wanted text not null,
      made_of text,
      width integer,
      height integer,
      placeholder text,
      left_out jsonb not null default '[]',
      problem text,
      created_at timestamptz not null default now(),
      unique (studio_id, id),
      foreign key (studio_id, commission_id) references commissions (studio_id, id) on delete cascade,
      foreign key (studio_id, lead_frame_id) references frames (studio_id, id) on delete cascade
    );
    comment on column brackets.wanted is 'Names the frames, their order, the lead and the recipe of the merged picture that should be there';
    comment on column brackets.made_of is 'The same of the merged picture that is there';
    comment on column brackets.problem is 'Why the wanted picture cannot be made';
    comment on column brackets.width is 'Pixels of the largest merged picture';
    create index brackets_commission on brackets (commission_id);
    create index brackets_lead on brackets (lead_frame_id);

    alter table frames
      add column bracket_id uuid,
      add column grouped_by_hand boolean not null default false,
      add foreign key (studio_id, bracket_id) references brackets (studio_id, id) on delete set null (bracket_id);
    comment on column frames.grouped_by_hand is 'Somebody decided which bracket it belongs to, or that it belongs to none';
    create index frames_bracket on frames (bracket_id) where bracket_id is not null;

    alter table proofs
      add column bracket_id uuid,
      add column pictured text,
      add foreign key (studio_id, bracket_id) references brackets (studio_id, id) on delete set null (bracket_id);
    comment on column proofs.pictured is 'What the watermarked pictures of a bracket''s proof were made of; part of their keys';
    create unique index proofs_bracket on proofs (bracket_id, sheet_id) where bracket_id is not null;

    alter table picks add column frame_ids uuid[] not null default '{}';
    comment on column picks.frame_ids is 'All frames of a bracket, darkest first; empty for a single frame';
    create index picks_frames on picks using gin (frame_ids);
  `);
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw(`
    alter table picks drop column frame_ids;
    alter table proofs drop column pictured, drop column bracket_id;
    alter table frames drop column grouped_by_hand, drop column bracket_id;
    drop table brackets;
  `);
}
