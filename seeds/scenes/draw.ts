import { type ChildProcess, fork } from 'node:child_process';
import fs from 'node:fs/promises';
import { createRequire } from 'node:module';
import os from 'node:os';
import path from 'node:path';
import { fileURLToPath, pathToFileURL } from 'node:url';
import type { Answer, Order } from './draw-child.ts';
import { exists } from './draw-take.ts';
import { LONG_SIDE, type PlannedFrame, type PlannedTake, planFrames } from './frames.ts';
import type { Assignment } from './takes.ts';

/** A frame that lies in the folder. */
export interface DrawnFrame {
  file: string;
  name: string;
  /** Size as it is looked at. */
  width: number;
  height: number;
  assignment: Assignment;
  scene: string;
  words: string;
  /** ISO 8601 with offset. */
  takenAt: string;
  /** Frames of one bracket share this; null for a single frame. */
  bracket: string | null;
  step: number;
  /** True for a finished file, which is no frame of the shoot. */
  final: boolean;
}

export interface DrawOptions {
  dir: string;
  onProgress?: (drawn: number, total: number) => void;
  /** The day from which the shoots are counted back; what a first run chose is kept. */
  today?: Date;
  /** Pixels along the longer side. */
  longSide?: number;
  /** Only these scenes. */
  scenes?: readonly string[];
}

/**
 * Draws the demo's frames into a folder and lists them. Frames that are there already are not drawn again, so a second
 * call is quick and a killed one goes on where it stopped. Works on all cores through child processes.
 */
export async function drawDemoFrames(options: DrawOptions): Promise<DrawnFrame[]> {
  const { dir, longSide = LONG_SIDE } = options;
  await fs.mkdir(dir, { recursive: true });
  const today = await firstDay(dir, options.today ?? new Date());
  const plan = planFrames(today, longSide).map((planned, number) => ({ ...planned, number }));
  const wanted = plan.filter(({ take }) => !options.scenes || options.scenes.includes(take.scene));
  const total = wanted.reduce((sum, { frames }) => sum + frames.length, 0);
  const waiting: (PlannedTake & { number: number })[] = [];
  let drawn = 0;
  for (const planned of wanted) {
    const missing = await missingFiles(planned, dir);
    drawn += planned.frames.length - missing;
    if (missing > 0) waiting.push(planned);
  }
  options.onProgress?.(drawn, total);
  const order = (take: number): Order => ({ take, dir, today: today.toISOString(), longSide });
  await inChildren(
    byPlace(waiting).map((takes) => takes.map(({ number }) => order(number))),
    () => options.onProgress?.(++drawn, total),
  );
  return wanted.flatMap(({ frames }) => frames.map((frame) => drawnFrame(frame, dir)));
}

/** The day the first run took for today: frames keep their dates when a run is continued on the next day. */
async function firstDay(dir: string, today: Date): Promise<Date> {
  const file = path.join(dir, 'shot-on.json');
  if (await exists(file)) {
    const { day } = JSON.parse(await fs.readFile(file, 'utf8')) as { day: string };
    return new Date(day);
  }
  await fs.writeFile(`${file}.part`, JSON.stringify({ day: today.toISOString() }));
  await fs.rename(`${file}.part`, file);
  return today;
}

async function missingFiles(planned: PlannedTake, dir: string): Promise<number> {
  const there = await Promise.all(planned.frames.map(({ name }) => exists(path.join(dir, name))));
  return there.filter((each) => !each).length;
}

function drawnFrame(frame: PlannedFrame, dir: string): DrawnFrame {
  const { name, width, height, assignment, scene, words, bracket, step } = frame;
  return {
    file: path.join(dir, name),
    name,
    width,
    height,
    assignment,
    scene,
    words,
    takenAt: frame.shot.takenAt,
    bracket,
    step,
    final: frame.finish !== null,
  };
}

/** Takes of one place stay together, so that its city is built once; the longest rows come first, so that no core is left alone. */
function byPlace<T extends PlannedTake>(takes: readonly T[]): T[][] {
  const places = new Map<unknown, T[]>();
  for (const take of takes) places.set(take.scene.build, [...(places.get(take.scene.build) ?? []), take]);
  return [...places.values()].sort((a, b) => b.length - a.length);
}

/** Hands rows of orders to as many children as there are cores. */
async function inChildren(rows: Order[][], onFrame: () => void): Promise<void> {
  const queue = [...rows];
  const crew = Array.from({ length: Math.min(queue.length, os.availableParallelism()) }, () => startChild());
  try {
    await Promise.all(
      crew.map(async (child) => {
        for (let row = queue.shift(); row; row = queue.shift()) for (const order of row) await carryOut(child, order, onFrame);
      }),
    );
  } finally {
    for (const child of crew) child.kill();
  }
}

function startChild(): ChildProcess {
  const tsx = pathToFileURL(createRequire(import.meta.url).resolve('tsx')).href;
  return fork(fileURLToPath(new URL('./draw-child.ts', import.meta.url)), [], { execArgv: ['--import', tsx] });
}

function carryOut(child: ChildProcess, order: Order, onFrame: () => void): Promise<void> {
  return new Promise((resolve, reject) => {
    const settle = (act: () => void): void => {
      child.off('message', answered);
      child.off('exit', gone);
      act();
    };
    const answered = (answer: Answer): void => {
      if (answer.kind === 'frame') return onFrame();
      settle(() => (answer.kind === 'done' ? resolve() : reject(new Error(`A picture could not be drawn: ${answer.reason}`))));
    };
    const gone = (code: number | null, signal: string | null): void =>
      settle(() => reject(new Error(`The process that draws pictures ended early (${signal ?? code}).`)));
    child.on('message', answered);
    child.on('exit', gone);
    child.send(order);
  });
}
