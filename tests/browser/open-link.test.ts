import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Mark } from '../../api/models/Mark.ts';
import { SheetGuest } from '../../api/models/SheetGuest.ts';
import { makeOpenSheet } from '../support/factories/sheet.ts';
import { switchOn } from '../support/factories/open-link.ts';
import { makeStudio, type MadeStudio } from '../support/factories/studio.ts';
import { tokenIn } from '../support/mail-links.ts';
import { SCREENS, startSite, type Site } from './support.ts';

const WORDS = 'harbour crane at dusk';
let site: Site;
let made: MadeStudio;

beforeAll(async () => {
  site = await startSite();
  made = await makeStudio(site.house);
});
afterAll(() => site?.stop());

async function openSheet() {
  const open = await makeOpenSheet(site.house, made, { proofs: 4 });
  await site.house.runJobs();
  return { ...open, studioPage: `/commissions/${open.commission.id}/proofs/${open.sheet.id}` };
}

/** As the studio does it on its page; gives the path of the address that is shown. */
async function switchOnByHand(open: Awaited<ReturnType<typeof openSheet>>): Promise<string> {
  const visitor = await site.visit(open.studioPage, { cookie: made.assistant.cookie });
  const { page } = visitor;
  await page.getByRole('button', { name: 'Switch on' }).click();
  const dialog = page.getByRole('dialog');
  const passphrase = dialog.getByLabel(/^Passphrase/);
  visitor.expectErrors(/422/);
  await passphrase.fill('short');
  await dialog.getByRole('button', { name: 'Switch on' }).click();
  await dialog.getByText('At least 8 characters.', { exact: true }).waitFor();
  await visitor.audit();
  await passphrase.fill(WORDS);
  await dialog.getByRole('button', { name: 'Switch on' }).click();
  const address = page.getByLabel('Address of the open link');
  await address.waitFor();
  await visitor.audit();
  const path = new URL(await address.inputValue()).pathname;
  await page.reload();
  expect(await address.inputValue()).toContain(path);
  await visitor.close();
  return path;
}

describe('the open link', () => {
  it('leads from a passphrase over looking and a confirmed address to a mark, on a phone', async () => {
    const open = await openSheet();
    const path = await switchOnByHand(open);
    const email = 'mira.sand@example.test';
    const visitor = await site.visit(path, SCREENS.phone);
    visitor.expectErrors(/422/);
    const { page } = visitor;

    await page.getByLabel('Passphrase').fill('harbour crane at dawn');
    await page.getByRole('button', { name: 'Open the proofs' }).click();
    await page.getByText('This is not the passphrase of this link.').waitFor();
    await visitor.audit();
    await page.getByLabel('Passphrase').fill(WORDS);
    await page.getByRole('button', { name: 'Open the proofs' }).click();

    await page.getByText('You are looking. To mark, give your name and confirm your e-mail address.').waitFor();
    await page.getByRole('link', { name: /^Proof 1,/ }).waitFor();
    expect(await page.getByText('Choosing: OL (lead), PT').count()).toBe(1);
    expect(await page.content()).not.toContain('Oskar Lind');
    await visitor.audit();
    expect(await page.evaluate(() => document.documentElement.scrollWidth - window.innerWidth)).toBeLessThanOrEqual(0);

    await page.getByRole('button', { name: 'Mark, Proof 2', exact: true }).click();
    const dialog = page.getByRole('dialog');
    await dialog.getByLabel('Your name').fill('Mira Sand');
    await dialog.getByLabel('Your e-mail address').fill('nobody');
    await dialog.getByRole('button', { name: 'Send me the link' }).click();
    await dialog.getByText('This is no e-mail address.').waitFor();
    await visitor.audit();
    await dialog.getByLabel('Your e-mail address').fill(email);
    await dialog.getByRole('button', { name: 'Send me the link' }).click();
    await dialog.getByText(`A link to begin marking is on its way to ${email}.`).waitFor();
    expect(await Mark.query().where({ sheetId: open.sheet.id }).resultSize()).toBe(0);

    await site.house.runJobs();
    await page.goto(`${site.house.address}/begin/${tokenIn(site.house, email, 'begin')}`);
    await page.getByRole('link', { name: 'Signed in as Mira Sand' }).waitFor();
    await page.getByRole('button', { name: 'Mark, Proof 2', exact: true }).click();
    await page.getByRole('button', { name: 'Marked, Proof 2', exact: true }).waitFor();
    await expect.poll(() => Mark.query().where({ sheetId: open.sheet.id }).resultSize()).toBe(1);
    expect(await page.getByText('You are looking.').count()).toBe(0);
    await visitor.close();
  });

  it('shows nothing more once it is withdrawn, on pages that are open as well; who confirmed stays listed', async () => {
    const open = await openSheet();
    const token = await switchOn(made, open.sheet.id);
    const looker = await site.visit(`/look/${token}`);
    looker.expectErrors(/410/);
    await looker.page.getByRole('link', { name: /^Proof 1,/ }).waitFor();
    await SheetGuest.query().insert({
      studioId: open.sheet.studioId,
      sheetId: open.sheet.id,
      accountId: made.assistant.account.id,
      role: 'reviewer',
      name: 'Mira Sand',
      byOpenLink: true,
    });

    const studio = await site.visit(open.studioPage, { cookie: made.owner.cookie });
    await studio.page.getByText('1 browser', { exact: true }).waitFor();
    await studio.page.getByRole('button', { name: 'Withdraw', exact: true }).click();
    await studio.page.getByText(/^1 person who came by it and confirmed an address stays/).waitFor();
    await studio.audit();
    await studio.page.getByRole('button', { name: 'Withdraw it' }).click();
    await studio.page.getByRole('button', { name: 'Switch on' }).waitFor();
    await studio.page.getByText('by the open link').waitFor();
    await studio.close();

    await looker.page.getByText('The studio has withdrawn this link.').waitFor();
    expect(await looker.page.getByRole('link', { name: /^Proof 1,/ }).count()).toBe(0);
    await looker.page.goto(`${site.house.address}/look/${token}`);
    await looker.page.getByRole('heading', { name: 'This link was withdrawn' }).waitFor();
    await looker.audit();
    await looker.close();
  });

  it('asks a looker in the viewer for their name as well, by button and by key', async () => {
    const open = await openSheet();
    const visitor = await site.visit(`/look/${await switchOn(made, open.sheet.id)}`);
    await visitor.page.getByRole('link', { name: /^Proof 1,/ }).click();
    // The sheet's own button has the same name until the viewer is there.
    await visitor.page.waitForURL(/\/proofs\/1$/);
    await visitor.page.getByRole('button', { name: 'Mark, Proof 1', exact: true }).click();
    await visitor.page.getByRole('dialog', { name: 'To mark, say who you are' }).waitFor();
    await visitor.page.keyboard.press('Escape');
    await visitor.page.keyboard.press('Space');
    await visitor.page.getByRole('dialog', { name: 'To mark, say who you are' }).waitFor();
    await visitor.close();
  });
});
