import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { matchFinal, type MatchablePick } from '../../api/domain/match-finals.ts';

function pick(id: string, name: string, ...taken: string[]): MatchablePick {
  return { id, names: [name], taken };
}

const final = (name: string, taken: string | null = null) => ({ name, taken });

const SET = [
  pick('one', 'IMG_0412.jpg', '2026-11-14 16:12:03.25'),
  pick('two', 'IMG_0413.jpg', '2026-11-14 16:12:09.50'),
  pick('long', 'IMG_04123.jpg', '2026-11-14 17:00:00'),
];

describe('a final is matched to its pick', () => {
  it.each([
    ['IMG_0412.jpg', 'one'],
    ['IMG_0412_final-v2.tif', 'one'],
    ['img_0412.TIFF', 'one'],
    ['IMG-0412 edit.jpg', 'one'],
    ['IMG_0412b.jpg', 'one'],
    ['Vessmouth_IMG_0413_print.tif', 'two'],
    ['IMG_04123_final.tif', 'long'],
    ['IMG_0412 (2).jpg', 'one'],
    ['2026-12-01 IMG_0413.jpg', 'two'],
  ])('%s', (name, id) => {
    expect(matchFinal(final(name), SET)).toEqual({ kind: 'matched', pickId: id });
  });

  it('by the longest stem where one name contains the other', () => {
    const picks = [pick('plain', 'IMG_0412.jpg'), pick('second', 'IMG_0412-2.jpg')];
    expect(matchFinal(final('IMG_0412-2_final.tif'), picks)).toEqual({ kind: 'matched', pickId: 'second' });
    expect(matchFinal(final('IMG_0412_final.tif'), picks)).toEqual({ kind: 'matched', pickId: 'plain' });
  });

  it('by its time where two cameras gave the same name', () => {
    const picks = [pick('a', 'IMG_0412.jpg', '2026-11-14 16:12:03'), pick('b', 'IMG_0412.JPG', '2026-11-15 09:00:00')];
    expect(matchFinal(final('IMG_0412_final.tif', '2026-11-15 09:00:00.4'), picks)).toEqual({ kind: 'matched', pickId: 'b' });
  });

  it('by any frame of a bracket', () => {
    const bracket = {
      id: 'b',
      names: ['HL_0871.jpg', 'HL_0872.jpg', 'HL_0873.jpg'],
      taken: ['2026-11-14 16:12:03', '2026-11-14 16:12:07'],
    };
    expect(matchFinal(final('HL_0872-merged.tif', '2026-11-14 16:12:07'), [bracket])).toEqual({ kind: 'matched', pickId: 'b' });
  });

  it('by a short name only when it is the very same', () => {
    const picks = [pick('a', '1.jpg'), pick('b', '2.jpg')];
    expect(matchFinal(final('1.tif'), picks)).toEqual({ kind: 'matched', pickId: 'a' });
    expect(matchFinal(final('1_final.tif'), picks)).toEqual({ kind: 'ask', doubt: 'weak-name', candidates: ['a'] });
  });
});

describe('what is unsure is asked', () => {
  it('where two picks fit equally well', () => {
    const picks = [pick('a', 'IMG_0412.jpg'), pick('b', 'IMG_0412.jpg')];
    expect(matchFinal(final('IMG_0412.tif'), picks)).toEqual({ kind: 'ask', doubt: 'several', candidates: ['a', 'b'] });
  });

  it('where two picks stand in one name', () => {
    expect(matchFinal(final('IMG_0412_IMG_0413_pano.tif'), SET)).toMatchObject({
      kind: 'ask',
      doubt: 'several',
      candidates: ['one', 'two'],
    });
  });

  it('where one of two equal names has no time to decide by', () => {
    const picks = [pick('a', 'IMG_0412.jpg', '2026-11-14 16:12:03'), pick('b', 'IMG_0412.jpg')];
    expect(matchFinal(final('IMG_0412.tif', '2026-11-14 16:12:03'), picks)).toMatchObject({ doubt: 'several', candidates: ['a', 'b'] });
  });

  it('where the time contradicts the name', () => {
    expect(matchFinal(final('IMG_0412_final.tif', '2026-11-14 16:12:09'), SET)).toEqual({
      kind: 'ask',
      doubt: 'time-contradicts',
      candidates: ['one', 'two'],
    });
  });

  it('where only the number is common', () => {
    expect(matchFinal(final('Library 0412.tif'), SET)).toEqual({ kind: 'ask', doubt: 'weak-name', candidates: ['one'] });
  });

  it('where only the time is common', () => {
    expect(matchFinal(final('reading-room.tif', '2026-11-14 16:12:03'), SET)).toEqual({
      kind: 'ask',
      doubt: 'time-only',
      candidates: ['one'],
    });
  });

  it('where a word of a name is a word of every final', () => {
    expect(matchFinal(final('IMG_9999_final.tif'), [pick('a', 'final.jpg')])).toMatchObject({ kind: 'ask', doubt: 'weak-name' });
  });

  it('where nothing is alike', () => {
    expect(matchFinal(final('IMG_0499_final.tif'), SET)).toEqual({ kind: 'ask', doubt: 'nothing-alike', candidates: [] });
    expect(matchFinal(final('IMG_0412.tif'), [])).toEqual({ kind: 'ask', doubt: 'nothing-alike', candidates: [] });
  });
});

describe('for any set of numbered frames', () => {
  const numbers = fc.uniqueArray(fc.integer({ min: 0, max: 9999 }), { minLength: 1, maxLength: 40 });
  const ending = fc.constantFrom('', '_final', '-v2', ' edit 2', ' (1)', 'b', '_web.final');
  const prefix = fc.constantFrom('IMG_', 'HL', 'Ropewalk Library ', 'DSC-');
  const frame = (start: string, number: number) => `${start}${String(number).padStart(4, '0')}`;

  it('finds the one it was made from, or asks; never another', () => {
    fc.assert(
      fc.property(numbers, prefix, ending, fc.nat(), (all, start, end, seed) => {
        const picks = all.map((number) => pick(String(number), `${frame(start, number)}.jpg`));
        const source = all[seed % all.length] ?? 0;
        const match = matchFinal(final(`${frame(start, source)}${end}.tif`), picks);
        expect(match).toEqual({ kind: 'matched', pickId: String(source) });
      }),
      { numRuns: 500 },
    );
  });

  it('matches nothing to a frame that was not picked', () => {
    fc.assert(
      fc.property(numbers, prefix, ending, (all, start, end) => {
        const [source = 0, ...others] = all;
        const picks = others.map((number) => pick(String(number), `${frame(start, number)}.jpg`));
        expect(matchFinal(final(`${frame(start, source)}${end}.tif`), picks).kind).toBe('ask');
      }),
      { numRuns: 500 },
    );
  });

  it('does not depend on the order of the picks', () => {
    fc.assert(
      fc.property(
        fc.shuffledSubarray(SET, { minLength: 3 }),
        fc.constantFrom('IMG_0412_x.tif', '0412.tif', 'IMG_04123.tif'),
        (picks, name) => {
          expect(matchFinal(final(name), picks)).toEqual(matchFinal(final(name), SET));
        },
      ),
    );
  });
});
