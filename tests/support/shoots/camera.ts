import type { Chance } from './chance.ts';
import type { Curve } from './scenery.ts';

/** Engraved times in seconds, from dark to bright, a third of a stop apart (common practice of makers). */
const below = (text: string) => text.split(' ').map((each) => 1 / Number(each));
const THIRDS = [
  ...below(
    '8000 6400 5000 4000 3200 2500 2000 1600 1250 1000 800 640 500 400 320 250 200 160 125 100 80 60 50 40 30 25 20 15 13 10 8 6 5 4',
  ),
  ...[0.3, 0.4, 0.5, 0.6, 0.8, 1, 1.3, 1.6, 2, 2.5, 3.2, 4, 5, 6, 8, 10, 13, 15, 20, 25, 30],
];
/** The same half a stop apart. */
const HALVES = [
  ...below('8000 6000 4000 3000 2000 1500 1000 750 500 350 250 180 125 90 60 45 30 20 15 10 8 6 4 3'),
  ...[0.5, 0.7, 1, 1.5, 2, 3, 4, 6, 8, 10, 15, 20, 30],
];

/** A body in somebody's hands. What it does not write stays null in all its frames. */
export interface Camera {
  make: string | null;
  model: string | null;
  serial: string | null;
  lens: string | null;
  focalLength: number;
  fNumber: number | null;
  iso: number;
  width: number;
  height: number;
  prefix: string;
  /** One, or two where it writes each exposure as a picture and as a raw file. */
  extensions: readonly string[];
  /** Number of the next file, 1 to 9999. */
  counter: number;
  subSeconds: boolean;
  /** Minutes east of UTC; null where it is not written. */
  zone: number | null;
  writesBias: boolean;
  writesMode: boolean;
  /** It leaves the bias at 0 within a bracket, and its mark as well where it writes none. */
  biasMoves: boolean;
  curve: Curve;
  /** Stops between two settings of its shutter: 1/3, 1/2, or any (a telephone). */
  series: 'thirds' | 'halves' | 'free';
  thumbs: boolean;
}

const MAKES = [
  ['Halden', 'Quay 5'],
  ['Halden', 'Quay 7'],
  ['Orme', 'Survey II'],
] as const;

export function buyCamera(chance: Chance, like?: Camera): Camera {
  const [make, model] = like ? [like.make, like.model] : chance.is(0.05) ? [null, null] : chance.pick(MAKES);
  const series = chance.pick(['thirds', 'thirds', 'thirds', 'halves', 'free'] as const);
  const [width, height] = chance.pick([
    [6000, 4000],
    [8256, 5504],
    [4000, 6000],
  ] as const);
  return {
    make,
    model,
    serial: chance.is(0.7) ? String(chance.whole(100_000, 999_999)) : null,
    lens: chance.is(0.7) ? chance.pick(['Arc 24 mm', 'Arc 16-35 mm', 'Arc 50 mm']) : null,
    focalLength: chance.pick([16, 24, 35, 50]),
    fNumber: chance.is(0.08) ? null : chance.pick([5.6, 8, 9, 11, 13, 16]),
    iso: chance.pick([64, 100, 125, 200, 400]),
    width,
    height,
    prefix: chance.pick(['HL_', 'DSC', 'IMG_', '_ORM']) + (like ? 'B' : ''),
    extensions: chance.pick([['jpg'], ['JPG'], ['tif'], ['dng'], ['jpg', 'dng']]),
    counter: chance.is(0.1) ? chance.whole(9960, 9999) : chance.whole(1, 9000),
    subSeconds: chance.is(0.7),
    zone: chance.is(0.6) ? chance.pick([60, 120, -300, 330]) : null,
    writesBias: chance.is(0.8),
    writesMode: chance.is(0.8),
    biasMoves: chance.is(0.7),
    curve: chance.pick(['straight', 'shoulder'] as const),
    series,
    thumbs: chance.is(0.93),
  };
}

/** Steps, in stops, that a camera can be set to between the frames of a bracket. */
export function stepsOf({ series }: Camera): readonly number[] {
  if (series === 'halves') return [0.5, 1, 2, 2];
  return series === 'thirds' ? [1 / 3, 2 / 3, 1, 1, 2, 2, 2, 3] : [1, 2, 2];
}

/** The shutter time a camera sets, and writes, for the exact one. Null beyond what it has. */
export function setShutter(camera: Camera, exact: number): number | null {
  if (camera.series === 'free') return exact >= 1 / 12_000 && exact <= 30 ? Number(exact.toPrecision(5)) : null;
  const series = camera.series === 'thirds' ? THIRDS : HALVES;
  const steps = camera.series === 'thirds' ? 3 : 2;
  // The first of both is 1/8192 s exactly.
  const at = Math.round((Math.log2(exact) + 13) * steps);
  return series[at] ?? null;
}
