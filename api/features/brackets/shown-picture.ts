import { sayExposures } from '../../domain/brackets/say-exposures.ts';
import type { Exposures } from '../../contract/sheets.ts';
import type { Bracket } from '../../models/Bracket.ts';
import type { Frame } from '../../models/Frame.ts';
import { type DerivativeSize, frameKey, mergedKey } from '../../services/storage-keys.ts';

/** What a proof is a picture of. */
export interface ShownPicture {
  key(size: DerivativeSize): string;
  /** Pixels as a finished file would have them, upright. */
  width: number;
  height: number;
  placeholder: string | null;
  merged: boolean;
  /** False while the merged picture is still to come; until then the lead frame stands in for it. */
  settled: boolean;
  /** Names it in the keys of the pictures that carry a watermark; null for a single frame, which is always the same. */
  pictured: string | null;
}

const LARGEST = 2560;

/** The merged picture at the size of the originals: it was made of their pictures of 2560 px. */
function fullSize(merged: { width: number; height: number }, lead: Pick<Frame, 'width' | 'height'>) {
  const longest = Math.max(lead.width, lead.height);
  const scale = longest / Math.min(longest, LARGEST);
  return { width: Math.round(merged.width * scale), height: Math.round(merged.height * scale) };
}

/** Whether a bracket's merged picture is there, being made, or cannot be made. */
export function mergeState({ madeOf, wanted, problem }: Bracket): 'ready' | 'waiting' | 'failed' {
  if (madeOf === wanted) return 'ready';
  return problem === null ? 'waiting' : 'failed';
}

/** The picture that stands for a single frame, or for a bracket with that lead frame. */
export function shownPicture(frame: Frame, bracket: Bracket | null | undefined): ShownPicture {
  const { width, height, placeholder } = frame;
  const lead = { key: (size: DerivativeSize) => frameKey(frame, size), width, height, placeholder, merged: false };
  if (!bracket) return { ...lead, settled: true, pictured: null };
  const state = mergeState(bracket);
  if (bracket.shows === 'lead' || state !== 'ready') {
    return { ...lead, settled: bracket.shows === 'lead' || state === 'failed', pictured: `f${frame.id.slice(0, 8)}` };
  }
  return {
    key: (size) => mergedKey(bracket, size),
    ...fullSize({ width: bracket.width ?? width, height: bracket.height ?? height }, frame),
    placeholder: bracket.placeholder,
    merged: true,
    settled: true,
    pictured: `m${bracket.madeOf}`,
  };
}

/** "5 exposures merged": what a bracket's picture is made of; null for a single frame. */
export function exposuresOf(bracket: Bracket | null | undefined, count: number, { merged }: ShownPicture): Exposures | null {
  if (!bracket) return null;
  return { count, merged, says: sayExposures(count, { merged, leftOut: bracket.leftOut.length }) };
}
