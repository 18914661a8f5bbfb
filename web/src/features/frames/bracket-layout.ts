import type { Proportioned } from '../../ui/justify.ts';

/** How a bracket lies in a column: its proof, and its frames in lines. CSS pixels. */
export interface BracketLayout {
  proof: { width: number; height: number };
  /** The frames stand beside the proof; else below it. */
  beside: boolean;
  /** Index of the first frame of each line among the bracket's frames. */
  lines: { first: number; widths: number[]; height: number }[];
}

export interface BracketSpace {
  /** Width of the column. */
  width: number;
  gap: number;
  /** Height of the words below each picture. */
  caption: number;
}

/** Frames beside the proof are no lower than this: a caption such as "+4 31% clipped" has to fit below. */
const LOWEST = 72;
const LOWEST_BELOW = 64;
const HIGHEST = 150;
/** How much higher the proof is than its frames where these stand in one line. */
const PROOF_TO_FRAME = 1.55;
const PROOF_BELOW = 230;

const proportion = ({ width, height }: Proportioned) => (width > 0 && height > 0 ? width / height : 1.5);
const sum = (numbers: readonly number[]) => numbers.reduce((total, one) => total + one, 0);

/**
 * Lays a bracket: the proof larger at the left and its frames beside it on the same foot, in one line or in two as high as the proof; where that
 * would make them too small, the frames in even lines below. No picture is cropped.
 */
export function layBracket(proof: Proportioned, frames: readonly Proportioned[], space: BracketSpace): BracketLayout {
  const tries = [inOneLine(proof, frames, space), frames.length > 3 ? inTwoLines(proof, frames, space) : null];
  return tries.find((layout) => layout !== null) ?? below(proof, frames, space);
}

function inOneLine(proof: Proportioned, frames: readonly Proportioned[], { width, gap }: BracketSpace): BracketLayout | null {
  const shapes = frames.map(proportion);
  const filling = (width - gap * frames.length) / (PROOF_TO_FRAME * proportion(proof) + sum(shapes));
  if (filling < LOWEST) return null;
  const height = Math.min(filling, HIGHEST);
  return {
    proof: sized(proof, height * PROOF_TO_FRAME),
    beside: true,
    lines: [{ first: 0, widths: shapes.map((shape) => shape * height), height }],
  };
}

function inTwoLines(proof: Proportioned, frames: readonly Proportioned[], { width, gap, caption }: BracketSpace): BracketLayout | null {
  const half = Math.ceil(frames.length / 2);
  const parts = [frames.slice(0, half), frames.slice(half)].map((part) => part.map(proportion));
  const between = caption + gap;
  const widest = Math.max(...parts.map(sum));
  const height = (width - gap * half - between * proportion(proof)) / (2 * proportion(proof) + widest);
  if (height < LOWEST) return null;
  const line = (shapes: number[], first: number) => ({ first, widths: shapes.map((shape) => shape * height), height });
  return { proof: sized(proof, 2 * height + between), beside: true, lines: parts.map((shapes, at) => line(shapes, at * half)) };
}

function below(proof: Proportioned, frames: readonly Proportioned[], { width, gap }: BracketSpace): BracketLayout {
  const height = Math.min(PROOF_BELOW, width / proportion(proof));
  const fits = (shapes: readonly number[]) => (width - gap * (shapes.length - 1)) / sum(shapes);
  const shapes = frames.map(proportion);
  // As few lines as leave the frames large enough, and as many frames in one as in the other.
  let count = 1;
  let parts = [shapes];
  while (count < shapes.length && Math.min(...parts.map(fits)) < LOWEST_BELOW) parts = evenly(shapes, ++count);
  const common = Math.min(HIGHEST, ...parts.map(fits));
  const lines = parts.map((part, at) => ({
    first: sum(parts.slice(0, at).map((one) => one.length)),
    widths: part.map((shape) => shape * common),
    height: common,
  }));
  return { proof: sized(proof, height), beside: false, lines };
}

function evenly(shapes: readonly number[], count: number): number[][] {
  const size = Math.ceil(shapes.length / count);
  return Array.from({ length: Math.ceil(shapes.length / size) }, (_, at) => shapes.slice(at * size, (at + 1) * size));
}

function sized(picture: Proportioned, height: number): { width: number; height: number } {
  return { width: height * proportion(picture), height };
}
