import { spawn } from 'node:child_process';
import { existsSync, mkdtempSync, readdirSync, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import pg from 'pg';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { startPostgres } from '../../docker-free-dev/postgres.ts';
import { isAlive } from '../../docker-free-dev/processes.ts';

let dir: string;
beforeAll(() => void (dir = mkdtempSync(path.join(tmpdir(), 'oriel-durable-'))));
afterAll(() => rmSync(dir, { recursive: true, force: true }));

async function ask(url: string, sql: string): Promise<Record<string, unknown>[]> {
  const client = new pg.Client(url);
  await client.connect();
  try {
    return (await client.query(sql)).rows as Record<string, unknown>[];
  } finally {
    await client.end();
  }
}

/** Starts a cluster in a process of its own, which says the address and waits. */
function startElsewhere(options: object): Promise<{ pid: number; url: string; server: number; ended: Promise<unknown> }> {
  const code = `import { startPostgres } from './docker-free-dev/postgres.ts';
    startPostgres(${JSON.stringify(options)}).then((p) => { console.log(p.url, p.pid); setInterval(() => {}, 1000); });`;
  const child = spawn(process.execPath, ['--import', 'tsx', '--input-type=module', '-e', code], { stdio: ['ignore', 'pipe', 'inherit'] });
  const ended = new Promise((resolve) => child.once('exit', resolve));
  return new Promise((resolve) => {
    child.stdout.once('data', (line: Buffer) => {
      const [url = '', server] = line.toString().trim().split(' ');
      resolve({ pid: child.pid ?? 0, url, server: Number(server), ended });
    });
  });
}

describe('a throw-away database', () => {
  it('listens on 127.0.0.1 alone, trades safety for speed, and is gone when it stops', async () => {
    const database = await startPostgres();
    const [settings] = await ask(database.url, `select current_setting('listen_addresses') as on, current_setting('fsync') as fsync`);
    expect(settings).toEqual({ on: '127.0.0.1', fsync: 'off' });
    const [{ folder } = {}] = await ask(database.url, `select current_setting('data_directory') as folder`);
    await database.stop();
    expect(existsSync(path.dirname(String(folder)))).toBe(false);
    expect(isAlive(database.pid)).toBe(false);
  });

  it('ends with the process that started it, and the next start removes its folder', async () => {
    const elsewhere = await startElsewhere({});
    const [{ folder } = {}] = await ask(elsewhere.url, `select current_setting('data_directory') as folder`);
    process.kill(elsewhere.pid, 'SIGKILL');
    await elsewhere.ended;
    await expect.poll(() => isAlive(elsewhere.server), { timeout: 15_000 }).toBe(false);
    expect(existsSync(String(folder))).toBe(true);
    await (await startPostgres()).stop();
    expect(existsSync(path.dirname(String(folder)))).toBe(false);
  });
});

describe('a durable database', () => {
  it('asks for a password that only its owner can read, and syncs', async () => {
    const database = await startPostgres({ dir, durable: true });
    try {
      expect(await ask(database.url, `select current_user as who, current_setting('fsync') as fsync`)).toEqual([
        { who: 'oriel', fsync: 'on' },
      ]);
      const wrong = new URL(database.url);
      wrong.password = 'guess';
      await expect(ask(wrong.toString(), 'select 1')).rejects.toThrow(/password authentication failed/);
      expect(statSync(path.join(dir, 'password')).mode & 0o777).toBe(0o600);
      expect(readdirSync(dir)).not.toContain('initdb-password');
      await ask(database.url, 'create table kept as select 7 as seven');
    } finally {
      await database.stop();
    }
  });

  it('refuses a second start while one runs', async () => {
    const database = await startPostgres({ dir, durable: true });
    await expect(startPostgres({ dir, durable: true })).rejects.toThrow(/in use by process \d+/);
    await database.stop();
  });

  it('has everything after its owner was killed, and does not wait for the old server', async () => {
    const elsewhere = await startElsewhere({ dir, durable: true });
    await ask(elsewhere.url, 'insert into kept values (8)');
    process.kill(elsewhere.pid, 'SIGKILL');
    await elsewhere.ended;
    const database = await startPostgres({ dir, durable: true });
    expect(await ask(database.url, 'select seven from kept order by seven')).toEqual([{ seven: 7 }, { seven: 8 }]);
    await database.stop();
  });

  it('starts over a postmaster.pid whose number now belongs to another process', async () => {
    const file = path.join(dir, 'cluster/postmaster.pid');
    writeFileSync(file, `${process.pid}\n${path.join(dir, 'cluster')}\n0\n5432\n\n127.0.0.1\n\nready\n`);
    const database = await startPostgres({ dir, durable: true });
    expect(await ask(database.url, 'select count(*)::int as rows from kept')).toEqual([{ rows: 2 }]);
    expect(Number(readFileSync(file, 'utf8').split('\n')[0])).toBe(database.pid);
    await database.stop();
  });
});
