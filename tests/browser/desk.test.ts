import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Client } from '../../api/models/Client.ts';
import { Commission } from '../../api/models/Commission.ts';
import { makeCommission } from '../support/factories/commission.ts';
import { rowOfDelivery, rowOfFinal } from '../support/factories/commission-life.ts';
import { makeFrame } from '../support/factories/frame.ts';
import { makeOpenSheet } from '../support/factories/sheet.ts';
import { makeStudio, type MadeStudio } from '../support/factories/studio.ts';
import { SCREENS, startSite, type Site } from './support.ts';

let site: Site;
let home: MadeStudio;
let openTitle: string;

beforeAll(async () => {
  site = await startSite();
  home = await makeStudio(site.house);
  const today = new Date().toISOString().slice(0, 10);
  const shot = await makeCommission(home.studio, { title: 'Ropewalk Library, first light to last', dueOn: today, brief: 'Six views.' });
  await makeFrame(site.house, shot);
  await makeCommission(home.studio, { title: 'Customs House' });
  const { sheet, commission } = await makeOpenSheet(site.house, home, { proofs: 2 });
  openTitle = commission.title;
  await site.house.ctx.knex('sheetGuests').where({ sheetId: sheet.id }).update({ firstOpenedAt: new Date() });
  const done = await makeCommission(home.studio, { title: 'Skyline for the annual report' });
  await rowOfDelivery(done, [await rowOfFinal(done)], { endsAt: new Date(Date.now() - 1000) });
});
afterAll(() => site?.stop());

const shots = process.env.ORIEL_SHOTS;

describe('the desk', () => {
  it.each(['tablet', 'desktop'] as const)('lines its columns up across the groups on a %s, without violations', async (screen) => {
    const visitor = await site.visit('/desk', { cookie: home.owner.cookie, ...SCREENS[screen] });
    const { page } = visitor;
    await page.getByRole('heading', { name: 'Waiting on clients' }).waitFor();
    const edges = await page
      .locator('main li')
      .evaluateAll((rows) => rows.map((row) => [...row.children].map((cell) => Math.round(cell.getBoundingClientRect().left))));
    expect(edges.length).toBe(4);
    const columns = screen === 'desktop' ? [0, 1, 2, 3] : [0, 1, 2, 3];
    for (const at of columns) expect(new Set(edges.map((row) => row[at])).size, `column ${at}`).toBe(1);
    expect(await page.evaluate(() => document.documentElement.scrollWidth <= window.innerWidth)).toBe(true);
    if (shots) await page.screenshot({ path: `${shots}/desk-${screen}.png` });
    await visitor.audit();
    await visitor.close();
  });

  it('goes where the next step is, reminds after asking, and closes what is done', async () => {
    const visitor = await site.visit('/desk', { cookie: home.owner.cookie });
    const { page } = visitor;
    await page.getByRole('button', { name: `Remind: ${openTitle}` }).click();
    await page.getByRole('button', { name: 'Send the mails' }).click();
    await page.getByText(`The guests of ${openTitle} get a mail.`).waitFor();
    expect(await site.house.ctx.knex('mails').where({ kind: 'sheet-reminder' }).pluck('toName')).toHaveLength(2);
    await page.getByRole('button', { name: 'Close: Skyline for the annual report' }).click();
    await page.getByRole('button', { name: 'Close commission' }).click();
    await page.getByText('Nothing delivered yet.').waitFor();
    await page.getByRole('link', { name: 'Write brief: Customs House' }).click();
    await page.waitForURL(/\/commissions\/[\w-]+\/brief$/);
    await visitor.close();
  });

  it('of a new studio says what it will show, and begins a commission with a new client', async () => {
    const fresh = await makeStudio(site.house, { name: 'Quay Street Pictures' });
    const visitor = await site.visit('/desk', { cookie: fresh.owner.cookie });
    const { page } = visitor;
    await page.getByText('Nothing on the desk').waitFor();
    await page.getByRole('link', { name: 'Begin a commission' }).click();
    await page.getByRole('button', { name: 'Begin commission' }).click();
    await page.getByText('Write a title.').waitFor();
    await page.getByLabel('Title').fill('Basin bridges');
    await page.getByLabel('Client', { exact: true }).selectOption({ label: 'A new client …' });
    await page.getByLabel('Company').fill('Harbour Trust');
    await page.getByLabel('Contact (optional)').fill('Maren Holt');
    await page.getByLabel('E-mail address (optional)').fill('maren@harbour.test');
    await page.getByLabel('Price of an extra').fill('85.50');
    if (shots) await page.screenshot({ path: `${shots}/commission-new.png`, fullPage: true });
    await visitor.audit();
    await page.getByRole('button', { name: 'Begin commission' }).click();
    await page.waitForURL(/\/brief$/);
    const commission = await Commission.query().findOne({ title: 'Basin bridges' }).throwIfNotFound();
    expect(commission).toMatchObject({ extraPrice: 8550, currency: 'GBP', studioId: fresh.studio.id });
    expect(await Client.query().findById(commission.clientId)).toMatchObject({ name: 'Harbour Trust' });
    await visitor.close();
  });

  it('says what went wrong and tries again', async () => {
    const visitor = await site.visit('/commissions', { cookie: home.owner.cookie });
    const { page } = visitor;
    await page.getByRole('heading', { name: 'Commissions' }).waitFor();
    visitor.expectErrors(/503|Failed to load resource/);
    await page.route('**/api/desk', (route) =>
      route.fulfill({ status: 500, contentType: 'application/problem+json', body: '{"detail":"Something broke."}' }),
    );
    visitor.expectErrors(/500/);
    await page.getByRole('link', { name: 'Desk' }).click();
    await page.getByText('Something broke.').waitFor();
    await page.unroute('**/api/desk');
    await page.getByRole('button', { name: 'Try again' }).click();
    await page.getByRole('heading', { name: 'To do next' }).waitFor();
    await visitor.close();
  });
});
