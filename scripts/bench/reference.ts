import { fork } from 'node:child_process';
import { freePort } from '../../docker-free-dev/ports.ts';
import type { BenchHouse } from './bench-house.ts';

/** Starts the bare Express application on the same database with as many connections as ours has. */
export async function startReference(house: BenchHouse): Promise<{ address: string; stop(): void }> {
  const port = await freePort();
  const child = fork('scripts/bench/reference-app.ts', {
    execArgv: ['--import', 'tsx'],
    env: {
      ...process.env,
      NODE_ENV: 'production',
      BENCH_PORT: String(port),
      BENCH_DATABASE_URL: house.databaseUrl,
      // Ours has its pool and that of the sessions.
      BENCH_CONNECTIONS: String(house.ctx.config.database.connections + 4),
    },
  });
  await new Promise((resolve) => child.once('message', resolve));
  return { address: `http://127.0.0.1:${port}`, stop: () => void child.kill('SIGTERM') };
}
