import type { Knex } from 'knex';

/** What a proof tells of the frames of its bracket. */
export interface BracketExposures {
  count: number;
  /** The shortest and the longest time in seconds; null where the camera wrote none. */
  shutterRange: { fastest: number; slowest: number } | null;
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
    .select<{ bracketId: string; count: number; fastest: number | null; slowest: number | null }[]>(
      'bracketId',
      knex.raw('count(*)::int as count'),
      knex.raw('min(exposure_time) as fastest'),
      knex.raw('max(exposure_time) as slowest'),
    );
  return new Map(
    rows.map(({ bracketId, count, fastest, slowest }) => [
      bracketId,
      { count, shutterRange: fastest === null || slowest === null ? null : { fastest, slowest } },
    ]),
  );
}
