import knex from 'knex';
import { migrateQueue } from '../../api/jobs/work.ts';
import { connect } from '../../api/db/knex.ts';

const TEMPLATE = 'oriel_template';

const inDatabase = (url: string, name: string) => {
  const address = new URL(url);
  address.pathname = `/${name}`;
  return address.toString();
};

async function asOwner<T>(url: string, work: (admin: ReturnType<typeof knex>) => Promise<T>): Promise<T> {
  const admin = knex({ client: 'pg', connection: inDatabase(url, 'postgres'), pool: { min: 0, max: 1 } });
  try {
    return await work(admin);
  } finally {
    await admin.destroy();
  }
}

/** Migrates one database that every test file's own is cloned from. */
export async function makeTemplate(url: string): Promise<void> {
  await asOwner(url, (admin) => admin.raw(`create database ${TEMPLATE}`));
  const template = inDatabase(url, TEMPLATE);
  const db = connect({ url: template, connections: 1 });
  await db.migrate.latest();
  await db.destroy();
  await migrateQueue(template);
}

let counter = 0;

/** Clones the template (some 0.1 s) and gives the address of the clone and a way to drop it. */
export async function cloneDatabase(url: string): Promise<{ url: string; drop(): Promise<void> }> {
  const name = `oriel_${process.pid}_${Date.now()}_${counter++}`;
  await asOwner(url, (admin) => admin.raw(`create database ${name} template ${TEMPLATE}`));
  return {
    url: inDatabase(url, name),
    drop: () => asOwner(url, async (admin) => void (await admin.raw(`drop database if exists ${name} with (force)`))),
  };
}

/** An empty database without any table, for the migrations' own test. */
export async function emptyDatabase(url: string): Promise<{ url: string; drop(): Promise<void> }> {
  const name = `oriel_empty_${process.pid}_${counter++}`;
  await asOwner(url, (admin) => admin.raw(`create database ${name}`));
  return {
    url: inDatabase(url, name),
    drop: () => asOwner(url, async (admin) => void (await admin.raw(`drop database if exists ${name} with (force)`))),
  };
}
