import { writeFileSync } from 'node:fs';
import path from 'node:path';
import sharp from 'sharp';
import { writeTags } from './exiftool.ts';
import { photographPixels } from './photograph.ts';

/** One exposure as a file on a card. */
export interface ExposedFile {
  name: string;
  /** Seconds; stands in the file, with f/11 and ISO 100. */
  seconds: number;
  /** Stops by which the picture is brighter than the photograph it is made of. */
  stops: number;
  /** "2026:10:28 17:06:12" and "34". */
  taken: string;
  subSeconds?: string;
  /** Another number is another street. */
  view?: number;
  /** Share of the width by which the camera was turned along the street. */
  turned?: number;
  /** Further tags in exiftool's words. */
  tags?: string[];
}

const [WIDTH, HEIGHT] = [480, 320];

const decode = (value: number) => (value <= 0.04045 ? value / 12.92 : ((value + 0.055) / 1.055) ** 2.4);
const encode = (light: number) => (light <= 0.0031308 ? light * 12.92 : 1.055 * light ** (1 / 2.4) - 0.055);

/** 8-bit values after so many stops more light (sRGB, IEC 61966-2-1). */
function brighten(stops: number): Uint8Array {
  return Uint8Array.from({ length: 256 }, (_, value) => Math.round(255 * encode(Math.min(1, decode(value / 255) * 2 ** stops))));
}

/** Writes a JPEG as a camera would: the same street for the same view, brighter or darker, with the settings written by exiftool. */
export async function exposeFile(folder: string, exposed: ExposedFile): Promise<string> {
  const { name, seconds, stops, taken, subSeconds, view = 1, turned = 0, tags = [] } = exposed;
  const table = brighten(stops);
  const street = photographPixels(WIDTH, HEIGHT, view);
  const [row, from] = [WIDTH * 3, Math.round(turned * WIDTH) * 3];
  const pixels = Buffer.from(street.map((_, at) => table[street[at - (at % row) + ((at + from) % row)] as number] as number));
  const file = path.join(folder, name);
  writeFileSync(
    file,
    await sharp(pixels, { raw: { width: WIDTH, height: HEIGHT, channels: 3 } })
      .jpeg({ quality: 92 })
      .toBuffer(),
  );
  await writeTags(
    ...([file, '-n', '-IFD0:Make=Halden', '-IFD0:Model=Quay 5', '-ExifIFD:SerialNumber=004711'] as const),
    ...['-ExifIFD:LensModel=Arc 24 mm', '-ExifIFD:FocalLength=24', '-ExifIFD:FocalLengthIn35mmFormat=24'],
    ...['-ExifIFD:FNumber=11', '-ExifIFD:ISO=100', `-ExifIFD:ExposureTime=${seconds}`, `-ExifIFD:DateTimeOriginal=${taken}`],
    ...(subSeconds === undefined ? [] : [`-ExifIFD:SubSecTimeOriginal=${subSeconds}`]),
    ...tags,
  );
  return file;
}
