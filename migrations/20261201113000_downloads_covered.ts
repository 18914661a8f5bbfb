import type { Knex } from 'knex';

/** Which bytes of a download were handed over: a resumed one is whole when its pieces cover the file, in whatever order they came. */
export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
    alter table downloads add column covered int8multirange not null default '{}';
    comment on column downloads.sent_bytes is 'Length of what is covered; bytes sent twice count once';
    create unique index final_versions_upload on final_versions (upload_id) where upload_id is not null;
    create index delivery_files_version on delivery_files (final_version_id);
  `);
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw(`
    drop index delivery_files_version;
    drop index final_versions_upload;
    alter table downloads drop column covered;
  `);
}
