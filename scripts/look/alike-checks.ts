import path from 'node:path';
import { findAlike, type AlikeGroup } from '../../api/domain/alike.ts';
import type { FoundBracket } from '../../api/domain/brackets.ts';
import { DEFAULT_THRESHOLDS } from '../../api/domain/check-thresholds.ts';
import type { Examined } from './examine-file.ts';
import type { AlikeCheck } from './findings.ts';

function sayAlike({ frameIds, sharpest, softest }: AlikeGroup, file: string, own: readonly string[]): string {
  const others = frameIds.filter((id) => id !== file && !own.includes(id)).map((id) => path.basename(id));
  const is = file === sharpest ? ' This one is the sharpest.' : file === softest ? ' This one is the softest.' : '';
  return `It looks nearly like ${others.join(', ')}.${is}`;
}

/** Near-doubles among the files, by file. Frames of one bracket are no doubles of each other. */
export function alikeChecks(examined: readonly Examined[], brackets: readonly FoundBracket[]): Map<string, AlikeCheck> {
  const bracketOf = new Map(brackets.flatMap(({ frameIds, leadId }) => frameIds.map((id) => [id, { leadId, frameIds }])));
  const frames = examined.map(({ file, measures }) => ({
    ...{ id: file, hash: measures.hash, sharpness: measures.sharpness },
    bracketId: bracketOf.get(file)?.leadId ?? null,
  }));
  const groups = findAlike(frames, DEFAULT_THRESHOLDS.alikeBits);
  return new Map(
    groups.flatMap((group) =>
      group.frameIds.map((file): [string, AlikeCheck] => {
        const says = sayAlike(group, file, bracketOf.get(file)?.frameIds ?? []);
        return [file, { check: 'alike', says, short: 'alike', toCheck: false }];
      }),
    ),
  );
}
