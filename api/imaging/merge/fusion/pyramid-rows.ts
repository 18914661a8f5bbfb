import { insideEdge, type EdgeRule } from './conventions.ts';

// Loops over pixels stay within the lengths they are given; `!` says so to the compiler at no cost.

/** Half of a length, as every second sample of it counts. */
export const halved = (length: number) => (length + 1) >> 1;

/** Rows of interleaved samples, bytes on the picture itself and floats above it. */
export type Row = Uint8Array | Float32Array;

/** One sample of the halved row near an edge, times 16. */
function shrunkAtEdge(row: Row, at: number, channel: number, channels: number, edge: EdgeRule): number {
  const width = row.length / channels;
  const tap = (x: number) => row[insideEdge(x, width, edge) * channels + channel]!;
  return tap(2 * at - 2) + tap(2 * at + 2) + 4 * (tap(2 * at - 1) + tap(2 * at + 1)) + 6 * tap(2 * at);
}

/** Halves a row with the taps 1 4 6 4 1, not yet divided by their sum of 16. */
export function shrinkRow(row: Row, channels: number, edge: EdgeRule, half: Float32Array): void {
  const width = row.length / channels;
  const last = half.length / channels - 1;
  // Taps of the samples from 1 to here need no edge.
  const safe = Math.min(last, (width - 3) >> 1);
  for (let channel = 0; channel < channels; channel++) {
    half[channel] = shrunkAtEdge(row, 0, channel, channels, edge);
    for (let x = Math.max(1, safe + 1); x <= last; x++) half[x * channels + channel] = shrunkAtEdge(row, x, channel, channels, edge);
    shrinkInside(row, channels, channel, safe, half);
  }
}

function shrinkInside(row: Row, channels: number, channel: number, safe: number, half: Float32Array): void {
  if (safe < 1) return;
  let [before, left, middle] = [row[channel]!, row[channels + channel]!, row[2 * channels + channel]!];
  for (let x = 1, to = channels + channel, from = 3 * channels + channel; x <= safe; x++, to += channels, from += 2 * channels) {
    const right = row[from]!;
    const after = row[from + channels]!;
    half[to] = before + after + 4 * (left + right) + 6 * middle;
    [before, left, middle] = [middle, right, after];
  }
}

/** Halves five rows that were halved along already into one, and divides by the taps' sum of both ways. */
export function shrinkDown(rows: Float32Array[], to: Float32Array): void {
  const [before, above, middle, below, after] = rows as [Float32Array, Float32Array, Float32Array, Float32Array, Float32Array];
  for (let at = 0; at < to.length; at++) to[at] = (before[at]! + after[at]! + 4 * (above[at]! + below[at]!) + 6 * middle[at]!) * (1 / 256);
}

/** Doubles a row: the same taps between samples that lie two apart, the last one repeated beyond the end. */
export function growRow(row: Float32Array, channels: number, edge: EdgeRule, doubled: Float32Array): void {
  const last = row.length / channels - 1;
  const width = doubled.length / channels;
  // Around the first sample OpenCV mirrors; beyond the last both repeat it.
  const first = edge === 'reflect-101' && last > 0 ? 1 : 0;
  for (let channel = 0; channel < channels; channel++) {
    let before = row[first * channels + channel]!;
    let middle = row[channel]!;
    for (let x = 0; x <= last; x++) {
      const after = row[Math.min(x + 1, last) * channels + channel]!;
      doubled[2 * x * channels + channel] = 0.125 * (before + after) + 0.75 * middle;
      if (2 * x + 1 < width) doubled[(2 * x + 1) * channels + channel] = 0.5 * (middle + after);
      [before, middle] = [middle, after];
    }
  }
}

/** Shares of the rows above, at and below a place of the halved level in a row of the level itself. */
export function growTaps(y: number): [above: number, at: number, below: number] {
  return y % 2 === 0 ? [0.125, 0.75, 0.125] : [0, 0.5, 0.5];
}
