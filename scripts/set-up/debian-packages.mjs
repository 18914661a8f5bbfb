import { spawnSync } from 'node:child_process';
import fs from 'node:fs';

/** What running takes: PostgreSQL's programs; perl, in which the tool that writes the demo's camera settings is written. */
export const TO_RUN = ['postgresql', 'perl'];

/** What the tests check against, beyond that. */
export const TO_TEST = [
  ...TO_RUN,
  ...['chromium', 'fonts-lato', 's3cmd', 'nginx-light', 'curl', 'zip', 'unzip', 'p7zip-full', 'libarchive-tools', 'python3'],
  ...['libimage-exiftool-perl', 'libvips-tools', 'liblcms2-utils', 'colord-data', 'icc-profiles-free', 'mate-backgrounds'],
  ...['enfuse', 'lomiri-wallpapers-16.04'],
];

const POLICY_FILE = '/usr/sbin/policy-rc.d';

function missingOf(names) {
  const asked = spawnSync('dpkg-query', ['-W', '-f=${Package} ${db:Status-Status}\n', ...names], { encoding: 'utf8' });
  if (asked.error) {
    throw new Error(
      `This is not a Debian system. Install what these packages hold, and PostgreSQL below /usr/lib/postgresql: ${names.join(' ')}`,
    );
  }
  const installed = new Set(
    asked.stdout
      .split('\n')
      .filter((line) => line.endsWith(' installed'))
      .map((line) => line.split(' ')[0]),
  );
  return names.filter((name) => !installed.has(name));
}

/**
 * While packages are installed, Debian asks this file before it starts a service: 101 means no. The default database
 * cluster and web server that come with packages must not start to run. The answer holds only as long as we live, so
 * a set-up that is killed leaves nothing behind that matters. A policy the machine already has stays in force.
 */
function withoutStartingServices(work) {
  if (fs.existsSync(POLICY_FILE)) return work();
  fs.writeFileSync(POLICY_FILE, `#!/bin/sh\nkill -0 ${process.pid} 2>/dev/null && exit 101\nexit 0\n`, { mode: 0o755 });
  try {
    return work();
  } finally {
    fs.rmSync(POLICY_FILE, { force: true });
  }
}

function aptGet(...args) {
  const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' };
  const done = spawnSync('apt-get', ['-q', '-o', 'DPkg::Lock::Timeout=300', ...args], {
    env,
    encoding: 'utf8',
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  if (done.status === 0) return;
  const words = `${done.stdout ?? ''}${done.stderr ?? ''}${done.error?.message ?? ''}`.trim().split('\n').slice(-15).join('\n');
  throw new Error(`apt-get ${args[0]} did not succeed:\n${words}`);
}

/** Installs what is missing as root; without root names the one line to run and stops. */
export function ensureDebianPackages(names, command) {
  const missing = missingOf(names);
  if (missing.length === 0) return;
  const install = ['install', '-y', '--no-install-recommends', ...missing];
  if (process.getuid() !== 0) {
    throw new Error(
      `Debian packages are missing. Run this line as root, then "${command}" again:\n  apt-get update && apt-get ${install.join(' ')}`,
    );
  }
  console.log(`Installing Debian packages: ${missing.join(' ')}`);
  withoutStartingServices(() => {
    aptGet('update');
    aptGet(...install);
  });
}
