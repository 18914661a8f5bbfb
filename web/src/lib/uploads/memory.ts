import { unfinishedOf } from './item-of.ts';
import type { UnfinishedStore } from './unfinished.ts';
import type { UploadItem } from './upload-item.ts';

/** How the queue keeps what is unfinished. Uploads go on without it, so a browser that refuses storage is no failure. */
export class Memory {
  /** Writes go one after the other: a file that is dropped must not come back by an older write. */
  #last: Promise<void> = Promise.resolve();

  constructor(private readonly store: UnfinishedStore) {}

  keep(items: readonly UploadItem[]): void {
    const files = items.map(unfinishedOf);
    if (files.length > 0) this.#then(() => this.store.keep(files));
  }

  drop(items: readonly UploadItem[]): void {
    const ids = items.map((item) => item.id);
    if (ids.length > 0) this.#then(() => this.store.drop(ids));
  }

  forget(id: string): void {
    this.#then(() => this.store.drop([id]));
  }

  /** What an earlier visit left, in the order in which it came. */
  async load() {
    const files = await this.store.load().catch(() => []);
    return files.sort((one, other) => (one.id < other.id ? -1 : 1));
  }

  #then(write: () => Promise<void>): void {
    this.#last = this.#last.then(write).catch(() => undefined);
  }
}
