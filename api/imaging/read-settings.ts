import exifr from 'exifr';
import sharp from 'sharp';
import { fNumberFromAperture, secondsFromTime } from '../domain/exposure.ts';
import type { JudgedFile } from './judge-file.ts';
import { takenTime, type TakenTime } from './taken-time.ts';

/** What a camera wrote about an exposure, in the columns of a frame. Null where it is unknown or cannot be meant. */
export interface ShootingSettings extends TakenTime {
  make: string | null;
  model: string | null;
  lens: string | null;
  serial: string | null;
  fNumber: number | null;
  /** Seconds. */
  exposureTime: number | null;
  iso: number | null;
  /** Millimetres. */
  focalLength: number | null;
  focalLength35: number | null;
  /** EV. */
  exposureBias: number | null;
  /** 0 automatic, 1 by hand, 2 automatic bracket. */
  exposureMode: number | null;
  /** 1 to 8. */
  orientation: number;
  /** Degrees, north and east positive. */
  latitude: number | null;
  longitude: number | null;
}

type Tags = Record<number, unknown>;
interface Blocks {
  ifd0?: Tags;
  exif?: Tags;
  gps?: Tags;
}

/** Tags by number (CIPA DC-008), values as written: no zone is guessed and no name translated. */
const OPTIONS = {
  tiff: true,
  ifd0: true,
  exif: true,
  gps: true,
  ifd1: false,
  interop: false,
  makerNote: false,
  userComment: false,
  xmp: false,
  icc: false,
  iptc: false,
  jfif: false,
  ihdr: false,
  mergeOutput: false,
  translateKeys: false,
  translateValues: false,
  reviveValues: false,
  sanitize: false,
} as unknown as Parameters<typeof exifr.parse>[1];

const LONGEST_TEXT = 200;
const CONTROLS = /\p{Cc}/gu;

function text(value: unknown): string | null {
  if (typeof value !== 'string') return null;
  const written =
    value
      .split('\0')[0]
      ?.replace(/\p{Surrogate}/gu, '\ufffd')
      .replace(CONTROLS, ' ')
      .trim()
      .slice(0, LONGEST_TEXT) ?? '';
  return written === '' ? null : written;
}

function finite(value: unknown): number | null {
  return typeof value === 'number' && Number.isFinite(value) ? value : null;
}

function positive(value: unknown, most = Number.MAX_SAFE_INTEGER): number | null {
  const number = finite(value);
  return number !== null && number > 0 && number <= most ? number : null;
}

function first(value: unknown): unknown {
  return Array.isArray(value) || ArrayBuffer.isView(value) ? (value as unknown as ArrayLike<unknown>)[0] : value;
}

/** 65535 in the 16-bit tag means that the number did not fit: it then stands in one of the 32-bit tags. */
function readIso(exif: Tags): number | null {
  const short = positive(first(exif[0x8827]));
  if (short !== null && short !== 65535) return short;
  const wide = [exif[0x8831], exif[0x8832], exif[0x8833]].map((value) => positive(first(value), 2 ** 31 - 1));
  return wide.find((value) => value !== null) ?? null;
}

/** ExposureTime and FNumber come before their APEX companions, which some cameras round or fill with garbage. */
function readExposure(exif: Tags): Pick<ShootingSettings, 'exposureTime' | 'fNumber' | 'exposureBias' | 'exposureMode'> {
  const timeValue = finite(exif[0x9201]);
  const apertureValue = positive(exif[0x9202], 20);
  const bias = finite(exif[0x9204]);
  const mode = finite(first(exif[0xa402]));
  return {
    exposureTime: positive(exif[0x829a], 1e6) ?? (timeValue === null ? null : secondsFromTime(timeValue)),
    fNumber: positive(exif[0x829d], 1000) ?? (apertureValue === null ? null : fNumberFromAperture(apertureValue)),
    // The ordinary range ends at 99.99 EV (CIPA DC-008); beyond it is garbage.
    exposureBias: bias !== null && Math.abs(bias) < 100 ? bias : null,
    exposureMode: mode !== null && [0, 1, 2].includes(mode) ? mode : null,
  };
}

/** The time of the exposure, else of its digitising; the time of the file's last change says nothing about either. */
function readTime(ifd0: Tags, exif: Tags): TakenTime {
  const words = (tag: number) => text(exif[tag]) ?? '';
  // Cameras that write one offset write it for the file's time, which is that of the exposure in their own files.
  const sameAsFile = words(0x9003) !== '' && words(0x9003) === text(ifd0[0x0132]);
  const offset = words(0x9011) || (sameAsFile ? words(0x9010) : '');
  const taken = takenTime(words(0x9003), words(0x9291), offset);
  return taken.takenLocal === null ? takenTime(words(0x9004), words(0x9292), words(0x9012)) : taken;
}

function degrees(value: unknown, reference: unknown, negative: string, most: number): number | null {
  const parts = Array.isArray(value) || ArrayBuffer.isView(value) ? Array.from(value as unknown as ArrayLike<unknown>).map(finite) : [];
  const letter = text(reference)?.toUpperCase();
  if (parts[0] == null || letter === undefined) return null;
  const total = parts[0] + (parts[1] ?? 0) / 60 + (parts[2] ?? 0) / 3600;
  if (total < 0 || total > most) return null;
  return letter.startsWith(negative) ? -total : total;
}

function readPlace(gps: Tags): Pick<ShootingSettings, 'latitude' | 'longitude'> {
  const latitude = degrees(gps[2], gps[1], 'S', 90);
  const longitude = degrees(gps[4], gps[3], 'W', 180);
  return latitude === null || longitude === null ? { latitude: null, longitude: null } : { latitude, longitude };
}

/** Picks the settings out of the parsed blocks. */
function settingsOf({ ifd0 = {}, exif = {}, gps = {} }: Blocks, orientation: number): ShootingSettings {
  return {
    ...readTime(ifd0, exif),
    make: text(ifd0[0x010f]),
    model: text(ifd0[0x0110]),
    lens: text(exif[0xa434]),
    serial: text(exif[0xa431]) ?? text(ifd0[0xc62f]),
    ...readExposure(exif),
    iso: readIso(exif),
    focalLength: positive(exif[0x920a], 100_000),
    focalLength35: positive(first(exif[0xa405]), 100_000),
    orientation,
    ...readPlace(gps),
  };
}

/** The EXIF block of WebP and AVIF, which the reader cannot find by itself; its "Exif" header is cut off. */
async function embeddedExif(path: string): Promise<Buffer | null> {
  const { exif } = await sharp(path, { limitInputPixels: false }).metadata();
  if (!exif) return null;
  return exif.toString('latin1', 0, 6) === 'Exif\0\0' ? exif.subarray(6) : exif;
}

async function readBlocks(path: string, kind: JudgedFile['kind']): Promise<Blocks> {
  const source = kind === 'webp' || kind === 'avif' ? await embeddedExif(path) : path;
  if (source === null) return {};
  return ((await exifr.parse(source, OPTIONS)) as Blocks | undefined) ?? {};
}

/**
 * Reads the shooting settings from a file's EXIF. Whatever the file holds, it answers: what cannot be read is unknown.
 */
export async function readSettings(path: string, judged: Pick<JudgedFile, 'kind' | 'orientation'>): Promise<ShootingSettings> {
  try {
    return settingsOf(await readBlocks(path, judged.kind), judged.orientation);
  } catch {
    return settingsOf({}, judged.orientation);
  }
}
