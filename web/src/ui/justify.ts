export interface Proportioned {
  /** Pixels of the upright picture; only their proportion matters. */
  width: number;
  height: number;
}

export interface JustifiedRow {
  /** Index of its first picture. */
  first: number;
  /** Width of each picture in CSS pixels, in order. */
  widths: number[];
  /** Height of all pictures in the row in CSS pixels. */
  height: number;
}

export interface JustifyOptions {
  /** Width of the column in CSS pixels. */
  width: number;
  /** The height rows should have; they differ from it as the proportions demand. */
  rowHeight: number;
  gap: number;
  /** No row gets higher than this: a row that would is left ragged instead. Default 1.4 times `rowHeight`. */
  maxHeight?: number;
}

function proportion(picture: Proportioned): number {
  return picture.width > 0 && picture.height > 0 ? picture.width / picture.height : 1;
}

/**
 * Breaks pictures into rows that fill the width exactly, each picture in its own proportion, in the given order. A row
 * closes where its height comes nearest to `rowHeight`. The last row, and one that would have to grow beyond
 * `maxHeight`, keeps its height and ends ragged: no picture is cropped, and none is blown up to fill a line.
 */
export function justify(pictures: readonly Proportioned[], options: JustifyOptions): JustifiedRow[] {
  const { width, rowHeight, gap, maxHeight = rowHeight * 1.4 } = options;
  const rows: JustifiedRow[] = [];
  let first = 0;
  while (first < pictures.length) {
    let sum = proportion(pictures[first] as Proportioned);
    let end = first + 1;
    const heightOf = (count: number, total: number) => (width - gap * (count - 1)) / total;
    while (end < pictures.length) {
      const now = heightOf(end - first, sum);
      const wider = sum + proportion(pictures[end] as Proportioned);
      const next = heightOf(end - first + 1, wider);
      if (now <= rowHeight && rowHeight - now <= Math.abs(next - rowHeight)) break;
      if (now > rowHeight && now - rowHeight < rowHeight - next && now <= maxHeight) break;
      sum = wider;
      end += 1;
    }
    const full = heightOf(end - first, sum);
    const isLast = end === pictures.length;
    const height = isLast ? Math.min(full, rowHeight) : Math.min(full, maxHeight);
    rows.push({ first, height, widths: pictures.slice(first, end).map((picture) => proportion(picture) * height) });
    first = end;
  }
  return rows;
}

/** The phone's layout: one picture a row over the full width, a tall one narrowed to `maxHeight` rather than cropped. */
export function stack(pictures: readonly Proportioned[], width: number, maxHeight: number): JustifiedRow[] {
  return pictures.map((picture, first) => {
    const height = Math.min(width / proportion(picture), maxHeight);
    return { first, height, widths: [height * proportion(picture)] };
  });
}
