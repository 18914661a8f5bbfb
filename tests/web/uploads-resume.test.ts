import { describe, expect, it } from 'vitest';
import type { FoundFile } from '../../web/src/lib/uploads/found-file.ts';
import { fileOf, HandClock, MemoryServer, MemoryShelf, plainHasher, startQueue } from './uploads-support.ts';

/** A handle as the browser keeps it: it needs a permission before it opens. */
function handleOf(found: FoundFile, permission: { state: PermissionState; asked: number }): FileSystemFileHandle {
  const handle = {
    kind: 'file',
    name: found.file.name,
    queryPermission: () => Promise.resolve(permission.state),
    requestPermission: () => {
      permission.asked += 1;
      permission.state = 'granted';
      return Promise.resolve('granted');
    },
    getFile: () => Promise.resolve(found.file),
  };
  return handle as unknown as FileSystemFileHandle;
}

/** A visit that is cut off in the middle of a file of 30 parts, with another file waiting behind it. */
async function cutOff(found: FoundFile[]) {
  const clock = new HandClock();
  const server = new MemoryServer(clock);
  const shelf = new MemoryShelf();
  const first = startQueue({ clock, server, shelf });
  first.queue.add(found);
  await clock.pass(90);
  first.queue.pause();
  const there = [...(server.uploads.get('up-1')?.parts.keys() ?? [])];
  expect(there.length).toBeGreaterThan(0);
  server.calls.length = 0;
  return { clock, server, shelf, there };
}

describe('after a reload', () => {
  it('keeps what is unfinished, and nothing of what is done', async () => {
    const { queue, clock, server, shelf } = startQueue();
    server.known.add(`sum of ${await fileOf('known.jpg', 30).file.text()}`);
    queue.add([fileOf('HL_1.jpg', 30), fileOf('known.jpg', 30), fileOf('.hidden', 30)]);
    await clock.pass(10);
    expect([...shelf.files.values()].map((file) => file.name)).toEqual(['HL_1.jpg', 'known.jpg']);
    await clock.pass(10_000);
    expect(shelf.files.size).toBe(0);
  });

  it('asks for the same files, recognises them, does not read them again and sends the parts that are missing', async () => {
    const { clock, server, shelf, there } = await cutOff([fileOf('HL_1.tif', 300, 'card/'), fileOf('HL_2.tif', 20, 'card/')]);
    let sums = 0;
    const hasher = { width: 2, sum: (file: Blob, signal: AbortSignal) => ((sums += 1), plainHasher.sum(file, signal)) };
    const { queue, states } = startQueue({ clock, server, shelf, hasher });
    await queue.restore();
    expect(states()).toEqual({ 'card/HL_1.tif': 'held', 'card/HL_2.tif': 'held' });
    await clock.pass(60_000);
    expect(server.calls).toEqual([]);

    queue.add([fileOf('HL_1.tif', 300), fileOf('HL_2.tif', 20), fileOf('HL_3.tif', 20)]);
    await clock.pass(60_000);
    expect(states()).toEqual({ 'card/HL_1.tif': 'done', 'card/HL_2.tif': 'done', 'HL_3.tif': 'done' });
    for (const number of there) expect(server.calls).not.toContain(`part HL_1.tif ${number}`);
    expect(sums).toBe(1);
    expect(shelf.files.size).toBe(0);
  });

  it('does not list a file twice that was dropped again before the earlier visit was read', async () => {
    const { clock, server, shelf, there } = await cutOff([fileOf('HL_1.tif', 300)]);
    const { queue, states } = startQueue({ clock, server, shelf });
    queue.add([fileOf('HL_1.tif', 300, 'again/')]);
    await queue.restore();
    await clock.pass(60_000);
    expect(states()).toEqual({ 'again/HL_1.tif': 'done' });
    for (const number of there) expect(server.calls).not.toContain(`part HL_1.tif ${number}`);
    expect(shelf.files.size).toBe(0);
  });

  it('does not take another file of the same name for the one it waits for', async () => {
    const { clock, server, shelf } = await cutOff([fileOf('HL_1.tif', 300)]);
    const { queue, files } = startQueue({ clock, server, shelf });
    await queue.restore();
    queue.add([fileOf('HL_1.tif', 290)]);
    await clock.pass(60_000);
    expect(files().map((file) => [file.size, file.state])).toEqual([
      [300, 'held'],
      [290, 'done'],
    ]);
  });

  it('goes on by itself where the browser still allows to open the files', async () => {
    const found = fileOf('HL_1.tif', 300);
    found.handle = handleOf(found, { state: 'granted', asked: 0 });
    const { clock, server, shelf } = await cutOff([found]);
    const { queue, states } = startQueue({ clock, server, shelf });
    await queue.restore();
    await clock.pass(60_000);
    expect(states()).toEqual({ 'HL_1.tif': 'done' });
  });

  it('asks for permission only when the person continues', async () => {
    const permission = { state: 'prompt' as PermissionState, asked: 0 };
    const found = fileOf('HL_1.tif', 300);
    found.handle = handleOf(found, permission);
    const { clock, server, shelf } = await cutOff([found]);
    const { queue, states } = startQueue({ clock, server, shelf });
    await queue.restore();
    await clock.pass(1_000);
    expect([states()['HL_1.tif'], permission.asked]).toEqual(['held', 0]);
    await queue.continueHeld();
    await clock.pass(60_000);
    expect([states()['HL_1.tif'], permission.asked]).toEqual(['done', 1]);
  });

  it('keeps waiting for a file that changed on the disk', async () => {
    const found = fileOf('HL_1.tif', 300);
    const changed = { file: new File(['x'], 'HL_1.tif'), path: 'HL_1.tif' };
    found.handle = handleOf(changed, { state: 'granted', asked: 0 });
    const { clock, server, shelf } = await cutOff([found]);
    const { queue, states } = startQueue({ clock, server, shelf });
    await queue.restore();
    await clock.pass(1_000);
    expect(states()).toEqual({ 'HL_1.tif': 'held' });
  });

  it('still says why a file failed', async () => {
    const clock = new HandClock();
    const server = new MemoryServer(clock);
    const shelf = new MemoryShelf();
    server.verdict = () => 'Not a picture.';
    const first = startQueue({ clock, server, shelf });
    first.queue.add([fileOf('HL_1.jpg', 10)]);
    await clock.pass(5_000);
    const { queue, fileNamed } = startQueue({ clock, server, shelf });
    await queue.restore();
    expect(fileNamed('HL_1.jpg')).toMatchObject({ state: 'failed', problem: 'Not a picture.' });
    queue.retry(fileNamed('HL_1.jpg').id);
    expect(fileNamed('HL_1.jpg').state).toBe('held');
  });

  it('forgets what the person gives up, here and on the server', async () => {
    const { clock, server, shelf } = await cutOff([fileOf('HL_1.tif', 300)]);
    const { queue, files } = startQueue({ clock, server, shelf });
    await queue.restore();
    queue.cancelAll();
    await clock.pass(100);
    expect([files(), shelf.files.size]).toEqual([[], 0]);
    expect(server.calls).toEqual(['abandon up-1']);
  });
});
