import fs from 'node:fs';
import path from 'node:path';
import { claimFolder } from '../docker-free-dev/folder-owner.ts';
import { type RunningPostgres, startPostgres } from '../docker-free-dev/postgres.ts';
import { buildWeb, webIsStale } from './start/build-web.ts';
import { requireFreePorts } from './start/busy-ports.ts';
import { type Addresses, childEnvironment, publicAddress } from './start/child-environment.ts';
import { clearDatabase, clusterPlace, isEmpty, migrate } from './start/database.ts';
import { demoWasInterrupted, forgetInterruptedDemo, makeDemo, readDemo } from './start/demo.ts';
import { type KeptSecrets, keepSecrets } from './start/kept-secrets.ts';
import type { LocalServices } from './start/local-services.ts';
import { untilHealthy } from './start/ready.ts';
import { Running } from './start/running.ts';
import { say, step, warn } from './start/say.ts';
import { loadDotEnv, readSettings, type StartSettings } from './start/settings.ts';
import { Supervised } from './start/supervised.ts';
import { sayWelcome } from './start/welcome.ts';

async function startDatabase(settings: StartSettings, running: Running): Promise<string> {
  if (settings.outside.database) return settings.outside.database;
  const dir = clusterPlace(settings.dataDir);
  const first = !fs.existsSync(path.join(dir, 'cluster'));
  const start = () => startPostgres({ dir, port: settings.ports.database, durable: true });
  running.database = await step(first ? 'Creating the database' : 'Starting the database', start);
  keepDatabase(running, start);
  return running.database.url;
}

/** Starts the database again when it ends by itself; the API and the worker wait for it and go on. */
function keepDatabase(running: Running, start: () => Promise<RunningPostgres>): void {
  void running.database?.ended
    .then(async () => {
      if (running.isStopping) return;
      warn('The database ended by itself and is started again.');
      await running.database?.stop();
      running.database = await start();
      keepDatabase(running, start);
    })
    .catch((error: unknown) => warn(`The database does not start again: ${error instanceof Error ? error.message : String(error)}`));
}

async function startServices(settings: StartSettings, secrets: KeptSecrets, running: Running, logDir: string): Promise<void> {
  const { dataDir, ports, outside, bucket, region } = settings;
  if (outside.store && outside.smtp) return;
  const keys = { accessKeyId: secrets.storeAccessKey, secretAccessKey: secrets.storeSecretKey };
  const corsOrigins = [new URL(publicAddress(settings)).origin];
  const what: LocalServices = {
    store: outside.store ? null : { dir: path.join(dataDir, 'store'), port: ports.store, bucket, region, corsOrigins, ...keys },
    mails: outside.smtp ? null : { dir: path.join(dataDir, 'mails'), smtpPort: ports.smtp, pagePort: ports.mails },
  };
  const services = new Supervised({
    name: 'The store and mail catcher',
    logName: 'services',
    logDir,
    args: ['--import', 'tsx', 'scripts/start/local-services.ts'],
    env: { ...process.env, ORIEL_LOCAL_SERVICES: JSON.stringify(what) },
  });
  running.services = services;
  const ready = services.firstMessage();
  services.start();
  await step('Starting the store and the mail catcher', () => ready);
}

/** A start that was killed in the middle of making the demo left half of it; the next one begins again. */
function clearHalfStore(settings: StartSettings): void {
  if (settings.outside.store) return;
  say('The last start was ended while it made the demo. It is made again.');
  fs.rmSync(path.join(settings.dataDir, 'store'), { recursive: true, force: true });
}

async function prepareDatabase(settings: StartSettings, databaseUrl: string, interrupted: boolean): Promise<void> {
  if (interrupted) {
    if (settings.outside.database)
      throw new Error('A demo was begun in the database of ORIEL_DATABASE_URL and never finished. Empty it first.');
    await clearDatabase(databaseUrl);
    forgetInterruptedDemo(settings.dataDir);
  }
  await step('Bringing the tables up to date', () => migrate(databaseUrl));
}

function program(
  running: Running,
  options: { name: string; logName: string; logDir: string; script: string; dev: boolean },
  env: Record<string, string | undefined>,
): void {
  const { script, dev, ...rest } = options;
  const args = dev ? ['node_modules/tsx/dist/cli.mjs', 'watch', '--clear-screen=false', script] : ['--import', 'tsx', script];
  const started = new Supervised({ ...rest, args, env, echo: dev });
  running.programs.push(started);
  started.start();
}

function startPageServer(settings: StartSettings, running: Running, logDir: string, env: Record<string, string | undefined>): void {
  const args = ['node_modules/vite/bin/vite.js', '--host', settings.host, '--port', String(settings.ports.web), '--strictPort'];
  const vite = new Supervised({ name: 'The page server', logName: 'pages', logDir, args, env, echo: true });
  running.programs.push(vite);
  vite.start();
}

async function startPrograms(
  settings: StartSettings,
  running: Running,
  logDir: string,
  env: Record<string, string | undefined>,
): Promise<void> {
  const { dev, dataDir, ports } = settings;
  program(running, { name: 'The worker', logName: 'worker', logDir, script: 'api/worker.ts', dev }, env);
  if (settings.demo && (await isEmpty(String(env.ORIEL_DATABASE_URL)))) {
    await step('Making the demo: drawing its pictures once takes a minute or two', () => makeDemo(dataDir, env, running));
  }
  program(running, { name: 'The API', logName: 'api', logDir, script: 'api/server.ts', dev }, env);
  if (dev) startPageServer(settings, running, logDir, env);
  await step('Waiting for the API', () => untilHealthy(`http://${settings.host}:${dev ? ports.devApi : ports.web}`));
}

async function start(settings: StartSettings, running: Running): Promise<void> {
  const { dataDir, outside, ports } = settings;
  fs.mkdirSync(dataDir, { recursive: true, mode: 0o755 });
  running.releaseFolder = claimFolder(dataDir, 'Oriel');
  await requireFreePorts(settings);
  const logDir = path.join(dataDir, 'logs');
  const secrets = keepSecrets(dataDir);
  const interrupted = demoWasInterrupted(dataDir);
  if (interrupted) clearHalfStore(settings);
  if (!settings.dev && webIsStale(settings.webRoot)) await step('Building the pages', () => buildWeb(settings.webRoot));
  const [databaseUrl] = await Promise.all([startDatabase(settings, running), startServices(settings, secrets, running, logDir)]);
  running.goOn();
  await prepareDatabase(settings, databaseUrl, interrupted);
  running.goOn();
  const addresses: Addresses = {
    databaseUrl,
    storeEndpoint: outside.store ?? `http://127.0.0.1:${ports.store}`,
    smtpUrl: outside.smtp ?? `smtp://127.0.0.1:${ports.smtp}`,
    mailsPage: outside.smtp ? null : `http://127.0.0.1:${ports.mails}/`,
  };
  await startPrograms(settings, running, logDir, childEnvironment(settings, secrets, addresses));
  sayWelcome({ address: publicAddress(settings), mailsPage: addresses.mailsPage, dataDir, logDir, demo: readDemo(dataDir) });
}

const running = new Running();
running.listenForSignals();
try {
  loadDotEnv(process.cwd());
  await start(readSettings(process.env, process.argv), running);
} catch (error) {
  // A stop in the middle of a start makes steps fail; whoever asked for it says so and ends the process.
  const asked = running.isStopping;
  if (!asked) warn(error instanceof Error ? error.message : String(error));
  await running.stop();
  process.exit(asked ? 0 : 1);
}
