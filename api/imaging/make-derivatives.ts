import sharp from 'sharp';
import type { DerivativeSize } from './derivative-sizes.ts';
import { asRefusal, decodeOptions, pictureSource, type JudgedFile, type PictureLimits } from './judge-file.ts';
import { makePlaceholder } from './placeholder.ts';
import { isSrgbProfile } from './srgb-profile.ts';
import { fromRaw, toRaw, turnUpright, type RawPicture } from './upright.ts';

export interface Derivative {
  size: DerivativeSize;
  width: number;
  height: number;
  /** A JPEG in sRGB without any metadata. */
  data: Buffer;
}
export interface Derivatives {
  pictures: Derivative[];
  /** ThumbHash in base64. */
  placeholder: string;
}

/** Enough that brickwork holds at 100%, half the bytes of 90. */
const QUALITY = 82;

function inside(size: number) {
  return { width: size, height: size, fit: 'inside', withoutEnlargement: true } as const;
}

/**
 * Decodes once: scaled down while decoding where the format can, from the embedded profile to sRGB (untagged is taken as
 * sRGB), transparency on white, 8 bits.
 * @throws Refusal where the file cannot be read to its end.
 */
export async function decodeInside(
  path: string,
  judged: JudgedFile,
  size: number,
  limits: Pick<PictureLimits, 'pixels'>,
): Promise<RawPicture> {
  try {
    const source = await pictureSource(path, judged);
    const { icc } = await sharp(source, decodeOptions(limits)).metadata();
    const ignoreIcc = icc !== undefined && (await isSrgbProfile(icc));
    const small = sharp(source, { ...decodeOptions(limits), ignoreIcc })
      .resize(inside(size))
      .flatten({ background: '#ffffff' })
      .toColourspace('srgb');
    return await turnUpright(await toRaw(small), judged.orientation);
  } catch (error) {
    throw asRefusal(error);
  }
}

/**
 * Writes a JPEG. Huffman tables are the standard ones: making tables to measure takes five times as long and saves 4% of
 * the bytes. Only the viewer's size keeps full chroma, which thin coloured lines of a façade need.
 */
export async function encodeDerivative(picture: RawPicture, size: DerivativeSize): Promise<Derivative> {
  const data = await fromRaw(picture)
    .jpeg({ quality: QUALITY, chromaSubsampling: size === 2560 ? '4:4:4' : '4:2:0', optimiseCoding: false })
    .toBuffer();
  return { size, width: picture.width, height: picture.height, data };
}

/** A smaller copy; the picture itself where it is small already. */
export async function shrink(picture: RawPicture, size: number): Promise<RawPicture> {
  return Math.max(picture.width, picture.height) <= size ? picture : toRaw(fromRaw(picture).resize(inside(size)));
}

/** Makes the pictures people see from pixels, never enlarged, each smaller one from the next larger. */
export async function derivativesOf(picture: RawPicture): Promise<Derivatives> {
  const large = await shrink(picture, 2560);
  const medium = await shrink(large, 960);
  const small = await shrink(medium, 480);
  const pictures = [await encodeDerivative(small, 480), await encodeDerivative(medium, 960), await encodeDerivative(large, 2560)];
  return { pictures, placeholder: await makePlaceholder(small) };
}

/**
 * Makes the pictures people see of a file, upright, in sRGB, without metadata, from one decoding.
 * @throws Refusal where the file cannot be read to its end.
 */
export async function makeDerivatives(path: string, judged: JudgedFile, limits: Pick<PictureLimits, 'pixels'>): Promise<Derivatives> {
  return derivativesOf(await decodeInside(path, judged, 2560, limits));
}
