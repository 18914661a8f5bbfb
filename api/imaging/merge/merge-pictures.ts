import sharp from 'sharp';
import { asRefusal } from '../judge-file.ts';
import { derivativesOf, type Derivatives } from '../make-derivatives.ts';
import { toRaw, type RawPicture } from '../upright.ts';
import { mergeExposures, type LeftOut } from './merge-exposures.ts';

/** A frame's largest derivative, a JPEG in sRGB. */
export interface BracketFrame {
  jpeg: Buffer;
  /** Stops against any frame of the same bracket; more is brighter. */
  ev: number;
}

/** The merged picture as people see it, in every size. */
export interface Merged extends Derivatives {
  /** Pixels of the largest. */
  width: number;
  height: number;
  /** Frames that have no part in it, by their place in the list that was given. Where one frame alone is left, this is that frame. */
  leftOut: LeftOut[];
  /** Pixels by which each frame was found to be moved against the lead frame. */
  shifts: { x: number; y: number }[];
}

async function decode(jpeg: Buffer): Promise<RawPicture> {
  try {
    return await toRaw(sharp(jpeg).removeAlpha().toColourspace('srgb'));
  } catch (error) {
    throw asRefusal(error);
  }
}

/**
 * Merges the frames of a bracket.
 * @param lead Place in the list of the frame that the others are laid over.
 * @throws Refusal where a picture cannot be read to its end.
 */
export async function mergePictures(frames: BracketFrame[], lead: number): Promise<Merged> {
  const pictures = await Promise.all(frames.map(({ jpeg }) => decode(jpeg)));
  const exposures = frames.map(({ ev }, index) => ({ ev, picture: pictures[index] as RawPicture }));
  const { picture, leftOut, shifts } = mergeExposures(exposures, lead);
  return { ...(await derivativesOf(picture)), width: picture.width, height: picture.height, leftOut, shifts };
}
