import type { Shot } from './exif.ts';
import { lights } from './light.ts';
import type { Format, Scene } from './scene.ts';
import { sceneNamed } from './scenes.ts';
import { kit, shutter } from './settings.ts';
import { type Assignment, assignments, type Finish, type Take } from './takes.ts';

/** Pixels along the longer side of a frame. */
export const LONG_SIDE = 3072;

/** One file of the demo, before it is drawn. */
export interface PlannedFrame {
  name: string;
  assignment: Assignment;
  scene: string;
  words: string;
  step: number;
  /** Frames of one bracket share this name; null for a single frame. */
  bracket: string | null;
  encoding: 'jpeg' | 'tiff' | 'p3';
  /** Size as it is looked at. */
  width: number;
  height: number;
  shot: Shot;
  finish: Finish | null;
}

/** One drawing and the files that come from it. */
export interface PlannedTake {
  take: Take;
  scene: Scene;
  /** Size as it is looked at. */
  width: number;
  height: number;
  frames: PlannedFrame[];
}

/** Hour at which an assignment's day begins, from its first scene's light. */
const firstHour = { dawn: 7.6, morning: 9.2, overcast: 10.4, day: 12.5, gold: 14.8, dusk: 16.4, blue: 16.9, night: 19, fog: 8.4 };
const OFFSET_HOURS = 1;

function sizeOf(format: Format, longSide: number): [number, number] {
  const even = (v: number): number => Math.round(v / 2) * 2;
  if (format === 'landscape') return [longSide, even((longSide * 2) / 3)];
  if (format === 'portrait') return [even((longSide * 2) / 3), longSide];
  return [longSide, even((longSide * 3) / 4)];
}

/** Local time in Vessmouth with hundredths and offset, for an instant in milliseconds. */
function localTime(instant: number): string {
  const local = new Date(Math.round(instant / 10) * 10 + OFFSET_HOURS * 3600_000).toISOString();
  return `${local.slice(0, 22)}+0${OFFSET_HOURS}:00`;
}

/** All takes of the demo with their files, counted back from `today`. */
export function planFrames(today: Date, longSide = LONG_SIDE): PlannedTake[] {
  return (Object.keys(assignments) as Assignment[]).flatMap((assignment) => planAssignment(assignment, today, longSide));
}

function planAssignment(assignment: Assignment, today: Date, longSide: number): PlannedTake[] {
  const { daysAgo, firstNumber, takes } = assignments[assignment];
  const midnight = Math.floor(today.getTime() / 86_400_000 - daysAgo) * 86_400_000;
  let clock = midnight + (firstHour[sceneNamed(takes[0]!.scene).light] - OFFSET_HOURS) * 3600_000;
  let number = firstNumber;
  return takes.map((take) => {
    const scene = sceneNamed(take.scene);
    // Never before the hour its light needs.
    clock = Math.max(clock + take.pause * 60_000 + 13_370, midnight + (firstHour[scene.light] - OFFSET_HOURS) * 3600_000);
    const planned = planTake(assignment, take, scene, clock, number, longSide);
    number += take.steps.length;
    clock = Date.parse(planned.frames[take.steps.length - 1]!.shot.takenAt);
    return planned;
  });
}

function planTake(assignment: Assignment, take: Take, scene: Scene, start: number, number: number, longSide: number): PlannedTake {
  const [width, height] = sizeOf(scene.format, longSide);
  const nameOf = (i: number): string => `HL_${String(number + i).padStart(4, '0')}`;
  const encoding = take.format ?? 'jpeg';
  let clock = start;
  const common = { assignment, scene: scene.name, words: scene.words, width, height };
  const frames = take.steps.map((step, i): PlannedFrame => {
    const shot = shotOf(take, scene, step, clock, width, height, encoding);
    // The camera needs half a second between the frames of a bracket.
    clock += shot.seconds * 1000 + 480;
    const bracket = take.steps.length > 1 ? `${nameOf(0)}-bracket` : null;
    return { ...common, name: `${nameOf(i)}.${encoding === 'tiff' ? 'tif' : 'jpg'}`, step, bracket, encoding, shot, finish: null };
  });
  // A final keeps the name of the bracket's middle exposure, as retouchers do.
  const middle = frames.find((frame) => frame.step === 0) ?? frames[0]!;
  const finals = (take.finishes ?? []).map((finish): PlannedFrame => {
    const stem = middle.name.slice(0, 7);
    const shot = { ...middle.shot, orientation: 1 as const, width, height };
    return {
      ...common,
      name: `${stem}${finish.suffix}.${finish.format === 'tiff' ? 'tif' : 'jpg'}`,
      step: 0,
      bracket: null,
      encoding: finish.format,
      shot,
      finish,
    };
  });
  return { take, scene, width, height, frames: [...frames, ...finals] };
}

function shotOf(take: Take, scene: Scene, step: number, clock: number, width: number, height: number, encoding: string): Shot {
  const aperture = take.aperture ?? 8;
  const sensitivity = take.sensitivity ?? 100;
  const exposureValue = scene.weather?.exposureValue ?? lights[scene.light].exposureValue;
  // The sensor lies across: a frame taken upright is stored lying and says so.
  const turned = scene.format === 'portrait' && encoding !== 'tiff';
  return {
    ...kit(scene.format, scene.camera.focal),
    aperture,
    sensitivity,
    seconds: shutter(exposureValue, aperture, sensitivity, step),
    takenAt: localTime(clock),
    bias: step,
    bracketed: take.steps.length > 1,
    width: turned ? height : width,
    height: turned ? width : height,
    orientation: turned ? 6 : 1,
    calibrated: encoding !== 'p3',
    place: take.place ?? null,
  };
}
