/** Where each row begins, and at the end where the last one ends: one number more than there are rows. CSS pixels. */
export function offsetsOf(count: number, heightOf: (index: number) => number): Float64Array {
  const offsets = new Float64Array(count + 1);
  for (let index = 0; index < count; index += 1) offsets[index + 1] = (offsets[index] ?? 0) + heightOf(index);
  return offsets;
}

/** The row that covers a height, the first above the list and the last below it. */
export function rowAt(offsets: Float64Array, y: number): number {
  let low = 0;
  let high = Math.max(0, offsets.length - 2);
  while (low < high) {
    const middle = (low + high + 1) >> 1;
    if ((offsets[middle] ?? 0) <= y) low = middle;
    else high = middle - 1;
  }
  return low;
}

export interface RowRange {
  first: number;
  /** Included; smaller than `first` where there are no rows. */
  last: number;
}

/** The rows between two heights, with so many CSS pixels more on either side. */
export function rowsBetween(offsets: Float64Array, top: number, bottom: number, beyond: number): RowRange {
  if (offsets.length < 2) return { first: 0, last: -1 };
  return { first: rowAt(offsets, top - beyond), last: rowAt(offsets, bottom + beyond) };
}

/** How far to scroll until a row lies between two heights; 0 where it does already. A row too high for them shows its top. */
export function wayTo(offsets: Float64Array, row: number, top: number, bottom: number): number {
  const begins = offsets[row] ?? 0;
  const ends = offsets[row + 1] ?? begins;
  if (begins < top || ends - begins > bottom - top) return begins - top;
  return ends > bottom ? ends - bottom : 0;
}
