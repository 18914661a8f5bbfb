import { type ChildProcess, spawn } from 'node:child_process';
import fs from 'node:fs';
import path from 'node:path';
import { freePort } from '../ports.ts';
import { endWithUs } from '../processes.ts';
import { type Account, spawnOptions } from './binaries.ts';
import { clusterFolder, readPidFile } from './leftovers.ts';
import { serverArguments } from './settings.ts';

const LOG_FILE = 'postgres.log';
const LOG_LIMIT_BYTES = 10 * 1024 * 1024;
const START_LIMIT_MS = 60_000;

export interface Server {
  pid: number;
  port: number;
  /** SIGINT: fast shutdown with a checkpoint. SIGQUIT: at once, with recovery at the next start. */
  stop(signal: 'SIGINT' | 'SIGQUIT'): Promise<void>;
  /** Settles when the server is gone, asked to or not. */
  ended: Promise<void>;
}

/** What every start needs to know. */
export interface Launch {
  dir: string;
  bin: string;
  account: Account | undefined;
  durable: boolean;
}

function openLog(dir: string): number {
  const file = path.join(dir, LOG_FILE);
  if (fs.existsSync(file) && fs.statSync(file).size > LOG_LIMIT_BYTES) fs.renameSync(file, `${file}.1`);
  return fs.openSync(file, 'a', 0o600);
}

function lastLogLines(dir: string): string {
  return fs.readFileSync(path.join(dir, LOG_FILE), 'utf8').trim().split('\n').slice(-8).join('\n');
}

/** PostgreSQL itself writes "ready" into line 8 of postmaster.pid once it takes connections. */
async function untilReady(child: ChildProcess, dir: string): Promise<void> {
  const deadline = Date.now() + START_LIMIT_MS;
  for (;;) {
    const lines = readPidFile(clusterFolder(dir));
    if (Number(lines[0]) === child.pid && lines[7]?.trim() === 'ready') return;
    if (child.exitCode !== null || child.signalCode !== null) {
      throw new Error(`PostgreSQL ended while starting:\n${lastLogLines(dir)}`);
    }
    if (Date.now() > deadline) {
      child.kill('SIGQUIT');
      throw new Error(`PostgreSQL was not ready within a minute:\n${lastLogLines(dir)}`);
    }
    await new Promise((resolve) => setTimeout(resolve, 20));
  }
}

async function launch({ dir, bin, account, durable }: Launch, port: number): Promise<Server> {
  const log = openLog(dir);
  const child = spawn(path.join(bin, 'postgres'), serverArguments(clusterFolder(dir), port, durable), {
    ...spawnOptions(account, dir),
    stdio: ['ignore', log, log],
    // A group of its own: Ctrl-C in the terminal must reach us alone, who then stop it in order.
    detached: true,
  });
  fs.closeSync(log);
  const ended = new Promise<void>((resolve) => {
    child.once('exit', () => resolve());
    child.once('error', () => resolve());
  });
  const dismissGuard = endWithUs(child.pid ?? 0, durable ? 'INT' : 'QUIT');
  void ended.then(dismissGuard);
  await untilReady(child, dir);
  child.unref();
  return { pid: child.pid ?? 0, port, ended, stop: (signal) => end(child, ended, signal) };
}

async function end(child: ChildProcess, ended: Promise<void>, signal: 'SIGINT' | 'SIGQUIT'): Promise<void> {
  if (child.exitCode !== null || child.signalCode !== null) return;
  child.ref();
  child.kill(signal);
  // Fast shutdown waits for backends to let go; after ten seconds an immediate one (crash recovery at next start).
  const patience = setTimeout(() => child.kill('SIGQUIT'), 10_000);
  await ended;
  clearTimeout(patience);
}

/** Starts the server on the given port, or on a free one, asking again when somebody else was quicker. */
export async function startServer(how: Launch, port: number | undefined): Promise<Server> {
  if (port) return launch(how, port);
  for (let attempt = 1; ; attempt += 1) {
    try {
      return await launch(how, await freePort());
    } catch (error) {
      if (attempt === 5) throw error;
    }
  }
}
