import { afterAll, beforeAll, expect, it } from 'vitest';
import { makeLooker, switchOn } from '../support/factories/open-link.ts';
import { makeOpenSheet } from '../support/factories/sheet.ts';
import { makeStudio, type MadeStudio } from '../support/factories/studio.ts';
import { type House, startHouse } from '../support/house.ts';

const WORDS = 'harbour crane at dusk';
let house: House;
let made: MadeStudio;
beforeAll(async () => {
  house = await startHouse({ limitScale: 1 });
  made = await makeStudio(house);
});
afterAll(() => house.stop());

it('limits the tries at a passphrase by address and link; right ones do not count', async () => {
  const [one, other] = [await makeOpenSheet(house, made, { proofs: 1 }), await makeOpenSheet(house, made, { proofs: 1 })];
  const token = await switchOn(made, one.sheet.id, { passphrase: WORDS });
  const beside = await switchOn(made, other.sheet.id, { passphrase: WORDS });
  const answerTo = (passphrase: string, at = token) => house.request.post('/api/look').send({ token: at, passphrase });
  for (let nth = 0; nth < 12; nth += 1) expect((await answerTo(WORDS)).status).toBe(200);
  for (let nth = 0; nth < 10; nth += 1) expect((await answerTo('wrong words')).status).toBe(422);
  const tooMany = await answerTo('wrong words');
  expect([tooMany.status, tooMany.body.detail]).toEqual([429, expect.stringMatching(/^Too many tries\. Please wait/)]);
  expect((await answerTo(WORDS)).status).toBe(429);
  expect((await answerTo(WORDS, beside)).status).toBe(200);
});

it('limits the mails that strangers have sent to one address', async () => {
  const { sheet } = await makeOpenSheet(house, made, { proofs: 1 });
  const looker = await makeLooker(house, await switchOn(made, sheet.id));
  const ask = (email: string) => looker.post(`/api/guest/sheets/${sheet.id}/ask-to-mark`).send({ name: 'Mira Sand', email });
  for (let nth = 0; nth < 5; nth += 1) expect((await ask('mira@example.test')).status).toBe(202);
  expect((await ask('Mira@example.test')).status).toBe(429);
  expect((await ask('somebody-else@example.test')).status).toBe(202);
});
