import type { Context } from '../../context.ts';
import type { FetchState } from '../../contract/deliveries.ts';

/** What somebody fetched of one thing of a delivery. */
export interface Fetched extends FetchState {
  deliveryId: string;
  accountId: string;
  what: 'file' | 'web' | 'full';
  deliveryFileId: string | null;
}

interface Row extends Omit<Fetched, 'lastAt'> {
  lastAt: Date;
}

/** What was fetched of deliveries, by person and thing, over all tries. */
export async function fetchedOf(ctx: Context, deliveryIds: readonly string[], accountId?: string): Promise<Fetched[]> {
  const rows = await ctx
    .knex('downloads')
    .whereIn('deliveryId', [...deliveryIds])
    .whereNotNull('accountId')
    .modify((query) => void (accountId && query.where({ accountId })))
    .groupBy('deliveryId', 'accountId', 'what', 'deliveryFileId')
    .select<Row[]>(
      'deliveryId',
      'accountId',
      'what',
      'deliveryFileId',
      ctx.knex.raw('bool_or(finished_at is not null) as finished'),
      ctx.knex.raw('max(sent_bytes) as sent'),
      ctx.knex.raw('count(*)::int as times'),
      ctx.knex.raw('max(last_at) as last_at'),
    );
  return rows.map((row) => ({ ...row, lastAt: row.lastAt.toISOString() }));
}
