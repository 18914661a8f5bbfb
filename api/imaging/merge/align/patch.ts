import type { RawPicture } from '../../upright.ts';
import type { Patch } from '../fusion/frame.ts';
import { cumulated, quantile, type Grey } from './grey-pyramid.ts';
import type { Shift } from './threshold-bitmaps.ts';

// Loops over pixels stay within the lengths they are given; `!` says so to the compiler at no cost.

/** Pixels of the greys that are judged together, each way. */
const CELL = 4;
/** The lead frame's value may be off by so much. */
const SLACK = 6;
/** Mean difference of a cell, in grey levels, up to which it is believed, and from which it is not at all. */
const [BELIEVED, DISBELIEVED] = [8, 20];

/** What a frame shows for each value of the lead frame: at least, at most, and most likely. */
interface Range {
  least: Uint8Array;
  most: Uint8Array;
  tones: Uint8Array;
}

/** By matching histograms: as many pixels are darker in both. White in the lead frame can be anything from where its last unclipped value lies. */
function ranges(lead: Grey, frame: Grey): Range {
  const [one, two] = [cumulated(lead), cumulated(frame)];
  const scale = frame.values.length / lead.values.length;
  const at = (value: number) => (value < 0 ? 0 : value > 254 ? 255 : quantile(two, Math.max(1, one[value]! * scale)));
  const row = (of: (value: number) => number) => Uint8Array.from({ length: 256 }, (_, value) => of(value));
  return {
    least: row((value) => at(value - 1 - SLACK)),
    most: row((value) => at(value + SLACK)),
    tones: row((value) => quantile(two, Math.max(1, (((one[value - 1] ?? 0) + one[value]!) / 2) * scale))),
  };
}

/** The darkest or the brightest of each pixel and the two beside it, `step` apart. */
function extreme(values: Uint8Array, step: number, brightest: boolean): Uint8Array {
  const result = Uint8Array.from(values);
  for (let at = step; at < values.length - step; at++) {
    const [before, here, after] = [values[at - step]!, values[at]!, values[at + step]!];
    result[at] = brightest ? Math.max(before, here, after) : Math.min(before, here, after);
  }
  return result;
}

/** The lead frame as others are held against it: an edge may lie between two pixels, so each pixel stands for its neighbours too. */
export interface Reference {
  picture: RawPicture;
  grey: Grey;
  darkest: Uint8Array;
  brightest: Uint8Array;
}

export function referenceOf(picture: RawPicture, grey: Grey): Reference {
  const of = (brightest: boolean) => extreme(extreme(grey.values, 1, brightest), grey.width, brightest);
  return { picture, grey, darkest: of(false), brightest: of(true) };
}

/** Mean distance of each cell from what the frame can show where the lead frame stands still. */
function differences(
  { grey: lead, darkest, brightest }: Reference,
  { least, most }: Range,
  frame: Grey,
  shift: Shift,
  { columns, rows }: { columns: number; rows: number },
): Float32Array {
  const found = new Float32Array(columns * rows);
  const { width, height } = lead;
  for (let y = Math.max(0, -shift.y); y < Math.min(height, height - shift.y); y++) {
    const row = Math.floor(y / CELL) * columns;
    for (let x = Math.max(0, -shift.x), at = y * width + x; x < Math.min(width, width - shift.x); x++, at++) {
      const value = frame.values[at + shift.y * width + shift.x]!;
      const [low, high] = [least[darkest[at]!]!, most[brightest[at]!]!];
      if (value < low) found[row + Math.floor(x / CELL)]! -= low - value;
      else if (value > high) found[row + Math.floor(x / CELL)]! += value - high;
    }
  }
  // Noise goes both ways and cancels out; what stands in the way is darker or brighter throughout.
  return found.map((sum) => Math.abs(sum) / (CELL * CELL));
}

/** The largest or the mean of each cell and its eight neighbours. */
function around(cells: Float32Array, columns: number, combine: (values: number[]) => number): Float32Array {
  return cells.map((_, at) => {
    const column = at % columns;
    const near = [-columns, 0, columns].flatMap((row) =>
      [-1, 0, 1].filter((step) => column + step >= 0 && column + step < columns).map((step) => cells[at + row + step]),
    );
    return combine(near.filter((value) => value !== undefined));
  });
}

const mean = (values: number[]) => values.reduce((sum, value) => sum + value, 0) / values.length;

/**
 * Where something stands in a frame that does not stand in the lead frame, or the other way round, the lead frame is taken instead: both are brought to
 * one exposure by matching their histograms; squares that differ are filled with what the lead frame shows there, at this frame's exposure, the squares
 * beside them too, with a soft border. What moves is thus seen once, as the lead frame has it, and no level of the pyramid keeps anything of the rest.
 * Where the lead frame is white (or black), a frame can show any value that is as bright (as dark): what moves before a clipped sky in two other frames is not
 * noticed, and what is filled in there is of one tone. Own method, of the kind that Srikantha and Sidibé (Ghost detection and removal for high dynamic
 * range images, Signal Processing: Image Communication 27, 2012) describe as choosing a reference exposure.
 * @param scale Pixels of the picture in one of its grey copy.
 * @returns Nothing where all is believed.
 */
export function patchFor(reference: Reference, frame: Grey, shift: Shift, scale: number): Patch | null {
  // One more each way for the pixels that make no whole square.
  const columns = Math.ceil(reference.grey.width / CELL) + 1;
  const rows = Math.ceil(reference.grey.height / CELL) + 1;
  const whole = { x: Math.round(shift.x), y: Math.round(shift.y) };
  const range = ranges(reference.grey, frame);
  const found = differences(reference, range, frame, whole, { columns, rows });
  if (found.every((difference) => difference <= BELIEVED)) return null;
  const doubted = found.map((difference) => Math.max(0, Math.min(1, (difference - BELIEVED) / (DISBELIEVED - BELIEVED))));
  const widened = around(
    around(doubted, columns, (near) => Math.max(...near)),
    columns,
    mean,
  );
  const shares = widened.map((doubt) => 1 - doubt);
  return { cell: CELL * scale, columns, shares, lead: reference.picture, tones: range.tones };
}
