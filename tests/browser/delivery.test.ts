import { createHash } from 'node:crypto';
import { mkdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import { Delivery } from '../../api/models/Delivery.ts';
import { DeliveryRecipient } from '../../api/models/DeliveryRecipient.ts';
import { Account } from '../../api/models/Account.ts';
import { makeCommission } from '../support/factories/commission.ts';
import { makeSentDelivery } from '../support/factories/delivery.ts';
import { makeFinal, makePickList } from '../support/factories/final.ts';
import { makeFrame } from '../support/factories/frame.ts';
import { makeGuestAgent, makeStudio, type MadeStudio } from '../support/factories/studio.ts';
import { SCREENS, startSite, type Site, type Visitor } from './support.ts';

vi.setConfig({ testTimeout: 240_000 });
let site: Site;
let studio: MadeStudio;

beforeAll(async () => {
  site = await startSite();
  studio = await makeStudio(site.house);
});
afterAll(() => site?.stop());

/** Pictures of the pages for people to look at, where a folder for them is named. */
async function show({ page }: Visitor, name: string): Promise<void> {
  const folder = process.env.ORIEL_SCREENSHOTS;
  if (!folder) return;
  mkdirSync(folder, { recursive: true });
  await page.waitForTimeout(400);
  await page.screenshot({ path: path.join(folder, `${name}.png`), fullPage: true });
}

const NAMES = ['HL_0412_final.jpg', 'HL_0412_final-v2.jpg', 'HL_0413_final.jpg', 'Library 0419.tif'];

/** Three picks: one final in two versions, one in one, one file that has to be asked about. */
async function makeFinishing() {
  const commission = await makeCommission(studio.studio, { title: 'Ropewalk Library, first light to last' });
  const frames = [];
  for (const name of ['HL_0412.jpg', 'HL_0413.jpg', 'HL_0419.jpg']) frames.push(await makeFrame(site.house, commission, { name }));
  await makePickList(commission, frames, {
    viewTitles: ['East front across the basin, dusk', 'Reading room, first light', null],
    allowance: 2,
  });
  for (const name of NAMES) await makeFinal(site.house, commission, { name, width: 900, height: 600 });
  return { commission, frames };
}

describe('the Finals page', () => {
  it('asks what is unsure, takes the answer, and undoes a removal', async () => {
    const { commission } = await makeFinishing();
    await site.house.runJobs();
    const visitor = await site.visit(`/commissions/${commission.id}/finals`, { cookie: studio.owner.cookie });
    const { page } = visitor;
    await page.getByRole('heading', { name: /Which pick is this/ }).waitFor();
    await page.getByText('Only a part of its name is that of a pick.').waitFor();
    await visitor.audit();
    await show(visitor, 'finals-1440');
    await page.getByRole('button', { name: /It is this Pick 3, also made · HL_0419\.jpg/ }).click();
    await page.getByRole('heading', { name: /Which pick is this/ }).waitFor({ state: 'detached' });
    const row = page.getByRole('row', { name: /HL_0419\.jpg/ });
    await row.getByText('Library 0419.tif').waitFor();
    await row.getByRole('button', { name: 'Change' }).click();
    await page.getByRole('button', { name: 'Remove this final' }).click();
    await row.getByText('not yet').first().waitFor();
    await page.getByRole('button', { name: 'Undo' }).click();
    await row.getByText('Library 0419.tif').waitFor();
    await row.getByRole('button', { name: 'Change' }).click();
    await page.getByRole('button', { name: /Title and pick/ }).click();
    await page.getByRole('textbox', { name: 'Title' }).fill('Stairs at noon');
    await visitor.audit();
    await page.getByRole('button', { name: 'Save' }).click();
    await row.getByText('Stairs at noon').waitFor();
    await page.setViewportSize(SCREENS.tablet.viewport);
    await show(visitor, 'finals-768');
    await visitor.audit();
    await visitor.close();
  });

  it('says what will be here while nothing is', async () => {
    const commission = await makeCommission(studio.studio);
    const visitor = await site.visit(`/commissions/${commission.id}/finals`, { cookie: studio.assistant.cookie });
    await visitor.page.getByText('No finals yet').waitFor();
    await visitor.audit();
    await visitor.page.goto(`${site.house.address}/commissions/${commission.id}/delivery`);
    await visitor.page.getByText('Nothing to deliver yet').waitFor();
    await visitor.audit();
    await visitor.close();
  });
});

describe('a delivery', () => {
  it('is made, built while one looks, sent, and followed', async () => {
    const { commission } = await makeFinishing();
    await site.house.runJobs();
    const visitor = await site.visit(`/commissions/${commission.id}/delivery`, { cookie: studio.owner.cookie });
    const { page } = visitor;
    await page.getByRole('button', { name: 'New delivery' }).click();
    await page.getByText('2 of 2 chosen').waitFor();
    await page.getByLabel('Name').fill('Ada Quill');
    await page.getByLabel('E-mail').fill('nonsense');
    await page.getByLabel('Your words').fill('Thank you for the day on the roof.');
    await visitor.audit();
    await show(visitor, 'delivery-new-1440');
    visitor.expectErrors(/422/);
    await page.getByRole('button', { name: /Deliver 2 files to one person/ }).click();
    await page.getByText('This is no e-mail address.').first().waitFor();
    await page.getByLabel('E-mail').fill('ada@tarn-brandreth.test');
    await page.getByRole('button', { name: /Deliver 2 files to one person/ }).click();
    await page.getByText('Building the archive in full resolution').waitFor();
    await show(visitor, 'delivery-preparing-1440');
    await site.house.runJobs();
    await page.getByText('Sent', { exact: true }).first().waitFor();
    await page
      .getByRole('row', { name: /Ada Quill/ })
      .getByText('0 of 2')
      .waitFor();
    await visitor.audit();
    const account = await Account.query().findOne({ email: 'ada@tarn-brandreth.test' }).throwIfNotFound();
    const recipient = await DeliveryRecipient.query().findOne({ accountId: account.id }).throwIfNotFound();
    const guest = await makeGuestAgent(site.house, account);
    await guest.agent.get(`/api/deliveries/${recipient.deliveryId}/archives/full/download`).buffer(true).expect(200);
    await page
      .getByRole('row', { name: /Ada Quill/ })
      .getByText('2 of 2')
      .waitFor();
    await show(visitor, 'delivery-sent-1440');
    await page.getByRole('button', { name: 'Withdraw', exact: true }).click();
    await visitor.audit();
    await page.getByRole('button', { name: 'Withdraw it from everybody' }).click();
    await page.getByText('Withdrawn', { exact: true }).waitFor();
    await page.getByRole('button', { name: 'Undo' }).click();
    await page.getByText('Sent', { exact: true }).first().waitFor();
    await page.setViewportSize(SCREENS.tablet.viewport);
    await show(visitor, 'delivery-sent-768');
    await visitor.audit();
    await visitor.close();
  });
});

describe('the recipients’ page', () => {
  it('shows the pictures with what there is to know, and downloads them, on every screen', async () => {
    const sent = await makeSentDelivery(site.house, studio, {
      names: ['East front across the basin.jpg', 'Quay side, blue hour.jpg', 'Looking up, forecourt.jpg'],
      words: 'Thank you for the day on the roof.\nThe night pictures are the ones for the leaflet.',
      title: 'Ropewalk Library, first light to last',
    });
    for (const [name, screen] of Object.entries(SCREENS)) {
      const visitor = await site.visit(`/deliveries/${sent.delivery.id}`, { cookie: sent.guest.cookie, ...screen });
      const { page } = visitor;
      await page.getByRole('heading', { name: 'Ropewalk Library, first light to last' }).waitFor();
      await page.getByRole('link', { name: /Full resolution, 3 files/ }).waitFor();
      await expect
        .poll(() => page.locator('figure img').evaluateAll((all) => all.filter((one) => (one as HTMLImageElement).naturalWidth > 0).length))
        .toBe(3);
      await visitor.audit();
      expect(
        await page.evaluate(() => document.documentElement.scrollWidth - window.innerWidth),
        `${name} scrolls sideways`,
      ).toBeLessThanOrEqual(0);
      await show(visitor, `guest-delivery-${screen.viewport.width}`);
      await page.getByRole('button', { name: 'Look at East front across the basin' }).click();
      const dialog = page.getByRole('dialog', { name: 'East front across the basin' });
      await dialog.getByText(/^[0-9a-f]{64}$/).waitFor();
      await page.keyboard.press('ArrowRight');
      await page.getByRole('dialog', { name: 'Quay side, blue hour' }).waitFor();
      await visitor.audit();
      await show(visitor, `guest-look-${screen.viewport.width}`);
      await page.keyboard.press('Escape');
      await page.getByRole('dialog').waitFor({ state: 'detached' });
      await visitor.close();
    }
    const visitor = await site.visit(`/deliveries/${sent.delivery.id}`, { cookie: sent.guest.cookie });
    const downloading = visitor.page.waitForEvent('download');
    await visitor.page.getByRole('link', { name: 'Download Quay side, blue hour' }).click();
    const download = await downloading;
    expect(download.suggestedFilename()).toBe('Quay side, blue hour.jpg');
    const page = (await sent.guest.agent.get(`/api/deliveries/${sent.delivery.id}`)).body as { files: { sha256: string }[] };
    expect(
      createHash('sha256')
        .update(readFileSync(await download.path()))
        .digest('hex'),
    ).toBe(page.files[1]?.sha256);
    await visitor.close();
  });

  it('says after the last date whom to ask, and to strangers that it is not theirs', async () => {
    const sent = await makeSentDelivery(site.house, studio, { names: ['One.jpg'], title: 'Corn Exchange relighting' });
    await Delivery.query()
      .findById(sent.delivery.id)
      .patch({ endsAt: new Date(Date.now() - 60_000) });
    const visitor = await site.visit(`/deliveries/${sent.delivery.id}`, { cookie: sent.guest.cookie, ...SCREENS.phone });
    await visitor.page.getByRole('heading', { name: 'The time to fetch these pictures is over' }).waitFor();
    await visitor.page.getByRole('link', { name: /Write to Harrow Lane Studio, studio@harrow-lane\.test/ }).waitFor();
    await visitor.audit();
    await show(visitor, 'guest-ended-390');
    await visitor.close();
    const stranger = await makeGuestAgent(site.house);
    const other = await site.visit(`/deliveries/${sent.delivery.id}`, { cookie: stranger.cookie });
    other.expectErrors(/404/);
    await other.page.getByRole('heading', { name: 'This is not open to you' }).waitFor();
    await other.audit();
    await other.close();
  });
});
