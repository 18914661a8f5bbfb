import { describe, expect, it } from 'vitest';
import type { GuestProof } from '../../api/contract/guest-sheets.ts';
import { layRows, measureSheet, readStoreys, stepOnSheet } from '../../web/src/features/sheets-guest/sheet-rows.ts';
import { drawAllowance } from '../../web/src/ui/dimension-line.tsx';

function proof(number: number, viewId: string | null, width = 6000, height = 4000): GuestProof {
  const asShot = { fNumber: 11, exposureTime: 1 / 125, iso: 100, focalLength: 35, takenLocal: null, shutterRange: null, apart: null };
  return { id: `p${number}`, number, viewId, width, height, placeholder: null, pictures: null, asShot, exposures: null };
}

const views = [
  { viewId: 'east', title: 'East front', askedFor: '' },
  { viewId: 'none', title: 'Nobody hung anything here', askedFor: '' },
  { viewId: 'yard', title: 'Forecourt', askedFor: '' },
];

describe('storeys', () => {
  it('leave out views without proofs and end with what belongs to no view', () => {
    const storeys = readStoreys({ storeys: views, proofs: [proof(1, 'east'), proof(2, 'yard'), proof(3, null), proof(4, 'unknown')] });
    expect(storeys.map(({ title, view, proofs }) => [title, view, proofs.map(({ number }) => number)])).toEqual([
      ['East front', 1, [1]],
      ['Forecourt', 3, [2]],
      ['', null, [3, 4]],
    ]);
  });

  it('lay rows that begin anew with each storey', () => {
    const storeys = readStoreys({ storeys: views, proofs: [1, 2, 3, 4, 5].map((number) => proof(number, number < 5 ? 'east' : 'yard')) });
    const rows = layRows(storeys, measureSheet(1360, 900));
    expect(rows.map((row) => [row.storey.title, row.isFirst, row.proofs.map(({ number }) => number)])).toEqual([
      ['East front', true, [1, 2, 3]],
      ['East front', false, [4]],
      ['Forecourt', true, [5]],
    ]);
  });

  it('take one picture a row on a phone and narrow a tall one', () => {
    const storeys = readStoreys({ storeys: views, proofs: [proof(1, 'east'), proof(2, 'east', 2000, 6000)] });
    const rows = layRows(storeys, measureSheet(390, 844));
    expect(rows.map((row) => Math.round(row.height))).toEqual([260, 608]);
    expect(rows[1]?.widths[0]).toBeCloseTo(607.68 / 3, 0);
  });

  it('draw nothing before the width is known', () => {
    expect(layRows(readStoreys({ storeys: views, proofs: [proof(1, 'east')] }), measureSheet(0, 900))).toEqual([]);
  });
});

describe('the arrows on a sheet', () => {
  const storeys = readStoreys({ storeys: views, proofs: [1, 2, 3, 4, 5].map((number) => proof(number, number < 5 ? 'east' : 'yard')) });
  const rows = layRows(storeys, measureSheet(1360, 900));
  const step = (row: number, at: number, way: Parameters<typeof stepOnSheet>[2]) => stepOnSheet(rows, { row, at }, way, 12);

  it('go along the row and over its end', () => {
    expect(step(0, 0, 'right')).toEqual({ row: 0, at: 1 });
    expect(step(0, 2, 'right')).toEqual({ row: 1, at: 0 });
    expect(step(1, 0, 'left')).toEqual({ row: 0, at: 2 });
    expect(step(0, 0, 'left')).toEqual({ row: 0, at: 0 });
    expect(step(2, 0, 'right')).toEqual({ row: 2, at: 0 });
  });

  it('go to the nearest picture above or below, and stay at the ends', () => {
    expect(step(0, 2, 'down')).toEqual({ row: 1, at: 0 });
    expect(step(1, 0, 'up')).toEqual({ row: 0, at: 0 });
    expect(step(0, 1, 'up')).toEqual({ row: 0, at: 1 });
    expect(step(0, 1, 'last')).toEqual({ row: 2, at: 0 });
  });
});

describe('the dimension line', () => {
  it('gives the allowance three quarters while the picks fit', () => {
    expect(drawAllowance(9, 12)).toEqual({ fill: 9 / 16, tick: 0.75, hatch: 0.75 });
  });

  it('hatches extras beyond the tick and always keeps them on the line', () => {
    for (const picked of [13, 16, 40, 500]) {
      const { fill, tick, hatch } = drawAllowance(picked, 12);
      expect(fill).toBe(tick);
      expect(hatch).toBeGreaterThan(tick);
      expect(hatch).toBeLessThan(1);
      expect((hatch - tick) / tick).toBeCloseTo((picked - 12) / 12, 9);
    }
  });

  it('draws an allowance of nothing, and no picks', () => {
    expect(drawAllowance(0, 0)).toEqual({ fill: 0, tick: 0, hatch: 0 });
    expect(drawAllowance(2, 0).hatch).toBeLessThan(1);
  });
});
