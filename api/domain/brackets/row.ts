import { brightness } from './stops.ts';
import { MOST_EXPOSURES, type BracketCandidate } from './candidate.ts';
import { compareNumbers, fileNumber, filesBetween, ofTwoCounters, type FileNumber } from './file-number.ts';
import { decodeThumb } from './likeness.ts';
import { momentsOf, type Moment } from './moment.ts';

/** A frame with what is derived from it once. */
export interface Exposure {
  frame: BracketCandidate;
  moment: Moment;
  file: FileNumber;
  /** See stops.ts; null where the shutter time is unknown. */
  stops: number | null;
  /** Milliseconds that the shutter was open. */
  lasts: number;
  /** Decoded; see candidate.ts. */
  thumb: Uint8Array | null;
}

/** Exposures of one body with one setting of lens and size, each begun soon after the one before it. */
export type Row = Exposure[];

/** The next frame of a bracket begins within this after the end of the one before it. Milliseconds. */
const LONGEST_PAUSE = 2000;
/** A shutter marked 30 s is open for 32 s: engraved times are up to 7% off. */
const ENGRAVED = 0.07;

function fits<T>(one: T | null, two: T | null): boolean {
  return one === null || two === null || one === two;
}

function sameSerial({ frame: one }: Exposure, { frame: two }: Exposure): boolean {
  return one.serial !== null && one.serial === two.serial;
}

/** By serial number, else by make and model; two of one model without numbers are told apart by the counters in their file names. */
function sameBody(one: Exposure, two: Exposure): boolean {
  if (sameSerial(one, two)) return fits(one.frame.model, two.frame.model);
  if (!fits(one.frame.serial, two.frame.serial) || ofTwoCounters(one.file, two.file)) return false;
  return one.frame.make === two.frame.make && one.frame.model === two.frame.model;
}

function sameFocalLength(one: number | null, two: number | null): boolean {
  return one === null || two === null || Math.abs(one - two) <= 0.01 * one;
}

/** A bracket lies in files of one kind: a picture and its raw file are two rows, and what somebody finished and named is none of the camera's row. */
function sameKind({ file: one }: Exposure, { file: two }: Exposure): boolean {
  return one.extension === two.extension && one.byCamera === two.byCamera;
}

function sameSetting(first: Exposure, second: Exposure): boolean {
  const [one, two] = [first.frame, second.frame];
  const sameSize = one.width === two.width && one.height === two.height;
  return sameSize && sameBody(first, second) && fits(one.lens, two.lens) && sameFocalLength(one.focalLength, two.focalLength);
}

/** Shortest time, in milliseconds, between the end of one exposure and the beginning of the next, as far as the clock can tell. */
function pauseBetween(one: Exposure, two: Exposure): number {
  return two.moment.begins - (one.moment.begins + one.moment.unsure) - one.lasts * (1 + ENGRAVED);
}

/** One body cannot begin an exposure while the shutter is open. */
function overlap(one: Exposure, two: Exposure): boolean {
  return two.moment.begins + two.moment.unsure < one.moment.begins + one.lasts * (1 - 2 * ENGRAVED) - 100;
}

function last(row: Row): Exposure {
  return row[row.length - 1] as Exposure;
}

function continues(row: Row, next: Exposure): boolean {
  const before = last(row);
  if (!sameKind(before, next) || pauseBetween(before, next) > LONGEST_PAUSE || overlap(before, next)) return false;
  return row.slice(-MOST_EXPOSURES).every((one) => sameSetting(one, next));
}

/** How surely a frame comes from the body of a row: by its serial number, then by the counter in the file names. */
function nearness(row: Row, next: Exposure): number {
  const before = last(row);
  const serial = sameSerial(before, next) ? 4 : 0;
  const files = filesBetween(before.file, next.file);
  return serial + (files === 1 ? 2 : files !== null && Math.abs(files) < 20 ? 1 : 0);
}

/** The body has turned to something else: what it was at before is over. */
function isOver(row: Row, next: Exposure): boolean {
  const before = last(row);
  if (pauseBetween(before, next) > LONGEST_PAUSE) return true;
  if (!sameKind(before, next) || !sameBody(before, next)) return false;
  return sameSerial(before, next) || filesBetween(before.file, next.file) === 1;
}

function inOrder(one: Exposure, two: Exposure): number {
  return (
    one.moment.begins - two.moment.begins ||
    compareNumbers(one.file, two.file) ||
    (one.stops ?? 0) - (two.stops ?? 0) ||
    (one.frame.id < two.frame.id ? -1 : 1)
  );
}

function exposuresOf(frames: readonly BracketCandidate[]): Exposure[] {
  const moments = momentsOf(frames);
  const exposures = [...moments].map(([frame, moment]) => ({
    frame,
    moment,
    file: fileNumber(frame.name),
    stops: brightness(frame),
    lasts: Math.max(0, frame.exposureTime ?? 0) * 1000,
    thumb: decodeThumb(frame.thumb),
  }));
  return exposures.sort(inOrder);
}

/** Follows every body through the shoot: frames of several bodies may lie between each other. Rows are in the order they began. */
export function rowsOf(frames: readonly BracketCandidate[]): Row[] {
  const rows: Row[] = [];
  let open: Row[] = [];
  for (const next of exposuresOf(frames)) {
    const own = open
      .filter((row) => continues(row, next))
      .reduce<Row | null>((best, row) => (best && nearness(best, next) >= nearness(row, next) ? best : row), null);
    open = open.filter((row) => row === own || !isOver(row, next));
    if (own) own.push(next);
    else {
      open.push([next]);
      rows.push(open[open.length - 1] as Row);
    }
  }
  return rows;
}
