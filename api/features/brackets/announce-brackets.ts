import type { Knex } from 'knex';
import { announce } from '../../db/live.ts';

/** Tells every open page of a commission that its brackets, or what is known of its frames, have changed. */
export async function announceBrackets(trx: Knex, commissionId: string): Promise<void> {
  await announce(trx, `commission:${commissionId}`, { what: 'brackets-changed' });
}
