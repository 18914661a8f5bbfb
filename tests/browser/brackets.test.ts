import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import type { Bracket } from '../../api/contract/brackets.ts';
import { makeExposures } from '../support/factories/bracket.ts';
import { makeCommission } from '../support/factories/commission.ts';
import { makeStudio, type MadeStudio } from '../support/factories/studio.ts';
import { runAllJobs } from '../support/run-all-jobs.ts';
import { SCREENS, startSite, type Site, type Visitor } from './support.ts';

/** A machine that runs other tests beside these is slow, which is no failure. */
const PATIENCE = 100_000;
vi.setConfig({ testTimeout: 3 * PATIENCE });

let site: Site;
let studio: MadeStudio;

beforeAll(async () => {
  site = await startSite();
  studio = await makeStudio(site.house);
});
afterAll(() => site?.stop());

/** A commission with one bracket of three and a single frame, measured, grouped and merged as after an upload. */
async function makeShoot() {
  const commission = await makeCommission(studio.studio, { title: 'Ropewalk Library, first light to last', views: ['East front'] });
  // Sizes as of a camera, so that there is something to see at 100%.
  const values = { width: 3000, height: 2000 };
  const frames = await makeExposures(site.house, commission, { values });
  const [single] = await makeExposures(site.house, commission, { stops: [0], minute: 30, seed: 2, values });
  await runAllJobs(site.house);
  return { commission, frames, single };
}

async function open(commission: { id: string }, search = '', screen = SCREENS.desktop): Promise<Visitor> {
  const visitor = await site.visit(`/commissions/${commission.id}/frames${search}`, { cookie: studio.owner.cookie, ...screen });
  visitor.page.setDefaultTimeout(PATIENCE);
  await tiles(visitor).first().waitFor();
  return visitor;
}

const soon = <T>(read: () => Promise<T>) => expect.poll(read, { timeout: PATIENCE });
const tiles = ({ page }: Visitor) => page.locator('[data-frame]');
/** What stands below each frame, "−2 1/64". */
const captions = async (visitor: Visitor) =>
  (await tiles(visitor).evaluateAll((all) => all.map((one) => one.querySelector('a')?.firstChild?.textContent ?? ''))).join(' ');
const brackets = async (commission: { id: string }): Promise<Bracket[]> =>
  (await studio.owner.agent.get(`/api/commissions/${commission.id}/brackets`).expect(200)).body.items;
const stem = (frame: { name: string } | undefined) => frame?.name.replace('.jpg', '') ?? '';

describe('brackets on the Frames page', () => {
  it('stand with their merged proof first, darkest frame next, on a desktop and a tablet', async () => {
    const { commission, single } = await makeShoot();
    const visitor = await open(commission);
    const { page } = visitor;
    const heading = page.getByRole('heading', { name: 'Bracket of 3 · 2 stops apart · f/11 · ISO 100 · 24 mm · 17:05:12' });
    await heading.waitFor();
    await page.getByRole('link', { name: 'Merged proof' }).waitFor();
    await page.getByText('3 of 3 aligned').waitFor();
    expect(await captions(visitor)).toBe(`−2 0 +2 ${stem(single)}`);
    const proof = await page.locator('[data-proof] img').boundingBox();
    const frame = await tiles(visitor).first().locator('img').boundingBox();
    expect(proof?.height ?? 0).toBeGreaterThan((frame?.height ?? 0) * 1.4);
    await visitor.audit();
    await page.setViewportSize(SCREENS.tablet.viewport);
    await heading.waitFor();
    expect(await page.evaluate(() => document.documentElement.scrollWidth <= window.innerWidth)).toBe(true);
    await visitor.audit();
    await visitor.close();
  });

  it('are shown alone where that is asked for, and after a reload still', async () => {
    const { commission, single } = await makeShoot();
    const visitor = await open(commission);
    const { page } = visitor;
    await page.getByRole('button', { name: 'Single frames 1' }).click();
    await soon(() => captions(visitor)).toBe(stem(single));
    await page.getByRole('button', { name: 'Brackets 1' }).click();
    await soon(() => captions(visitor)).toBe('−2 0 +2');
    await page.reload();
    await soon(() => captions(visitor)).toBe('−2 0 +2');
    expect(new URL(page.url()).search).toBe('?only=brackets');
    await visitor.close();
  });

  it('are split, and joined again by Undo', async () => {
    const { commission, frames, single } = await makeShoot();
    const visitor = await open(commission);
    const { page } = visitor;
    await page.getByRole('button', { name: 'Split' }).click();
    await page.getByText('The bracket is split: 3 frames stand alone.').waitFor();
    await soon(() => captions(visitor)).toBe([...frames, single].map(stem).join(' '));
    expect(await brackets(commission)).toEqual([]);
    await page.getByRole('button', { name: 'Undo' }).click();
    await soon(() => captions(visitor)).toBe(`−2 0 +2 ${stem(single)}`);
    await page.getByText('3 exposures are being merged …').waitFor();
    await runAllJobs(site.house);
    await page.getByText('3 of 3 aligned').waitFor();
    expect((await brackets(commission)).map(({ byHand, leadFrameId }) => [byHand, leadFrameId])).toEqual([[true, frames[0]?.id]]);
    await visitor.close();
  });

  it('lose a frame, get another lead and show it, each by the dialog and the menu of their heading', async () => {
    const { commission, frames } = await makeShoot();
    const visitor = await open(commission);
    const { page } = visitor;
    const more = page.locator('[role=rowheader]').getByRole('button', { name: 'More' });
    await more.click();
    await page.getByRole('button', { name: 'Its frames …' }).click();
    const dialog = page.getByRole('dialog', { name: 'Bracket of 3: its frames' });
    await dialog.getByRole('button', { name: `Make it the lead (${frames[2]?.name})` }).click();
    await soon(() => captions(visitor)).toContain('−4 −2 0');
    await visitor.audit();
    await dialog.getByRole('button', { name: `Take out (${frames[1]?.name})` }).click();
    await page.getByText('1 frame taken out of the bracket.').waitFor();
    await page.getByRole('heading', { name: /^Bracket of 2/ }).waitFor();
    await more.click();
    await page.getByRole('button', { name: 'Show the lead frame' }).click();
    await page.getByRole('link', { name: 'Lead frame as proof' }).waitFor();
    expect((await brackets(commission)).map(({ shows, leadFrameId }) => [shows, leadFrameId])).toEqual([['lead', frames[2]?.id]]);
    await visitor.close();
  });

  it('are joined from chosen frames by the keyboard, and follow what somebody else does', async () => {
    const { commission } = await makeShoot();
    const [found] = await brackets(commission);
    const visitor = await open(commission);
    const { page } = visitor;
    await page.getByRole('heading', { name: /^Bracket of 3/ }).waitFor();
    await studio.assistant.agent.post(`/api/brackets/${found?.id}/split`).send({}).expect(200);
    await page.getByRole('heading', { name: /^Bracket of 3/ }).waitFor({ state: 'detached' });
    await tiles(visitor).first().focus();
    await page.keyboard.press('Shift+ArrowRight');
    await page.keyboard.press('Shift+ArrowRight');
    await page.getByRole('button', { name: 'Join' }).focus();
    await page.keyboard.press('Enter');
    await page.getByText('3 frames joined to a bracket.').waitFor();
    await page.getByRole('heading', { name: /^Bracket of 3.* by hand/ }).waitFor();
    await visitor.close();
  });

  it('go onto a proof sheet whole, whichever frame was chosen', async () => {
    const { commission } = await makeShoot();
    const visitor = await open(commission);
    const { page } = visitor;
    await tiles(visitor).nth(2).click();
    await page.getByText('1 bracket as one proof', { exact: true }).waitFor();
    await page.getByRole('button', { name: 'Put on proof sheet' }).click();
    await page.getByRole('button', { name: 'A new proof sheet' }).click();
    await page.getByText('1 bracket as one proof put on sheet 1: it has 1 proof now.').waitFor();
    await page.goto(`${site.house.address}/commissions/${commission.id}/proofs`);
    await page.getByText('3 exposures merged').waitFor();
    await page.getByRole('button', { name: 'Show the lead frame as proof 1' }).click();
    await page.getByRole('button', { name: 'Show it merged as proof 1' }).waitFor();
    await visitor.audit();
    await visitor.close();
  });
});

describe('what to look at', () => {
  it('stands with its sentence, and near-doubles stand together', async () => {
    const other = await makeStudio(site.house);
    const { body } = await other.owner.agent.get('/api/studio/checks').expect(200);
    // No picture is so sharp: whatever is slow for the hand is pointed out.
    await other.owner.agent
      .put('/api/studio/checks')
      .send({ thresholds: { ...body.thresholds, sharpFrom: 20 } })
      .expect(200);
    const commission = await makeCommission(other.studio);
    for (const minute of [10, 20]) await makeExposures(site.house, commission, { stops: [0], minute, seed: 4 });
    await makeExposures(site.house, commission, { stops: [-4], minute: 40, seed: 9 });
    await runAllJobs(site.house);
    const visitor = await site.visit(`/commissions/${commission.id}/frames`, { cookie: other.owner.cookie });
    const { page } = visitor;
    page.setDefaultTimeout(PATIENCE);
    await page.getByRole('button', { name: 'To check 2' }).click();
    await page
      .getByText(/^1\/15 s is slow for the hand at 24 mm/)
      .nth(1)
      .waitFor();
    await visitor.audit();
    await page.getByRole('button', { name: 'Alike 2' }).click();
    await page.getByRole('heading', { name: /^2 frames alike/ }).waitFor();
    await visitor.audit();
    await visitor.close();
  });
});

describe("the photographer's view of a bracket", () => {
  const shown = (page: Visitor['page']) => page.getByRole('dialog').locator('[data-stage-picture] img:not(.invisible)').getAttribute('src');
  const pictureBox = (page: Visitor['page']) => page.locator('[data-stage-picture]').boundingBox();

  it('steps through its pictures in place, at the same zoom, and blinks merged against lead', async () => {
    const { commission, frames } = await makeShoot();
    const visitor = await open(commission);
    const { page } = visitor;
    await page.getByRole('link', { name: 'Merged proof' }).click();
    const strip = page.getByRole('group', { name: 'Pictures of the bracket' });
    await page.getByRole('dialog', { name: `Merged proof of ${frames[0]?.name}` }).waitFor();
    await page.getByText('3 frames, 2 stops apart, f/11, ISO 100').waitFor();
    await visitor.audit();
    const merged = await shown(page);
    await page.keyboard.press('z');
    await page.keyboard.press('Shift+ArrowLeft');
    const zoomed = await pictureBox(page);
    expect(zoomed?.width ?? 0).toBeGreaterThan(2000);
    await page.keyboard.press('ArrowDown');
    await page.getByRole('dialog', { name: `Frame ${frames[1]?.name}` }).waitFor();
    expect(await strip.locator('[aria-current]').textContent()).toBe('−2');
    expect(await pictureBox(page)).toEqual(zoomed);
    await page.keyboard.press('ArrowUp');
    await page.getByRole('dialog', { name: 'Merged proof of' }).waitFor();
    await page.keyboard.down('b');
    await soon(() => shown(page)).not.toBe(merged);
    await page.keyboard.up('b');
    await soon(() => shown(page)).toBe(merged);
    await strip.getByRole('button', { name: '+2' }).click();
    await page.getByRole('dialog', { name: `Frame ${frames[2]?.name}` }).waitFor();
    await page.getByRole('img', { name: /^Histogram\. The brightest parts are/ }).waitFor();
    await visitor.close();
  });

  it('blinks by itself only on request, and not at all where motion is unwanted', async () => {
    const { commission } = await makeShoot();
    const [found] = await brackets(commission);
    const path = `/commissions/${commission.id}/frames/${found?.leadFrameId}#merged`;
    const visitor = await site.visit(path, { cookie: studio.owner.cookie, reducedMotion: 'reduce' });
    const { page } = visitor;
    const blink = page.getByRole('button', { name: 'Blink against the lead' });
    await blink.waitFor();
    await soon(() => shown(page)).not.toBe(null);
    const merged = await shown(page);
    await blink.click();
    await soon(() => shown(page)).not.toBe(merged);
    const lead = await shown(page);
    await page.waitForTimeout(2500);
    expect(await shown(page)).toBe(lead);
    await page.emulateMedia({ reducedMotion: 'no-preference' });
    await blink.click();
    await soon(() => shown(page)).toBe(lead);
    await soon(() => shown(page)).toBe(merged);
    await visitor.close();
  });

  it('draws what is clipped over the picture and says how much', async () => {
    const { commission, frames } = await makeShoot();
    const visitor = await site.visit(`/commissions/${commission.id}/frames/${frames[2]?.id}`, {
      cookie: studio.owner.cookie,
      ...SCREENS.tablet,
    });
    const { page } = visitor;
    page.setDefaultTimeout(PATIENCE);
    await page.getByRole('dialog', { name: `Frame ${frames[2]?.name}` }).waitFor();
    await page.keyboard.press('h');
    await page.getByText(/^Highlights [\d.]+%, stripes rising/).waitFor();
    // Counted again in the picture itself: the share of pixels of which a channel is at 253 or above.
    const counted = await page.evaluate(async () => {
      const picture = document.querySelector<HTMLImageElement>('[data-stage-picture] img:not(.invisible)');
      const canvas = document.createElement('canvas');
      await picture?.decode();
      [canvas.width, canvas.height] = [picture?.naturalWidth ?? 0, picture?.naturalHeight ?? 0];
      const pen = canvas.getContext('2d');
      pen?.drawImage(picture as HTMLImageElement, 0, 0);
      const { data } = pen?.getImageData(0, 0, canvas.width, canvas.height) ?? { data: new Uint8ClampedArray() };
      let clipped = 0;
      for (let at = 0; at < data.length; at += 4) if (Math.max(data[at] ?? 0, data[at + 1] ?? 0, data[at + 2] ?? 0) >= 253) clipped++;
      return (clipped / (data.length / 4)) * 100;
    });
    const words = await page.getByText(/^Highlights.*stripes rising/).textContent();
    expect(Number(/[\d.]+/.exec(words ?? '')?.[0])).toBeCloseTo(counted, counted < 10 ? 1 : 0);
    await visitor.audit();
    await page.keyboard.press('g');
    const lines = await page.locator('[data-guides=thirds]').evaluate((it) => it.getBoundingClientRect().toJSON());
    expect(lines).toEqual(await page.locator('[data-stage-picture]').evaluate((it) => it.getBoundingClientRect().toJSON()));
    await page.keyboard.press('?');
    await page
      .getByRole('dialog', { name: 'Keys of this view' })
      .getByText('While held: the merged picture against the lead frame')
      .waitFor();
    await visitor.audit();
    await visitor.close();
  });
});

describe('the settings', () => {
  it('of the frame checks are changed, refused with a sentence, and taken back to the defaults', async () => {
    const made = await makeStudio(site.house);
    const visitor = await site.visit('/settings/checks', { cookie: made.owner.cookie });
    const { page } = visitor;
    const tilt = page.getByRole('spinbutton', { name: 'Tilted from, degrees' });
    await tilt.fill('0.1');
    await page.getByRole('button', { name: 'Save' }).click();
    await page.getByText('A number from 0.2 to 10.').waitFor();
    await tilt.fill('0.8');
    await page.getByRole('button', { name: 'Save' }).click();
    await page.getByText('Saved. Frames are pointed out by this from now on.').waitFor();
    await visitor.audit();
    const read = async () => (await made.owner.agent.get('/api/studio/checks').expect(200)).body.thresholds.tiltDegrees as number;
    expect(await read()).toBe(0.8);
    await page.getByRole('button', { name: 'Take the defaults' }).click();
    expect(await tilt.inputValue()).toBe('0.5');
    await page.getByRole('button', { name: 'Save' }).click();
    await soon(read).toBe(0.5);
    await page.setViewportSize(SCREENS.tablet.viewport);
    await visitor.audit();
    await visitor.close();
  });

  it('of the uses are added, put elsewhere, removed and brought back; an assistant only reads them', async () => {
    const made = await makeStudio(site.house);
    const visitor = await site.visit('/settings/uses', { cookie: made.owner.cookie });
    const { page } = visitor;
    const titles = async () =>
      ((await made.owner.agent.get('/api/studio/uses').expect(200)).body.uses as { title: string }[]).map(({ title }) => title);
    const before = await titles();
    await page.getByRole('button', { name: 'Add a use' }).click();
    const dialog = page.getByRole('dialog', { name: 'A new use' });
    await dialog.getByRole('button', { name: 'Add' }).click();
    await dialog.getByText('Name the use.').waitFor();
    await visitor.audit();
    await dialog.getByRole('radio', { name: /Seen from a distance/ }).check();
    await dialog.getByRole('textbox', { name: 'Name' }).fill('Site fence');
    await dialog.getByRole('textbox', { name: 'Width, cm' }).fill('340');
    await dialog.getByRole('textbox', { name: 'Distance, metres' }).fill('2,5');
    await dialog.getByRole('button', { name: 'Add' }).click();
    await page.getByText('3.4 m wide').waitFor();
    // One arc minute at 2.5 m: 3438 / 98.4 in.
    await page.getByText('from 2.5 m, 35 ppi').waitFor();
    expect(await titles()).toEqual([...before, 'Site fence']);
    await page.getByRole('button', { name: 'Move Site fence up' }).click();
    await soon(titles).toEqual([...before.slice(0, -1), 'Site fence', ...before.slice(-1)]);
    await page.getByRole('button', { name: 'Remove A4 page' }).click();
    await page.getByText('A4 page is removed.').waitFor();
    expect(await titles()).not.toContain('A4 page');
    await page.getByRole('button', { name: 'Undo' }).last().click();
    await soon(titles).toContain('A4 page');
    await visitor.audit();
    await page.setViewportSize(SCREENS.tablet.viewport);
    await visitor.audit();
    await visitor.close();
    const reader = await site.visit('/settings/uses', { cookie: made.assistant.cookie });
    await reader.page.getByText('Only the owner of the studio changes these.').waitFor();
    expect(await reader.page.getByRole('button', { name: 'Add a use' }).count()).toBe(0);
    await reader.close();
  });
});
