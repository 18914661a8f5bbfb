import { rgbaToThumbHash } from 'thumbhash';
import { fromRaw, toRaw, type RawPicture } from './upright.ts';

/** A picture without transparency as RGBA. */
function asRgba({ data, width, height }: RawPicture): Uint8Array {
  const rgba = new Uint8Array(width * height * 4).fill(255);
  for (let pixel = 0; pixel < width * height; pixel++) rgba.set(data.subarray(pixel * 3, pixel * 3 + 3), pixel * 4);
  return rgba;
}

/** Some twenty bytes that draw a blur of the picture before it arrives. ThumbHash in base64; it takes 100 px at most. */
export async function makePlaceholder(picture: RawPicture): Promise<string> {
  const tiny = await toRaw(fromRaw(picture).resize({ width: 100, height: 100, fit: 'inside', withoutEnlargement: true }));
  return Buffer.from(rgbaToThumbHash(tiny.width, tiny.height, asRgba(tiny))).toString('base64');
}
