import { execFile } from 'node:child_process';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { promisify } from 'node:util';
import type {} from '../support/cluster.ts';
import type { TestProject } from 'vitest/node';

declare module 'vitest' {
  export interface ProvidedContext {
    /** The folder with the built pages of this run. */
    webRoot: string;
  }
}

/** Builds the pages as they are shipped, into a folder of this run's own. */
export default async function setUp(project: TestProject): Promise<() => void> {
  const folder = mkdtempSync(path.join(tmpdir(), 'oriel-web-'));
  const { VITEST: _vitest, NODE_ENV: _environment, ...environment } = process.env;
  await promisify(execFile)(
    process.execPath,
    ['node_modules/vite/bin/vite.js', 'build', '--outDir', folder, '--emptyOutDir', '--logLevel', 'warn'],
    { env: environment },
  );
  project.provide('webRoot', folder);
  return () => rmSync(folder, { recursive: true, force: true });
}
