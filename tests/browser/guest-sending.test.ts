import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Mark } from '../../api/models/Mark.ts';
import { PickList } from '../../api/models/PickList.ts';
import { Proof } from '../../api/models/Proof.ts';
import { SheetGuest } from '../../api/models/SheetGuest.ts';
import { hashToken } from '../../api/features/guests/tokens.ts';
import { makeOpenSheet } from '../support/factories/sheet.ts';
import { makeStudio, type MadeStudio } from '../support/factories/studio.ts';
import { SCREENS, startSite, type Site } from './support.ts';

let site: Site;
let made: MadeStudio;

beforeAll(async () => {
  site = await startSite();
  made = await makeStudio(site.house);
});
afterAll(() => site?.stop());

/** A sheet on which the lead has picked proofs 1, 2 and 3, one more than is included. */
async function pickedSheet() {
  const open = await makeOpenSheet(site.house, made, { proofs: 4, allowance: 2 });
  await site.house.runJobs();
  const proofs = await Proof.query().where({ sheetId: open.sheet.id }).orderBy('number');
  for (const proof of proofs.slice(0, 3))
    await open.lead.agent.put(`/api/guest/sheets/${open.sheet.id}/proofs/${proof.id}/mark`).expect(200);
  return { ...open, proofs, address: `/sheets/${open.sheet.id}` };
}
const listsOf = (sheetId: string) => PickList.query().where({ sheetId });

describe('reviewing and sending', () => {
  it.each([
    ['a phone', SCREENS.phone],
    ['a desktop', SCREENS.desktop],
  ])('sends once on %s, however often the button is pressed, and says what happens next', async (_name, screen) => {
    const open = await pickedSheet();
    const visitor = await site.visit(`${open.address}/review`, { cookie: open.lead.cookie, ...screen });
    const { page } = visitor;
    await page.getByText('2 of 2').waitFor();
    await visitor.audit();
    await page.getByLabel(/^A message to the studio/).fill('The first one is for the cover.');
    await page.getByRole('button', { name: 'Send 3 picks' }).click();
    await page.getByText(/One of them is an extra/).waitFor();
    await visitor.audit();
    await page.getByRole('button', { name: 'Send now' }).dblclick();
    await page.getByRole('heading', { name: 'Pick list 1 is with Harrow Lane Studio' }).waitFor();
    await visitor.audit();
    const lists = await listsOf(open.sheet.id);
    expect(lists.map(({ pickCount, extraCount, words }) => [pickCount, extraCount, words])).toEqual([
      [3, 1, 'The first one is for the cover.'],
    ]);
    await page.getByRole('link', { name: 'All proofs' }).click();
    await page.getByText('Pick list 1 is with the studio.').waitFor();
    expect(await page.getByRole('button', { name: /^Pick(ed)?, Proof/ }).count()).toBe(0);
    await visitor.close();
  });

  it('stops where somebody changed the picks while the question stood', async () => {
    const open = await pickedSheet();
    const visitor = await site.visit(`${open.address}/review`, { cookie: open.lead.cookie });
    const { page } = visitor;
    await page.getByRole('button', { name: 'Send 3 picks' }).click();
    await open.lead.agent.delete(`/api/guest${open.address}/proofs/${open.proofs[1]?.id}/mark`).expect(200);
    await page.getByText('No longer picked: proof 2.').waitFor();
    await page.getByRole('button', { name: 'Take the change in' }).click();
    await page.getByRole('button', { name: 'Send now' }).click();
    await page.getByRole('heading', { name: 'Pick list 1 is with Harrow Lane Studio' }).waitFor();
    expect((await listsOf(open.sheet.id))[0]?.pickCount).toBe(2);
    await visitor.close();
  });

  it('fails at once without a line, with a sentence, and is not sent later', async () => {
    const open = await pickedSheet();
    const visitor = await site.visit(`${open.address}/review`, { cookie: open.lead.cookie });
    const { page } = visitor;
    await page.getByRole('button', { name: 'Send 3 picks' }).click();
    visitor.expectErrors(/ERR_INTERNET_DISCONNECTED/);
    await page.context().setOffline(true);
    await page.getByRole('button', { name: 'Send now' }).click();
    const dialog = page.getByRole('dialog');
    await dialog.getByText(/^No answer from the server/).waitFor();
    await dialog.getByRole('button', { name: 'Cancel' }).click();
    const asked = page.waitForRequest(/pick-lists/, { timeout: 3000 }).then(
      () => true,
      () => false,
    );
    await page.context().setOffline(false);
    expect(await asked).toBe(false);
    expect(await listsOf(open.sheet.id)).toEqual([]);
    await visitor.close();
  });

  it('shows every picture beside its words, not over them, on a phone', async () => {
    const open = await pickedSheet();
    const visitor = await site.visit(`${open.address}/review`, { cookie: open.lead.cookie, ...SCREENS.phone });
    const rows = visitor.page.locator('main li').filter({ has: visitor.page.locator('img') });
    await rows.first().waitFor();
    for (const row of await rows.all()) {
      const picture = await row.locator('img').boundingBox();
      const words = await row.locator('b').first().boundingBox();
      expect((picture?.x ?? 0) + (picture?.width ?? 0)).toBeLessThanOrEqual(words?.x ?? 0);
    }
    await visitor.close();
  });

  it('takes a pick off the list and puts it back', async () => {
    const open = await pickedSheet();
    const visitor = await site.visit(`${open.address}/review`, { cookie: open.lead.cookie });
    const { page } = visitor;
    await page.getByRole('button', { name: 'Take off, Proof 2' }).click();
    await page.getByRole('button', { name: 'Send 2 picks' }).waitFor();
    await page.getByRole('button', { name: 'Undo' }).click();
    await page.getByRole('button', { name: 'Send 3 picks' }).waitFor();
    await expect.poll(() => Mark.query().where({ sheetId: open.sheet.id }).resultSize(), { timeout: 20_000 }).toBe(3);
    await visitor.close();
  });
});

describe('the viewer', () => {
  it('steps, marks, zooms and changes the surround by keys, and leaves single keys alone once they are switched off', async () => {
    const open = await pickedSheet();
    const visitor = await site.visit(`${open.address}/proofs/1`, { cookie: open.lead.cookie });
    const { page } = visitor;
    const surround = () => page.locator('[data-surround]').first().getAttribute('data-surround');
    await page.getByRole('button', { name: 'Picked · 1, Proof 1' }).waitFor();
    await visitor.audit();
    expect(await surround()).toBe('mid');
    expect(
      await page
        .locator('body > div > div')
        .first()
        .evaluate((stage) => getComputedStyle(stage).backgroundColor),
    ).toBe('rgb(119, 119, 119)');
    await page.keyboard.press('s');
    expect(await surround()).toBe('black');
    await page.keyboard.press('ArrowRight');
    await page.waitForURL(/\/proofs\/2$/);
    await page.getByRole('button', { name: 'Picked · 2, Proof 2' }).waitFor();
    await page.keyboard.press('Space');
    await page.getByRole('button', { name: 'Pick, Proof 2' }).waitFor();
    await page.keyboard.press('?');
    const keys = page.getByRole('checkbox', { name: /^Single keys/ });
    await visitor.audit();
    await keys.click();
    await expect.poll(() => keys.isChecked(), { timeout: 20_000 }).toBe(false);
    await page.keyboard.press('Escape');
    await page.keyboard.press('s');
    expect(await surround()).toBe('black');
    await page.keyboard.press('ArrowLeft');
    await page.waitForURL(/\/proofs\/1$/);
    await visitor.close();
  });

  it('shows a proof at 100% and fits it again, by the button, on a phone', async () => {
    const open = await pickedSheet();
    const visitor = await site.visit(`${open.address}/proofs/1`, { cookie: open.lead.cookie, ...SCREENS.phone });
    const { page } = visitor;
    const width = () => page.locator('[data-stage-picture]').evaluate((element) => element.getBoundingClientRect().width);
    await page.getByRole('button', { name: '100%' }).waitFor();
    await visitor.audit();
    expect(await width()).toBeCloseTo(390, 0);
    await page.getByRole('button', { name: '100%' }).click();
    // 2560 pixels of the proof on 2 pixels of the screen a CSS pixel.
    expect(await width()).toBeCloseTo(1280, 0);
    await page.getByRole('button', { name: 'Fit' }).click();
    expect(await width()).toBeCloseTo(390, 0);
    await visitor.close();
  });
});

describe('the link of an e-mail', () => {
  const token = (name: string) => `${name}${'A'.repeat(43)}`.slice(0, 43);

  it('opens a session and the sheet; fetching the page alone opens nothing', async () => {
    const open = await pickedSheet();
    const secret = token('open');
    await SheetGuest.query()
      .findById(open.lead.guest.id)
      .patch({ tokenHash: hashToken(secret) });
    const scanned = await site.house.request.get(`/open/${secret}`);
    expect([scanned.status, scanned.headers['set-cookie']]).toEqual([200, undefined]);
    const visitor = await site.visit(`/open/${secret}`);
    await visitor.page.waitForURL(new RegExp(`${open.address}$`));
    await visitor.page.getByRole('button', { name: 'Picked, Proof 1' }).waitFor();
    await visitor.page.getByRole('link', { name: /Signed in as/ }).click();
    await visitor.page.getByRole('heading', { name: 'Everything you were invited to' }).waitFor();
    await visitor.audit();
    expect(await visitor.page.getByRole('listitem').count()).toBe(1);
    await visitor.close();
  });

  it('that was replaced says so and sends a new one', async () => {
    const open = await pickedSheet();
    const [secret, newer] = [token('older'), token('newer')];
    await SheetGuest.query()
      .findById(open.lead.guest.id)
      .patch({ tokenHash: hashToken(secret) });
    await SheetGuest.query()
      .findById(open.lead.guest.id)
      .patch({ tokenHash: hashToken(newer) });
    const visitor = await site.visit(`/open/${secret}`);
    visitor.expectErrors(/410/);
    await visitor.page.getByRole('heading', { name: 'There is a newer link' }).waitFor();
    await visitor.audit();
    await visitor.page.getByRole('button', { name: 'Send me a new link' }).click();
    await visitor.page.getByRole('status').filter({ hasText: /\w/ }).waitFor();
    await site.house.runJobs();
    expect(site.house.mails.mails().some(({ to }) => JSON.stringify(to).includes(open.lead.account.email))).toBe(true);
    await visitor.close();
  });

  it('that was withdrawn, or never was, says what to do', async () => {
    const open = await pickedSheet();
    const secret = token('taken');
    await SheetGuest.query()
      .findById(open.lead.guest.id)
      .patch({ tokenHash: hashToken(secret), withdrawnAt: new Date() });
    const visitor = await site.visit(`/open/${secret}`);
    visitor.expectErrors(/4(04|10)/);
    await visitor.page.getByRole('heading', { name: 'This link was withdrawn' }).waitFor();
    expect(await visitor.page.getByText(/studio@harrow-lane\.test/).count()).toBe(1);
    await visitor.page.goto(`${site.house.address}/open/${token('never')}`);
    await visitor.page.getByRole('heading', { name: 'This link does not open' }).waitFor();
    await visitor.audit();
    await visitor.close();
  });
});
