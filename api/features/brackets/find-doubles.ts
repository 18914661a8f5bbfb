import { raw } from 'objection';
import { type AlikeGroup, findAlike } from '../../domain/alike.ts';
import { DEFAULT_THRESHOLDS } from '../../domain/check-thresholds.ts';
import type { Commission } from '../../models/Commission.ts';
import { Frame } from '../../models/Frame.ts';
import { Studio } from '../../models/Studio.ts';

type HashedFrame = Pick<Frame, 'id' | 'bracketId' | 'alike'> & { hash: string | null; sharpness: number | null };

/** Notes on every frame of a commission which others look nearly like it. Hidden frames are out of the running. */
export async function findDoubles(commission: Commission): Promise<void> {
  const { studioId, id: commissionId } = commission;
  const { checkThresholds } = await Studio.query().findById(studioId).throwIfNotFound();
  const frames = await Frame.within(commission)
    .where({ commissionId })
    .whereNull('deletedAt')
    .joinRaw('left join frame_measures m on m.frame_id = frames.id')
    .orderByRaw('frames.taken_local nulls last, frames.name, frames.id')
    .select('frames.id', 'frames.bracketId', 'frames.alike', 'frames.hiddenAt')
    .select(raw(`m.measures->>'hash'`).as('hash'), raw(`(m.measures->>'sharpness')::float8`).as('sharpness'))
    .castTo<(HashedFrame & Pick<Frame, 'hiddenAt'>)[]>();
  const seen = frames.filter(({ hiddenAt }) => hiddenAt === null);
  const found = placesIn(findAlike(seen, (checkThresholds ?? DEFAULT_THRESHOLDS).alikeBits));
  for (const { id, alike } of frames) {
    const now = found.get(id) ?? null;
    if (!sameAlike(alike, now)) await Frame.within(commission).findById(id).patch({ alike: now });
  }
}

function placesIn(groups: readonly AlikeGroup[]): Map<string, NonNullable<Frame['alike']>> {
  const places = new Map<string, NonNullable<Frame['alike']>>();
  for (const { frameIds, sharpest, softest } of groups) {
    for (const id of frameIds) {
      const is = id === sharpest ? 'sharpest' : id === softest ? 'softest' : null;
      places.set(id, { group: frameIds[0] ?? id, count: frameIds.length, is });
    }
  }
  return places;
}

function sameAlike(one: Frame['alike'], two: Frame['alike']): boolean {
  return one?.group === two?.group && one?.count === two?.count && one?.is === two?.is;
}
