import http from 'node:http';
import { makeBenchGuest, makeBigSheet } from './big-sheet.ts';
import { startBenchHouse } from './bench-house.ts';
import { type Figure, figure, inTurns, median, seconds } from './figures.ts';
import { startReference } from './reference.ts';

const GUESTS = 200;
const MARKS_EACH = 20;

const agent = new http.Agent({ keepAlive: true, maxSockets: GUESTS });

function put(address: string, cookie: string): Promise<void> {
  return new Promise((resolve, reject) => {
    const request = http.request(address, { method: 'PUT', agent, headers: { cookie, 'content-length': 0 } }, (answer) => {
      answer.resume();
      answer.once('end', () => (answer.statusCode === 200 ? resolve() : reject(new Error(`${answer.statusCode} at ${address}`))));
    });
    request.once('error', reject).end();
  });
}

/** 200 guests who mark at once, 20 proofs each, against a bare route that does one upsert. Counts the marks afterwards. */
export async function marks(rounds: number): Promise<Figure[]> {
  const house = await startBenchHouse();
  const reference = await startReference(house);
  try {
    const { sheet, proofIds } = await makeBigSheet(house, 200);
    const guests: { accountId: string; cookie: string }[] = [];
    for (let at = 0; at < GUESTS; at += 1) guests.push(await makeBenchGuest(house, sheet, at));
    await house.ctx.knex.schema.raw(`create table bench_marks (sheet_id uuid not null, proof_id uuid not null, account_id uuid not null,
      marked_at timestamptz not null default now(), primary key (sheet_id, proof_id, account_id))`);
    const everybody = (address: (proofId: string, accountId: string) => string) =>
      Promise.all(
        guests.map(async ({ accountId, cookie }, at) => {
          for (let mark = 0; mark < MARKS_EACH; mark += 1)
            await put(address(proofIds[(at * 7 + mark * 3) % proofIds.length] ?? '', accountId), cookie);
        }),
      );
    let wrong = 0;
    const rate = async (table: string, address: (proofId: string, accountId: string) => string) => {
      await house.ctx.knex(table).delete();
      const took = await seconds(() => everybody(address));
      const [{ count } = { count: 0 }] = await house.ctx.knex(table).count<{ count: number }[]>('* as count');
      wrong += Math.abs(Number(count) - GUESTS * MARKS_EACH);
      return (GUESTS * MARKS_EACH) / took;
    };
    const { ours, reference: theirs } = await inTurns(
      rounds,
      () => rate('marks', (proofId) => `${house.address}/api/guest/sheets/${sheet.id}/proofs/${proofId}/mark`),
      () => rate('benchMarks', (proofId, accountId) => `${reference.address}/marks/${sheet.id}/${proofId}/${accountId}`),
    );
    return [
      figure(`${GUESTS} guests, ${MARKS_EACH} marks each`, 'marks/s', median(ours), median(theirs)),
      figure('marks lost or doubled, in all rounds', 'marks', wrong, null),
    ];
  } finally {
    reference.stop();
    await house.stop();
  }
}
