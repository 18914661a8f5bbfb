import { afterAll, beforeAll, expect, it } from 'vitest';
import { newToken } from '../../api/features/guests/tokens.ts';
import { makeStudio } from '../support/factories/studio.ts';
import { type House, startHouse } from '../support/house.ts';

let house: House;
// A tenth of the product's own limits.
beforeAll(async () => void (house = await startHouse({ limitScale: 0.1 })));
afterAll(() => house.stop());

async function statuses(count: number, send: (nth: number) => PromiseLike<{ status: number }>): Promise<number[]> {
  const answers: number[] = [];
  for (let nth = 0; nth < count; nth += 1) answers.push((await send(nth)).status);
  return answers;
}

const post = (path: string, body: object) => house.request.post(path).send(body);

it('limits the tries at one account, known or not, and then those from one address', async () => {
  expect(await statuses(3, () => post('/api/sign-in', { email: 'one@example.test', password: 'x' }))).toEqual([401, 429, 429]);
  const answer = await post('/api/sign-in', { email: 'two@example.test', password: 'x' });
  expect(answer.status).toBe(429);
  expect(Number(answer.headers['retry-after'])).toBeGreaterThan(0);
  expect(answer.body.detail).toMatch(/^Too many tries\. Please wait/);
});

it('limits guesses at links, requests for resets and sign-ups', async () => {
  expect(await statuses(5, () => post('/api/open', { token: newToken().token }))).toEqual([404, 404, 404, 404, 429]);
  expect(await statuses(2, () => post('/api/password-resets', { email: 'three@example.test' }))).toEqual([202, 429]);
  const signUp = (nth: number) =>
    post('/api/sign-up', { studioName: 'S', name: 'N', email: `n${nth}@example.test`, password: 'four or five words here' });
  expect(await statuses(2, signUp)).toEqual([202, 429]);
});

it('limits the pictures of a watermark that one account has made, and no other account’s', async () => {
  const { owner, assistant } = await makeStudio(house);
  const send = ({ agent }: typeof owner) => agent.post('/api/studio/watermark-images');
  const answers = await statuses(13, () => send(owner));
  expect(answers).toEqual([...Array.from({ length: 12 }, () => 422), 429]);
  expect((await send(assistant)).status).toBe(422);
});

it('keeps no address of a person among the counts', async () => {
  const rows = await house.ctx.knex<{ key: string }>('rateLimits').select('key');
  expect(rows.length).toBeGreaterThan(4);
  expect(rows.map((row) => row.key).join(' ')).not.toContain('@');
});
