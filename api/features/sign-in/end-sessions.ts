import type { Knex } from 'knex';

/** Ends sessions of an account within the caller's transaction: they are gone if, and only if, what ended them is done. */
export async function endSessions(db: Knex, accountId: string, kind?: 'staff' | 'guest'): Promise<void> {
  await db('sessions')
    .where({ userId: accountId, ...(kind ? { kind } : {}) })
    .delete();
}
