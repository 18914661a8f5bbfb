import { execFile } from 'node:child_process';
import { createHash } from 'node:crypto';
import fs from 'node:fs';
import path from 'node:path';
import { promisify } from 'node:util';
import { isAlive } from '../../docker-free-dev/processes.ts';

const SOURCES = ['web', 'api/contract', 'api/domain', 'vite.config.ts', 'package-lock.json'];
const STAMP = '.sources';

function* filesBelow(place: string): Generator<string> {
  if (!fs.statSync(place).isDirectory()) return yield place;
  for (const name of fs.readdirSync(place).sort()) yield* filesBelow(path.join(place, name));
}

/** A hash over the name and the content of everything the pages are built from. */
function hashOfSources(): string {
  const hash = createHash('sha256');
  for (const source of SOURCES) {
    for (const file of filesBelow(source)) hash.update(`${file}\0`).update(fs.readFileSync(file)).update('\0');
  }
  return hash.digest('hex');
}

function stampOf(webRoot: string): string | null {
  const file = path.join(webRoot, STAMP);
  return fs.existsSync(file) ? fs.readFileSync(file, 'utf8') : null;
}

/** Folders of builds whose process died. */
function sweepDrafts(webRoot: string): void {
  const [parent, prefix] = [path.dirname(webRoot), `${path.basename(webRoot)}.draft-`];
  if (!fs.existsSync(parent)) return;
  for (const name of fs.readdirSync(parent)) {
    if (name.startsWith(prefix) && !isAlive(Number(name.slice(prefix.length)))) fs.rmSync(path.join(parent, name), { recursive: true });
  }
}

async function runVite(outDir: string): Promise<void> {
  const args = ['node_modules/vite/bin/vite.js', 'build', '--outDir', outDir, '--emptyOutDir', '--logLevel', 'warn'];
  try {
    await promisify(execFile)(process.execPath, args, { env: { ...process.env, NODE_ENV: 'production' } });
  } catch (error) {
    const { stdout = '', stderr = '' } = error as { stdout?: string; stderr?: string };
    throw new Error(`The pages could not be built:\n${`${stdout}${stderr}`.trim()}`, { cause: error });
  }
}

/** True where the built pages are not those of the present sources. */
export function webIsStale(webRoot: string): boolean {
  return stampOf(webRoot) !== hashOfSources();
}

/** Builds the pages beside their place and swaps them in whole: a copy that runs meanwhile never serves half of them. */
export async function buildWeb(webRoot: string): Promise<void> {
  sweepDrafts(webRoot);
  const stamp = hashOfSources();
  const draft = path.resolve(`${webRoot}.draft-${process.pid}`);
  await runVite(draft);
  fs.writeFileSync(path.join(draft, STAMP), stamp);
  fs.rmSync(webRoot, { recursive: true, force: true });
  fs.renameSync(draft, webRoot);
}
