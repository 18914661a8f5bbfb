import { DERIVATIVE_LIMITS } from '../../domain/clipping.ts';
import { MEASURES_RECIPE, type FrameMeasures } from '../../domain/frame-measures.ts';
import type { RawPicture } from '../upright.ts';
import { measureClipping } from './clipping.ts';
import { hashOf, thumbOf } from './hash.ts';
import { headroomOf, histogramOf } from './histogram.ts';
import { shrinkInside } from './plane.ts';
import { scanPicture } from './scan.ts';
import { sharpnessOf } from './sharpness.ts';
import { measureTilt } from './tilt.ts';

/**
 * Longer side that sharpness and tilt are measured at, so that files of all sizes compare: half the viewer's, where noise is averaged
 * away and edges still tell a tenth of a degree.
 */
export const MEASURED_SIDE = 1280;

/** Digits that mean something, and no more of them in the database. */
function rounded<Value>(measures: Value): Value {
  return JSON.parse(
    JSON.stringify(measures, (_key, value: unknown) => (typeof value === 'number' ? Number(value.toPrecision(5)) : value)),
  ) as Value;
}

/** Measures a derivative: 8 bits a channel, sRGB, decoded from a JPEG, 2560 px along its longer side or less. */
export function measurePicture(picture: RawPicture): FrameMeasures {
  const { width, height } = picture;
  const scan = scanPicture(picture, DERIVATIVE_LIMITS);
  const small = shrinkInside(scan.luma, MEASURED_SIDE);
  // Means of means of areas are the same means: the thumb needs no look at the large picture.
  const thumb = thumbOf(small);
  return rounded({
    recipe: MEASURES_RECIPE,
    width,
    height,
    histogram: histogramOf(scan.counts, width * height),
    ...measureClipping(scan, DERIVATIVE_LIMITS),
    headroom: headroomOf(scan.counts, width * height, DERIVATIVE_LIMITS.high),
    sharpness: sharpnessOf(small),
    tilt: measureTilt(small),
    hash: hashOf(thumb),
    thumb: Buffer.from(thumb).toString('base64'),
  });
}
