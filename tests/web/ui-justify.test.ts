import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { justify, stack } from '../../web/src/ui/justify.ts';

const landscape = { width: 6000, height: 4000 };
const portrait = { width: 4000, height: 6000 };
const panorama = { width: 12_000, height: 2400 };
const options = { width: 1000, rowHeight: 220, gap: 10 };

const pictures = fc.array(fc.record({ width: fc.integer({ min: 200, max: 12_000 }), height: fc.integer({ min: 200, max: 12_000 }) }), {
  maxLength: 60,
});

describe('justified rows', () => {
  it('gives no rows for no pictures', () => {
    expect(justify([], options)).toEqual([]);
  });

  it('fills the width exactly with full rows', () => {
    const rows = justify([landscape, landscape, landscape, portrait, landscape, landscape], options);
    const full = rows[0];
    expect(full && full.widths.reduce((sum, width) => sum + width, 0) + 10 * (full.widths.length - 1)).toBeCloseTo(1000, 6);
  });

  it('does not stretch the last row', () => {
    const rows = justify([landscape], options);
    expect(rows).toEqual([{ first: 0, height: 220, widths: [330] }]);
  });

  it('gives a panorama a row of its own when it is wider than the column at the wanted height', () => {
    const rows = justify([panorama, landscape], { ...options, width: 700 });
    expect(rows[0]).toMatchObject({ first: 0, height: 140 });
    expect(rows).toHaveLength(2);
  });

  it('reads a picture without known pixels as a square', () => {
    expect(justify([{ width: 0, height: 0 }], options)[0]?.widths).toEqual([220]);
  });

  it('keeps every picture once, in order, uncropped, within the column and below the greatest height', () => {
    fc.assert(
      fc.property(pictures, fc.integer({ min: 280, max: 2000 }), (set, width) => {
        const rows = justify(set, { width, rowHeight: 220, gap: 10 });
        const seen = rows.flatMap((row) => row.widths.map((one, at) => ({ at: row.first + at, ratio: one / row.height })));
        expect(seen.map(({ at }) => at)).toEqual(set.map((_, at) => at));
        for (const { at, ratio } of seen) expect(ratio).toBeCloseTo((set[at]?.width ?? 0) / (set[at]?.height ?? 1), 6);
        for (const row of rows) {
          const used = row.widths.reduce((sum, one) => sum + one, 0) + 10 * (row.widths.length - 1);
          expect(used).toBeLessThanOrEqual(width + 1e-6);
          expect(row.height).toBeLessThanOrEqual(220 * 1.4 + 1e-9);
        }
      }),
    );
  });
});

describe('stacked pictures of a phone', () => {
  it('take the whole width, one below the other', () => {
    expect(stack([landscape, landscape], 390, 600)).toEqual([
      { first: 0, height: 260, widths: [390] },
      { first: 1, height: 260, widths: [390] },
    ]);
  });

  it('are narrowed instead of cropped when they are too tall', () => {
    expect(stack([{ width: 1000, height: 3000 }], 390, 600)).toEqual([{ first: 0, height: 600, widths: [200] }]);
  });
});
