import { describe, expect, it } from 'vitest';
import { secondsLeft, SpeedMeter } from '../../web/src/lib/uploads/speed.ts';
import { fileOf, startQueue } from './uploads-support.ts';

describe('speed and time left', () => {
  it('is the mean of the last twelve seconds', () => {
    const meter = new SpeedMeter();
    meter.add(0, 1_000_000);
    expect(meter.perSecond(900)).toBeUndefined();
    expect(meter.perSecond(2_000)).toBe(500_000);
    for (let second = 1; second <= 30; second += 1) meter.add(second * 1000, 2_000_000);
    expect(meter.perSecond(30_000)).toBe(2_000_000);
    expect(meter.perSecond(36_000)).toBe(1_000_000);
    expect(meter.perSecond(43_000)).toBe(0);
  });

  it('starts anew after a pause', () => {
    const meter = new SpeedMeter();
    meter.add(0, 9_000_000);
    meter.clear();
    meter.add(100_000, 1_000);
    expect(meter.perSecond(100_500)).toBeUndefined();
    expect(meter.perSecond(101_000)).toBe(1_000);
  });

  it('tells the time left, and nothing where nothing moves', () => {
    expect(secondsLeft(3_100_000_000, 8_600_000)).toBeCloseTo(360.5, 1);
    expect(secondsLeft(0, undefined)).toBe(0);
    expect(secondsLeft(10, 0)).toBeUndefined();
    expect(secondsLeft(10, undefined)).toBeUndefined();
  });
});

describe('totals', () => {
  it('add up counts and bytes while parts are on their way', async () => {
    const { queue, server, clock } = startQueue();
    server.takes = 1000;
    queue.add([fileOf('HL_1.jpg', 40), fileOf('HL_2.jpg', 25), fileOf('.hidden', 5)]);
    await clock.pass(2_600);
    queue.store.flush();
    const totals = queue.store.totals();
    expect(totals).toMatchObject({ files: 2, bytes: 65, running: true, paused: false });
    // The offers take a second, the first four parts of 10 bytes another; of the last three (10, 10 and 5 bytes), half
    // is reported after half a second.
    expect(totals.sent).toBe(40 + 5 + 5 + 2);
    expect(totals.counts).toMatchObject({ sending: 2, 'left-out': 1 });
    await clock.pass(60_000);
    expect(queue.store.totals()).toMatchObject({ sent: 65, running: false, secondsLeft: 0 });
  });

  it('leave a failed file out of the time left', async () => {
    const { queue, server, clock } = startQueue();
    server.verdict = () => 'Not a picture.';
    queue.add([fileOf('HL_1.jpg', 40)]);
    await clock.pass(10_000);
    expect(queue.store.totals()).toMatchObject({ secondsLeft: 0, running: false, files: 1 });
    expect(queue.store.totals().counts.failed).toBe(1);
  });
});

describe('the store', () => {
  it('tells at most four times a second, and makes new objects only for files that changed', async () => {
    const { queue, clock } = startQueue();
    let told = 0;
    queue.store.subscribe(() => (told += 1));
    queue.add(Array.from({ length: 5_000 }, (_, at) => fileOf(`HL_${String(at).padStart(4, '0')}.jpg`, 20)));
    await clock.pass(250);
    const ids = queue.store.ids();
    const last = ids.at(-1) ?? '';
    const view = queue.store.view(last);
    expect([ids.length, view?.state]).toEqual([5_000, 'waiting']);
    await clock.pass(5_000);
    expect(told).toBeLessThanOrEqual(21);
    expect(queue.store.totals().counts.done).toBeGreaterThan(50);
    expect(queue.store.ids()).toBe(ids);
    expect(queue.store.view(last)).toBe(view);
    expect(queue.store.view(ids[0] ?? '')?.state).toBe('done');
  });

  it('keeps what is known of the next files few: reading never runs far ahead of sending', async () => {
    const { queue, server, clock, files } = startQueue();
    server.takes = 100_000;
    queue.add(Array.from({ length: 200 }, (_, at) => fileOf(`HL_${at}.jpg`, 20)));
    await clock.pass(5_000);
    const untouched = files().filter((file) => file.state === 'waiting').length;
    expect(untouched).toBeGreaterThan(170);
  });
});
