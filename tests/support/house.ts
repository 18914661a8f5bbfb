import { mkdtempSync, rmSync } from 'node:fs';
import { createServer, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import path from 'node:path';
import type { Express } from 'express';
import { runOnce, Logger as QuietLogger } from 'graphile-worker';
import { pino } from 'pino';
import supertest from 'supertest';
import { inject } from 'vitest';
import { buildApp } from '../../api/app.ts';
import { loadConfig } from '../../api/config.ts';
import type { Context } from '../../api/context.ts';
import { openHouse } from '../../api/house.ts';
import { jobs } from '../../api/jobs/all.ts';
import { createGates } from '../../api/middleware/actor.ts';
import { createLimits } from '../../api/middleware/limits.ts';
import { Sessions } from '../../api/middleware/sessions.ts';
import { startMailCatcher } from '../../docker-free-dev/mail-catcher.ts';
import { startStore } from '../../docker-free-dev/s3-store.ts';
import { cloneDatabase } from './database.ts';

export interface House {
  ctx: Context;
  app: Express;
  sessions: Sessions;
  /** supertest on the listening server. */
  request: ReturnType<typeof supertest>;
  /** A new agent with a cookie jar of its own: one person at one browser. */
  agent(): ReturnType<typeof supertest.agent>;
  address: string;
  /** The settings of this house, for processes that a test starts itself. */
  env: Record<string, string>;
  server: Server;
  store: Awaited<ReturnType<typeof startStore>>;
  mails: Awaited<ReturnType<typeof startMailCatcher>>;
  /** Runs every waiting job, and those that they enqueue, until none is left. */
  runJobs(): Promise<void>;
  /** Problems that the log got at error level, for tests that expect none. */
  logged: string[];
  stop(): Promise<void>;
}

export interface HouseOptions {
  env?: Record<string, string>;
  /** Multiplies every rate limit; tests of the limits themselves use 1. */
  limitScale?: number;
}

/** The whole product on loopback, with a database, a store and a mail catcher of its own. */
export async function startHouse(options: HouseOptions = {}): Promise<House> {
  const dir = mkdtempSync(path.join(tmpdir(), 'oriel-house-'));
  const keys = { accessKeyId: 'oriel-tests', secretAccessKey: 'a-secret-of-the-tests' };
  const [database, store, mails] = await Promise.all([
    cloneDatabase(inject('clusterUrl')),
    startStore({ dir: path.join(dir, 'store'), buckets: ['oriel'], ...keys }),
    startMailCatcher({ dir: path.join(dir, 'mails') }),
  ]);
  const server = createServer();
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const port = (server.address() as AddressInfo).port;
  const env = {
    NODE_ENV: 'test',
    ORIEL_PORT: String(port),
    ORIEL_DATABASE_URL: database.url,
    ORIEL_STORE_ENDPOINT: store.endpoint,
    ORIEL_STORE_ACCESS_KEY: keys.accessKeyId,
    ORIEL_STORE_SECRET_KEY: keys.secretAccessKey,
    ORIEL_SMTP_URL: `smtp://127.0.0.1:${mails.smtpPort}`,
    ORIEL_SECRET: 'a-secret-of-the-tests-that-is-long-enough',
    ...options.env,
  };
  const config = loadConfig(env);
  const logged: string[] = [];
  const log = pino({ level: 'error' }, { write: (line: string) => void logged.push(line) });
  const { ctx, close } = await openHouse(config, log);
  const sessions = new Sessions(config);
  const app = buildApp({ ctx, sessions, gates: createGates(sessions), limits: createLimits(ctx.knex, options.limitScale ?? 1000) });
  server.on('request', app);
  const address = `http://127.0.0.1:${port}`;
  return {
    ctx,
    app,
    sessions,
    server,
    store,
    mails,
    address,
    env,
    logged,
    request: supertest(address),
    agent: () => supertest.agent(address),
    runJobs: () => runJobs(ctx, database.url),
    stop: async () => {
      server.closeAllConnections();
      await new Promise((resolve) => server.close(resolve));
      await sessions.stop();
      await close();
      await Promise.all([store.stop(), mails.stop(), database.drop()]);
      rmSync(dir, { recursive: true, force: true });
    },
  };
}

async function runJobs(ctx: Context, databaseUrl: string): Promise<void> {
  const signal = new AbortController().signal;
  const taskList = Object.fromEntries(
    jobs.map((job) => [
      job.name,
      (payload: unknown, { job: row }: { job: { attempts: number; max_attempts: number } }) =>
        job.run(ctx, payload as never, { signal, attempt: row.attempts, lastAttempt: row.attempts >= row.max_attempts }),
    ]),
  );
  // Jobs of one line wait for each other, and a run may end between two of them.
  for (;;) {
    await runOnce({
      connectionString: databaseUrl,
      taskList,
      concurrency: 2,
      maxPoolSize: 4,
      noHandleSignals: true,
      logger: new QuietLogger(() => () => undefined),
    });
    const { rows } = await ctx.knex.raw<{ rows: unknown[] }>(
      'select id from graphile_worker.jobs where run_at <= now() and locked_at is null and attempts < max_attempts limit 1',
    );
    if (rows.length === 0) return;
  }
}
