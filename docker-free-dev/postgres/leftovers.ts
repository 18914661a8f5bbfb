import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { OWNER_FILE } from '../folder-owner.ts';
import { commandLine, isAlive, readMark, stillRuns, waitForEnd } from '../processes.ts';

/** Temporary clusters are made under os.tmpdir() with this prefix, so that a later start can find those left behind. */
export const TEMPORARY_PREFIX = 'oriel-pg-';

const CLUSTER = 'cluster';

/** The data folder of the cluster inside `dir`. */
export function clusterFolder(dir: string): string {
  return path.join(dir, CLUSTER);
}

/** The process id in postmaster.pid when that process is a postgres of this very data folder, else null. */
function postmasterOf(cluster: string): number | null {
  const pid = Number(readPidFile(cluster)[0]);
  if (!Number.isInteger(pid) || pid <= 1 || !isAlive(pid)) return null;
  const words = commandLine(pid);
  const isPostgres = path.basename(words[0] ?? '') === 'postgres' && words.includes(cluster);
  return isPostgres ? pid : null;
}

/** Lines of postmaster.pid (PostgreSQL: 1 pid, 4 port, 8 status); empty where there is none. */
export function readPidFile(cluster: string): string[] {
  try {
    return fs.readFileSync(path.join(cluster, 'postmaster.pid'), 'utf8').split('\n');
  } catch {
    return [];
  }
}

/** Ends the postgres that a dead process of ours left running on `cluster` and removes its stale pid file. */
export async function endOrphan(cluster: string): Promise<void> {
  const orphan = postmasterOf(cluster);
  if (orphan !== null) {
    for (const signal of ['SIGINT', 'SIGQUIT', 'SIGKILL'] as const) {
      process.kill(orphan, signal);
      if (await waitForEnd(orphan, 10_000)) break;
    }
  }
  // PostgreSQL refuses to start when the id in the file was taken by any other process of the same user.
  fs.rmSync(path.join(cluster, 'postmaster.pid'), { force: true });
}

/** Removes temporary clusters whose owner died without stopping them (kill -9, power cut). */
export async function sweepTemporary(): Promise<void> {
  for (const name of fs.readdirSync(os.tmpdir())) {
    if (!name.startsWith(TEMPORARY_PREFIX)) continue;
    const dir = path.join(os.tmpdir(), name);
    const owner = readMark(path.join(dir, OWNER_FILE));
    if (!owner || stillRuns(owner)) continue;
    await endOrphan(clusterFolder(dir));
    fs.rmSync(dir, { recursive: true, force: true });
  }
}
