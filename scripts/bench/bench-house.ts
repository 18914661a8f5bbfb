import { type ChildProcess, fork, spawn } from 'node:child_process';
import { createHash, randomBytes } from 'node:crypto';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { pino } from 'pino';
import { loadConfig } from '../../api/config.ts';
import type { Context } from '../../api/context.ts';
import { openHouse } from '../../api/house.ts';
import { Account } from '../../api/models/Account.ts';
import { Client } from '../../api/models/Client.ts';
import { Commission } from '../../api/models/Commission.ts';
import { Membership } from '../../api/models/Membership.ts';
import { Studio } from '../../api/models/Studio.ts';
import { freePort } from '../../docker-free-dev/ports.ts';
import { startPostgres } from '../../docker-free-dev/postgres.ts';
import { migrate } from '../start/database.ts';
import { untilHealthy } from '../start/ready.ts';

/** The whole product in processes of its own, as `npm start` runs it, on a data folder that is gone afterwards. */
export interface BenchHouse {
  ctx: Context;
  address: string;
  databaseUrl: string;
  dir: string;
  apiPid: number;
  workerPid: number;
  /** Cookie of the studio's owner. */
  cookie: string;
  studio: Studio;
  commission: Commission;
  /** Opens a session for an account and gives its cookie. */
  signIn(accountId: string, kind: 'staff' | 'guest'): Promise<string>;
  stop(): Promise<void>;
}

const program = (file: string, env: NodeJS.ProcessEnv) =>
  spawn(process.execPath, ['--import', 'tsx', file], { env, stdio: ['ignore', 'ignore', 'inherit'] });

async function startServices(
  dir: string,
  keys: { accessKeyId: string; secretAccessKey: string },
): Promise<{ child: ChildProcess; storePort: number; smtpPort: number }> {
  const [storePort, smtpPort, pagePort] = [await freePort(), await freePort(), await freePort()];
  const services = {
    store: { dir: path.join(dir, 'store'), port: storePort, ...keys, bucket: 'oriel', region: 'us-east-1', corsOrigins: [] },
    mails: { dir: path.join(dir, 'mails'), smtpPort, pagePort },
  };
  const child = fork('scripts/start/local-services.ts', {
    execArgv: ['--import', 'tsx'],
    env: { ...process.env, ORIEL_LOCAL_SERVICES: JSON.stringify(services) },
  });
  await new Promise((resolve) => child.once('message', resolve));
  return { child, storePort, smtpPort };
}

export async function startBenchHouse(): Promise<BenchHouse> {
  const dir = fs.mkdtempSync(path.join(os.tmpdir(), 'oriel-bench-'));
  // User postgres has to pass this folder.
  fs.chmodSync(dir, 0o755);
  const keys = { accessKeyId: 'ORIELBENCH', secretAccessKey: randomBytes(20).toString('hex') };
  const postgres = await startPostgres({ dir: path.join(dir, 'postgres'), durable: true });
  const services = await startServices(dir, keys);
  await migrate(postgres.url);
  const port = await freePort();
  const env = {
    ...process.env,
    NODE_ENV: 'production',
    AWS_SDK_JS_NODE_VERSION_SUPPORT_WARNING_DISABLED: 'true',
    ORIEL_PORT: String(port),
    ORIEL_METRICS_PORT: String(await freePort()),
    ORIEL_DATABASE_URL: postgres.url,
    ORIEL_STORE_ENDPOINT: `http://127.0.0.1:${services.storePort}`,
    ORIEL_STORE_ACCESS_KEY: keys.accessKeyId,
    ORIEL_STORE_SECRET_KEY: keys.secretAccessKey,
    ORIEL_SMTP_URL: `smtp://127.0.0.1:${services.smtpPort}`,
    ORIEL_SECRET: randomBytes(32).toString('hex'),
  };
  const config = loadConfig(env);
  const { ctx, close } = await openHouse(config, pino({ level: 'error' }));
  const [api, worker] = [program('api/server.ts', env), program('api/worker.ts', env)];
  await untilHealthy(config.address);
  const signIn = async (accountId: string, kind: 'staff' | 'guest') => {
    const token = randomBytes(20).toString('base64url');
    const id = createHash('sha256').update(token).digest('hex');
    await ctx.knex('sessions').insert({ id, userId: accountId, kind, expiresAt: new Date(Date.now() + 86_400_000 * 14) });
    return `${kind === 'staff' ? 'oriel_studio' : 'oriel_guest'}=${token}`;
  };
  const { studio, owner, commission } = await makeRows();
  return {
    ctx,
    address: config.address,
    databaseUrl: postgres.url,
    dir,
    apiPid: api.pid ?? 0,
    workerPid: worker.pid ?? 0,
    cookie: await signIn(owner.id, 'staff'),
    studio,
    commission,
    signIn,
    stop: async () => {
      await Promise.all([api, worker].map((child) => ended(child)));
      await close();
      await ended(services.child);
      await postgres.stop();
      fs.rmSync(dir, { recursive: true, force: true });
    },
  };
}

function ended(child: ChildProcess): Promise<unknown> {
  if (child.exitCode !== null) return Promise.resolve();
  const gone = new Promise((resolve) => child.once('exit', resolve));
  child.kill('SIGTERM');
  return gone;
}

async function makeRows() {
  const studio = await Studio.query().insertAndFetch({ name: 'Harrow Lane Studio', replyTo: 'studio@harrow-lane.test' });
  const owner = await Account.query().insertAndFetch({
    email: 'owner@harrow-lane.test',
    name: 'Ines Okafor',
    emailConfirmedAt: new Date(),
  });
  await Membership.query().insert({ studioId: studio.id, accountId: owner.id, role: 'owner' });
  const client = await Client.query().insertAndFetch({ studioId: studio.id, name: 'Tarn Brandreth Architects' });
  const commission = await Commission.query().insertAndFetch({
    studioId: studio.id,
    clientId: client.id,
    title: 'Ropewalk Library',
    allowance: 12,
    extraPrice: 8500,
    currency: 'GBP',
  });
  return { studio, owner, commission };
}

/** Largest resident memory of a process while something runs, in MB, read ten times a second; and what it was before. */
export async function watchMemory<T>(pid: number, work: () => Promise<T>): Promise<{ result: T; before: number; most: number }> {
  const read = () => Number(/VmRSS:\s+(\d+)/.exec(fs.readFileSync(`/proc/${pid}/status`, 'utf8'))?.[1] ?? 0) / 1024;
  const before = read();
  let most = before;
  const timer = setInterval(() => (most = Math.max(most, read())), 100);
  try {
    return { result: await work(), before, most };
  } finally {
    clearInterval(timer);
  }
}
