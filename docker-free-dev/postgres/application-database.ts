import pg from 'pg';

/** Role and database of the application: an ordinary role, as a real installation would have. */
export async function ensureDatabase(port: number, password: string): Promise<void> {
  const client = new pg.Client({ host: '127.0.0.1', port, user: 'postgres', password, database: 'postgres' });
  await client.connect();
  try {
    const role = await client.query(`select 1 from pg_roles where rolname = 'oriel'`);
    if (role.rowCount === 0) await client.query(`create role oriel login password '${password}'`);
    const database = await client.query(`select 1 from pg_database where datname = 'oriel'`);
    if (database.rowCount === 0) await client.query('create database oriel owner oriel');
  } finally {
    await client.end();
  }
}
