import { alignedRows, type AlignedFrame } from './aligned-frame.ts';
import type { EdgeRule, FusionConventions } from './conventions.ts';
import { floatLevel, GrownRows, levelSizes, shrinkLevel, type FloatLevel, type Level } from './levels.ts';
import { growTaps, type Row } from './pyramid-rows.ts';
import { rowsOf, type Share } from './share.ts';
import { weighFrames } from './weigh-frames.ts';

/** Everything a fusion reads and writes. Plain data over memory that threads can share. */
export interface FusionPlan {
  width: number;
  height: number;
  frames: AlignedFrame[];
  rule: Omit<FusionConventions, 'levels'>;
  levels: number;
  /** Floats for weights and pyramids: `workspaceLength` of them. */
  workspace: Float32Array;
  /** RGB bytes of the result. */
  result: Uint8ClampedArray;
}

type Size = { width: number; height: number };

/** Samples a frame takes: one weight for a pixel of the picture, one weight and three colours for each of the levels above; and three for what is fused so far. */
export function workspaceLength({ width, height }: Size, frames: number, levels: number): number {
  const [, ...coarser] = levelSizes(width, height, levels);
  return width * height * frames + coarser.reduce((total, size) => total + size.width * size.height * (4 * frames + 3), 0);
}

/** The levels of one frame, the picture's own first. */
interface FramePyramid {
  colours: Level[];
  weights: FloatLevel[];
}

function pictureLevel(frame: AlignedFrame, { width, height }: Size): Level {
  return { width, height, channels: 3, row: alignedRows(frame, width, height) };
}

function layOut(plan: FusionPlan): { frames: FramePyramid[]; fused: FloatLevel[] } {
  const [size, ...coarser] = levelSizes(plan.width, plan.height, plan.levels) as [Size, ...Size[]];
  let used = 0;
  const take = (of: Size, channels: number) => {
    const length = of.width * of.height * channels;
    return floatLevel(plan.workspace.subarray(used, (used += length)), of);
  };
  const frames = plan.frames.map((frame) => ({
    weights: [size, ...coarser].map((of) => take(of, 1)),
    colours: [pictureLevel(frame, size), ...coarser.map((of) => take(of, 3))],
  }));
  return { frames, fused: coarser.map((of) => take(of, 3)) };
}

/** Adds a frame's share of one row: its weight times what the row holds beyond the coarser level. */
function addDetail(
  sum: Float32Array,
  row: Row,
  weights: Float32Array,
  around: [Float32Array, Float32Array, Float32Array],
  y: number,
): void {
  const [above, middle, below] = around;
  const [a, b, c] = growTaps(y);
  for (let x = 0, at = 0; x < weights.length; x++, at += 3) {
    const weight = weights[x]!;
    sum[at]! += weight * (row[at]! - a * above[at]! - b * middle[at]! - c * below[at]!);
    sum[at + 1]! += weight * (row[at + 1]! - a * above[at + 1]! - b * middle[at + 1]! - c * below[at + 1]!);
    sum[at + 2]! += weight * (row[at + 2]! - a * above[at + 2]! - b * middle[at + 2]! - c * below[at + 2]!);
  }
}

/** The coarsest level is blended as it is. */
function addPlain(sum: Float32Array, row: Row, weights: Float32Array): void {
  for (let x = 0, at = 0; x < weights.length; x++) for (const end = at + 3; at < end; at++) sum[at]! += weights[x]! * row[at]!;
}

/** Fuses rows of one level over what is fused of the coarser one. */
function fuseLevel(
  frames: FramePyramid[],
  level: number,
  fused: FloatLevel[],
  result: (y: number) => Float32Array | Uint8ClampedArray,
  edge: EdgeRule,
  [from, to]: [number, number],
): void {
  const { width } = frames[0]!.weights[level]!;
  const sum = new Float32Array(width * 3);
  const coarser = fused[level];
  const below = coarser && new GrownRows(coarser, width, edge);
  const grown = frames.map(({ colours }) => (coarser ? new GrownRows(colours[level + 1] as FloatLevel, width, edge) : null));
  for (let y = from; y < to; y++) {
    sum.fill(0);
    if (below) {
      const [[above, middle, under], [a, b, c]] = [below.around(y), growTaps(y)];
      for (let at = 0; at < sum.length; at++) sum[at] = a * above[at]! + b * middle[at]! + c * under[at]!;
    }
    frames.forEach(({ colours, weights }, index) => {
      const [row, weight, around] = [colours[level]!.row(y), weights[level]!.row(y), grown[index]?.around(y)];
      if (around) addDetail(sum, row, weight, around, y);
      else addPlain(sum, row, weight);
    });
    result(y).set(sum);
  }
}

/** Runs one thread's share of a fusion; `plan.result` is complete when all have come to its end. */
export function fuse(plan: FusionPlan, share: Share): void {
  const { frames, fused } = layOut(plan);
  const rule = { ...plan.rule, levels: () => plan.levels };
  weighFrames(
    plan.frames,
    frames.map(({ weights }) => weights[0]!),
    rule,
    rowsOf(share, plan.height),
  );
  share.meet();
  fused.forEach(({ height }, level) => {
    for (const { colours, weights } of frames) {
      shrinkLevel(colours[level]!, colours[level + 1] as FloatLevel, rule.edge, rowsOf(share, height));
      shrinkLevel(weights[level]!, weights[level + 1]!, rule.edge, rowsOf(share, height));
    }
    share.meet();
  });
  const stride = plan.width * 3;
  for (let level = plan.levels - 1; level >= 0; level--) {
    const target = level > 0 ? (y: number) => fused[level - 1]!.row(y) : (y: number) => plan.result.subarray(y * stride, (y + 1) * stride);
    fuseLevel(frames, level, fused, target, rule.edge, rowsOf(share, frames[0]!.weights[level]!.height));
    share.meet();
  }
}
