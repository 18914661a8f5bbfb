import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { announce } from '../../api/db/live.ts';
import { Mark } from '../../api/models/Mark.ts';
import { Proof } from '../../api/models/Proof.ts';
import { Sheet } from '../../api/models/Sheet.ts';
import { makeOpenSheet } from '../support/factories/sheet.ts';
import { makeStudio, type MadeStudio } from '../support/factories/studio.ts';
import { SCREENS, startSite, type Site, type Visitor } from './support.ts';

let site: Site;
let made: MadeStudio;

beforeAll(async () => {
  site = await startSite();
  made = await makeStudio(site.house);
});
afterAll(() => site?.stop());

/** What comes sooner or later: this machine may be busy. */
const soon = <T>(read: () => Promise<T>) => expect.poll(read, { timeout: 20_000 });

async function openSheet(values: Parameters<typeof makeOpenSheet>[2] = {}) {
  const open = await makeOpenSheet(site.house, made, { proofs: 7, allowance: 2, ...values });
  await site.house.runJobs();
  const proofs = await Proof.query().where({ sheetId: open.sheet.id }).orderBy('number');
  return { ...open, proofs, address: `/sheets/${open.sheet.id}` };
}
type Open = Awaited<ReturnType<typeof openSheet>>;

const visit = (open: Open, who: 'lead' | 'reviewer' = 'lead', screen = SCREENS.desktop, at = '') =>
  site.visit(open.address + at, { cookie: open[who].cookie, ...screen });

const button = ({ page }: Visitor, word: string, number: number) =>
  page.getByRole('button', { name: `${word}, Proof ${number}`, exact: true });
const picture = ({ page }: Visitor, number: number) => page.getByRole('link', { name: new RegExp(`^Proof ${number},`) });
const marksOf = (open: Open) =>
  Mark.query()
    .where({ sheetId: open.sheet.id })
    .then((marks) => marks.map(({ proofId }) => open.proofs.find((proof) => proof.id === proofId)?.number ?? 0).sort());

describe('the guest’s sheet', () => {
  it('shows the storeys in order, and what belongs to no view in the last one', async () => {
    const open = await openSheet();
    const visitor = await visit(open);
    await picture(visitor, 1).waitFor();
    const storeys = await visitor.page.getByRole('heading', { level: 2 }).allTextContents();
    expect(storeys).toEqual(['East front', 'Forecourt', 'Also made']);
    expect(await visitor.page.getByRole('heading', { level: 1 }).textContent()).toBe(open.commission.title);
    await visitor.close();
  });

  it.each([
    ['All proofs', (page: Visitor['page']) => page.getByRole('button', { name: 'All proofs' }).click()],
    ['Escape', (page: Visitor['page']) => page.keyboard.press('Escape')],
  ])('shows the proof that was looked at last, coming back by %s on a phone', async (_name, comeBack) => {
    const open = await openSheet();
    const visitor = await visit(open, 'lead', SCREENS.phone, '/proofs/6');
    await visitor.page.getByRole('heading', { level: 1 }).waitFor();
    await comeBack(visitor.page);
    await picture(visitor, 6).waitFor();
    await soon(async () => {
      const box = await picture(visitor, 6).boundingBox();
      return box !== null && box.y >= 0 && box.y < SCREENS.phone.viewport.height;
    }).toBe(true);
    await visitor.close();
  });

  it.each(Object.entries(SCREENS))('has no violation of WCAG and nothing beyond the right edge on a %s', async (_name, screen) => {
    const open = await openSheet();
    await open.lead.agent.put(`/api/guest${open.address}/proofs/${open.proofs[0]?.id}/mark`);
    const visitor = await visit(open, 'lead', screen);
    await picture(visitor, 1).waitFor();
    for (const surround of ['paper', 'mid grey', 'black']) {
      await visitor.page.getByRole('button', { name: /^Surround:/ }).click();
      await visitor.page.getByRole('button', { name: surround, exact: true }).click();
      await visitor.audit();
    }
    expect(await visitor.page.evaluate(() => document.documentElement.scrollWidth - window.innerWidth)).toBeLessThanOrEqual(0);
    await visitor.close();
  });

  it('saves a mark at once, numbers picks in the order of the sheet and counts the extras', async () => {
    const open = await openSheet();
    const visitor = await visit(open);
    for (const number of [5, 2, 4]) await button(visitor, 'Pick', number).click();
    await soon(() => marksOf(open)).toEqual([2, 4, 5]);
    expect(await picture(visitor, 2).getAttribute('aria-label')).toMatch(/, picked$/);
    expect(await picture(visitor, 5).getAttribute('aria-label')).toMatch(/, picked as an extra$/);
    await soon(() => visitor.page.getByRole('status').first().textContent()).toContain('3 picked');
    expect(await visitor.page.getByRole('status').first().textContent()).toContain('1 extra');
    await button(visitor, 'Picked', 2).click();
    await soon(() => marksOf(open)).toEqual([4, 5]);
    await visitor.close();
  });

  it('takes a mark back visibly where the server refuses it', async () => {
    const open = await openSheet();
    const visitor = await visit(open);
    visitor.expectErrors(/409/);
    await button(visitor, 'Pick', 3).waitFor();
    await Sheet.query()
      .findById(open.sheet.id)
      .patch({ endsAt: new Date(Date.now() - 1000) });
    await button(visitor, 'Pick', 3).click();
    await visitor.page.getByText(/^Proof 3 could not be marked; it is as it was\./).waitFor();
    await visitor.page.getByText('Choosing has ended.').waitFor();
    expect(await visitor.page.getByRole('button', { name: /^Picked?, Proof/ }).count()).toBe(0);
    expect(await marksOf(open)).toEqual([]);
    await visitor.close();
  });

  it('takes a mark back where the line is dead, and can mark again afterwards', async () => {
    const open = await openSheet();
    const visitor = await visit(open);
    visitor.expectErrors(/ERR_INTERNET_DISCONNECTED/);
    await button(visitor, 'Pick', 1).waitFor();
    await visitor.context.setOffline(true);
    await button(visitor, 'Pick', 1).click();
    await visitor.page.getByText(/could not be marked.*No answer from the server/).waitFor();
    await button(visitor, 'Pick', 1).waitFor();
    await visitor.context.setOffline(false);
    await button(visitor, 'Pick', 1).click();
    await soon(() => marksOf(open)).toEqual([1]);
    await visitor.close();
  });

  it('sends the last wish of somebody who marks and unmarks quickly', async () => {
    const open = await openSheet();
    const visitor = await visit(open);
    await picture(visitor, 1).focus();
    for (let press = 0; press < 5; press += 1) await visitor.page.keyboard.press('Space');
    await soon(() => marksOf(open)).toEqual([1]);
    expect(await button(visitor, 'Picked', 1).count()).toBe(1);
    await visitor.close();
  });

  it('shows another guest’s mark without reloading, by initials and name', async () => {
    const open = await openSheet();
    const visitor = await visit(open);
    await picture(visitor, 2).waitFor();
    await open.reviewer.agent.put(`/api/guest${open.address}/proofs/${open.proofs[1]?.id}/mark`).expect(200);
    const said = visitor.page.locator('figure').filter({ has: picture(visitor, 2) });
    await said.getByText('PT', { exact: true }).waitFor();
    expect(await said.getByText('Marked by Petra Thorn').count()).toBe(1);
    expect(await visitor.page.getByRole('status').first().textContent()).toContain('0 picked');
    await visitor.close();
  });

  it('tells a reviewer who sends, and offers them no sending', async () => {
    const open = await openSheet();
    const visitor = await visit(open, 'reviewer');
    await button(visitor, 'Mark', 1).click();
    await visitor.page.getByText('1 marked by you').waitFor();
    expect(await visitor.page.getByText('Oskar Lind makes the final choice and sends it.').count()).toBe(1);
    expect(await visitor.page.getByRole('link', { name: 'Review and send' }).count()).toBe(0);
    await visitor.close();
  });

  it('is walked by the arrows, marked by Space and opened by Enter', async () => {
    const open = await openSheet();
    const visitor = await visit(open);
    await picture(visitor, 1).focus();
    const focused = () => visitor.page.evaluate(() => document.activeElement?.getAttribute('aria-label')?.split(',')[0]);
    const seen: (string | undefined)[] = [];
    for (const key of ['ArrowRight', 'ArrowRight', 'ArrowDown', 'End', 'ArrowUp', 'Home', 'ArrowLeft']) {
      await visitor.page.keyboard.press(key);
      seen.push(await focused());
    }
    expect(seen[0]).toBe('Proof 2');
    expect(seen[3]).toBe('Proof 7');
    expect(seen.slice(5)).toEqual(['Proof 1', 'Proof 1']);
    await visitor.page.keyboard.press('ArrowRight');
    await visitor.page.keyboard.press('Space');
    await soon(() => marksOf(open)).toEqual([2]);
    await visitor.page.keyboard.press('Enter');
    await visitor.page.waitForURL(/\/proofs\/2$/);
    await visitor.page.getByRole('button', { name: 'All proofs' }).waitFor();
    await visitor.page.keyboard.press('ArrowRight');
    await visitor.page.waitForURL(/\/proofs\/3$/);
    await visitor.page.keyboard.press('Escape');
    await visitor.page.waitForURL(/\/sheets\/[\w-]+$/);
    await soon(focused).toBe('Proof 3');
    await visitor.close();
  });

  it('reads a changed sheet anew when the studio changes it', async () => {
    const open = await openSheet();
    const visitor = await visit(open);
    await picture(visitor, 1).waitFor();
    await Sheet.query().findById(open.sheet.id).patch({ allowance: 5 });
    await announce(site.house.ctx.knex, `sheet:${open.sheet.id}`, { what: 'sheet' });
    await visitor.page.getByText('of 5 included').first().waitFor();
    await visitor.close();
  });

  it('says what to do without a session, and for somebody who is not invited', async () => {
    const open = await openSheet();
    const stranger = await site.visit(open.address);
    stranger.expectErrors(/401/);
    await stranger.page.getByRole('heading', { name: 'Please open your link again' }).waitFor();
    await stranger.audit();
    await stranger.close();
    const other = await openSheet({ proofs: 1 });
    const guest = await site.visit(open.address, { cookie: other.lead.cookie });
    guest.expectErrors(/404/);
    await guest.page.getByRole('heading', { name: 'This is not open to you' }).waitFor();
    await guest.audit();
    await guest.close();
  });
});
