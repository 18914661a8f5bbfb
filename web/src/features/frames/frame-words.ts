import type { FrameItem } from '../../../../api/contract/frames.ts';
import { formatAperture, formatFocalLength, formatIso, formatShutter } from '../../../../api/domain/photo-notation.ts';

/** The settings below a frame, as short as they can be: "f/8 · 1/125 · ISO 100"; without an ISO the focal length. */
export function captionSettings(frame: FrameItem): string {
  const parts = [formatAperture(frame.fNumber), captionShutter(frame), formatIso(frame.iso) ?? formatFocalLength(frame.focalLength)];
  return parts.filter(Boolean).join(' · ');
}

/** The shutter time as short as it can be. A fraction is a time in any case; "2 s" needs its unit. */
export function captionShutter({ exposureTime }: Pick<FrameItem, 'exposureTime'>): string | undefined {
  return formatShutter(exposureTime)?.replace(/^(1\/\d+) s$/, '$1');
}

/** The name without its extension, as captions have it; the whole name where there is none. */
export function stem(name: string): string {
  return name.replace(/(?<=.)\.[^.]+$/, '');
}
