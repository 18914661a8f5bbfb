import { createHash } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import { announce } from '../../api/db/live.ts';
import { Frame } from '../../api/models/Frame.ts';
import { originalKey, RECIPE } from '../../api/services/storage-keys.ts';
import { drawPicture, makeFrame } from '../support/factories/frame.ts';
import { makeCommission } from '../support/factories/commission.ts';
import { makeStudio, type MadeStudio } from '../support/factories/studio.ts';
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

/** A commission with `count` frames, HL_0001 and on, a minute apart; all three by two. */
async function makeSet(count: number) {
  const views = ['East front across the basin, dusk', 'Reading room, first light'];
  const commission = await makeCommission(studio.studio, { title: 'Ropewalk Library, first light to last', views });
  for (let number = 1; number <= count; number += 1) {
    await makeFrame(site.house, commission, {
      name: `HL_${String(number).padStart(4, '0')}.jpg`,
      takenLocal: `2026-10-28T17:${String(number).padStart(2, '0')}:12`,
      fNumber: number % 2 === 0 ? 8 : 11,
    });
  }
  return commission;
}

async function open(commission: { id: string }, screen = SCREENS.desktop): Promise<Visitor> {
  const visitor = await site.visit(`/commissions/${commission.id}/frames`, { cookie: studio.owner.cookie, ...screen });
  visitor.page.setDefaultTimeout(PATIENCE);
  await visitor.page.getByRole('gridcell').first().waitFor();
  return visitor;
}

/** What comes sooner or later. */
const soon = <T>(read: () => Promise<T>) => expect.poll(read, { timeout: PATIENCE });

const cells = ({ page }: Visitor) => page.getByRole('gridcell');
const names = async (visitor: Visitor) =>
  (await cells(visitor).evaluateAll((all) => all.map((one) => one.querySelector('a')?.textContent ?? ''))).join(' ');
const chosen = async ({ page }: Visitor) =>
  (
    await page
      .locator('[role=gridcell][aria-selected=true]')
      .evaluateAll((all) => all.map((one) => one.querySelector('a')?.textContent?.slice(3)))
  ).join(' ');
const focused = ({ page }: Visitor) => page.evaluate(() => document.activeElement?.querySelector('a')?.textContent);

async function listed(commission: { id: string }, query = ''): Promise<{ name: string; hidden: boolean; viewId: string | null }[]> {
  const { body } = await studio.owner.agent.get(`/api/commissions/${commission.id}/frames?sort=name${query}`).expect(200);
  return (body as { items: { name: string; hidden: boolean; viewId: string | null }[] }).items;
}

describe('choosing frames', () => {
  it('by the mouse: alone, one more with Ctrl, up to here with Shift', async () => {
    const visitor = await open(await makeSet(9));
    await cells(visitor).nth(1).click();
    await cells(visitor)
      .nth(3)
      .click({ modifiers: ['ControlOrMeta'] });
    expect(await chosen(visitor)).toBe('0002 0004');
    await cells(visitor)
      .nth(6)
      .click({ modifiers: ['Shift'] });
    expect(await chosen(visitor)).toBe('0004 0005 0006 0007');
    await visitor.page.getByText('4 chosen').waitFor();
    await visitor.audit();
    await cells(visitor).nth(0).click();
    expect(await chosen(visitor)).toBe('0001');
    await visitor.close();
  });

  it('by the keyboard alone', async () => {
    const visitor = await open(await makeSet(9));
    const { keyboard } = visitor.page;
    await visitor.page.getByRole('button', { name: 'Keys' }).focus();
    await keyboard.press('Tab');
    expect(await focused(visitor)).toBe('HL_0001');
    await keyboard.press('ArrowRight');
    await keyboard.press('Space');
    await keyboard.press('Shift+ArrowRight');
    expect(await chosen(visitor)).toBe('0002 0003');
    await keyboard.press('ArrowDown');
    expect(await focused(visitor)).toBe('HL_0007');
    await keyboard.press('Space');
    expect(await chosen(visitor)).toBe('0002 0003 0007');
    await keyboard.press('ControlOrMeta+a');
    await visitor.page.getByText('9 chosen').waitFor();
    await keyboard.press('Escape');
    expect(await chosen(visitor)).toBe('');
    expect(await focused(visitor)).toBe('HL_0007');
    await keyboard.press('?');
    await visitor.page.getByRole('dialog', { name: 'Keys on this page' }).waitFor();
    await visitor.audit();
    await visitor.close();
  });

  it('by a finger: each tap one more or one less', async () => {
    const visitor = await open(await makeSet(5), SCREENS.tablet);
    await cells(visitor).nth(0).tap();
    await cells(visitor).nth(2).tap();
    expect(await chosen(visitor)).toBe('0001 0003');
    await visitor.audit();
    await cells(visitor).nth(0).tap();
    expect(await chosen(visitor)).toBe('0003');
    await visitor.close();
  });
});

describe('what is done with chosen frames', () => {
  it('deletes after asking, names what goes, and brings it back', async () => {
    const commission = await makeSet(6);
    const visitor = await open(commission);
    const { page } = visitor;
    await cells(visitor).nth(1).click();
    await page.keyboard.press('Shift+ArrowRight');
    await page.keyboard.press('Delete');
    const dialog = page.getByRole('dialog', { name: 'Delete 2 frames?' });
    await dialog.getByText('HL_0002.jpg, HL_0003.jpg').waitFor();
    await visitor.audit();
    await dialog.getByRole('button', { name: 'Delete 2 frames' }).click();
    await page.getByText('2 frames deleted.').waitFor();
    expect((await listed(commission)).map((one) => one.name)).toEqual(['HL_0001.jpg', 'HL_0004.jpg', 'HL_0005.jpg', 'HL_0006.jpg']);
    await soon(() => names(visitor)).toBe('HL_0001 HL_0004 HL_0005 HL_0006');
    await page.getByRole('button', { name: 'Undo' }).click();
    await soon(() => names(visitor)).toBe('HL_0001 HL_0002 HL_0003 HL_0004 HL_0005 HL_0006');
    expect(await listed(commission)).toHaveLength(6);
    await visitor.close();
  });

  it('brings deleted frames back days later, from their own list', async () => {
    const commission = await makeSet(3);
    const [first] = await Frame.query().where({ commissionId: commission.id }).orderBy('name');
    await studio.owner.agent
      .post(`/api/commissions/${commission.id}/frames/delete`)
      .send({ frameIds: [first?.id] })
      .expect(200);
    const visitor = await open(commission);
    const { page } = visitor;
    await page.getByRole('button', { name: 'Deleted 1' }).click();
    await soon(() => names(visitor)).toBe('HL_0001');
    await cells(visitor).nth(0).click();
    await visitor.audit();
    await page.getByRole('button', { name: 'Bring back' }).click();
    await page.getByText('1 frame brought back.').waitFor();
    await page.getByRole('button', { name: 'Frames 3' }).click();
    await soon(() => names(visitor)).toBe('HL_0001 HL_0002 HL_0003');
    await visitor.close();
  });

  it('keeps a frame that is on a sheet, and says why', async () => {
    const commission = await makeSet(2);
    const frames = await Frame.query().where({ commissionId: commission.id }).orderBy('name');
    await studio.owner.agent
      .post(`/api/commissions/${commission.id}/sheets`)
      .send({ frameIds: [frames[0]?.id] })
      .expect(201);
    const visitor = await open(commission);
    const { page } = visitor;
    await cells(visitor).nth(0).click();
    await page.keyboard.press('ControlOrMeta+a');
    await page.keyboard.press('Delete');
    await page.getByRole('button', { name: 'Delete 2 frames' }).click();
    await page.getByText('HL_0001.jpg was kept: It is on proof sheet 1. Take it off the sheet first.').waitFor();
    await soon(() => names(visitor)).toBe('HL_0001');
    await visitor.close();
  });

  it('changes nothing in a closed commission', async () => {
    const commission = await makeSet(2);
    await studio.owner.agent.post(`/api/commissions/${commission.id}/close`).expect(200);
    const visitor = await open(commission);
    await cells(visitor).nth(0).click();
    expect(await chosen(visitor)).toBe('0001');
    expect(await visitor.page.getByRole('button', { name: 'Add frames' }).count()).toBe(0);
    expect(await visitor.page.getByRole('button', { name: 'Hide', exact: true }).count()).toBe(0);
    await visitor.close();
  });

  it('hides and shows again', async () => {
    const commission = await makeSet(4);
    const visitor = await open(commission);
    const { page } = visitor;
    await cells(visitor).nth(0).click();
    await page.getByRole('button', { name: 'Hide', exact: true }).click();
    await soon(() => names(visitor)).toBe('HL_0002 HL_0003 HL_0004');
    await page.getByRole('button', { name: 'Hidden 1' }).click();
    await soon(() => names(visitor)).toBe('HL_0001');
    await cells(visitor).nth(0).click();
    await page.getByRole('button', { name: 'Show again' }).click();
    await page.getByText('No frame is like this').waitFor();
    expect((await listed(commission)).some((one) => one.hidden)).toBe(false);
    await page.getByRole('button', { name: 'Show all frames' }).click();
    await soon(() => names(visitor)).toBe('HL_0001 HL_0002 HL_0003 HL_0004');
    await visitor.close();
  });

  it('hangs them under a view and puts them on a proof sheet', async () => {
    const commission = await makeSet(4);
    const visitor = await open(commission);
    const { page } = visitor;
    await cells(visitor).nth(1).click();
    await page.keyboard.press('Shift+ArrowRight');
    await page.getByRole('button', { name: 'Hang under' }).click();
    await page.getByRole('button', { name: 'View 2 · Reading room, first light' }).click();
    await page.getByText('2 frames hung under “Reading room, first light”.').waitFor();
    const hung = (await listed(commission)).map((one) => one.viewId === commission.views[1]?.id);
    expect(hung).toEqual([false, true, true, false]);

    await page.getByRole('button', { name: 'Put on proof sheet' }).click();
    await page.getByRole('button', { name: 'A new proof sheet' }).click();
    await page.getByText('2 frames put on sheet 1').waitFor();
    const { body } = await studio.owner.agent.get(`/api/commissions/${commission.id}/sheets`).expect(200);
    expect((body as { items: { proofCount: number }[] }).items.map((sheet) => sheet.proofCount)).toEqual([2]);
    await page.getByRole('combobox', { name: 'View', exact: true }).selectOption({ label: 'View 2 · Reading room, first light' });
    await soon(() => names(visitor)).toBe('HL_0002 HL_0003');
    await visitor.close();
  });
});

describe('finding frames', () => {
  it('sorts and filters, and keeps both over a reload', async () => {
    const visitor = await open(await makeSet(6));
    const { page } = visitor;
    await page.getByRole('combobox', { name: 'Sort by' }).selectOption('name');
    await page.getByRole('button', { name: 'Ascending' }).click();
    await soon(() => names(visitor)).toBe('HL_0006 HL_0005 HL_0004 HL_0003 HL_0002 HL_0001');
    await page.getByRole('searchbox').fill('f/8');
    await soon(() => names(visitor)).toBe('HL_0006 HL_0004 HL_0002');
    await page.reload();
    await soon(() => names(visitor)).toBe('HL_0006 HL_0004 HL_0002');
    await visitor.close();
  });

  it('shows a new frame without a reload, and one that somebody else deleted no more', async () => {
    const commission = await makeSet(2);
    const visitor = await open(commission);
    const topic = `commission:${commission.id}`;
    const fresh = await makeFrame(site.house, commission, { name: 'HL_0900.jpg', takenLocal: '2026-10-28T18:00:00' });
    await announce(site.house.ctx.knex, topic, { what: 'frame-ready', frameId: fresh.id, uploadId: null });
    await soon(() => names(visitor)).toBe('HL_0001 HL_0002 HL_0900');
    await studio.assistant.agent
      .post(`/api/commissions/${commission.id}/frames/delete`)
      .send({ frameIds: [fresh.id] })
      .expect(200);
    await soon(() => names(visitor)).toBe('HL_0001 HL_0002');
    await visitor.close();
  });

  it('says what went wrong when the frames cannot be loaded, and tries again', async () => {
    const commission = await makeSet(1);
    const visitor = await site.visit('/desk', { cookie: studio.owner.cookie });
    visitor.expectErrors(/500/);
    visitor.expectErrors(/desk/);
    const { page } = visitor;
    let broken = true;
    await page.route(/\/frames\?/, (route) => (broken ? route.fulfill({ status: 500 }) : route.continue()));
    await page.goto(`${site.house.address}/commissions/${commission.id}/frames`);
    await page.getByRole('alert').getByText('The server failed. Please try again.').waitFor();
    broken = false;
    await page.getByRole('button', { name: 'Try again' }).click();
    await cells(visitor).first().waitFor();
    await visitor.close();
  });
});

describe('one frame large', () => {
  it('opens with Enter, goes on with the arrows, and gives the focus back to the frame looked at', async () => {
    const visitor = await open(await makeSet(5));
    const { page } = visitor;
    await cells(visitor).nth(1).focus();
    await page.keyboard.press('Enter');
    const viewer = page.getByRole('dialog', { name: 'Frame HL_0002.jpg' });
    await viewer.getByText('2 of 5').waitFor();
    await viewer.getByText('28 Oct 2026, 17:02:12').waitFor();
    await viewer.getByRole('img', { name: 'HL_0002.jpg' }).waitFor();
    await visitor.audit();
    await page.keyboard.press('ArrowRight');
    await page.getByRole('dialog', { name: 'Frame HL_0003.jpg' }).getByText('3 of 5').waitFor();
    await page.keyboard.press('Escape');
    await soon(() => focused(visitor)).toBe('HL_0003');
    await page.goBack();
    await visitor.close();
  });

  it('has an address of its own', async () => {
    const commission = await makeSet(3);
    const frame = await Frame.query().findOne({ commissionId: commission.id, name: 'HL_0003.jpg' }).throwIfNotFound();
    const visitor = await site.visit(`/commissions/${commission.id}/frames/${frame.id}`, {
      cookie: studio.owner.cookie,
      ...SCREENS.tablet,
    });
    await visitor.page.getByRole('dialog', { name: 'Frame HL_0003.jpg' }).getByText('3 of 3').waitFor();
    await visitor.audit();
    await visitor.page.getByRole('button', { name: 'All frames' }).click();
    await soon(() => focused(visitor)).toBe('HL_0003');
    await visitor.close();
  });
});

describe('ten thousand frames', () => {
  it('scroll with few of them in the document, and the keyboard reaches the last', async () => {
    const commission = await makeCommission(studio.studio);
    await insertMany(commission, 10_000);
    const visitor = await site.visit('/desk', { cookie: studio.owner.cookie });
    visitor.expectErrors(/desk/);
    const { page } = visitor;
    const picture = await drawPicture(48, 32);
    await page.route(/\/pictures\//, (route) => route.fulfill({ body: picture, contentType: 'image/jpeg' }));
    await page.goto(`${site.house.address}/commissions/${commission.id}/frames`);
    await page.getByText('Frames · 10000').waitFor();
    let most = 0;
    for (let step = 0; step < 12; step += 1) {
      await page.mouse.wheel(0, 9_000);
      await page.waitForTimeout(80);
      most = Math.max(most, await cells(visitor).count());
    }
    expect(most).toBeGreaterThan(5);
    expect(most).toBeLessThan(120);
    await cells(visitor).first().focus();
    await page.keyboard.press('End');
    await soon(() => focused(visitor)).toBe('HL_9999');
    expect(await cells(visitor).count()).toBeLessThan(120);
    await page.keyboard.press('ControlOrMeta+a');
    await page.getByText('10\u2009000 chosen').waitFor();
    await visitor.close();
  });
});

/** Rows alone: their pictures are stood in for by the test. */
async function insertMany(commission: { id: string; studioId: string }, count: number): Promise<void> {
  const rows = Array.from({ length: count }, (_, number) => ({
    studioId: commission.studioId,
    commissionId: commission.id,
    state: 'ready' as const,
    originalName: `HL_${String(number).padStart(4, '0')}.jpg`,
    name: `HL_${String(number).padStart(4, '0')}.jpg`,
    mediaType: 'image/jpeg',
    sizeBytes: 1000,
    sha256: createHash('sha256').update(`${commission.id}/${number}`).digest('hex'),
    storageKey: originalKey(commission.studioId, commission.id),
    recipe: RECIPE,
    width: number % 5 === 0 ? 4000 : 6000,
    height: number % 5 === 0 ? 6000 : 4000,
    takenLocal: new Date(Date.UTC(2026, 9, 28) + number * 1000).toISOString().slice(0, 19),
  }));
  for (let at = 0; at < rows.length; at += 1000) await Frame.query().insert(rows.slice(at, at + 1000));
}
