import type { Knex } from 'knex';

export interface EnqueueOptions {
  /** A second job with the same key replaces the first while that one waits. */
  key?: string;
  runAt?: Date;
  /** A job with the same key that waits already keeps its time: it runs so long after the first cause, not after the last. */
  keepRunAt?: boolean;
  /** Lower runs first; 0 by default. */
  priority?: number;
  maxAttempts?: number;
  /** Jobs of one line run one after the other. */
  line?: string;
}

/** Each try meets a worker that takes the waiting job at that very moment; more than a few in a row is no chance any more. */
const TRIES = 5;

/** Puts a job into the queue within the caller's transaction: it exists if, and only if, the transaction commits. */
export async function enqueue(db: Knex, name: string, payload: Record<string, unknown>, options: EnqueueOptions = {}): Promise<void> {
  for (let attempt = 1; attempt <= TRIES; attempt += 1) {
    const { rows } = await db.raw<{ rows: { id: unknown }[] }>(
      `select id from graphile_worker.add_job(
         ?, payload := ?::json, run_at := ?::timestamptz, max_attempts := ?::int, job_key := ?::text, priority := ?::int, job_key_mode := ?::text,
         queue_name := ?::text)`,
      [
        name,
        JSON.stringify(payload),
        options.runAt?.toISOString() ?? null,
        options.maxAttempts ?? 8,
        options.key ?? null,
        options.priority ?? 0,
        options.keepRunAt ? 'preserve_run_at' : 'replace',
        options.line ?? null,
      ] as Knex.RawBinding[],
    );
    // No row: a worker took the waiting job of that key between the two statements of add_job, which then adds nothing.
    if (rows[0]?.id != null) return;
  }
  throw new Error(`The job ${name} could not be put into the queue.`);
}
