import type { Knex } from 'knex';
import type { Logger } from 'pino';
import type { Config } from './config.ts';
import type { Live } from './db/live.ts';
import type { Pixels } from './imaging/pixels/pixels.ts';
import type { Store } from './services/storage.ts';

/** What a feature needs to do its work; made once a process by the server, the worker or a test. */
export interface Context {
  config: Config;
  knex: Knex;
  store: Store;
  live: Live;
  log: Logger;
  pixels: Pixels;
}
