import { createHash } from 'node:crypto';
import fs from 'node:fs';
import path from 'node:path';
import { connect } from '../../api/db/knex.ts';
import { migrateQueue } from '../../api/jobs/work.ts';
import { closedParent, clusterAccount } from '../../docker-free-dev/postgres/binaries.ts';
import { say } from './say.ts';

/**
 * Where the cluster lives. Started by root, PostgreSQL runs as user postgres, who may not enter a data folder below
 * root's home; then the cluster gets a folder of its own below /var/lib, named after the data folder.
 */
export function clusterPlace(dataDir: string): string {
  const inside = path.join(dataDir, 'postgres');
  const closed = clusterAccount() ? closedParent(inside) : null;
  if (!closed) return inside;
  const name = createHash('sha256').update(dataDir).digest('hex').slice(0, 12);
  const outside = path.join('/var/lib/oriel', name);
  say(`User postgres may not enter ${closed}, so the database lives in ${outside}.`);
  fs.mkdirSync(path.dirname(outside), { recursive: true, mode: 0o755 });
  return outside;
}

/** Brings the tables and the queue up to date. */
export async function migrate(url: string): Promise<void> {
  const knex = connect({ url, connections: 2 });
  try {
    await knex.migrate.latest();
  } finally {
    await knex.destroy();
  }
  await migrateQueue(url);
}

/** True while no studio has signed up. */
export async function isEmpty(url: string): Promise<boolean> {
  const knex = connect({ url, connections: 1 });
  try {
    return (await knex('studios').first('id')) === undefined;
  } finally {
    await knex.destroy();
  }
}

/** Takes every table away: used only on a local database whose demo was never finished. */
export async function clearDatabase(url: string): Promise<void> {
  const knex = connect({ url, connections: 1 });
  try {
    const schemas = await knex.raw<{ rows: { name: string }[] }>(
      `select nspname as name from pg_namespace where nspname !~ '^pg_' and nspname not in ('information_schema', 'public')`,
    );
    for (const { name } of schemas.rows) await knex.raw('drop schema ?? cascade', [name]);
    await knex.raw('drop schema public cascade');
    await knex.raw('create schema public');
  } finally {
    await knex.destroy();
  }
}
