import { insideEdge, type EdgeRule, type FusionConventions } from './conventions.ts';

// Loops over pixels stay within the lengths they are given; `!` says so to the compiler at no cost.

/** Luma of ITU-R BT.601, as the paper's authors and OpenCV take grey, on a scale of 0 to 1. */
const [RED, GREEN, BLUE] = [0.299 / 255, 0.587 / 255, 0.114 / 255];
/** So that pixels without any quality in any frame become their average. */
const FLOOR = 1e-12;

/** A row of RGB bytes as grey, 0 to 1. */
export function greyRow(pixels: Uint8Array, grey: Float32Array): void {
  for (let x = 0, at = 0; x < grey.length; x++, at += 3) grey[x] = RED * pixels[at]! + GREEN * pixels[at + 1]! + BLUE * pixels[at + 2]!;
}

/** How well exposed each of the 256 values is: exp(−(v − 0.5)² / 2σ²), to the power of the exponent. */
export function exposednessTable({ sigma, exposedness }: Pick<FusionConventions, 'sigma' | 'exposedness'>): Float64Array {
  return Float64Array.from({ length: 256 }, (_, value) => Math.exp((-exposedness * (value / 255 - 0.5) ** 2) / (2 * sigma * sigma)));
}

/** Standard deviation of red, green and blue (of three, not of a sample), 0 to 1. */
export function saturationOf(red: number, green: number, blue: number): number {
  const mean = (red + green + blue) / 3;
  return Math.sqrt(((red - mean) ** 2 + (green - mean) ** 2 + (blue - mean) ** 2) / 3) / 255;
}

/** Absolute response of the Laplacian [0 1 0; 1 −4 1; 0 1 0], to the power of the exponent, into `weights`. */
function contrastRow(above: Float32Array, row: Float32Array, below: Float32Array, edge: EdgeRule, exponent: number, weights: Float32Array) {
  const last = row.length - 1;
  const ends = (x: number) => row[insideEdge(x - 1, row.length, edge)]! + row[insideEdge(x + 1, row.length, edge)]!;
  weights[0] = Math.abs(above[0]! + below[0]! + ends(0) - 4 * row[0]!);
  for (let x = 1; x < last; x++) weights[x] = Math.abs(above[x]! + below[x]! + row[x - 1]! + row[x + 1]! - 4 * row[x]!);
  weights[last] = Math.abs(above[last]! + below[last]! + ends(last) - 4 * row[last]!);
  if (exponent !== 1) for (let x = 0; x <= last; x++) weights[x] = weights[x]! ** exponent;
}

function timesSaturation(pixels: Uint8Array, exponent: number, weights: Float32Array): void {
  if (exponent === 0) return;
  for (let x = 0, at = 0; x < weights.length; x++, at += 3) {
    const [red, green, blue] = [pixels[at]!, pixels[at + 1]!, pixels[at + 2]!];
    // Three times the variance, in whole numbers: a² + b² + c² − ab − bc − ca, times 2/3.
    const spread = red * red + green * green + blue * blue - red * green - green * blue - blue * red;
    const saturation = Math.sqrt(spread * (2 / 9)) / 255;
    weights[x]! *= exponent === 1 ? saturation : saturation ** exponent;
  }
}

function timesExposedness(pixels: Uint8Array, table: Float64Array, weights: Float32Array): void {
  for (let x = 0, at = 0; x < weights.length; x++, at += 3) {
    weights[x] = weights[x]! * table[pixels[at]!]! * table[pixels[at + 1]!]! * table[pixels[at + 2]!]! + FLOOR;
  }
}

/** A row of one frame, and its grey with that of the rows beside it. */
export interface WeighedRow {
  pixels: Uint8Array;
  above: Float32Array;
  grey: Float32Array;
  below: Float32Array;
}

/** The product of the three measures for one row of a frame, not yet divided by the sum over the frames. */
export function qualityRow(
  { pixels, above, grey, below }: WeighedRow,
  rule: FusionConventions,
  table: Float64Array,
  weights: Float32Array,
): void {
  if (rule.contrast === 0) weights.fill(1);
  else contrastRow(above, grey, below, rule.edge, rule.contrast, weights);
  timesSaturation(pixels, rule.saturation, weights);
  timesExposedness(pixels, table, weights);
}

/** Divides one row's weights of all frames by their sum. */
export function normaliseRows(rows: Float32Array[]): void {
  const width = rows[0]!.length;
  for (let x = 0; x < width; x++) {
    let sum = 0;
    for (const row of rows) sum += row[x]!;
    const factor = 1 / sum;
    for (const row of rows) row[x]! *= factor;
  }
}
