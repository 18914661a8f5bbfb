import type { WorkerEvents } from 'graphile-worker';
import type { Context } from '../context.ts';

const BEAT_SECONDS = 4;
/** A worker that was not heard for so long is dead. Together with a beat this stays under half a minute. */
const DEAD_SECONDS = 20;

/**
 * The queue would keep the jobs of a killed worker locked for hours. So every worker gives signs of life, and frees the jobs locked by those
 * that give none any more. The queue locks jobs in the name of a pool of lanes, never in that of a single lane.
 */
export function startHeart(ctx: Context, events: WorkerEvents): { stop(): Promise<void> } {
  const pools = new Set<string>();
  events.on('pool:create', ({ workerPool }) => void pools.add(workerPool.id));
  events.on('pool:release', ({ workerPool }) => void pools.delete(workerPool.id));
  let beating: Promise<void> = Promise.resolve();
  const timer = setInterval(() => {
    beating = beat(ctx, [...pools]).catch((error: unknown) => ctx.log.warn({ error: String(error) }, 'a sign of life could not be given'));
  }, BEAT_SECONDS * 1000);
  return {
    stop: async () => {
      clearInterval(timer);
      await beating;
      await ctx
        .knex('workerBeats')
        .whereIn('workerId', [...pools])
        .delete();
    },
  };
}

async function beat(ctx: Context, pools: string[]): Promise<void> {
  if (pools.length > 0) {
    await ctx
      .knex('workerBeats')
      .insert(pools.map((workerId) => ({ workerId, beatAt: ctx.knex.fn.now() })))
      .onConflict('workerId')
      .merge();
  }
  const freed = await freeJobsOfTheDead(ctx.knex);
  if (freed > 0) ctx.log.warn({ freed }, 'took up the jobs of a worker that died');
}

/** Frees every job that is locked by a worker without a recent sign of life. Returns how many workers those were. */
export async function freeJobsOfTheDead(knex: Context['knex'], deadSeconds = DEAD_SECONDS): Promise<number> {
  const { rows } = await knex.raw<{ rows: { dead: string }[] }>(
    `select distinct locked_by as dead from graphile_worker.jobs
      where locked_by is not null and locked_at < now() - make_interval(secs => ?)
        and not exists (select from worker_beats where worker_id = locked_by and beat_at > now() - make_interval(secs => ?))`,
    [deadSeconds, deadSeconds],
  );
  if (rows.length === 0) return 0;
  await knex.raw('select graphile_worker.force_unlock_workers(?::text[])', [rows.map((row) => row.dead)]);
  await knex('workerBeats').where('beatAt', '<', knex.raw("now() - interval '1 hour'")).delete();
  return rows.length;
}
