import { once } from 'node:events';
import type { AddressInfo } from 'node:net';
import express from 'express';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { makeOpenSheet } from '../support/factories/sheet.ts';
import { makeStudio } from '../support/factories/studio.ts';
import { streamEvents } from '../../api/middleware/event-stream.ts';
import { createGates } from '../../api/middleware/actor.ts';
import { Sessions } from '../../api/middleware/sessions.ts';
import { SheetGuest } from '../../api/models/SheetGuest.ts';
import { type House, startHouse } from '../support/house.ts';

let house: House;

beforeAll(async () => {
  house = await startHouse();
});
afterAll(() => house.stop());

it('a stream ends once the guest who listens has lost their invitation', async () => {
  const made = await makeStudio(house);
  const { sheet, lead } = await makeOpenSheet(house, made, { proofs: 1 });
  const sessions = new Sessions(house.ctx.config);
  const gate = createGates(sessions).guestOfSheet();
  // The route of the guest's sheet, breathing faster.
  const app = express().get('/sheets/:sheetId/events', gate, (req, res) => {
    const stillMay = async () => gate(req, res, () => undefined);
    streamEvents(house.ctx.live, `sheet:${req.params.sheetId}`, { res, stillMay, breathSeconds: 0.02 });
  });
  const server = app.listen(0, '127.0.0.1');
  await once(server, 'listening');
  const address = `http://127.0.0.1:${(server.address() as AddressInfo).port}/sheets/${sheet.id}/events`;
  const answer = await fetch(address, { headers: { cookie: lead.cookie } });
  const reader = answer.body?.pipeThrough(new TextDecoderStream()).getReader();
  let breaths = 0;
  for (let read = await reader?.read(); read && !read.done; read = await reader?.read()) {
    breaths += 1;
    if (breaths === 3) await SheetGuest.query().where({ sheetId: sheet.id }).patch({ withdrawnAt: new Date() });
  }
  expect(breaths).toBeGreaterThanOrEqual(3);
  expect((await fetch(address, { headers: { cookie: lead.cookie } })).status).toBe(404);
  server.close();
  await sessions.stop();
});
