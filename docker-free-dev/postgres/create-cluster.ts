import { randomBytes } from 'node:crypto';
import fs from 'node:fs';
import path from 'node:path';
import { type Account, run, spawnOptions } from './binaries.ts';
import { clusterFolder } from './leftovers.ts';

const PASSWORD_FILE = 'password';

/** The durable cluster's password: made once, kept beside the cluster with mode 0600. */
export function keepPassword(dir: string): string {
  const file = path.join(dir, PASSWORD_FILE);
  if (fs.existsSync(file)) return fs.readFileSync(file, 'utf8').trim();
  const password = randomBytes(24).toString('base64url');
  fs.writeFileSync(file, password, { mode: 0o600 });
  return password;
}

/** Gives the folder to the account the cluster runs under; nobody else may look in (initdb insists on 0700). */
export function prepareFolder(dir: string, account: Account | undefined): void {
  fs.mkdirSync(dir, { recursive: true, mode: 0o700 });
  fs.chmodSync(dir, 0o700);
  if (account) fs.chownSync(dir, account.uid, account.gid);
}

/** initdb needs the password in a file its own account can read; it is gone again right afterwards. */
async function withPasswordFile(
  dir: string,
  account: Account | undefined,
  password: string,
  use: (file: string) => Promise<void>,
): Promise<void> {
  const file = path.join(dir, 'initdb-password');
  fs.writeFileSync(file, password, { mode: 0o600 });
  try {
    if (account) fs.chownSync(file, account.uid, account.gid);
    await use(file);
  } finally {
    fs.rmSync(file, { force: true });
  }
}

/**
 * Creates the cluster where there is none. It is built beside its final name and renamed, so that a start killed in
 * the middle of initdb leaves nothing that a later start would take for a whole cluster.
 */
export async function createCluster(dir: string, bin: string, account: Account | undefined, password: string | null): Promise<void> {
  const cluster = clusterFolder(dir);
  if (fs.existsSync(cluster)) return;
  const draft = `${cluster}.new`;
  fs.rmSync(draft, { recursive: true, force: true });
  const args = ['-D', draft, '-U', 'postgres', '-E', 'UTF8', '--locale=C.UTF-8', '--no-instructions'];
  const initdb = (more: string[]) => run(path.join(bin, 'initdb'), [...args, ...more], spawnOptions(account, dir));
  if (password === null) await initdb(['-A', 'trust', '--no-sync']);
  else {
    await withPasswordFile(dir, account, password, (file) => initdb(['-A', 'scram-sha-256', `--pwfile=${file}`]));
  }
  fs.renameSync(draft, cluster);
}
