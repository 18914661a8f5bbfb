/** Pixels marked in a picture, gathered in square cells so that a spot of noise or a wire makes or breaks no area. */
export interface Areas {
  /** Share of the picture's pixels that are marked and lie in large areas; 0 to 1. */
  inLarge: number;
  /** The largest area's share of the picture. */
  largest: number;
  /** Areas that are not large. */
  spots: number;
}

/** Cells along the longer side. */
const CELLS = 320;
/** From this share of the picture on an area is large: a square of some 7% of the sides, far more than a lamp or a lit window has. */
export const LARGE_AREA = 0.005;

/** A cell counts where at least half of its pixels are marked. Gives each cell's marked pixels, 0 where it does not count. */
function fillCells(mask: Uint8Array, width: number, height: number, bit: number): { marked: Uint32Array; across: number } {
  const side = Math.max(1, Math.round(Math.max(width, height) / CELLS));
  const across = Math.ceil(width / side);
  const marked = new Uint32Array(across * Math.ceil(height / side));
  for (let y = 0, at = 0; y < height; y++) {
    const row = Math.floor(y / side) * across;
    for (let x = 0; x < width; x++, at++) if (mask[at]! & bit) marked[row + ((x / side) | 0)]!++;
  }
  for (let cell = 0; cell < marked.length; cell++) {
    const pixels = Math.min(side, width - (cell % across) * side) * Math.min(side, height - Math.floor(cell / across) * side);
    if (marked[cell]! * 2 < pixels) marked[cell] = 0;
  }
  return { marked, across };
}

/** Takes one connected area out of the cells (neighbours share a side) and gives its marked pixels. */
function takeArea(marked: Uint32Array, across: number, start: number, stack: number[]): number {
  let pixels = 0;
  stack.push(start);
  while (stack.length > 0) {
    const cell = stack.pop()!;
    if (marked[cell] === 0) continue;
    pixels += marked[cell]!;
    marked[cell] = 0;
    const column = cell % across;
    if (column > 0) stack.push(cell - 1);
    if (column < across - 1) stack.push(cell + 1);
    if (cell >= across) stack.push(cell - across);
    if (cell + across < marked.length) stack.push(cell + across);
  }
  return pixels;
}

/** Tells the large areas of a mask's bit from its small spots. */
export function findAreas(mask: Uint8Array, width: number, height: number, bit: number): Areas {
  const { marked, across } = fillCells(mask, width, height, bit);
  const areas: Areas = { inLarge: 0, largest: 0, spots: 0 };
  const stack: number[] = [];
  for (let cell = 0; cell < marked.length; cell++) {
    if (marked[cell] === 0) continue;
    const share = takeArea(marked, across, cell, stack) / mask.length;
    if (share >= LARGE_AREA) areas.inLarge += share;
    else areas.spots++;
    areas.largest = Math.max(areas.largest, share);
  }
  return areas;
}
