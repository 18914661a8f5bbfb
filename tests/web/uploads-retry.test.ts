import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { retryAfterMs, waitAfter } from '../../web/src/lib/uploads/back-off.ts';
import { TransportProblem } from '../../web/src/lib/uploads/transport.ts';
import { fileOf, startQueue } from './uploads-support.ts';

describe('how long to wait', () => {
  it('doubles from one second to thirty, the upper half left to chance', () => {
    expect([1, 2, 3, 4, 5, 6, 20].map((failures) => waitAfter(failures, undefined, 0))).toEqual([
      500, 1000, 2000, 4000, 8000, 15000, 15000,
    ]);
    expect([1, 2, 6].map((failures) => waitAfter(failures, undefined, 0.9999))).toEqual([1000, 2000, 29999]);
  });

  it('never undercuts what the server asks for, and never waits longer than five minutes', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 40 }),
        fc.nat(10_000_000),
        fc.double({ min: 0, max: 0.999, noNaN: true }),
        (failures, wish, chance) => {
          const wait = waitAfter(failures, wish, chance);
          expect(wait).toBeGreaterThanOrEqual(Math.min(wish, 300_000));
          expect(wait).toBeLessThanOrEqual(300_000);
        },
      ),
    );
  });

  // RFC 9110 10.2.3 has both forms and these two examples (the date's zone is always GMT).
  it('reads Retry-After as seconds and as a date', () => {
    expect(retryAfterMs('120', 0)).toBe(120_000);
    const now = Date.UTC(1999, 11, 31, 23, 59, 0);
    expect(retryAfterMs('Fri, 31 Dec 1999 23:59:59 GMT', now)).toBe(59_000);
    expect(retryAfterMs('Fri, 31 Dec 1999 23:59:59 GMT', now + 120_000)).toBe(0);
    for (const nonsense of [null, '', 'soon']) expect(retryAfterMs(nonsense, 0)).toBeUndefined();
  });
});

describe('a lost line', () => {
  const lost = new TransportProblem('line', 'The line is lost.');

  it('waits longer and longer, tries with one request, and then goes on with four', async () => {
    const { queue, server, clock, states } = startQueue();
    queue.add(Array.from({ length: 6 }, (_, at) => fileOf(`HL_${at}.jpg`, 100)));
    await clock.pass(100);
    server.trouble = () => lost;
    await clock.pass(1_000);
    const before = server.calls.length;
    server.most = 0;
    await clock.pass(60_000);
    expect(server.most).toBe(1);
    // 1, 2, 4, 8, 16, 30 s, each cut by a quarter by the chance of 0.5.
    expect(server.calls.length - before).toBe(5);
    expect(queue.store.totals()).toMatchObject({ problem: 'The line is lost.', running: true });
    expect(queue.store.totals().counts.retrying).toBeGreaterThan(0);
    server.trouble = () => undefined;
    server.most = 0;
    await clock.pass(60_000);
    expect(server.most).toBe(4);
    expect(new Set(Object.values(states()))).toEqual(new Set(['done']));
    expect(queue.store.totals().problem).toBeUndefined();
  });

  it('asks again which parts are there, and does not send those twice', async () => {
    const { queue, server, clock, states } = startQueue();
    let broken = false;
    server.trouble = (call, detail) => {
      if (call !== 'part' || detail !== 'HL_1.tif 3' || broken) return undefined;
      broken = true;
      // The part arrived, only the answer was lost.
      server.uploads.get('up-1')?.parts.set(3, 10);
      return lost;
    };
    queue.add([fileOf('HL_1.tif', 60)]);
    await clock.pass(30_000);
    expect(states()).toEqual({ 'HL_1.tif': 'done' });
    expect(server.calls.filter((call) => call === 'offer HL_1.tif')).toHaveLength(2);
    expect(server.calls.filter((call) => call === 'part HL_1.tif 3')).toHaveLength(1);
  });

  it('sends everything again when the server forgot the upload', async () => {
    const { queue, server, clock, states } = startQueue();
    queue.add([fileOf('HL_1.tif', 200)]);
    await clock.pass(70);
    server.uploads.clear();
    await clock.pass(60_000);
    expect(states()).toEqual({ 'HL_1.tif': 'done' });
    expect([...(server.uploads.values().next().value?.parts.keys() ?? [])]).toHaveLength(20);
  });

  it('does not send a file again that was complete when the answer got lost', async () => {
    const { queue, server, clock, states } = startQueue();
    let broken = false;
    server.trouble = (call) => {
      const held = server.uploads.get('up-1');
      if (call !== 'complete' || broken || !held) return undefined;
      broken = true;
      held.state = 'checking';
      return lost;
    };
    queue.add([fileOf('HL_1.tif', 20)]);
    await clock.pass(30_000);
    expect(states()).toEqual({ 'HL_1.tif': 'done' });
    expect(server.calls.filter((call) => call.startsWith('part'))).toHaveLength(2);
    expect(server.calls.filter((call) => call.startsWith('complete'))).toHaveLength(1);
  });

  it('waits as long as a busy server asks', async () => {
    const { queue, server, clock, states } = startQueue();
    server.trouble = () => new TransportProblem('busy', 'Please wait.', 90_000);
    queue.add([fileOf('HL_1.jpg', 10)]);
    await clock.pass(100);
    server.trouble = () => undefined;
    await clock.pass(89_000);
    expect(server.calls).toEqual(['offer HL_1.jpg']);
    await clock.pass(10_000);
    expect(states()).toEqual({ 'HL_1.jpg': 'done' });
  });

  it('sends nothing while the browser says that there is no network, and at once when it is back', async () => {
    const { queue, server, clock, states } = startQueue();
    queue.setOnline(false);
    queue.add([fileOf('HL_1.jpg', 10)]);
    await clock.pass(120_000);
    expect(server.calls).toEqual([]);
    expect(queue.store.totals().problem).toMatch(/no network/);
    queue.setOnline(true);
    await clock.pass(1_000);
    expect(states()).toEqual({ 'HL_1.jpg': 'done' });
  });

  it('asks for the checks again after the line was lost meanwhile', async () => {
    const { queue, server, clock, states } = startQueue();
    server.trouble = (call) => (call === 'check' ? lost : undefined);
    queue.add([fileOf('HL_1.jpg', 10)]);
    await clock.pass(20_000);
    expect(states()).toEqual({ 'HL_1.jpg': 'checking' });
    server.trouble = () => undefined;
    await clock.pass(40_000);
    expect(states()).toEqual({ 'HL_1.jpg': 'done' });
  });
});
