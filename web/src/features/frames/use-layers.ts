import { useQueries } from '@tanstack/react-query';
import type { FrameItem } from '../../../../api/contract/frames.ts';
import type { BracketSet } from './bracket-places.ts';
import type { Layer } from './frame-stage.tsx';
import { stem } from './frame-words.ts';
import { frameQuery } from './queries.ts';

/**
 * The picture that is shown, and the addresses of those beneath it: in a bracket all of its pictures are kept ready.
 * @param merged whether the merged picture is shown; against it the lead frame stands
 */
export function useLayers(frame: FrameItem, set: BracketSet | null, merged: boolean): { shown: Layer; ready: (string | undefined)[] } {
  const frames = (set ? set.frames : [frame]).filter((one) => one.state === 'ready');
  const larges = useQueries({
    queries: frames.map((one) => frameQuery(one.id)),
    combine: (answers) => new Map(answers.map(({ data }) => [data?.id, data?.pictures?.['2560']])),
  });
  const ready = [set?.bracket.merged.pictures?.['2560'], ...frames.map((one) => larges.get(one.id))];
  if (merged && set?.bracket.merged.pictures) {
    const { pictures, placeholder } = set.bracket.merged;
    return { shown: { name: `Merged proof of ${stem(frame.name)}`, large: pictures['2560'], medium: pictures['960'], placeholder }, ready };
  }
  const { name, pictures, placeholder } = frame;
  return { shown: { name, large: larges.get(frame.id), medium: pictures?.['960'], placeholder }, ready };
}
