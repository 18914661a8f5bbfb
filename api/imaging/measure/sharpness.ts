import type { Plane } from './plane.ts';

const TILE = 64;

/** Variance of the luma and of its Laplacian in a tile. */
export interface TileVariance {
  luma: number;
  laplacian: number;
}

/**
 * Variances within a rectangle, for the kernel [0 1 0; 1 −4 1; 0 1 0] (Pech-Pacheco and others, "Diatom autofocusing in brightfield
 * microscopy", ICPR 2000; from memory). The rectangle must keep a pixel away from the edges.
 */
export function tileVariance({ width, values }: Plane, left: number, top: number, right: number, bottom: number): TileVariance {
  let [sum, squares, bends, bendSquares] = [0, 0, 0, 0];
  for (let y = top; y < bottom; y++) {
    for (let at = y * width + left; at < y * width + right; at++) {
      const value = values[at]!;
      const bend = values[at - 1]! + values[at + 1]! + values[at - width]! + values[at + width]! - 4 * value;
      sum += value;
      squares += value * value;
      bends += bend;
      bendSquares += bend * bend;
    }
  }
  const pixels = (right - left) * (bottom - top);
  return { luma: squares / pixels - (sum / pixels) ** 2, laplacian: bendSquares / pixels - (bends / pixels) ** 2 };
}

function tilesOf(plane: Plane): TileVariance[] {
  const tiles: TileVariance[] = [];
  const side = Math.min(TILE, plane.width - 2, plane.height - 2);
  if (side < 8) return tiles;
  for (let top = 1; top + side < plane.height; top += side)
    for (let left = 1; left + side < plane.width; left += side) tiles.push(tileVariance(plane, left, top, left + side, top + side));
  return tiles;
}

function quantile(values: number[], share: number): number {
  const ordered = values.toSorted((a, b) => a - b);
  return ordered[Math.min(ordered.length - 1, Math.floor(share * ordered.length))] ?? 0;
}

/** Grey levels that a tile's luma must spread to have something in it. */
const LEAST_SPREAD = 6;
/** White noise of variance s² gives the Laplacian 20 s²: the squares of the kernel's numbers. */
const KERNEL_SQUARES = 20;

/**
 * Sharpness of a picture: the variance of the Laplacian over the variance of the luma, on the sharpest tenth of the tiles that have
 * something in them. Dividing takes contrast and exposure out; the noise, as the quietest tiles show it, is taken off before.
 * Sizes compare only at one width. Null where no tile has anything in it.
 */
export function sharpnessOf(luma: Plane): number | null {
  const tiles = tilesOf(luma);
  const noise =
    quantile(
      tiles.map((tile) => tile.laplacian),
      0.02,
    ) / KERNEL_SQUARES;
  const ratios = tiles
    .map((tile) => ({ luma: tile.luma - noise, laplacian: tile.laplacian - noise * KERNEL_SQUARES }))
    .filter((tile) => tile.luma > LEAST_SPREAD ** 2)
    .map((tile) => Math.max(0, tile.laplacian) / tile.luma);
  return ratios.length === 0 ? null : quantile(ratios, 0.9);
}
