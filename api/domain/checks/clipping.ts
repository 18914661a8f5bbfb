import type { AtLimit } from '../frame-measures.ts';
import { percent, type CheckedShot, type FrameCheck, type Rule } from './check.ts';

/**
 * Where one channel alone is at the limit, brightness still has its drawing; coloured light and narrow colour spaces do it often. So
 * much more of the picture has to be so.
 */
const COLOUR_ALONE = 5;

function whereItLies({ areas, areasAny }: AtLimit, alarming: boolean): string {
  const large = Math.max(areas, areasAny);
  if (large > 0.0005) return `${percent(large)} lies in large areas`;
  return alarming ? 'it lies close together' : 'it lies in small spots';
}

const ON_PURPOSE = ' The other exposures of its bracket hold that.';

function ending(alarming: boolean, { inBracket }: CheckedShot): { says: string; toCheck: boolean } {
  return { says: alarming && inBracket ? ON_PURPOSE : '', toCheck: alarming && !inBracket };
}

/** Clipped highlights: a sky is an alarm, lamps are not; nor is a frame of a bracket, which is taken for that. */
export const checkHighlights: Rule = (shot, measures, { clippedPercent }) => {
  if (!measures) return null;
  const { any, all, areas, areasAny } = measures.highlights;
  const alarming = areas * 100 >= clippedPercent || areasAny * 100 >= clippedPercent * COLOUR_ALONE;
  if (!alarming && any * 100 < clippedPercent) return null;
  const { says, toCheck } = ending(alarming, shot);
  const lies = whereItLies(measures.highlights, alarming);
  return {
    check: 'highlights',
    says: `${percent(any)} of the picture is clipped in at least one colour, ${percent(all)} in all three; ${lies}.${says}`,
    short: `${percent(any)} clipped`,
    toCheck,
  };
};

/** Blocked shadows: large parts without any drawing. One channel at zero is only a deep colour. */
export const checkShadows: Rule = (shot, measures, { blockedPercent }): FrameCheck | null => {
  if (!measures) return null;
  const { all, areas } = measures.shadows;
  const alarming = areas * 100 >= blockedPercent;
  if (!alarming && all * 100 < blockedPercent) return null;
  const { says, toCheck } = ending(alarming, shot);
  const lies = whereItLies({ ...measures.shadows, areasAny: 0 }, alarming);
  return { check: 'shadows', says: `${percent(all)} of the picture is black; ${lies}.${says}`, short: `${percent(all)} black`, toCheck };
};
