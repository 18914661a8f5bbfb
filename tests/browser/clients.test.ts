import { afterAll, beforeAll, expect, it } from 'vitest';
import { makeClient } from '../support/factories/client.ts';
import { makeCommission } from '../support/factories/commission.ts';
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

it.each(['tablet', 'desktop'] as const)('clients are listed and one is shown with its people and commissions on a %s', async (screen) => {
  const made = await makeStudio(site.house, { name: 'Quay Street Pictures' });
  const client = await makeClient(made.studio, { name: 'Tarn Brandreth Architects' });
  await makeCommission(made.studio, { title: 'Ropewalk Library', clientId: client.id });
  const visitor = await site.visit('/clients', { cookie: made.owner.cookie, ...SCREENS[screen] });
  const { page } = visitor;
  await page.getByRole('link', { name: 'Tarn Brandreth Architects' }).waitFor();
  await visitor.audit();
  await page.getByRole('link', { name: 'Tarn Brandreth Architects' }).click();
  await page.getByRole('link', { name: 'Ropewalk Library' }).waitFor();
  if (shots) await page.screenshot({ path: `${shots}/client-${screen}.png`, fullPage: true });
  await visitor.audit();
  visitor.expectErrors(/409/);
  await page.getByRole('button', { name: 'Delete client' }).click();
  await page.getByText('Tarn Brandreth Architects has a commission and stays while there is one.').waitFor();
  await visitor.close();
});

it('a client is added, gets a contact, is deleted and comes back', async () => {
  const visitor = await site.visit('/clients', { cookie: home.assistant.cookie });
  const { page } = visitor;
  await page.getByText('No clients yet').waitFor();
  await page.getByRole('button', { name: 'Add client' }).first().click();
  const dialog = page.getByRole('dialog');
  await dialog.getByLabel('Company').fill('Harbour Trust');
  await visitor.audit();
  await dialog.getByRole('button', { name: 'Add client' }).click();
  await page.getByRole('heading', { name: 'Harbour Trust' }).waitFor();
  await page.getByRole('button', { name: 'Add contact' }).click();
  await dialog.getByLabel('Name').fill('Maren Holt');
  await dialog.getByLabel('E-mail address').fill('maren');
  await dialog.getByRole('button', { name: 'Add contact' }).click();
  await dialog.getByText('This is no e-mail address.').waitFor();
  await dialog.getByLabel('E-mail address').fill('maren@harbour.test');
  await dialog.getByRole('button', { name: 'Add contact' }).click();
  await page.getByText('maren@harbour.test').waitFor();
  await page.getByRole('button', { name: 'Delete client' }).click();
  await page.getByText('Harbour Trust is deleted.').waitFor();
  await page.getByRole('button', { name: 'Undo' }).click();
  await soon(() => page.getByRole('link', { name: 'Harbour Trust' }).count()).toBe(1);
  await visitor.close();
});
