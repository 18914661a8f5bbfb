import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { makeClient } from '../support/factories/client.ts';
import { makeCommission } from '../support/factories/commission.ts';
import { makeFrame } from '../support/factories/frame.ts';
import { makeStudio, type MadeStudio } from '../support/factories/studio.ts';
import { SCREENS, startSite, type Site } from './support.ts';

let site: Site;
let home: MadeStudio;

beforeAll(async () => {
  site = await startSite();
  home = await makeStudio(site.house);
});
afterAll(() => site?.stop());

const shots = process.env.ORIEL_SHOTS;
const soon = <T>(read: () => Promise<T>) => expect.poll(read, { timeout: 20_000 });

describe('the list of commissions', () => {
  it.each(['tablet', 'desktop'] as const)('searches, filters and goes on by key on a %s', async (screen) => {
    const made = await makeStudio(site.house, { name: 'Quay Street Pictures' });
    const client = await makeClient(made.studio, { name: 'Tarn Brandreth Architects' });
    for (let at = 1; at <= 52; at += 1) await makeCommission(made.studio, { title: `Job ${at}`, clientId: client.id, dueOn: '2026-12-24' });
    await makeCommission(made.studio, { title: 'Ropewalk Library', clientId: client.id, closedAt: new Date() });
    const visitor = await site.visit('/commissions', { cookie: made.owner.cookie, ...SCREENS[screen] });
    const { page } = visitor;
    const rows = page.locator('tbody tr');
    await soon(() => rows.count()).toBe(50);
    await page.getByRole('button', { name: 'Show more' }).click();
    await soon(() => rows.count()).toBe(53);
    if (shots) await page.screenshot({ path: `${shots}/commissions-${screen}.png` });
    await visitor.audit();
    await page.getByLabel('State').selectOption('Closed');
    await soon(() => rows.allInnerTexts()).toEqual([expect.stringContaining('Ropewalk Library')]);
    await page.getByLabel('Search titles and clients').fill('nowhere');
    await page.getByText('Nothing found').waitFor();
    await visitor.close();
  });
});

describe('a brief', () => {
  it.each(['tablet', 'desktop'] as const)('shows its title block, steps and views on a %s, without violations', async (screen) => {
    const commission = await makeCommission(home.studio, {
      title: 'Ropewalk Library, first light to last',
      brief: 'Six views of the library for the opening brochure, at dawn and at dusk.',
      views: ['East front across the basin, dusk', 'Reading room, first light', 'Forecourt'],
      dueOn: '2026-12-24',
    });
    await makeFrame(site.house, commission, { viewId: commission.views[0]!.id });
    const visitor = await site.visit(`/commissions/${commission.id}/brief`, { cookie: home.owner.cookie, ...SCREENS[screen] });
    await visitor.page.getByText('1 frame', { exact: true }).waitFor();
    if (shots) await visitor.page.screenshot({ path: `${shots}/brief-${screen}.png`, fullPage: true });
    await visitor.audit();
    await visitor.page.getByRole('link', { name: /^Record/ }).click();
    await visitor.page.getByText('Nothing here yet').waitFor();
    await visitor.audit();
    await visitor.close();
  });

  it('changed meanwhile shows the newer values and keeps what was typed', async () => {
    const commission = await makeCommission(home.studio, { title: 'Basin bridges', brief: 'Three views.' });
    const visitor = await site.visit(`/commissions/${commission.id}/brief`, { cookie: home.owner.cookie });
    const { page } = visitor;
    visitor.expectErrors(/412/);
    await page.getByLabel(/^Brief/).fill('Five views, said Maren.');
    await home.assistant.agent
      .patch(`/api/commissions/${commission.id}`)
      .set('If-Match', '"1"')
      .send({ brief: 'Four views, said Oskar.' })
      .expect(200);
    await page.getByRole('button', { name: 'Save' }).click();
    await page.getByText('Changed meanwhile').waitFor();
    await page.getByText('Four views, said Oskar.').waitFor();
    expect(await page.getByLabel(/^Brief/).inputValue()).toBe('Five views, said Maren.');
    if (shots) await page.screenshot({ path: `${shots}/changed-meanwhile.png` });
    await visitor.audit();
    await page.getByRole('button', { name: 'Save' }).click();
    await page.getByText('Saved.').waitFor();
    const { body } = await home.owner.agent.get(`/api/commissions/${commission.id}`);
    expect(body).toMatchObject({ brief: 'Five views, said Maren.', version: 3 });
    await page.getByRole('link', { name: /^Record/ }).click();
    await soon(() => page.locator('tbody tr').count()).toBe(2);
    if (shots) await page.screenshot({ path: `${shots}/record.png` });
    await visitor.audit();
    await visitor.close();
  });

  it('orders its views by buttons, adds and deletes them', async () => {
    const commission = await makeCommission(home.studio, { views: ['East front', 'Forecourt'] });
    const visitor = await site.visit(`/commissions/${commission.id}/brief`, { cookie: home.owner.cookie });
    const { page } = visitor;
    const titles = () => page.locator('ol li b').allInnerTexts();
    await page.getByRole('button', { name: 'Move “Forecourt” up' }).click();
    await soon(titles).toEqual(['Forecourt', 'East front']);
    await page.getByRole('button', { name: 'Add view' }).click();
    await page.getByLabel('What it shows').fill('Reading room');
    await visitor.audit();
    await page.getByRole('dialog').getByRole('button', { name: 'Add view' }).click();
    await soon(titles).toEqual(['Forecourt', 'East front', 'Reading room']);
    await page.getByRole('button', { name: 'Delete “East front”' }).click();
    await page.getByRole('button', { name: 'Delete view' }).click();
    await soon(titles).toEqual(['Forecourt', 'Reading room']);
    const { body } = await home.owner.agent.get(`/api/commissions/${commission.id}/views`);
    expect(body.items.map((view: { title: string }) => view.title)).toEqual(['Forecourt', 'Reading room']);
    await visitor.close();
  });

  it('deleted says what goes and is undone', async () => {
    const commission = await makeCommission(home.studio, { title: 'Customs House' });
    await makeFrame(site.house, commission);
    const visitor = await site.visit(`/commissions/${commission.id}/brief`, { cookie: home.owner.cookie });
    const { page } = visitor;
    await page.getByRole('button', { name: 'Delete commission' }).click();
    const dialog = page.getByRole('dialog');
    await dialog.getByText('1 frame', { exact: true }).waitFor();
    // The page hears of the deletion before it is left, and asks once more for what is gone.
    visitor.expectErrors(/404 .*\/api\/commissions\//);
    await dialog.getByRole('button', { name: 'Delete commission' }).click();
    await page.getByText('Customs House is deleted.').waitFor();
    await page.getByRole('button', { name: 'Undo' }).click();
    await soon(async () => (await home.owner.agent.get(`/api/commissions/${commission.id}`)).status).toBe(200);
    await visitor.close();
  });
});

describe('the page of the API', () => {
  it('is read without scripts and without violations', async () => {
    const visitor = await site.visit('/api/docs');
    await visitor.page.getByRole('heading', { name: 'The API of Oriel' }).waitFor();
    if (shots) await visitor.page.screenshot({ path: `${shots}/docs.png` });
    await visitor.audit();
    await visitor.close();
  });
});
