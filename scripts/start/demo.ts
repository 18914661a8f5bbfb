import { spawn } from 'node:child_process';
import fs from 'node:fs';
import path from 'node:path';
import readline from 'node:readline';
import type { Running } from './running.ts';
import type { Demo } from '../../seeds/demo.ts';
import { say } from './say.ts';

const DONE = 'demo.json';
const BEGUN = 'demo-begun';

/** What the demo said when it was made; null where there is none. */
export function readDemo(dataDir: string): Demo | null {
  try {
    return JSON.parse(fs.readFileSync(path.join(dataDir, DONE), 'utf8')) as Demo;
  } catch {
    return null;
  }
}

/** True where a start was ended in the middle of making the demo: what is there is half of it. */
export function demoWasInterrupted(dataDir: string): boolean {
  return fs.existsSync(path.join(dataDir, BEGUN));
}

export function forgetInterruptedDemo(dataDir: string): void {
  fs.rmSync(path.join(dataDir, BEGUN), { force: true });
  fs.rmSync(path.join(dataDir, DONE), { force: true });
}

/** Makes the demo in a process of its own, whose memory is gone afterwards. */
export async function makeDemo(dataDir: string, env: Record<string, string | undefined>, running: Running): Promise<void> {
  fs.writeFileSync(path.join(dataDir, BEGUN), new Date().toISOString());
  const result = path.join(dataDir, DONE);
  const args = ['--import', 'tsx', 'scripts/start/seed.ts', `${result}.new`, path.join(dataDir, 'demo-pictures')];
  const child = spawn(process.execPath, args, {
    env: env as NodeJS.ProcessEnv,
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  running.errand = child;
  const words: string[] = [];
  readline.createInterface({ input: child.stderr }).on('line', (line) => words.push(line));
  readline.createInterface({ input: child.stdout }).on('line', (line) => say(`  ${line}`));
  const code = await new Promise((resolve) => child.once('close', resolve));
  running.errand = null;
  running.goOn();
  if (code !== 0) throw new Error(`The demo could not be made:\n${words.slice(-15).join('\n')}`);
  fs.renameSync(`${result}.new`, result);
  fs.rmSync(path.join(dataDir, BEGUN));
}
