import sharp from 'sharp';
import type { Plane } from '../../api/imaging/measure/plane.ts';
import type { RawPicture } from '../../api/imaging/upright.ts';

/** A picture of one number a pixel, from its place. */
export function planeOf(width: number, height: number, value: (x: number, y: number) => number): Plane {
  return { width, height, values: Float32Array.from({ length: width * height }, (_, at) => value(at % width, Math.floor(at / width))) };
}

/** A picture in colour, from its place. */
export function pictureOf(width: number, height: number, colour: (x: number, y: number) => readonly [number, number, number]): RawPicture {
  const data = Buffer.alloc(width * height * 3);
  for (let at = 0; at < width * height; at++) data.set(colour(at % width, Math.floor(at / width)), at * 3);
  return { data, width, height, channels: 3 };
}

/** The same picture as it comes back from the derivative's JPEG. */
export async function throughJpeg({ data, width, height, channels }: RawPicture): Promise<RawPicture> {
  const jpeg = await sharp(data, { raw: { width, height, channels } }).jpeg({ quality: 82, chromaSubsampling: '4:4:4' }).toBuffer();
  const { data: back } = await sharp(jpeg).raw().toBuffer({ resolveWithObject: true });
  return { data: back, width, height, channels: 3 };
}

/** Evenly distributed numbers from 0 to 1, the same for the same seed. */
export function seededRandom(seed: number): () => number {
  let state = seed >>> 0;
  return () => (state = (Math.imul(state, 1664525) + 1013904223) >>> 0) / 2 ** 32;
}

/** Normally distributed numbers of standard deviation 1 (Box and Muller). */
export function seededNormal(seed: number): () => number {
  const random = seededRandom(seed);
  return () => Math.sqrt(-2 * Math.log(1 - random())) * Math.cos(2 * Math.PI * random());
}
