/** A frame as it lies over the lead frame. All memory may be shared between threads. */
export interface AlignedFrame {
  /** RGB bytes, row after row. */
  pixels: Uint8Array;
  /** What lies at (x, y) of the result lies at (x + shift.x, y + shift.y) of the frame. */
  shift: { x: number; y: number };
  /** How far the frame is believed at each place, where something moved; everywhere where there is none. */
  trust: TrustMap | null;
}

/** Shares of 0 to 255 for squares of `cell` pixels, row after row. */
export interface TrustMap {
  cell: number;
  columns: number;
  shares: Uint8Array;
}

/** Gives the rows of a frame as they lie over the result, the edge repeated where the frame does not reach. */
export function alignedRows({ pixels, shift }: AlignedFrame, width: number, height: number): (y: number) => Uint8Array {
  const stride = width * 3;
  const sourceRow = (y: number) => {
    const from = Math.min(height - 1, Math.max(0, y + shift.y)) * stride;
    return pixels.subarray(from, from + stride);
  };
  if (shift.x === 0) return sourceRow;
  const moved = new Uint8Array(stride);
  return (y) => {
    const row = sourceRow(y);
    for (let x = 0, at = 0; x < width; x++) {
      const from = 3 * Math.min(width - 1, Math.max(0, x + shift.x));
      moved[at++] = row[from]!;
      moved[at++] = row[from + 1]!;
      moved[at++] = row[from + 2]!;
    }
    return moved;
  };
}

/** Takes away a row's weights where the frame does not reach or is not believed. */
export function withdraw(weights: Float32Array, { shift, trust }: AlignedFrame, y: number, height: number): void {
  const width = weights.length;
  if (y + shift.y < 0 || y + shift.y >= height) weights.fill(0);
  weights.fill(0, 0, Math.max(0, -shift.x));
  weights.fill(0, Math.min(width, width - shift.x));
  if (!trust) return;
  const shares = trust.shares.subarray(Math.floor(y / trust.cell) * trust.columns);
  for (let x = 0; x < width; x++) weights[x]! *= shares[Math.floor(x / trust.cell)]! / 255;
}
