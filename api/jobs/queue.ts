import type { Knex } from 'knex';

export interface EnqueueOptions {
  /** A second job with the same key replaces the first while that one waits. */
  key?: string;
  runAt?: Date;
  /** Lower runs first; 0 by default. */
  priority?: number;
  maxAttempts?: number;
}

/** Puts a job into the queue within the caller's transaction: it exists if, and only if, the transaction commits. */
export async function enqueue(db: Knex, name: string, payload: Record<string, unknown>, options: EnqueueOptions = {}): Promise<void> {
  await db.raw(
    'select graphile_worker.add_job(?, payload := ?::json, run_at := ?::timestamptz, max_attempts := ?::int, job_key := ?::text, priority := ?::int)',
    [
      name,
      JSON.stringify(payload),
      options.runAt?.toISOString() ?? null,
      options.maxAttempts ?? 8,
      options.key ?? null,
      options.priority ?? 0,
    ] as Knex.RawBinding[],
  );
}
