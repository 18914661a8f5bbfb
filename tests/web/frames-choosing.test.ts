import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { acrossRows, rowOf } from '../../web/src/features/frames/row-places.ts';
import { choose, chooseAll, chooseNone, keepShown, moveTo, NOTHING, type Selection } from '../../web/src/features/frames/selection.ts';
import { justify } from '../../web/src/ui/justify.ts';

const ORDER = ['a', 'b', 'c', 'd', 'e', 'f'];
const chosen = (selection: Selection) => [...selection.chosen].sort().join('');

describe('choosing', () => {
  it('a press chooses one alone, with Ctrl one more or one less', () => {
    let now = choose(NOTHING, ORDER, 'b', 'alone');
    now = choose(now, ORDER, 'd', 'also');
    expect(chosen(now)).toBe('bd');
    now = choose(now, ORDER, 'b', 'also');
    expect(chosen(now)).toBe('d');
    expect(chosen(choose(now, ORDER, 'f', 'alone'))).toBe('f');
  });

  it('Shift chooses from the last press to this one, in both directions, and turns round its anchor', () => {
    const start = choose(NOTHING, ORDER, 'c', 'alone');
    const forward = choose(start, ORDER, 'e', 'range');
    expect(chosen(forward)).toBe('cde');
    expect(chosen(choose(forward, ORDER, 'a', 'range'))).toBe('abc');
  });

  it('Shift and arrows choose what is passed and give back what is left again', () => {
    let now = moveTo(NOTHING, ORDER, 'b', false);
    now = moveTo(now, ORDER, 'c', true);
    now = moveTo(now, ORDER, 'd', true);
    expect(chosen(now)).toBe('bcd');
    now = moveTo(now, ORDER, 'c', true);
    expect(chosen(now)).toBe('bc');
    expect(now.focus).toBe('c');
    expect(chosen(moveTo(now, ORDER, 'f', false))).toBe('bc');
  });

  it('all and none', () => {
    const all = chooseAll(moveTo(NOTHING, ORDER, 'c', false), ORDER);
    expect([chosen(all), all.focus]).toEqual(['abcdef', 'c']);
    expect(chosen(chooseNone(all))).toBe('');
  });

  it('lets go of what is not shown any more, and stays the same object where all is shown', () => {
    const now = choose(choose(NOTHING, ORDER, 'b', 'alone'), ORDER, 'e', 'also');
    expect(keepShown(now, ORDER)).toBe(now);
    const less = keepShown(now, ['a', 'b', 'c']);
    expect([chosen(less), less.focus, less.anchor]).toEqual(['b', null, null]);
  });

  it('a range over an anchor that is gone is the pressed one', () => {
    const now: Selection = { chosen: new Set(['x']), focus: 'x', anchor: 'x' };
    expect(chosen(choose(now, ORDER, 'c', 'range'))).toBe('c');
  });
});

describe('moving across rows', () => {
  const rows = [
    { first: 0, widths: [100, 200, 100], height: 100 },
    { first: 3, widths: [300, 112], height: 100 },
    { first: 5, widths: [80], height: 100 },
  ];

  it('goes to the picture whose middle is nearest', () => {
    // Middles: 50, 212, 374 above; 150, 368 below.
    expect([0, 1, 2].map((at) => acrossRows(rows, at, 1, 12))).toEqual([3, 3, 4]);
    expect([3, 4].map((at) => acrossRows(rows, at, -1, 12))).toEqual([1, 2]);
    expect(acrossRows(rows, 4, 1, 12)).toBe(5);
  });

  it('stays at the edges', () => {
    expect(acrossRows(rows, 1, -1, 12)).toBe(1);
    expect(acrossRows(rows, 5, 1, 12)).toBe(5);
  });

  it('finds the row of every picture', () => {
    const sizes = fc.array(fc.record({ width: fc.integer({ min: 1, max: 9000 }), height: fc.integer({ min: 1, max: 9000 }) }), {
      minLength: 1,
      maxLength: 60,
    });
    fc.assert(
      fc.property(sizes, (pictures) => {
        const made = justify(pictures, { width: 1100, rowHeight: 190, gap: 12 });
        pictures.forEach((_, at) => {
          const row = made[rowOf(made, at)];
          expect(row && at >= row.first && at < row.first + row.widths.length).toBe(true);
        });
      }),
    );
  });
});
