import type { Grey } from './grey-pyramid.ts';
import type { Shift } from './threshold-bitmaps.ts';

// Loops over pixels stay within the lengths they are given; `!` says so to the compiler at no cost.

/** A square of a picture with edges both ways. */
export interface Tile {
  x: number;
  y: number;
  /** Difference of neighbours in the direction that shows least, in both pictures at least. */
  texture: number;
}

export const TILE = 40;
const [COLUMNS, ROWS] = [8, 6];
/** Between these values a pixel is neither black nor white. */
const [BLACK, WHITE] = [6, 249];
/** So much of a tile must be neither in either picture. */
const USABLE = 0.6;
/** Less than this may be noise. */
const LEAST_TEXTURE = 1.2;

const usable = (value: number) => value > BLACK && value < WHITE;

/**
 * Differences of neighbours in the direction in which a tile shows least, so that one edge alone, whatever its slope, is nothing: the lesser eigenvalue
 * of the structure tensor, as Shi and Tomasi choose what to track (Good Features to Track, CVPR 1994). None where too much is black or white.
 */
function textureOf({ values, width }: Grey, left: number, top: number): number {
  let [along, down, both, pixels] = [0, 0, 0, 0];
  // Every other pixel is enough to tell.
  for (let y = top; y < top + TILE - 1; y += 2) {
    for (let x = left, at = y * width + left; x < left + TILE - 1; x += 2, at += 2) {
      const value = values[at]!;
      if (!usable(value)) continue;
      pixels++;
      const [right, below] = [values[at + 1]! - value, values[at + width]! - value];
      along += right * right;
      down += below * below;
      both += right * below;
    }
  }
  if (pixels < (USABLE * TILE * TILE) / 4) return 0;
  const weakest = (along + down - Math.sqrt((along - down) ** 2 + 4 * both ** 2)) / 2;
  return Math.sqrt(Math.max(0, weakest) / pixels);
}

/** The tile of each part of the picture that shows most in both pictures, the second moved by `shift`. */
export function texturedTiles(first: Grey, second: Grey, shift: Shift, reach: number): Tile[] {
  const margin = { x: Math.abs(shift.x) + reach + 1, y: Math.abs(shift.y) + reach + 1 };
  const best = new Map<number, Tile>();
  for (let y = margin.y; y + TILE + margin.y <= first.height; y += TILE) {
    for (let x = margin.x; x + TILE + margin.x <= first.width; x += TILE) {
      const texture = Math.min(textureOf(first, x, y), textureOf(second, x + shift.x, y + shift.y));
      const part = Math.floor((y * ROWS) / first.height) * COLUMNS + Math.floor((x * COLUMNS) / first.width);
      if (texture >= LEAST_TEXTURE && texture > (best.get(part)?.texture ?? 0)) best.set(part, { x, y, texture });
    }
  }
  return [...best.values()];
}

/** Correlation of a tile with the other picture moved by (dx, dy), over pixels that are neither black nor white in either: −1 to 1. */
export function correlation(first: Grey, second: Grey, tile: Tile, dx: number, dy: number): number {
  let [n, a, b, aa, bb, ab] = [0, 0, 0, 0, 0, 0];
  for (let y = tile.y; y < tile.y + TILE; y++) {
    let at = y * first.width + tile.x;
    let other = (y + dy) * second.width + tile.x + dx;
    for (let x = 0; x < TILE; x++, at++, other++) {
      const [one, two] = [first.values[at]!, second.values[other]!];
      if (!usable(one) || !usable(two)) continue;
      n++;
      a += one;
      b += two;
      aa += one * one;
      bb += two * two;
      ab += one * two;
    }
  }
  const spread = (n * aa - a * a) * (n * bb - b * b);
  return n < (USABLE * TILE * TILE) / 2 || spread <= 0 ? 0 : (n * ab - a * b) / Math.sqrt(spread);
}
