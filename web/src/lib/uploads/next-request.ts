import type { UploadItem } from './upload-item.ts';

/** One request that a file needs next. */
export type NextRequest =
  { kind: 'offer'; item: UploadItem } | { kind: 'part'; item: UploadItem; number: number } | { kind: 'complete'; item: UploadItem };

/** Files that are begun on the server at the same time, those that wait to retry among them. */
export const BEGUN_AT_ONCE = 8;

/**
 * The request that brings the set forward most. Offers and completions are short and keep the line filled with parts, so
 * they go first; of the parts, those of the oldest file.
 * @param begun files that are being sent, oldest first
 * @param now milliseconds since the epoch
 */
export function nextRequest(begun: Iterable<UploadItem>, now: number): NextRequest | undefined {
  let part: NextRequest | undefined;
  for (const item of begun) {
    if (item.asking || item.notBefore > now) continue;
    if (item.unsure) {
      // With parts under way the answer would be out of date when it comes.
      if (item.partsFlying.size === 0) return { kind: 'offer', item };
      continue;
    }
    if (item.allThere) return { kind: 'complete', item };
    const number = part ? undefined : item.nextPart();
    if (number !== undefined) part = { kind: 'part', item, number };
  }
  return part;
}
