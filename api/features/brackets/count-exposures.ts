import type { Knex } from 'knex';
import { sayApart } from '../../domain/brackets/say-bracket.ts';
import { brightness, differences, ladder, type Settings } from '../../domain/brackets/stops.ts';

/** What a proof tells of the frames of its bracket. */
export interface BracketExposures {
  count: number;
  /** The shortest and the longest time in seconds; null where the camera wrote none. */
  shutterRange: { fastest: number; slowest: number } | null;
  /** "2 stops apart"; null where the settings of a frame are not known, or all are the same. */
  apart: string | null;
}
/** By the id of the bracket. */
export type Exposed = Map<string, BracketExposures>;

/** Counts the frames behind the proofs that stand for a bracket. */
export async function exposuresOfProofs(knex: Knex, proofs: readonly { bracketId: string | null }[]): Promise<Exposed> {
  const ids = proofs.flatMap(({ bracketId }) => bracketId ?? []);
  if (ids.length === 0) return new Map();
  const rows = await knex('frames')
    .whereIn('bracketId', ids)
    .whereNull('deletedAt')
    .groupBy('bracketId')
    .select<{ bracketId: string; count: number; fastest: number | null; slowest: number | null; settings: Settings[] }[]>(
      'bracketId',
      knex.raw('count(*)::int as count'),
      knex.raw('min(exposure_time) as fastest'),
      knex.raw('max(exposure_time) as slowest'),
      knex.raw(`json_agg(json_build_object('exposureTime', exposure_time, 'fNumber', f_number, 'iso', iso)) as settings`),
    );
  return new Map(
    rows.map(({ bracketId, count, fastest, slowest, settings }) => [
      bracketId,
      { count, shutterRange: fastest === null || slowest === null ? null : { fastest, slowest }, apart: apartIn(settings) },
    ]),
  );
}

function apartIn(settings: readonly Settings[]): string | null {
  const stopsOf = (one: Settings) => brightness(one) ?? NaN;
  const apart = differences(ladder([...settings].sort((one, two) => stopsOf(one) - stopsOf(two))));
  return apart.every(Number.isFinite) && apart.some((stops) => stops > 0) ? sayApart(apart) : null;
}
