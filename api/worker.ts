import { loadConfig } from './config.ts';
import { createMetrics, serveMetrics } from './features/health/metrics.ts';
import { openHouse } from './house.ts';
import { jobs } from './jobs/all.ts';
import { startWork } from './jobs/work.ts';
import { createLog } from './services/log.ts';

const config = loadConfig(process.env);
const log = createLog(config, 'worker');
const { ctx, close } = await openHouse(config, log);
const work = await startWork(ctx, jobs);
log.info({ jobs: jobs.map((job) => job.name) }, 'the worker is ready');
const figures =
  config.workerMetricsPort === undefined
    ? undefined
    : await serveMetrics(createMetrics(ctx).registry, config.host, config.workerMetricsPort);

let stopping = false;
async function stop(code: number): Promise<void> {
  if (stopping) return;
  stopping = true;
  log.info('stopping');
  figures?.close();
  await work.stop();
  await close();
  process.exit(code);
}
process.on('SIGTERM', () => void stop(0));
process.on('SIGINT', () => void stop(0));
work.ended.then(
  () => void stop(0),
  (error: unknown) => {
    log.fatal({ err: error }, 'the worker ended by itself');
    void stop(1);
  },
);
