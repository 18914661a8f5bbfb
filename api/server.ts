import { createServer } from 'node:http';
import { buildApp } from './app.ts';
import { loadConfig } from './config.ts';
import { createMetrics, serveMetrics } from './features/health/metrics.ts';
import { openHouse } from './house.ts';
import { createGates } from './middleware/actor.ts';
import { createLimits } from './middleware/limits.ts';
import { Sessions } from './middleware/sessions.ts';
import { createLog } from './services/log.ts';

const config = loadConfig(process.env);
const log = createLog(config, 'api');
const { ctx, close } = await openHouse(config, log);
const sessions = new Sessions(config);
const metrics = createMetrics(ctx);
const app = buildApp({ ctx, sessions, gates: createGates(sessions), limits: createLimits(ctx.knex) }, metrics.observe);
const server = createServer(app);
// An upload of a part over a slow line may take its time; a client that sends nothing may not.
server.requestTimeout = 15 * 60 * 1000;
server.listen(config.port, config.host, () => log.info({ address: config.address }, 'the API is ready'));
const figures = await serveMetrics(metrics.registry, config.host, config.metricsPort);

let stopping = false;
async function stop(): Promise<void> {
  if (stopping) return;
  stopping = true;
  log.info('stopping');
  // Live updates and long downloads would keep the server open for ever.
  setTimeout(() => server.closeAllConnections(), 3000).unref();
  server.closeIdleConnections();
  figures.close();
  await new Promise((resolve) => server.close(resolve));
  await sessions.stop();
  await close();
  process.exit(0);
}
process.on('SIGTERM', () => void stop());
process.on('SIGINT', () => void stop());
