import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { offsetsOf, rowAt, rowsBetween, wayTo } from '../../web/src/ui/virtual-window.ts';

const heights = [100, 50, 200, 80];
const offsets = offsetsOf(heights.length, (index) => heights[index] ?? 0);

describe('the window over a long list', () => {
  it('knows where rows begin and the last one ends', () => {
    expect([...offsets]).toEqual([0, 100, 150, 350, 430]);
  });

  it('finds the row at a height, and the ends beyond them', () => {
    expect([-5, 0, 99, 100, 349, 350, 9999].map((y) => rowAt(offsets, y))).toEqual([0, 0, 0, 1, 2, 3, 3]);
  });

  it('has no rows in an empty list', () => {
    expect(
      rowsBetween(
        offsetsOf(0, () => 0),
        0,
        900,
        100,
      ),
    ).toEqual({ first: 0, last: -1 });
  });

  it('draws every row that a window touches', () => {
    const rows = fc.array(fc.integer({ min: 1, max: 500 }), { minLength: 1, maxLength: 80 });
    fc.assert(
      fc.property(rows, fc.integer({ min: -500, max: 20_000 }), fc.integer({ min: 1, max: 3000 }), (set, top, height) => {
        const all = offsetsOf(set.length, (index) => set[index] ?? 0);
        const { first, last } = rowsBetween(all, top, top + height, 0);
        set.forEach((_, row) => {
          const touches = (all[row] ?? 0) < top + height && (all[row + 1] ?? 0) > top;
          if (touches) expect(row >= first && row <= last).toBe(true);
        });
      }),
    );
  });

  it('scrolls as little as needed to a row, and to its top where it is higher than the window', () => {
    expect(wayTo(offsets, 1, 0, 300)).toBe(0);
    expect(wayTo(offsets, 3, 0, 300)).toBe(130);
    expect(wayTo(offsets, 0, 40, 300)).toBe(-40);
    expect(wayTo(offsets, 2, 0, 120)).toBe(150);
  });
});
