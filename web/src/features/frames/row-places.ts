import type { JustifiedRow } from '../../ui/justify.ts';

/** Pictures side by side, and where the first begins, in CSS pixels. */
export type PlacedRow = JustifiedRow & { left?: number };

/** The row that holds picture `index`. */
export function rowOf(rows: readonly PlacedRow[], index: number): number {
  let [low, high] = [0, rows.length - 1];
  while (low < high) {
    const middle = Math.ceil((low + high) / 2);
    if ((rows[middle]?.first ?? 0) <= index) low = middle;
    else high = middle - 1;
  }
  return low;
}

/** The picture above or below `index` (`step` −1 or 1): the one whose middle is nearest; `index` itself at the edges. */
export function acrossRows(rows: readonly PlacedRow[], index: number, step: -1 | 1, gap: number): number {
  const at = rowOf(rows, index);
  const [here, there] = [rows[at], rows[at + step]];
  if (!here || !there) return index;
  const wanted = middles(here, gap)[index - here.first] ?? 0;
  const places = middles(there, gap);
  const nearest = places.reduce((best, middle, place) => {
    return Math.abs(middle - wanted) < Math.abs((places[best] ?? 0) - wanted) ? place : best;
  }, 0);
  return there.first + nearest;
}

function middles(row: PlacedRow, gap: number): number[] {
  let left = row.left ?? 0;
  return row.widths.map((width) => {
    const middle = left + width / 2;
    left += width + gap;
    return middle;
  });
}
