import { describe, expect, it } from 'vitest';
import { arrangeBracket, type Exposed, middleFrame } from '../../api/domain/brackets/arrange.ts';
import { sayExposures } from '../../api/domain/brackets/say-exposures.ts';

const frame = (id: string, values: Partial<Exposed> = {}): Exposed => ({
  id,
  name: `${id}.jpg`,
  takenLocal: '2026-10-28T17:06:12',
  exposureTime: 1 / 60,
  fNumber: 11,
  iso: 100,
  ...values,
});
const ids = (frames: readonly Exposed[]) => frames.map(({ id }) => id);

describe('a bracket grouped by hand', () => {
  it('stands darkest first, with stops against its lead (APEX: a stop doubles the time)', () => {
    const frames = [frame('b', { exposureTime: 1 / 15 }), frame('c', { exposureTime: 1 / 4 }), frame('a', { exposureTime: 1 / 60 })];
    const bracket = arrangeBracket(frames, 'b');
    expect(ids(bracket.frames)).toEqual(['a', 'b', 'c']);
    expect(bracket.steps).toEqual([-2, 0, 2]);
    expect(bracket.says).toBe('3 frames, 2 stops apart, f/11, ISO 100');
  });

  it('counts aperture and sensitivity as well: f/8 and ISO 200 are two stops more than f/11 and ISO 100', () => {
    expect(arrangeBracket([frame('b', { fNumber: 8, iso: 200 }), frame('a')], 'a').steps).toEqual([0, 2]);
  });

  it('puts what nothing is known of last, in the order it was taken, and claims no steps for it', () => {
    const unknown = (id: string, takenLocal: string | null) => frame(id, { exposureTime: null, fNumber: null, iso: null, takenLocal });
    const bracket = arrangeBracket([unknown('late', null), unknown('early', '2026-10-28T17:00:00'), frame('known')], 'known');
    expect(ids(bracket.frames)).toEqual(['known', 'early', 'late']);
    expect(bracket.steps).toEqual([0, null, null]);
    expect(arrangeBracket([unknown('one', null), unknown('two', null)], 'one')).toMatchObject({ steps: [null, null], says: '2 frames' });
  });

  it('is led by the exposure in the middle, of two the one taken first', () => {
    const dark = frame('dark', { exposureTime: 1 / 250, takenLocal: '2026-10-28T17:06:13' });
    const light = frame('light', { exposureTime: 1 / 15 });
    expect(middleFrame([light, dark, frame('middle')]).id).toBe('middle');
    expect(middleFrame([dark, light]).id).toBe('light');
  });
});

it('says what a proof is made of', () => {
  expect(sayExposures(5, { merged: true, leftOut: 0 })).toBe('5 exposures merged');
  expect(sayExposures(5, { merged: true, leftOut: 1 })).toBe('4 of 5 exposures merged');
  expect(sayExposures(5, { merged: false, leftOut: 0 })).toBe('1 of 5 exposures');
});
