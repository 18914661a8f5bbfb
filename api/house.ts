import type { Logger } from 'pino';
import type { Config } from './config.ts';
import type { Context } from './context.ts';
import { connect } from './db/knex.ts';
import { Live } from './db/live.ts';
import { createPixels } from './imaging/pixels/pixels.ts';
import { Store } from './services/storage.ts';

/** Opens every connection a process needs, and closes them again in the opposite order. */
export async function openHouse(config: Config, log: Logger): Promise<{ ctx: Context; close(): Promise<void> }> {
  const knex = connect(config.database);
  const store = new Store(config.store);
  const live = new Live(config.database.url, log);
  const pixels = createPixels({
    processes: config.worker.pixelProcesses,
    timeoutSeconds: config.worker.pixelSeconds,
    maxPixels: config.limits.pixels,
  });
  await live.start();
  return {
    ctx: { config, knex, store, live, log, pixels },
    close: async () => {
      await pixels.stop();
      await live.stop();
      store.stop();
      await knex.destroy();
    },
  };
}
