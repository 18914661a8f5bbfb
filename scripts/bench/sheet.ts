import autocannon from 'autocannon';
import { makeBenchGuest, makeBigSheet } from './big-sheet.ts';
import { startBenchHouse } from './bench-house.ts';
import { type Figure, figure, inTurns, median } from './figures.ts';
import { startReference } from './reference.ts';

const PROOFS = 1000;
const SECONDS = 5;

/** The guest's sheet of 1,000 proofs as JSON over 50 connections, against a bare route that sends the same bytes from one SQL query. */
export async function sheet(rounds: number): Promise<Figure[]> {
  const house = await startBenchHouse();
  const reference = await startReference(house);
  try {
    const made = await makeBigSheet(house, PROOFS);
    const guest = await makeBenchGuest(house, made.sheet, 0);
    const url = `${house.address}/api/guest/sheets/${made.sheet.id}/proofs`;
    const body = await (await fetch(url, { headers: { cookie: guest.cookie, 'accept-encoding': 'identity' } })).text();
    await house.ctx.knex.schema.raw('create table bench_bodies (id uuid primary key, body text not null)');
    await house.ctx.knex('benchBodies').insert({ id: made.sheet.id, body });
    const load = async (address: string, headers: Record<string, string>) => {
      const result = await autocannon({ url: address, connections: 50, duration: SECONDS, headers });
      if (result.non2xx > 0 || result.errors > 0) throw new Error(`${result.non2xx} refusals and ${result.errors} errors at ${address}`);
      return result.requests.average;
    };
    const { ours, reference: theirs } = await inTurns(
      rounds,
      () => load(url, { cookie: guest.cookie }),
      () => load(`${reference.address}/sheet/${made.sheet.id}`, {}),
    );
    return [
      figure(`${PROOFS} proofs, 50 connections`, 'requests/s', median(ours), median(theirs)),
      figure('size of the answer', 'kB', body.length / 1000),
    ];
  } finally {
    reference.stop();
    await house.stop();
  }
}
