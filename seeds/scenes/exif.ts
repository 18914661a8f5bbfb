import { directory, type Tag } from './tags.ts';
import type { Settings } from './settings.ts';

/** Everything a file says about how it was taken. */
export interface Shot extends Settings {
  /** Start of the exposure, ISO 8601 with sub-seconds and offset: "2026-11-25T16:58:03.42+01:00". */
  takenAt: string;
  bias: number;
  bracketed: boolean;
  width: number;
  height: number;
  /** Exif orientation: 1 upright, 6 to be turned by 90 degrees clockwise. */
  orientation: 1 | 6;
  /** Whether the colours are sRGB; another profile is called uncalibrated (Exif 2.32, ColorSpace). */
  calibrated: boolean;
  /** Degrees north and east; null where the camera knew no place. */
  place: readonly [number, number] | null;
}

const EXIF_POINTER = 0x8769;
const GPS_POINTER = 0x8825;

const fraction = (seconds: number): [number, number] => (seconds >= 0.3 ? [Math.round(seconds * 10), 10] : [1, Math.round(1 / seconds)]);

function main(shot: Shot): Tag[] {
  const [date, clock] = stamp(shot.takenAt);
  return [
    { tag: 0x010f, type: 'ascii', value: shot.make },
    { tag: 0x0110, type: 'ascii', value: shot.model },
    { tag: 0x0112, type: 'short', value: [shot.orientation] },
    { tag: 0x011a, type: 'rational', value: [300, 1] },
    { tag: 0x011b, type: 'rational', value: [300, 1] },
    { tag: 0x0128, type: 'short', value: [2] },
    { tag: 0x0132, type: 'ascii', value: `${date} ${clock}` },
    { tag: 0x0213, type: 'short', value: [1] },
    { tag: 0x013b, type: 'ascii', value: 'Harrow Lane Studio' },
    { tag: 0x8298, type: 'ascii', value: 'Harrow Lane Studio, Vessmouth' },
  ];
}

/** "2026-11-25T16:58:03.42+01:00" as Exif's date, time, sub-seconds and offset. */
function stamp(iso: string): [string, string, string, string] {
  const match = /^(\d{4})-(\d\d)-(\d\d)T(\d\d:\d\d:\d\d)\.(\d+)([+-]\d\d:\d\d)$/.exec(iso);
  if (!match) throw new Error(`Not a time with sub-seconds and offset: ${iso}`);
  return [`${match[1]}:${match[2]}:${match[3]}`, match[4]!, match[5]!, match[6]!];
}

function exposure(shot: Shot): Tag[] {
  const [date, clock, fine, offset] = stamp(shot.takenAt);
  return [
    { tag: 0x829a, type: 'rational', value: fraction(shot.seconds) },
    { tag: 0x829d, type: 'rational', value: [Math.round(shot.aperture * 10), 10] },
    { tag: 0x8822, type: 'short', value: [3] },
    { tag: 0x8827, type: 'short', value: [shot.sensitivity] },
    { tag: 0x9000, type: 'undefined', value: '0232' },
    { tag: 0x9003, type: 'ascii', value: `${date} ${clock}` },
    { tag: 0x9004, type: 'ascii', value: `${date} ${clock}` },
    { tag: 0x9010, type: 'ascii', value: offset },
    { tag: 0x9011, type: 'ascii', value: offset },
    { tag: 0x9101, type: 'undefined', value: [1, 2, 3, 0] },
    { tag: 0x9204, type: 'srational', value: [Math.round(shot.bias * 10), 10] },
    { tag: 0x9207, type: 'short', value: [5] },
    { tag: 0x920a, type: 'rational', value: [Math.round(shot.focal * 10), 10] },
    { tag: 0x9291, type: 'ascii', value: fine },
    { tag: 0xa000, type: 'undefined', value: '0100' },
    { tag: 0xa001, type: 'short', value: [shot.calibrated ? 1 : 0xffff] },
    { tag: 0xa002, type: 'long', value: [shot.width] },
    { tag: 0xa003, type: 'long', value: [shot.height] },
    { tag: 0xa402, type: 'short', value: [shot.bracketed ? 2 : 0] },
    { tag: 0xa405, type: 'short', value: [Math.round(shot.focalAs35)] },
    { tag: 0xa431, type: 'ascii', value: shot.serial },
    { tag: 0xa433, type: 'ascii', value: shot.make },
    { tag: 0xa434, type: 'ascii', value: shot.lens },
    { tag: 0xa435, type: 'ascii', value: shot.lensSerial },
  ];
}

function gps([north, east]: readonly [number, number]): Tag[] {
  const parts = (degrees: number): number[] => {
    const d = Math.abs(degrees);
    const minutes = (d % 1) * 60;
    return [Math.floor(d), 1, Math.floor(minutes), 1, Math.round((minutes % 1) * 6000), 100];
  };
  return [
    { tag: 0, type: 'byte', value: [2, 3, 0, 0] },
    { tag: 1, type: 'ascii', value: north >= 0 ? 'N' : 'S' },
    { tag: 2, type: 'rational', value: parts(north) },
    { tag: 3, type: 'ascii', value: east >= 0 ? 'E' : 'W' },
    { tag: 4, type: 'rational', value: parts(east) },
  ];
}

/** The three directories of a shot, to stand at `offset`; `raw` are entries the first one keeps. */
function directories(shot: Shot, offset: number, raw: readonly Buffer[] = []): Buffer {
  const pointers = (exif: number, place: number): Tag[] => [
    { tag: EXIF_POINTER, type: 'long', value: [exif] },
    ...(shot.place ? [{ tag: GPS_POINTER, type: 'long', value: [place] } as const] : []),
  ];
  const first = (exif: number, place: number): Buffer => directory([...main(shot), ...pointers(exif, place)], offset, raw);
  const exifAt = offset + first(0, 0).length;
  const exif = directory(exposure(shot), exifAt);
  const place = shot.place ? directory(gps(shot.place), exifAt + exif.length) : Buffer.alloc(0);
  return Buffer.concat([first(exifAt, exifAt + exif.length), exif, place]);
}

/** A JPEG with the shot's settings in its first segment, where Exif 2.32 wants them. */
export function intoJpeg(jpeg: Buffer, shot: Shot): Buffer {
  const header = Buffer.from('II*\0\x08\0\0\0', 'latin1');
  const body = Buffer.concat([Buffer.from('Exif\0\0', 'latin1'), header, directories(shot, 8)]);
  const marker = Buffer.from([0xff, 0xe1, 0, 0]);
  marker.writeUInt16BE(body.length + 2, 2);
  return Buffer.concat([jpeg.subarray(0, 2), marker, body, jpeg.subarray(2)]);
}

/** A little-endian TIFF with the shot's settings: its directory is written anew at the end, its pixels stay. */
export function intoTiff(tiff: Buffer, shot: Shot): Buffer {
  if (tiff.toString('latin1', 0, 4) !== 'II*\0') throw new Error('Only little-endian TIFF files are written here.');
  const at = tiff.readUInt32LE(4);
  const raw = Array.from({ length: tiff.readUInt16LE(at) }, (_, i) => tiff.subarray(at + 2 + i * 12, at + 14 + i * 12));
  const padded = tiff.length % 2 ? Buffer.concat([tiff, Buffer.alloc(1)]) : Buffer.from(tiff);
  padded.writeUInt32LE(padded.length, 4);
  return Buffer.concat([padded, directories(shot, padded.length, raw)]);
}
