import { EventEmitter } from 'node:events';
import { Logger as WorkerLogger, type Runner, run, runMigrations, type Task, type WorkerEvents } from 'graphile-worker';
import pg from 'pg';
import type { Context } from '../context.ts';
import { startHeart } from './heart.ts';
import type { Job } from './job.ts';

/** Creates the queue's own tables, in a schema of their own. Safe to run again. */
export async function migrateQueue(databaseUrl: string): Promise<void> {
  await runMigrations({ connectionString: databaseUrl, logger: quiet() });
}

function quiet(): WorkerLogger {
  return new WorkerLogger(() => () => undefined);
}

function logger(ctx: Context): WorkerLogger {
  return new WorkerLogger((scope) => (level, message) => {
    // Every job's end is an info line of the library; ours are enough.
    if (level === 'error') ctx.log.error({ job: scope.taskIdentifier, jobId: scope.jobId }, message);
    else if (level === 'warning') ctx.log.warn({ job: scope.taskIdentifier }, message);
  });
}

function taskOf(ctx: Context, job: Job<never>, stopping: AbortSignal): Task {
  return async (payload, { job: row }) => {
    const seconds = job.timeoutSeconds ?? 300;
    const signal = AbortSignal.any([stopping, AbortSignal.timeout(seconds * 1000)]);
    const begun = Date.now();
    const tools = { signal, attempt: row.attempts, lastAttempt: row.attempts >= row.max_attempts };
    const tooLong = new Promise<never>((_resolve, reject) => {
      signal.addEventListener(
        'abort',
        () => reject(new Error(stopping.aborted ? 'the worker is stopping' : `took longer than ${seconds} s`)),
        { once: true },
      );
    });
    try {
      await Promise.race([job.run(ctx, payload as never, tools), tooLong]);
      ctx.log.info({ job: job.name, ms: Date.now() - begun, attempt: row.attempts }, 'job done');
    } catch (error) {
      ctx.log.warn({ job: job.name, attempt: row.attempts, err: error }, 'job failed');
      throw error;
    }
  };
}

/** A running worker. */
export interface Work {
  stop(): Promise<void>;
  /** Settles when the worker ends by itself, which it should not. */
  ended: Promise<void>;
}

/** Takes jobs from the queue until stopped. */
export async function startWork(ctx: Context, jobs: Job<never>[]): Promise<Work> {
  const stopping = new AbortController();
  const pool = new pg.Pool({
    connectionString: ctx.config.database.url,
    max: ctx.config.worker.jobs + 3,
    application_name: 'oriel-worker',
  });
  const lost = (error: Error) => ctx.log.warn({ error: String(error) }, 'lost a connection to the database');
  pool.on('error', lost);
  pool.on('connect', (client) => client.on('error', lost));
  const events: WorkerEvents = new EventEmitter();
  const heart = startHeart(ctx, events);
  const runner: Runner = await run({
    events,
    pgPool: pool,
    concurrency: ctx.config.worker.jobs,
    pollInterval: 1000,
    noHandleSignals: true,
    logger: logger(ctx),
    taskList: Object.fromEntries(jobs.map((job) => [job.name, taskOf(ctx, job, stopping.signal)])),
    crontab: jobs.flatMap((job) => (job.every ? [`${job.every} ${job.name}`] : [])).join('\n'),
  });
  return {
    ended: runner.promise,
    stop: async () => {
      stopping.abort();
      await runner.stop().catch(() => undefined);
      await heart.stop();
      await pool.end();
    },
  };
}
