import { DERIVATIVE_LIMITS } from '../../domain/clipping.ts';
import { MEASURES_RECIPE, type FrameMeasures } from '../../domain/frame-measures.ts';
import type { RawPicture } from '../upright.ts';
import { measureClipping } from './clipping.ts';
import { hashOf, thumbOf } from './hash.ts';
import { countCodes, headroomOf, histogramOf } from './histogram.ts';
import { lumaOf, shrinkInside } from './plane.ts';
import { SHARPNESS_SIDE, sharpnessOf } from './sharpness.ts';
import { measureTilt, TILT_SIDE } from './tilt.ts';

/** Digits that mean something, and no more of them in the database. */
function rounded<Value>(measures: Value): Value {
  return JSON.parse(
    JSON.stringify(measures, (_key, value: unknown) => (typeof value === 'number' ? Number(value.toPrecision(5)) : value)),
  ) as Value;
}

/** Measures a derivative: 8 bits a channel, sRGB, decoded from a JPEG, 2560 px along its longer side or less. */
export function measurePicture(picture: RawPicture): FrameMeasures {
  const pixels = picture.width * picture.height;
  const counts = countCodes(picture);
  const luma = lumaOf(picture);
  // Each smaller picture is made from the next larger one: means of means of areas are the same means.
  const medium = shrinkInside(luma, SHARPNESS_SIDE);
  const small = shrinkInside(medium, TILT_SIDE);
  const thumb = thumbOf(small);
  return rounded({
    recipe: MEASURES_RECIPE,
    width: picture.width,
    height: picture.height,
    histogram: histogramOf(counts, pixels),
    ...measureClipping(picture, counts, DERIVATIVE_LIMITS),
    headroom: headroomOf(counts, pixels, DERIVATIVE_LIMITS.high),
    sharpness: sharpnessOf(medium),
    tilt: measureTilt(small),
    hash: hashOf(thumb),
    thumb: Buffer.from(thumb).toString('base64'),
  });
}
