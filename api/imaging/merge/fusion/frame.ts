import type { RawPicture } from '../../upright.ts';

/** A frame as it lies over the result. */
export interface PlacedFrame {
  picture: RawPicture;
  /** What lies at (x, y) of the result lies at (x + shift.x, y + shift.y) of the frame. */
  shift: { x: number; y: number };
  /** What is taken from the lead frame, where something moved; nothing where there is none. */
  patch: Patch | null;
}

/** How far a frame is believed at each place, and what stands in its stead where it is not. */
export interface Patch {
  /** Shares of 0 to 1 for squares of `cell` pixels, row after row. */
  cell: number;
  columns: number;
  shares: Float32Array;
  /** The lead frame, and each of its values as this frame would show it. */
  lead: RawPicture;
  tones: Uint8Array;
}

/** Writes a frame's RGB as it lies over the result, the frame's edge repeated where it does not reach. */
export function placeFrame({ picture, shift, patch }: PlacedFrame, target: Uint8Array): void {
  const { width, height, data, channels } = picture;
  for (let y = 0; y < height; y++) {
    const from = Math.min(height - 1, Math.max(0, y + shift.y)) * width;
    const row = target.subarray(y * width * 3, (y + 1) * width * 3);
    if (channels === 3 && shift.x === 0) row.set(data.subarray(from * 3, (from + width) * 3));
    else placeRow(data.subarray(from * channels, (from + width) * channels), channels, shift.x, row);
    if (patch) patchRow(row, patch, y);
  }
}

function patchRow(row: Uint8Array, { cell, columns, shares, lead, tones }: Patch, y: number): void {
  const first = Math.floor(y / cell) * columns;
  for (let x = 0; x < lead.width; x++) {
    const share = shares[first + Math.floor(x / cell)] ?? 1;
    if (share === 1) continue;
    const from = (y * lead.width + x) * lead.channels;
    for (let colour = 0; colour < 3; colour++) {
      const shown = row[x * 3 + colour] ?? 0;
      row[x * 3 + colour] = Math.round((tones[lead.data[from + colour] ?? 0] ?? 0) * (1 - share) + shown * share);
    }
  }
}

function placeRow(source: Uint8Array, channels: number, shift: number, row: Uint8Array): void {
  const width = row.length / 3;
  for (let x = 0, at = 0; x < width; x++) {
    const from = Math.min(width - 1, Math.max(0, x + shift)) * channels;
    for (let colour = 0; colour < 3; colour++) row[at++] = source[from + colour] ?? 0;
  }
}

/** Takes away a row's weights where the frame does not reach. */
export function withdraw(weights: Float32Array, { picture, shift }: PlacedFrame, y: number): void {
  if (y + shift.y < 0 || y + shift.y >= picture.height) weights.fill(0);
  if (shift.x < 0) weights.fill(0, 0, -shift.x);
  if (shift.x > 0) weights.fill(0, Math.max(0, weights.length - shift.x));
}
