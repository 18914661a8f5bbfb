import { type ChildProcess, spawn } from 'node:child_process';
import { chmodSync, mkdtempSync, readdirSync, readFileSync, rmSync, statSync } from 'node:fs';
import net from 'node:net';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { isPortFree } from '../../docker-free-dev/ports.ts';
import { isAlive } from '../../docker-free-dev/processes.ts';
import { PORT_VARIABLES } from '../../scripts/start/settings.ts';

/** npm start itself, on ports and in a data folder of its own, without the demo. */
const MINUTE = 60_000;
let dir: string;
let env: Record<string, string | undefined>;
const started: ChildProcess[] = [];

/** The first of so many free ports in a row, below those that the kernel hands out by itself while other tests run. */
async function freeBlock(length: number): Promise<number> {
  for (;;) {
    const base = 20_000 + Math.floor(Math.random() * 10_000);
    const free = await Promise.all(Array.from({ length }, (_, index) => isPortFree(base + index)));
    if (free.every(Boolean)) return base;
  }
}

beforeAll(async () => {
  dir = mkdtempSync(path.join(tmpdir(), 'oriel-start-'));
  // Started by root, PostgreSQL runs as another user, who must be let through.
  chmodSync(dir, 0o755);
  const base = await freeBlock(Object.keys(PORT_VARIABLES).length);
  const ports = Object.values(PORT_VARIABLES).map(([variable], index) => [variable, String(base + index)]);
  const { VITEST: _vitest, NODE_ENV: _environment, ...rest } = process.env;
  const own = { ORIEL_DATA_DIR: path.join(dir, 'data'), ORIEL_WEB_ROOT: path.join(dir, 'web'), ORIEL_DEMO: 'no' };
  env = { ...rest, ...Object.fromEntries(ports), ...own };
});
afterEach(async () => {
  for (const child of started.splice(0)) {
    if (child.exitCode === null && child.signalCode === null) await end(child, 'SIGTERM');
  }
});
afterAll(() => rmSync(dir, { recursive: true, force: true }));

interface Start {
  child: ChildProcess;
  /** Everything it wrote so far. */
  said: () => string;
}

function start(more: Record<string, string> = {}): Start {
  const child = spawn(process.execPath, ['scripts/start.mjs'], {
    env: { ...env, ...more } as NodeJS.ProcessEnv,
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  started.push(child);
  let text = '';
  for (const stream of [child.stdout, child.stderr]) stream?.on('data', (chunk: Buffer) => (text += chunk.toString()));
  return { child, said: () => text };
}

async function end(child: ChildProcess, signal: NodeJS.Signals): Promise<number | null> {
  const code = new Promise<number | null>((resolve) => child.once('exit', resolve));
  child.kill(signal);
  return code;
}

async function startToEnd(more: Record<string, string> = {}): Promise<{ code: number | null; said: string }> {
  const { child, said } = start(more);
  const code = await new Promise<number | null>((resolve) => child.once('close', resolve));
  return { code, said: said() };
}

async function untilReady({ said }: Start): Promise<void> {
  await expect.poll(said, { timeout: 2 * MINUTE, interval: 100 }).toContain('Oriel is ready');
}

const health = async () => (await fetch(`http://127.0.0.1:${env.ORIEL_PORT}/healthz`)).status;

/** Children, their children and so on. */
function descendants(pid: number): number[] {
  const stats = readdirSync('/proc')
    .filter((name) => /^\d+$/.test(name))
    .flatMap((name) => {
      try {
        const text = readFileSync(`/proc/${name}/stat`, 'utf8');
        return [[Number(name), Number(text.slice(text.lastIndexOf(')') + 2).split(' ')[1])] as const];
      } catch {
        return [];
      }
    });
  const below = (parent: number): number[] => stats.filter(([, of]) => of === parent).flatMap(([child]) => [child, ...below(child)]);
  return below(pid);
}

const childWith = (pid: number, word: string) =>
  descendants(pid).find((child) => {
    try {
      return readFileSync(`/proc/${child}/cmdline`, 'utf8').includes(word);
    } catch {
      return false;
    }
  });

describe('npm start', () => {
  it(
    'starts everything, refuses a second copy, starts a crashed API again, and ends all of it at Ctrl-C',
    async () => {
      const first = start();
      await untilReady(first);
      expect(await health()).toBe(200);
      for (const file of ['secrets.json', 'postgres/password']) {
        expect(statSync(path.join(dir, 'data', file)).mode & 0o777).toBe(0o600);
      }

      const second = await startToEnd();
      expect([second.code, second.said]).toEqual([1, expect.stringMatching(/in use by process \d+/)]);

      const api = childWith(first.child.pid ?? 0, 'api/server.ts');
      process.kill(api ?? 0, 'SIGKILL');
      await expect.poll(first.said, { timeout: MINUTE }).toMatch(/The API ended by itself \(SIGKILL\) and is started again/);
      await expect.poll(health, { timeout: MINUTE }).toBe(200);

      const family = descendants(first.child.pid ?? 0);
      expect(family.length).toBeGreaterThan(4);
      expect(await end(first.child, 'SIGINT')).toBe(0);
      await expect.poll(() => family.filter(isAlive), { timeout: MINUTE }).toEqual([]);
    },
    5 * MINUTE,
  );

  it(
    'repairs what a killed start left, and needs no second build',
    async () => {
      const killed = start();
      await untilReady(killed);
      const family = descendants(killed.child.pid ?? 0);
      await end(killed.child, 'SIGKILL');
      const again = start();
      await untilReady(again);
      expect(again.said()).not.toContain('Building the pages');
      expect(await health()).toBe(200);
      await expect.poll(() => family.filter(isAlive), { timeout: MINUTE }).toEqual([]);
    },
    5 * MINUTE,
  );

  it(
    'names the variable of a port that somebody else holds',
    async () => {
      const squatter = net.createServer();
      await new Promise<void>((resolve) => squatter.listen(0, '127.0.0.1', resolve));
      const { port } = squatter.address() as net.AddressInfo;
      const { code, said } = await startToEnd({ ORIEL_STORE_PORT: String(port) });
      squatter.close();
      expect([code, said]).toEqual([
        1,
        expect.stringContaining(`Port ${port} is in use by another program. Set ORIEL_STORE_PORT to a free port.`),
      ]);
    },
    MINUTE,
  );
});
