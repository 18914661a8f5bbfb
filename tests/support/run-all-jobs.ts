import type { House } from './house.ts';

/** Jobs that wait a moment for more of their kind. */
const GATHERING = ['group-frames', 'merge-bracket'];

/** Runs every waiting job, those among them that only gather for a moment, and what they bring about, until none is left. */
export async function runAllJobs(house: House): Promise<void> {
  for (;;) {
    await house.runJobs();
    const { rows } = await house.ctx.knex.raw<{ rows: { id: string }[] }>(
      `select id from graphile_worker.jobs where task_identifier = any(?) and attempts = 0 and locked_at is null`,
      [GATHERING],
    );
    if (rows.length === 0) return;
    await house.ctx.knex.raw('select graphile_worker.reschedule_jobs(?::bigint[], run_at := now())', [rows.map(({ id }) => id)]);
  }
}
