import { rgbaToThumbHash } from 'thumbhash';
import { fromRaw, toRaw, type RawPicture } from './upright.ts';

/** A grey, RGB or RGBA picture as RGBA. */
function asRgba({ data, width, height, channels }: RawPicture): Uint8Array {
  const rgba = new Uint8Array(width * height * 4);
  for (let pixel = 0; pixel < width * height; pixel++) {
    const from = pixel * channels;
    const grey = channels < 3;
    rgba[pixel * 4] = data[from] ?? 0;
    rgba[pixel * 4 + 1] = data[grey ? from : from + 1] ?? 0;
    rgba[pixel * 4 + 2] = data[grey ? from : from + 2] ?? 0;
    rgba[pixel * 4 + 3] = 255;
  }
  return rgba;
}

/** Some twenty bytes that draw a blur of the picture before it arrives. ThumbHash in base64; it takes 100 px at most. */
export async function makePlaceholder(picture: RawPicture): Promise<string> {
  const tiny = await toRaw(fromRaw(picture).resize({ width: 100, height: 100, fit: 'inside', withoutEnlargement: true }));
  return Buffer.from(rgbaToThumbHash(tiny.width, tiny.height, asRgba(tiny))).toString('base64');
}
