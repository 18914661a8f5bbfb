import { execFileSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import sharp from 'sharp';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { createPixels, PixelsFailure, type Pixels } from '../../api/imaging/pixels/pixels.ts';
import { Refusal } from '../../api/imaging/refusal.ts';
import { writeTags } from '../support/exiftool.ts';
import { photograph } from '../support/photograph.ts';

const folder = mkdtempSync(path.join(tmpdir(), 'oriel-pixels-'));
const good = path.join(folder, 'good.jpg');
const broken = path.join(folder, 'broken.jpg');
const slow = path.join(folder, 'slow.tif');
const running: Pixels[] = [];

function start(options: Partial<Parameters<typeof createPixels>[0]> = {}): Pixels {
  const pixels = createPixels({ processes: 1, timeoutSeconds: 100, maxPixels: 300e6, ...options });
  running.push(pixels);
  return pixels;
}

/** Children of this very process that run the pool's program. */
function children(): number[] {
  const lines = execFileSync('ps', ['-o', 'pid=,args=', '--ppid', String(process.pid)])
    .toString()
    .split('\n');
  return lines.filter((line) => line.includes('pixels/child.ts')).map((line) => Number.parseInt(line, 10));
}

beforeAll(async () => {
  const bytes = await photograph(1500, 1000).jpeg().toBuffer();
  writeFileSync(good, bytes);
  writeFileSync(broken, bytes.subarray(0, bytes.length / 2));
  await writeTags(good, '-n', '-FNumber=8', '-ISO=100', '-IFD0:Orientation=6', '-DateTimeOriginal=2026:10:28 17:06:12');
  // Deflate of many pixels takes far longer to read than the time that the test below allows.
  await sharp({ create: { width: 14000, height: 14000, channels: 3, background: '#456' } })
    .tiff({ compression: 'deflate' })
    .toFile(slow);
}, 120_000);
afterEach(async () => {
  for (const pixels of running.splice(0)) await pixels.stop();
});
afterAll(() => rmSync(folder, { recursive: true, force: true }));

describe('the pool', () => {
  it('takes a file apart in a child and gives plain data and buffers back', async () => {
    const { judged, settings, width, height, pictures, placeholder } = await start().prepare(good);
    expect(judged).toMatchObject({ kind: 'jpeg', width: 1500, height: 1000, orientation: 6 });
    expect({ width, height }).toEqual({ width: 1000, height: 1500 });
    expect(settings).toMatchObject({ fNumber: 8, iso: 100, takenLocal: '2026-10-28T17:06:12' });
    expect(pictures.map(({ size }) => size)).toEqual([480, 960, 2560]);
    for (const { data } of pictures) expect(Buffer.isBuffer(data)).toBe(true);
    expect(placeholder.length).toBeGreaterThan(10);
  });

  it('judges, marks and makes the web size', async () => {
    const pixels = start();
    expect(await pixels.judge(good)).toMatchObject({ judged: { kind: 'jpeg' }, width: 1000, height: 1500 });
    const [picture] = await pixels.watermark(
      (await pixels.prepare(good)).pictures[2]?.data ?? Buffer.alloc(0),
      { kind: 'text', text: 'Harrow Lane', opacity: 0.4, size: 0.3, tiled: true },
      null,
      [960],
    );
    expect(picture).toMatchObject({ size: 960, width: 640, height: 960 });
    expect(await pixels.webSize(good)).toMatchObject({ width: 1000, height: 1500 });
    const png = await sharp({ create: { width: 9, height: 9, channels: 4, background: '#fff' } })
      .png()
      .toBuffer();
    expect(await pixels.cleanWatermark(png)).toMatchObject({ width: 9, height: 9 });
  });

  it('refuses a broken picture with its sentence, and goes on with the next', async () => {
    const pixels = start();
    const [first, second, third] = await Promise.allSettled([pixels.prepare(broken), pixels.prepare(good), pixels.prepare(broken)]);
    expect(second.status).toBe('fulfilled');
    for (const outcome of [first, third]) {
      const reason: unknown = outcome.status === 'rejected' ? outcome.reason : undefined;
      expect(reason).toBeInstanceOf(Refusal);
      expect(reason).toMatchObject({ code: 'damaged', message: expect.stringContaining('cut short') });
    }
  });

  it('holds to the limit of pixels', async () => {
    await expect(start({ maxPixels: 1e6 }).prepare(good)).rejects.toMatchObject({ code: 'too-many-pixels' });
  });

  it('gives an error, not a refusal, where the file is not there', async () => {
    const outcome = await start()
      .prepare(path.join(folder, 'nowhere'))
      .catch((error: unknown) => error);
    expect(outcome).toBeInstanceOf(Error);
    expect(outcome).not.toBeInstanceOf(Refusal);
  });

  it('survives a child that is killed: that call fails, the next finds a new child', async () => {
    const pixels = start();
    await pixels.judge(good);
    const [pid] = children();
    const call = pixels.prepare(slow).catch((error: unknown) => error);
    await new Promise((resolve) => setTimeout(resolve, 300));
    process.kill(pid ?? 0, 'SIGKILL');
    expect(await call).toBeInstanceOf(PixelsFailure);
    expect((await pixels.prepare(good)).width).toBe(1000);
    expect(children()).not.toContain(pid);
  });

  it('ends a call that takes too long, with its child, and finds a new one', async () => {
    const pixels = start({ timeoutSeconds: 10 });
    await pixels.judge(good);
    const [pid] = children();
    const call = pixels.prepare(slow).catch((error: unknown) => error);
    await new Promise((resolve) => setTimeout(resolve, 500));
    // A child stopped in the middle never answers, whatever the machine's speed, and hears no polite signal.
    process.kill(pid ?? 0, 'SIGSTOP');
    const outcome = await call;
    expect(outcome).toBeInstanceOf(PixelsFailure);
    expect((outcome as Error).message).toContain('longer than 10 s');
    expect(await pixels.judge(good)).toMatchObject({ width: 1000 });
    expect(children()).not.toContain(pid);
  }, 120_000);

  it('tells its children none of the secrets around them', async () => {
    const pixels = start();
    await pixels.judge(good);
    const [pid] = children();
    const environment = execFileSync('cat', [`/proc/${pid}/environ`]).toString();
    expect(process.env.PATH).toBeDefined();
    expect(environment).not.toContain('PATH=');
    expect(
      environment
        .split('\0')
        .filter(Boolean)
        .map((line) => line.split('=')[0])
        .sort(),
    ).toEqual(expect.arrayContaining(['MALLOC_ARENA_MAX', 'NODE_CHANNEL_FD']));
  });

  it('leaves no child behind', async () => {
    const pixels = start({ processes: 2 });
    await Promise.all([pixels.judge(good), pixels.judge(good)]);
    expect(children().length).toBeGreaterThan(0);
    await pixels.stop();
    await new Promise((resolve) => setTimeout(resolve, 200));
    expect(children()).toEqual([]);
  });
});
