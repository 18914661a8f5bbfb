import { execFileSync, spawn, type SpawnOptions } from 'node:child_process';
import fs from 'node:fs';
import path from 'node:path';

const DEBIAN_BASE = '/usr/lib/postgresql';

/** Folder with initdb and postgres of the newest installed version; throws a sentence where there is none. */
export function findBinaries(): string {
  const versions = fs.existsSync(DEBIAN_BASE) ? fs.readdirSync(DEBIAN_BASE) : [];
  const [newest] = versions
    .filter((version) => fs.existsSync(path.join(DEBIAN_BASE, version, 'bin/initdb')))
    .sort((a, b) => Number(b) - Number(a));
  if (!newest) throw new Error('PostgreSQL is not installed. Run: apt-get install -y postgresql');
  return path.join(DEBIAN_BASE, newest, 'bin');
}

/** The account PostgreSQL runs under: it refuses root, so root lends it the user "postgres". */
export interface Account {
  uid: number;
  gid: number;
}

/** User postgres when we are root, undefined (ourselves) otherwise. */
export function clusterAccount(): Account | undefined {
  if (process.getuid?.() !== 0) return undefined;
  const ask = (flag: string) => Number(execFileSync('id', [flag, 'postgres'], { encoding: 'utf8' }));
  return { uid: ask('-u'), gid: ask('-g') };
}

/** How every PostgreSQL program is started: no inherited environment (PGPORT and the like), cwd the account may enter. */
export function spawnOptions(account: Account | undefined, dir: string): SpawnOptions {
  const env = { PATH: process.env.PATH, LC_ALL: 'C.UTF-8', HOME: dir, TZ: 'UTC' } as unknown as NodeJS.ProcessEnv;
  return { ...account, env, cwd: '/' };
}

/** Runs a program to its end; rejects with what it wrote when it fails. */
export function run(program: string, args: string[], options: SpawnOptions): Promise<void> {
  return new Promise((resolve, reject) => {
    const child = spawn(program, args, { ...options, stdio: ['ignore', 'ignore', 'pipe'] });
    let words = '';
    child.stderr?.on('data', (chunk: Buffer) => (words += chunk.toString()));
    child.once('error', reject);
    child.once('close', (code) => {
      if (code === 0) resolve();
      else reject(new Error(`${path.basename(program)} failed (${code}): ${words.trim()}`));
    });
  });
}

/** The first folder on the way to `dir` that other accounts may not pass, or null when all can be passed. */
export function closedParent(dir: string): string | null {
  for (let at = path.dirname(path.resolve(dir)); ; at = path.dirname(at)) {
    if (fs.existsSync(at) && (fs.statSync(at).mode & 0o001) === 0) return at;
    if (at === path.dirname(at)) return null;
  }
}
