import type { BracketCandidate } from '../../../api/domain/brackets.ts';
import type { Camera } from './camera.ts';
import type { Chance } from './chance.ts';
import { thumbOf, type Place } from './scenery.ts';

/** One press of the shutter as the generator thinks of it. */
export interface Press {
  /** Milliseconds since 1970. */
  at: number;
  /** Seconds, as the camera writes them. */
  seconds: number;
  iso?: number;
  bias: number;
  mode: 0 | 1 | 2;
  place: Place;
  direction: number;
  /** Stops by which the picture comes out brighter than one that was metered. */
  brighter: number;
}

/** The wall clock as read-settings writes it: without the fraction where the camera has none, and without trailing zeros. */
function wallClock(at: number, camera: Camera, zone: number): string {
  const fine = camera.subSeconds ? Math.floor(at / 10) * 10 : Math.floor(at / 1000) * 1000;
  const text = new Date(fine + zone * 60_000).toISOString().slice(0, -1);
  return text.replace(/\.?0+$/, (zeros) => (zeros.startsWith('.') || text.endsWith('.000') ? '' : zeros.replace(/0+$/, '')));
}

function nextStem(camera: Camera): string {
  const stem = `${camera.prefix}${String(camera.counter).padStart(4, '0')}`;
  camera.counter = camera.counter === 9999 ? 1 : camera.counter + 1;
  return stem;
}

/** Now and then a single tag is lost on the way. */
const lost = <T>(chance: Chance, value: T): T | null => (chance.is(0.005) ? null : value);

const anyId = (chance: Chance) => Array.from({ length: 4 }, () => chance.whole(0, 0xffff).toString(16).padStart(4, '0')).join('');

/** The frames of a press, one for each kind of file the camera writes. `zone` is where its clock stood, in minutes east of UTC. */
export function press(camera: Camera, what: Press, zone: number, chance: Chance): BracketCandidate[] {
  const takenLocal = wallClock(what.at, camera, zone);
  const stem = nextStem(camera);
  return camera.extensions.map((extension) => ({
    id: anyId(chance),
    name: `${stem}.${extension}`,
    takenLocal,
    takenAt: camera.zone === null ? null : Date.parse(`${takenLocal}Z`) - zone * 60_000,
    exposureTime: what.seconds,
    fNumber: lost(chance, camera.fNumber),
    iso: lost(chance, what.iso ?? camera.iso),
    exposureBias: camera.writesBias ? lost(chance, what.bias) : null,
    exposureMode: camera.writesMode ? lost(chance, what.mode) : null,
    make: camera.make,
    model: camera.model,
    serial: camera.serial,
    lens: lost(chance, camera.lens),
    focalLength: lost(chance, camera.focalLength),
    width: camera.width,
    height: camera.height,
    thumb: camera.thumbs ? thumbOf(what.place, what.direction, what.brighter, camera.curve, chance) : null,
  }));
}
