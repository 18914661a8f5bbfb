import { spawnSync } from 'node:child_process';
import fs from 'node:fs';
import path from 'node:path';

function readPackages(file) {
  try {
    return JSON.parse(fs.readFileSync(file, 'utf8')).packages ?? {};
  } catch {
    return {};
  }
}

/**
 * npm itself notes in node_modules/.package-lock.json what it has put there, as its last act. Optional packages are
 * those of other machines.
 */
function isInstalled(root) {
  const wanted = Object.entries(readPackages(path.join(root, 'package-lock.json')));
  const there = readPackages(path.join(root, 'node_modules/.package-lock.json'));
  return wanted.every(
    ([name, entry]) =>
      name === '' || entry.optional || (there[name]?.version === entry.version && there[name]?.integrity === entry.integrity),
  );
}

/** Runs npm ci where node_modules is missing or is not what package-lock.json says. */
export function ensureNpmPackages(root) {
  if (isInstalled(root)) return;
  console.log('Installing npm packages (about a minute)');
  const args = ['ci', '--include=dev', '--no-audit', '--no-fund', '--no-progress'];
  const npm = process.env.npm_execpath;
  const options = { cwd: root, encoding: 'utf8', stdio: ['ignore', 'pipe', 'pipe'] };
  const done = npm?.endsWith('.js') ? spawnSync(process.execPath, [npm, ...args], options) : spawnSync('npm', args, options);
  if (done.status === 0) return;
  const words = `${done.stdout ?? ''}${done.stderr ?? ''}${done.error?.message ?? ''}`.trim().split('\n').slice(-15).join('\n');
  throw new Error(`npm ci did not succeed:\n${words}`);
}
