import fs from 'node:fs';
import path from 'node:path';
import { readMark, stillRuns, writeMark } from './processes.ts';

/** File in a data folder that names the process working in it. */
export const OWNER_FILE = 'owner.json';

const claimedHere = new Set<string>();

/**
 * Claims a data folder for this process. A claim left by a dead process is taken over.
 * @param what names the service in the sentence a second start gets: "The database".
 * @returns releases the claim.
 * @throws Error where a living process, this one included, holds the folder.
 */
export function claimFolder(dir: string, what: string): () => void {
  const file = path.join(path.resolve(dir), OWNER_FILE);
  const owner = readMark(file);
  const taken = claimedHere.has(file) || (owner !== null && owner.pid !== process.pid && stillRuns(owner));
  if (taken) throw new Error(`${what} in ${dir} is in use by process ${owner?.pid ?? process.pid}. Stop that one first.`);
  claimedHere.add(file);
  writeMark(file);
  return () => {
    claimedHere.delete(file);
    fs.rmSync(file, { force: true });
  };
}
