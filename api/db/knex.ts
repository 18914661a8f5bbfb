import knex, { type Knex } from 'knex';
import { knexSnakeCaseMappers, Model } from 'objection';
import pg from 'pg';
import { migrationSource } from '../../migrations/index.ts';

// Sizes are bigint columns; all of them stay far below 2^53, so numbers are exact.
pg.types.setTypeParser(pg.types.builtins.INT8, Number);
// A date without a time has no zone: keep "2026-11-17" as it is written.
pg.types.setTypeParser(pg.types.builtins.DATE, String);
// A camera's wall clock has no zone either.
pg.types.setTypeParser(pg.types.builtins.TIMESTAMP, (text) => text.replace(' ', 'T'));

const names = knexSnakeCaseMappers();
const camelCase = names.postProcessResponse as (result: unknown) => unknown;

/** The answer to raw SQL keeps its rows one level down, where the mappers do not look. */
function isRaw(result: unknown): result is { rows: unknown[] } {
  return typeof result === 'object' && result !== null && Array.isArray((result as { rows?: unknown }).rows);
}

/** Opens the connection pool and hands it to the models. Names are camelCase in code and snake_case in tables. */
export function connect(database: { url: string; connections: number }): Knex {
  const db = knex({
    client: 'pg',
    connection: { connectionString: database.url, application_name: 'oriel' },
    pool: { min: 0, max: database.connections },
    migrations: { migrationSource },
    ...names,
    postProcessResponse: (result: unknown) => (isRaw(result) ? { ...result, rows: camelCase(result.rows) } : camelCase(result)),
  });
  Model.knex(db);
  return db;
}
