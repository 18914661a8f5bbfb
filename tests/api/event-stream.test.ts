import { once } from 'node:events';
import type { AddressInfo } from 'node:net';
import express from 'express';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { makeLooker, switchOn } from '../support/factories/open-link.ts';
import { makeOpenSheet } from '../support/factories/sheet.ts';
import { makeStudio, type MadeStudio } from '../support/factories/studio.ts';
import { streamEvents } from '../../api/middleware/event-stream.ts';
import { createGates } from '../../api/middleware/actor.ts';
import { Sessions } from '../../api/middleware/sessions.ts';
import { SheetGuest } from '../../api/models/SheetGuest.ts';
import { type House, startHouse } from '../support/house.ts';

let house: House;
let made: MadeStudio;

beforeAll(async () => {
  house = await startHouse();
  made = await makeStudio(house);
});
afterAll(() => house.stop());

/** Listens until the stream ends, taking the right away at its third breath; gives the breaths heard and the status of coming back. */
async function listenUntilRefused(sheetId: string, cookie: string, takeAway: () => PromiseLike<unknown>) {
  const sessions = new Sessions(house.ctx.config);
  const gate = createGates(sessions).looksAtSheet();
  // The route of the guest's sheet, breathing faster.
  const app = express().get('/sheets/:sheetId/events', gate, (req, res) => {
    const stillMay = async () => gate(req, res, () => undefined);
    streamEvents(house.ctx.live, `sheet:${req.params.sheetId}`, { res, stillMay, breathSeconds: 0.02 });
  });
  app.use((error: { status?: number }, _req: unknown, res: express.Response, _next: unknown) => void res.sendStatus(error.status ?? 500));
  const server = app.listen(0, '127.0.0.1');
  await once(server, 'listening');
  const address = `http://127.0.0.1:${(server.address() as AddressInfo).port}/sheets/${sheetId}/events`;
  const answer = await fetch(address, { headers: { cookie } });
  const reader = answer.body?.pipeThrough(new TextDecoderStream()).getReader();
  let breaths = 0;
  for (let read = await reader?.read(); read && !read.done; read = await reader?.read()) {
    breaths += 1;
    if (breaths === 3) await takeAway();
  }
  const { status } = await fetch(address, { headers: { cookie } });
  server.close();
  await sessions.stop();
  return { breaths, status };
}

it('a stream ends once the guest who listens has lost their invitation', async () => {
  const { sheet, lead } = await makeOpenSheet(house, made, { proofs: 1 });
  const lose = () => SheetGuest.query().where({ sheetId: sheet.id }).patch({ withdrawnAt: new Date() });
  const { breaths, status } = await listenUntilRefused(sheet.id, lead.cookie, lose);
  expect(breaths).toBeGreaterThanOrEqual(3);
  expect(status).toBe(404);
});

it('a stream ends once the open link by which somebody listens was withdrawn', async () => {
  const { sheet } = await makeOpenSheet(house, made, { proofs: 1 });
  const looker = await makeLooker(house, await switchOn(made, sheet.id));
  const cookie = looker.jar.getCookies({ domain: '127.0.0.1', path: '/api', secure: false, script: false }).toValueString();
  const withdraw = () => made.assistant.agent.post(`/api/sheets/${sheet.id}/open-link/withdraw`).expect(200);
  const { breaths, status } = await listenUntilRefused(sheet.id, cookie, withdraw);
  expect(breaths).toBeGreaterThanOrEqual(3);
  expect(status).toBe(410);
});
