import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { layBracket } from '../../web/src/features/frames/bracket-layout.ts';
import { CAPTION, GAP, layGrid } from '../../web/src/features/frames/grid-rows.ts';
import { acrossRows } from '../../web/src/features/frames/row-places.ts';
import { sectionsOf } from '../../web/src/features/frames/sections.ts';
import { bracket, frame, membersOf } from './frames-support.ts';

const shape = fc.constantFrom({ width: 6000, height: 4000 }, { width: 4000, height: 6000 }, { width: 4000, height: 3000 });
const widths = fc.integer({ min: 480, max: 2400 });
const space = (width: number) => ({ width, gap: GAP, caption: CAPTION });
const total = (numbers: readonly number[]) => numbers.reduce((sum, one) => sum + one, 0);

describe('a bracket in its column', () => {
  it('never crops a picture, loses a frame or leaves the column, whatever the shapes and the width', () => {
    fc.assert(
      fc.property(shape, fc.integer({ min: 2, max: 9 }), widths, (picture, count, width) => {
        const { proof, beside, lines } = layBracket(picture, Array(count).fill(picture), space(width));
        expect(proof.width / proof.height).toBeCloseTo(picture.width / picture.height, 6);
        expect(total(lines.map((line) => line.widths.length))).toBe(count);
        for (const line of lines) {
          const used = total(line.widths) + GAP * (line.widths.length - 1) + (beside ? proof.width + GAP : 0);
          expect(used).toBeLessThanOrEqual(width + 0.001);
          for (const one of line.widths) expect(one / line.height).toBeCloseTo(picture.width / picture.height, 6);
          expect(line.height).toBeLessThan(proof.height);
        }
      }),
    );
  });

  it('has the proof and five frames in one line where there is room, as high as can be', () => {
    const five = Array(5).fill({ width: 3, height: 2 });
    const { proof, beside, lines } = layBracket({ width: 3, height: 2 }, five, space(1176));
    expect([beside, lines.length]).toEqual([true, 1]);
    expect(proof.width + GAP + total(lines[0]?.widths ?? []) + 4 * GAP).toBeCloseTo(1176, 3);
  });

  it('sets nine frames in two lines that end on the foot of the proof', () => {
    const nine = Array(9).fill({ width: 3, height: 2 });
    const { proof, beside, lines } = layBracket({ width: 3, height: 2 }, nine, space(1100));
    expect([beside, lines.map((line) => line.widths.length)]).toEqual([true, [5, 4]]);
    expect(total(lines.map((line) => line.height)) + CAPTION + GAP).toBeCloseTo(proof.height, 6);
  });

  it('goes below the proof where the column is narrow', () => {
    const five = Array(5).fill({ width: 3, height: 2 });
    const { beside, lines } = layBracket({ width: 3, height: 2 }, five, space(500));
    expect(beside).toBe(false);
    expect(Math.min(...lines.map((line) => line.height))).toBeGreaterThanOrEqual(64);
    expect(lines.map((line) => line.widths.length)).toEqual([3, 2]);
  });
});

const names = (prefix: string, count: number) => Array.from({ length: count }, (_, at) => `${prefix}${at}`);
const BRACKETS = new Map([bracket('one', names('a', 5))].map((one) => [one.id, one]));
const SHOWN = [...membersOf('one', names('a', 5)), ...names('b', 9).map((name) => frame(name))];
const MODEL = layGrid(sectionsOf(SHOWN, BRACKETS, 'all'), 1176);

describe('the rows of the grid', () => {
  it('are a heading and a row for a bracket, a heading and rows for the single frames', () => {
    expect(MODEL.rows.map((row) => row.kind)).toEqual(['heading', 'bracket', 'heading', 'frames', 'frames', 'frames']);
    expect(new Set(MODEL.rows.map((row) => row.key)).size).toBe(MODEL.rows.length);
    expect(MODEL.order).toEqual([...names('a', 5), ...names('b', 9)]);
  });

  it('have no heading where nothing is grouped', () => {
    expect(layGrid(sectionsOf(SHOWN, new Map(), 'all'), 1176).rows.every((row) => row.kind === 'frames')).toBe(true);
  });

  it('let the arrows go from a bracket down to the single frames and back to what lies above', () => {
    const down = acrossRows(MODEL.lines, 4, 1, GAP);
    expect(MODEL.order[down]).toBe('b3');
    expect(MODEL.order[acrossRows(MODEL.lines, down, -1, GAP)]).toBe('a4');
    // The proof stands at the left: below it is the first single frame, above which the first frame of the bracket is nearest.
    expect(MODEL.order[acrossRows(MODEL.lines, 5, -1, GAP)]).toBe('a0');
  });

  it('hold every line of frames once, in the row that draws it', () => {
    for (const line of MODEL.lines) {
      const row = MODEL.rows[line.row];
      expect(row?.kind === 'frames' || row?.kind === 'bracket').toBe(true);
    }
    expect(MODEL.lines.map((line) => line.first)).toEqual([0, 5, 9, 13]);
  });

  it('are laid for ten thousand frames in two thousand brackets without losing one', () => {
    const many = names('s', 2000).map((id) => bracket(id, names(`${id}-`, 5)));
    const frames = many.flatMap((one) => membersOf(one.id, one.frameIds));
    const model = layGrid(sectionsOf(frames, new Map(many.map((one) => [one.id, one])), 'all'), 1176);
    expect([model.order.length, model.rows.length, model.lines.length]).toEqual([10_000, 4000, 2000]);
  });
});
