import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { S3Client } from '@aws-sdk/client-s3';
import { type RunningStore, startStore, type StoreOptions } from '../../docker-free-dev/s3-store.ts';
import { KEYS } from './signed-request.ts';

export interface OwnStore {
  dir: string;
  store: RunningStore;
  /** The official client, set up as Oriel sets up its own. */
  client: S3Client;
  /** Stops the store and starts it again on the same folder. */
  restart(): Promise<void>;
  stop(): Promise<void>;
}

export function clientOf(endpoint: string, more: ConstructorParameters<typeof S3Client>[0] = {}): S3Client {
  return new S3Client({ endpoint, region: 'us-east-1', forcePathStyle: true, credentials: KEYS, ...more });
}

/** A store in a temporary folder of its own, with the bucket "pictures". */
export async function startOwnStore(options: Partial<StoreOptions> = {}): Promise<OwnStore> {
  const dir = mkdtempSync(path.join(tmpdir(), 'oriel-store-'));
  const start = () => startStore({ dir, buckets: ['pictures'], ...KEYS, ...options });
  const store = await start();
  const own: OwnStore = {
    dir,
    store,
    client: clientOf(store.endpoint),
    restart: async () => {
      await own.store.stop();
      own.client.destroy();
      own.store = await start();
      own.client = clientOf(own.store.endpoint);
    },
    stop: async () => {
      own.client.destroy();
      await own.store.stop();
      rmSync(dir, { recursive: true, force: true });
    },
  };
  return own;
}
