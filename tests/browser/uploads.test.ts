import { copyFile, mkdir } from 'node:fs/promises';
import path from 'node:path';
import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import { makeCommission } from '../support/factories/commission.ts';
import { makeStudio, type MadeStudio } from '../support/factories/studio.ts';
import { startSite, type Site, type Visitor } from './support.ts';
import { chooseFiles, holdParts, keepWorking, notePart, startCard } from './uploads-support.ts';

/** A machine that runs other tests beside these is slow, which is no failure. */
const PATIENCE = 100_000;
vi.setConfig({ testTimeout: 3 * PATIENCE });

let site: Site;
let studio: MadeStudio;
let work: ReturnType<typeof keepWorking>;
const card = startCard();

beforeAll(async () => {
  site = await startSite();
  studio = await makeStudio(site.house);
  work = keepWorking(site.house);
});
afterAll(async () => {
  await work?.stop();
  await site?.stop();
  card.remove();
});

async function openFrames(): Promise<{ visitor: Visitor; commissionId: string; address: string }> {
  const commission = await makeCommission(studio.studio, { title: 'Ropewalk Library, first light to last' });
  const address = `/commissions/${commission.id}/frames`;
  const visitor = await site.visit(address, { cookie: studio.owner.cookie });
  visitor.page.setDefaultTimeout(PATIENCE);
  await visitor.page.getByText('No frames yet').waitFor();
  return { visitor, commissionId: commission.id, address };
}

async function frameNames(commissionId: string): Promise<string[]> {
  const { body } = await studio.owner.agent.get(`/api/commissions/${commissionId}/frames?sort=name`).expect(200);
  return (body as { items: { name: string }[] }).items.map((item) => item.name);
}

/** What comes sooner or later. */
const soon = <T>(read: () => T) => expect.poll(read, { timeout: PATIENCE });

const tile = (visitor: Visitor, name: string) => visitor.page.getByRole('gridcell', { name });

describe('bringing frames', () => {
  it('takes chosen files in, shows them without a reload, and names what is no picture', async () => {
    const { visitor, commissionId } = await openFrames();
    const files = [
      await card.jpeg('HL_0412.jpg'),
      await card.jpeg('HL_0413.jpg', 600, 900),
      await card.file('notes.jpg', 'East front across the basin, dusk. '.repeat(40)),
      await card.file('.DS_Store', 'x'),
      await card.file('HL_0500.jpg', ''),
    ];
    await chooseFiles(visitor.page, files);
    await visitor.page.getByText('2 frames uploaded').waitFor();
    await tile(visitor, 'HL_0412').locator('img').waitFor();
    await tile(visitor, 'HL_0413').locator('img').waitFor();
    await visitor.page.getByText('1 failed · 2 left out').waitFor();
    await visitor.audit();

    await visitor.page.getByRole('button', { name: 'Show the files' }).click();
    const list = visitor.page.getByRole('group', { name: 'Files of this upload' });
    await list.getByText('The file is empty (0 bytes).').waitFor();
    const failed = list.getByRole('listitem').filter({ hasText: 'notes.jpg' });
    expect(await failed.innerText()).toMatch(/not a picture|no picture/i);
    await visitor.audit();
    expect(await frameNames(commissionId)).toEqual(['HL_0412.jpg', 'HL_0413.jpg']);
    await visitor.close();
  });

  it('recognises a file that is there already before it sends a byte', async () => {
    const { visitor, commissionId } = await openFrames();
    const file = await card.jpeg('HL_0601.jpg');
    await chooseFiles(visitor.page, [file]);
    await visitor.page.getByText('1 frame uploaded').waitFor();
    await visitor.page.reload();
    await tile(visitor, 'HL_0601').waitFor();
    const parts = notePart(visitor.page);
    const copy = path.join(card.dir, 'the same under another name.jpg');
    await copyFile(file, copy);
    await chooseFiles(visitor.page, [copy]);
    await visitor.page.getByText('1 already there').waitFor();
    expect(parts).toEqual([]);
    expect(await frameNames(commissionId)).toEqual(['HL_0601.jpg']);
    await visitor.close();
  });

  it('walks a dropped folder to the bottom', async () => {
    const { visitor, commissionId } = await openFrames();
    const folder = path.join(card.dir, 'card 1');
    await mkdir(path.join(folder, '100'), { recursive: true });
    await copyFile(await card.jpeg('a.jpg'), path.join(folder, 'HL_0701.jpg'));
    await copyFile(await card.jpeg('b.jpg'), path.join(folder, '100', 'HL_0702.jpg'));
    await drop(visitor, [folder]);
    await visitor.page.getByText('2 frames uploaded').waitFor();
    expect(await frameNames(commissionId)).toEqual(['HL_0701.jpg', 'HL_0702.jpg']);
    await visitor.close();
  });
});

/** Drops files of the disk onto the page, as a hand with a mouse would. */
async function drop({ page, context }: Visitor, files: string[]): Promise<void> {
  const devtools = await context.newCDPSession(page);
  const data = { items: [], files, dragOperationsMask: 1 };
  for (const type of ['dragEnter', 'dragOver', 'drop'] as const) {
    await devtools.send('Input.dispatchDragEvent', { type, x: 600, y: 500, data });
  }
}

describe('a long upload', () => {
  it('pauses and goes on', async () => {
    const { visitor, commissionId } = await openFrames();
    const { page } = visitor;
    const gate = holdParts(site.house, (number) => number > 1);
    await chooseFiles(page, [await card.largeTiff('HL_0801.tif')]);
    await soon(() => gate.held.length).toBe(2);
    await soon(() => partsThere(commissionId)).toEqual([1]);
    await page.getByRole('button', { name: 'Pause' }).click();
    await page.getByText('Upload paused').waitFor();
    await visitor.audit();
    gate.lose();
    const parts = notePart(page);
    await page.getByRole('button', { name: 'Continue' }).click();
    await page.getByText('1 frame uploaded').waitFor();
    expect(parts.sort()).toEqual([2, 3]);
    expect(await frameNames(commissionId)).toEqual(['HL_0801.tif']);
    await visitor.close();
  });

  it('warns before the page is left, and goes on after a reload with the parts that are missing', async () => {
    const { visitor, commissionId, address } = await openFrames();
    const { page } = visitor;
    const file = await card.largeTiff('HL_0802.tif');
    const gate = holdParts(site.house, (number) => number > 1);
    await chooseFiles(page, [file]);
    await soon(() => gate.held.length).toBe(2);
    await soon(() => partsThere(commissionId)).toEqual([1]);

    const warned: string[] = [];
    page.on('dialog', (dialog) => {
      warned.push(dialog.type());
      void dialog.accept();
    });
    await page.goto(site.house.address + address);
    expect(warned).toEqual(['beforeunload']);
    gate.lose();

    await page.getByText('1 frame of an earlier visit waits').waitFor();
    await visitor.audit();
    const parts = notePart(page);
    await page.getByRole('button', { name: 'Continue' }).click();
    await page.getByText('The browser cannot open the files by itself.').waitFor();
    await chooseFiles(page, [file]);
    await page.getByText('1 frame uploaded').waitFor();
    expect(parts.sort()).toEqual([2, 3]);
    expect(await frameNames(commissionId)).toEqual(['HL_0802.tif']);
    await visitor.close();
  });

  it('goes on when the server went away and came back', async () => {
    const { visitor, commissionId } = await openFrames();
    const { page } = visitor;
    visitor.expectErrors(/ERR_CONNECTION_REFUSED|ERR_CONNECTION_RESET|ERR_EMPTY_RESPONSE|ERR_FAILED|ERR_INCOMPLETE_CHUNKED_ENCODING/);
    const gate = holdParts(site.house, (number) => number > 1);
    await chooseFiles(page, [await card.largeTiff('HL_0803.tif')]);
    await soon(() => gate.held.length).toBe(2);
    await soon(() => partsThere(commissionId)).toEqual([1]);

    const port = Number(new URL(site.house.address).port);
    const { server } = site.house;
    server.closeAllConnections();
    await new Promise((resolve) => server.close(resolve));
    gate.lose();
    await page.getByText('The line is lost. Trying again.').first().waitFor();
    await page.getByText('1 waiting to retry').waitFor();
    const parts = notePart(page);
    await new Promise<void>((resolve) => server.listen(port, '127.0.0.1', resolve));
    await page.getByText('1 frame uploaded').waitFor();
    expect(new Set(parts)).toEqual(new Set([2, 3]));
    expect(await frameNames(commissionId)).toEqual(['HL_0803.tif']);
    await visitor.close();
  });

  it('never has more than four requests under way', async () => {
    const { visitor } = await openFrames();
    const files: string[] = [];
    for (let number = 0; number < 14; number += 1) files.push(await card.jpeg(`HL_09${String(number).padStart(2, '0')}.jpg`));
    const gate = holdParts(site.house, () => true);
    await chooseFiles(visitor.page, files);
    await soon(() => gate.held.length).toBe(4);
    await new Promise((resolve) => setTimeout(resolve, 500));
    expect(gate.held.length).toBe(4);
    gate.release();
    await visitor.page.getByText('14 frames uploaded').waitFor();
    await visitor.close();
  });
});

async function partsThere(commissionId: string): Promise<number[]> {
  const list = await studio.owner.agent.get(`/api/commissions/${commissionId}/uploads`).expect(200);
  const [upload] = (list.body as { items: { id: string }[] }).items;
  const one = await studio.owner.agent.get(`/api/uploads/${upload?.id}`).expect(200);
  return (one.body as { partsThere: number[] }).partsThere;
}
