import type { TestProject } from 'vitest/node';
import { startPostgres } from '../../docker-free-dev/postgres.ts';
import { makeTemplate } from './database.ts';

declare module 'vitest' {
  export interface ProvidedContext {
    /** The throw-away PostgreSQL cluster of this run. */
    clusterUrl: string;
  }
}

/** Vitest's global set-up: one private PostgreSQL for the whole run, gone afterwards. */
export default async function setUp(project: TestProject): Promise<() => Promise<void>> {
  const cluster = await startPostgres();
  await makeTemplate(cluster.url);
  project.provide('clusterUrl', cluster.url);
  return () => cluster.stop();
}
