import knex, { type Knex } from 'knex';
import { afterAll, beforeAll, describe, expect, inject, it } from 'vitest';
import { migrationSource } from '../../migrations/index.ts';
import { emptyDatabase } from '../support/database.ts';

let database: Awaited<ReturnType<typeof emptyDatabase>>;
let db: Knex;

beforeAll(async () => {
  database = await emptyDatabase(inject('clusterUrl'));
  db = knex({ client: 'pg', connection: database.url, pool: { min: 0, max: 2 }, migrations: { migrationSource } });
});
afterAll(async () => {
  await db.destroy();
  await database.drop();
});

/** The whole shape of the database as text: columns, checks, keys, indexes, triggers. */
async function shape(): Promise<string[]> {
  const { rows } = await db.raw<{ rows: { line: string }[] }>(`
    select format('column %s.%s %s %s %s', table_name, column_name, data_type, is_nullable, column_default) as line
      from information_schema.columns where table_schema = 'public' and table_name not like 'knex%'
    union all select format('constraint %s %s', conrelid::regclass, pg_get_constraintdef(oid)) from pg_constraint where connamespace = 'public'::regnamespace and conrelid::regclass::text not like 'knex%'
    union all select indexdef from pg_indexes where schemaname = 'public' and tablename not like 'knex%'
    union all select pg_get_triggerdef(oid) from pg_trigger where not tgisinternal
    order by 1`);
  return rows.map((row) => row.line);
}

describe('migrations', () => {
  it('go up, all the way down and up again to the same shape', async () => {
    await db.migrate.latest();
    const first = await shape();
    expect(first.length).toBeGreaterThan(100);
    await db.migrate.rollback(undefined, true);
    expect(await shape()).toEqual([]);
    await db.migrate.latest();
    expect(await shape()).toEqual(first);
  });

  it('refuse a frame under a commission of another studio', async () => {
    const studio = async (name: string) =>
      (await db('studios').insert({ name, reply_to: 'post@example.test' }).returning('id'))[0].id as string;
    const [ours, theirs] = [await studio('Ours'), await studio('Theirs')];
    const [client] = await db('clients').insert({ studio_id: theirs, name: 'Client' }).returning('id');
    const [commission] = await db('commissions')
      .insert({ studio_id: theirs, client_id: client.id, title: 'Job', currency: 'GBP' })
      .returning('id');
    const view = (studio_id: string) => db('views').insert({ studio_id, commission_id: commission.id, position: 1, title: 'East front' });
    await expect(view(ours)).rejects.toThrow(/foreign key/);
    await view(theirs);
  });

  it('keep the record append-only', async () => {
    const [studio] = await db('studios').insert({ name: 'Third', reply_to: 'post@example.test' }).returning('id');
    await db('record_entries').insert({ studio_id: studio.id, by_name: 'Oriel', by_kind: 'oriel', did: 'studio.made', says: 'Made' });
    await expect(db('record_entries').update({ says: 'Changed' })).rejects.toThrow(/never changed/);
  });
});
