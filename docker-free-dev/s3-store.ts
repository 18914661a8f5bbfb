import fs from 'node:fs';
import http from 'node:http';
import type { AddressInfo } from 'node:net';
import path from 'node:path';
import { claimFolder } from './folder-owner.ts';
import { Blobs } from './s3-store/blobs.ts';
import { requireBucketName } from './s3-store/buckets.ts';
import { Catalogue } from './s3-store/catalogue.ts';
import { Faults } from './s3-store/faults.ts';
import { handle, type House } from './s3-store/requests.ts';

export interface StoreOptions {
  dir: string;
  /** Loopback port; a free one is taken where it is left out. */
  port?: number;
  accessKeyId: string;
  secretAccessKey: string;
  /** Made where they are missing. */
  buckets: string[];
  /** Origins of browsers that may speak to the store; none where left out. */
  corsOrigins?: string[];
  /** us-east-1 where left out. */
  region?: string;
  /** true: every write reaches the disk before it is answered. Slower; a killed process loses nothing either way. */
  sync?: boolean;
}

export interface RunningStore {
  /** For S3 clients, path style: http://127.0.0.1:<port> */
  endpoint: string;
  port: number;
  faults: Faults;
  stop(): Promise<void>;
}

async function openHouse(options: StoreOptions): Promise<House> {
  const sync = options.sync ?? false;
  const catalogue = new Catalogue(options.dir, sync);
  const blobs = new Blobs(path.join(options.dir, 'blobs'), sync);
  await catalogue.load();
  await blobs.sweep(catalogue.blobs());
  for (const bucket of options.buckets) {
    requireBucketName(bucket);
    if (!catalogue.buckets.has(bucket)) catalogue.record({ does: 'make-bucket', bucket, created: Date.now() });
  }
  const { accessKeyId, secretAccessKey, region = 'us-east-1', corsOrigins = [] } = options;
  const onUnexpected = (error: unknown) => console.error('Store:', error);
  return { keys: { accessKeyId, secretAccessKey, region }, catalogue, blobs, faults: new Faults(), corsOrigins, onUnexpected };
}

/** Requests being served, so that a stop waits for their last write. */
function track(house: House): { serve: http.RequestListener; idle: () => Promise<unknown> } {
  const running = new Set<Promise<void>>();
  const serve: http.RequestListener = (req, res) => {
    const done = handle(house, req, res)
      .catch(house.onUnexpected)
      .finally(() => running.delete(done));
    running.add(done);
  };
  return { serve, idle: () => Promise.allSettled(running) };
}

function listen(server: http.Server, port: number): Promise<number> {
  return new Promise((resolve, reject) => {
    server.once('error', reject);
    server.listen(port, '127.0.0.1', () => resolve((server.address() as AddressInfo).port));
  });
}

function createServer(serve: http.RequestListener): http.Server {
  // Longest request: 5 GiB over a slow line. Idle connections outlive the pause between two requests of a client.
  const server = http.createServer({ maxHeaderSize: 16 * 1024, requestTimeout: 3_600_000, keepAliveTimeout: 65_000 }, serve);
  // The body is asked for only once the request has been believed.
  server.on('checkContinue', serve);
  return server;
}

/** Starts an S3-compatible store on 127.0.0.1 that keeps everything in `dir`. */
export async function startStore(options: StoreOptions): Promise<RunningStore> {
  fs.mkdirSync(options.dir, { recursive: true, mode: 0o700 });
  const release = claimFolder(options.dir, 'The store');
  try {
    const house = await openHouse(options);
    const { serve, idle } = track(house);
    const server = createServer(serve);
    const port = await listen(server, options.port ?? 0);
    const stop = async () => {
      const closed = new Promise((resolve) => server.close(resolve));
      server.closeAllConnections();
      await Promise.all([closed, idle()]);
      house.catalogue.close();
      release();
    };
    return { endpoint: `http://127.0.0.1:${port}`, port, faults: house.faults, stop };
  } catch (error) {
    release();
    throw error;
  }
}
