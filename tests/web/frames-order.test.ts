import { describe, expect, it } from 'vitest';
import { arrange, type FrameWish } from '../../web/src/features/frames/frame-order.ts';
import { frame } from './frames-support.ts';

const WISH: FrameWish = { sort: 'taken', descending: false, shown: 'visible', group: 'all', view: '', text: '' };

const DUSK = frame('HL_0412', { takenLocal: '2026-10-28T17:06:12.34', fNumber: 11, exposureTime: 0.25, iso: 100, focalLength: 35 });
const LATER = frame('HL_0413', { takenLocal: '2026-10-28T17:06:12.9', fNumber: 8, exposureTime: 1 / 125, iso: 1000, focalLength: 24 });
const BARE = frame('HL_0009');
const HIDDEN = frame('HL_0500', { hidden: true, takenLocal: '2026-10-28T12:00:00' });
const FAILED = frame('HL_0501', { state: 'failed', problem: 'The file ends early.' });
const ALL = [LATER, BARE, DUSK, HIDDEN, FAILED];

const ids = (wish: Partial<FrameWish>, frames = ALL) => arrange(frames, { ...WISH, ...wish }).map((one) => one.id);

describe('the order of frames', () => {
  it('is by time to the hundredth of a second, unknown times last', () => {
    expect(ids({})).toEqual(['HL_0412', 'HL_0413', 'HL_0009', 'HL_0501']);
  });

  it('keeps what is unknown last when it is turned round', () => {
    expect(ids({ descending: true })).toEqual(['HL_0413', 'HL_0412', 'HL_0009', 'HL_0501']);
    expect(ids({ sort: 'f-number', descending: true })).toEqual(['HL_0412', 'HL_0413', 'HL_0009', 'HL_0501']);
  });

  it('counts numbers in names as numbers', () => {
    const frames = ['HL_10', 'HL_9', 'HL_0100'].map((name) => frame(name));
    expect(ids({ sort: 'name' }, frames)).toEqual(['HL_9', 'HL_10', 'HL_0100']);
    expect(ids({ sort: 'name', descending: true }, frames)).toEqual(['HL_0100', 'HL_10', 'HL_9']);
  });

  it('goes by each setting', () => {
    const two = [DUSK, LATER];
    expect(ids({ sort: 'f-number' }, two)).toEqual(['HL_0413', 'HL_0412']);
    expect(ids({ sort: 'exposure-time' }, two)).toEqual(['HL_0413', 'HL_0412']);
    expect(ids({ sort: 'iso' }, two)).toEqual(['HL_0412', 'HL_0413']);
    expect(ids({ sort: 'focal-length' }, two)).toEqual(['HL_0413', 'HL_0412']);
  });
});

describe('which frames are shown', () => {
  it('hidden ones only when asked for, failed ones alone when asked for', () => {
    expect(ids({ shown: 'hidden' })).toEqual(['HL_0500']);
    expect(ids({ shown: 'failed' })).toEqual(['HL_0501']);
  });

  it('by view, or those under none', () => {
    const hung = frame('HL_0700', { viewId: 'v1' });
    expect(ids({ view: 'v1' }, [...ALL, hung])).toEqual(['HL_0700']);
    expect(ids({ view: 'none' }, [BARE, hung])).toEqual(['HL_0009']);
  });

  it('by words of the name, the settings and the time; every word must fit', () => {
    expect(ids({ text: '0412' })).toEqual(['HL_0412']);
    expect(ids({ text: 'f/8' })).toEqual(['HL_0413']);
    expect(ids({ text: '1/125 f/8' })).toEqual(['HL_0413']);
    expect(ids({ text: '1/125 f/11' })).toEqual([]);
    expect(ids({ text: 'iso 100' })).toEqual(['HL_0412']);
    expect(ids({ text: '35mm' })).toEqual(['HL_0412']);
    expect(ids({ text: '28 Oct 17:06' })).toEqual(['HL_0412', 'HL_0413']);
    expect(ids({ text: '17:06:12.9' })).toEqual(['HL_0413']);
    expect(ids({ text: '2026-10-28' })).toEqual(['HL_0412', 'HL_0413']);
  });
});
