// The way in of npm start: runs before node_modules exists, so it uses nothing but Node itself.
import { dirname } from 'node:path';
import { fileURLToPath } from 'node:url';
import { ensureDebianPackages, TO_RUN } from './set-up/debian-packages.mjs';
import { requireNode } from './set-up/node-version.mjs';
import { ensureNpmPackages } from './set-up/npm-packages.mjs';

requireNode();
const root = dirname(dirname(fileURLToPath(import.meta.url)));
process.chdir(root);
try {
  ensureDebianPackages(TO_RUN, 'npm start');
  ensureNpmPackages(root);
} catch (error) {
  console.error(error.message);
  process.exit(1);
}
const { register } = await import('tsx/esm/api');
register();
await import('./start.ts');
