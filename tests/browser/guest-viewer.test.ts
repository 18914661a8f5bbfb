import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { makeSheet } from '../../api/features/sheets/make-sheet.ts';
import { Proof } from '../../api/models/Proof.ts';
import { Sheet } from '../../api/models/Sheet.ts';
import { makeExposures } from '../support/factories/bracket.ts';
import { makeCommission } from '../support/factories/commission.ts';
import { makeFrame } from '../support/factories/frame.ts';
import { makeSheetGuest, type SheetPerson } from '../support/factories/sheet.ts';
import { makeStudio } from '../support/factories/studio.ts';
import { runAllJobs } from '../support/run-all-jobs.ts';
import { SCREENS, startSite, type Site, type Visitor } from './support.ts';

let site: Site;
let lead: SheetPerson;
let address: string;
/** Addresses: of 6000 × 4000 px; merged from exposures of 1/64 s, 1/16 s and 1/4 s; larger than any use. */
let single: string;
let merged: string;
let huge: string;

beforeAll(async () => {
  site = await startSite();
  const { house } = site;
  const made = await makeStudio(house);
  const commission = await makeCommission(made.studio, { views: ['East front'] });
  const frame = await makeFrame(house, commission, {});
  const [exposure] = await makeExposures(house, commission, { minute: 40 });
  const large = await makeFrame(house, commission, { width: 18_000, height: 12_000 });
  await runAllJobs(house);
  const draft = await makeSheet(house.ctx, made.owner.actor, commission.id, [frame.id, exposure?.id ?? '', large.id]);
  const sheet = await Sheet.query().patchAndFetchById(draft.id, { issuedAt: new Date(), endsAt: new Date(Date.now() + 1e9) });
  await runAllJobs(house);
  lead = await makeSheetGuest(house, sheet);
  address = `/sheets/${sheet.id}`;
  const proofs = await Proof.query().where({ sheetId: sheet.id });
  [single, merged, huge] = [frame, null, large].map((of) => {
    const proof = proofs.find(({ frameId, bracketId }) => (of ? frameId === of.id : bracketId !== null));
    return `/proofs/${proof?.number}`;
  }) as [string, string, string];
});
afterAll(() => site?.stop());

const visit = (at: string, screen = SCREENS.desktop) => site.visit(address + at, { cookie: lead.cookie, ...screen });
const part = ({ page }: Visitor, name: string) => page.getByRole('region', { name, exact: true });
/** The answer beside a use or a setting. */
const answer = (visitor: Visitor, region: string, what: string) =>
  part(visitor, region)
    .locator('dl > div')
    .filter({ has: visitor.page.locator('dt').getByText(what, { exact: true }) })
    .locator('dd');
const drawn = ({ page }: Visitor) => page.locator('[data-guides]').evaluateAll((all) => all.map((one) => one.getAttribute('data-guides')));

describe('guides over the picture', () => {
  it('come one after the other with G, are told to a screen reader, and are there again at the next proof', async () => {
    const visitor = await visit('/proofs/1');
    const { page } = visitor;
    await page.getByRole('button', { name: /^Guides/ }).waitFor();
    expect(await drawn(visitor)).toEqual([]);
    for (const [guides, says] of [
      ['thirds', 'Guides: thirds'],
      ['centre', 'Guides: centre lines'],
      ['diagonals', 'Guides: diagonals'],
    ]) {
      await page.keyboard.press('g');
      await page.getByRole('status').filter({ hasText: says }).waitFor({ state: 'attached' });
      expect(await drawn(visitor)).toEqual([guides]);
    }
    await page.keyboard.press('ArrowRight');
    await page.waitForURL(/\/proofs\/2$/);
    await page.reload();
    await page.locator('[data-guides=diagonals]').waitFor({ state: 'attached' });
    await page.keyboard.press('g');
    await page.locator('[data-guides]').waitFor({ state: 'detached' });
    await visitor.close();
  });

  it('lie on the picture itself, fitted and at 100%', async () => {
    const visitor = await visit(huge);
    const { page } = visitor;
    await page.getByRole('button', { name: /^Guides/ }).click();
    await page.getByRole('button', { name: 'thirds', exact: true }).click();
    const boxes = () =>
      Promise.all(
        ['[data-stage-picture]', '[data-guides=thirds]'].map((one) =>
          page.locator(one).evaluate((it) => it.getBoundingClientRect().toJSON()),
        ),
      );
    const [picture, lines] = await boxes();
    expect(lines).toEqual(picture);
    await page.getByRole('button', { name: '100%' }).click();
    const [zoomed, over] = await boxes();
    expect(over).toEqual(zoomed);
    expect((zoomed as DOMRect).width).toBeGreaterThan((picture as DOMRect).width);
    await visitor.close();
  });

  it('leave G alone for somebody who switched single keys off', async () => {
    const visitor = await visit('/proofs/1');
    const { page } = visitor;
    await page.getByRole('button', { name: 'Keys' }).click();
    expect(await page.getByText('the next guides over the picture').count()).toBe(1);
    // Listened for before it is asked: on a quiet machine the answer is there at once.
    const saved = page.waitForResponse((response) => response.url().endsWith('/api/guest') && response.ok());
    await page.getByRole('checkbox', { name: 'Single keys act on this page' }).uncheck();
    await saved;
    await page.keyboard.press('Escape');
    await page.keyboard.press('g');
    await page.keyboard.press('ArrowRight');
    await page.waitForURL(/\/proofs\/2$/);
    expect(await drawn(visitor)).toEqual([]);
    await lead.agent.patch('/api/guest').send({ shortcuts: true }).expect(200);
    await visitor.close();
  });
});

describe('fit for use', () => {
  // ISO 216: A4 is 210 × 297 mm, A3 297 × 420, A2 420 × 594. At 300 ppi, common practice for the hand, A3 wants 4961 × 3508 px.
  // Of 6000 × 4000 px A2 is limited by its height: 4000 px / 420 mm × 25.4 = 241.9 ppi; 4000 px / 300 × 2.54 cm = 33.9 cm.
  it('tells for each use whether 6000 × 4000 pixels are enough, or what they are enough for', async () => {
    const visitor = await visit(single);
    const fit = (use: string) => answer(visitor, 'Fit for use', use);
    await fit('A4 page, 300 ppi').waitFor();
    expect(await fit('A4 page, 300 ppi').innerText()).toBe('sharp');
    expect(await fit('A3 spread, 300 ppi').innerText()).toBe('sharp');
    expect((await fit('A2 print, 300 ppi').innerText()).split('\n')).toEqual(['241 ppi', 'sharp up to 47 × 33 cm']);
    // One arc minute at 10 m: 3438 / (10 000 mm / 25.4) = 8.7 ppi; over 6 m that is 2063 px.
    expect(await fit('6 m hoarding seen from 10 m').innerText()).toBe('sharp');
    expect(await part(visitor, 'Fit for use').getByText('6,000 × 4,000 pixels').count()).toBe(1);
    await visitor.page.getByText('What “sharp” means here').click();
    await visitor.page.getByText(/From 10 m that is 8\.7 ppi/).waitFor();
    await visitor.audit();
    await visitor.close();
  });

  it('is sharp throughout where there are pixels enough', async () => {
    const visitor = await visit(huge);
    await part(visitor, 'Fit for use').waitFor();
    const answers = await part(visitor, 'Fit for use').locator('dd').allInnerTexts();
    expect(answers.length).toBeGreaterThan(5);
    expect(new Set(answers)).toEqual(new Set(['sharp']));
    await visitor.close();
  });
});

describe('a proof merged from a bracket', () => {
  it('says so on the sheet and beside the picture, with its shutter times in a photographer’s notation', async () => {
    const sheet = await visit('');
    await sheet.page.getByRole('figure').getByText('3 exposures merged').waitFor();
    expect(await sheet.page.getByText('exposures merged').count()).toBe(1);
    await sheet.close();
    const visitor = await visit(merged);
    const shot = (what: string) => answer(visitor, 'As shot', what).innerText();
    await part(visitor, 'As shot').waitFor();
    expect(await shot('Exposures')).toBe('3, 2 stops apart, merged');
    expect(await shot('Shutter')).toBe('1/60 s to 1/4 s');
    expect([await shot('Aperture'), await shot('ISO'), await shot('Focal length')]).toEqual(['f/11', '100', '24 mm']);
    await visitor.close();
  });

  it.each(Object.entries(SCREENS))('has no violation of WCAG and nothing beyond the right edge on a %s', async (_name, screen) => {
    const visitor = await visit(merged, screen);
    await visitor.page.getByRole('button', { name: /^Guides/ }).click();
    await visitor.page.getByRole('button', { name: 'diagonals', exact: true }).click();
    await visitor.audit();
    expect(await visitor.page.evaluate(() => document.documentElement.scrollWidth - window.innerWidth)).toBeLessThanOrEqual(0);
    await visitor.close();
  });
});
