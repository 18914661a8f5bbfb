import { Commission } from '../../../api/models/Commission.ts';
import { View } from '../../../api/models/View.ts';
import { makeClient } from './client.ts';

let counter = 0;

type Values = Partial<
  Pick<
    Commission,
    'clientId' | 'title' | 'brief' | 'shotOn' | 'dueOn' | 'allowance' | 'extraPrice' | 'currency' | 'closedAt' | 'deletedAt' | 'createdAt'
  >
>;

/** A commission of a studio; without a client one is made. `views` are the titles of its views, in order. */
export async function makeCommission(
  studio: { id: string; currency?: string },
  values: Values & { views?: string[] } = {},
): Promise<Commission & { views: View[] }> {
  counter += 1;
  const { views = [], ...columns } = values;
  const clientId = columns.clientId ?? (await makeClient(studio)).id;
  const commission = await Commission.query().insertAndFetch({
    studioId: studio.id,
    title: `Ropewalk Library ${counter}`,
    allowance: 12,
    extraPrice: 8500,
    currency: studio.currency ?? 'GBP',
    ...columns,
    clientId,
  });
  const made: View[] = [];
  for (const [at, title] of views.entries()) {
    made.push(await View.query().insertAndFetch({ studioId: studio.id, commissionId: commission.id, position: at + 1, title }));
  }
  return Object.assign(commission, { views: made });
}
