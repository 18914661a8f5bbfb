import { decodeInside } from './make-derivatives.ts';
import type { JudgedFile, PictureLimits } from './judge-file.ts';
import { fromRaw } from './upright.ts';

/** Longest side of a finished file's web size, in pixels. */
export const WEB_SIZE = 2048;

export interface WebPicture {
  width: number;
  height: number;
  /** A JPEG that names its colour space. */
  data: Buffer;
}

/**
 * Makes the web size of a finished file: at most 2048 px, upright, sRGB with the profile inside, as it will travel on its own.
 * @throws Refusal where the file cannot be read to its end.
 */
export async function makeWebSize(path: string, judged: JudgedFile, limits: Pick<PictureLimits, 'pixels'>): Promise<WebPicture> {
  const picture = await decodeInside(path, judged, WEB_SIZE, limits);
  const data = await fromRaw(picture).jpeg({ quality: 88, chromaSubsampling: '4:4:4' }).withIccProfile('srgb').toBuffer();
  return { width: picture.width, height: picture.height, data };
}
