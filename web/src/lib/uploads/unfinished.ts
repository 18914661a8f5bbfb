import { createStore, delMany, entries, setMany } from 'idb-keyval';

/** What is kept of a file so that a reload loses nothing. Never its bytes. */
export interface Unfinished {
  id: string;
  name: string;
  path: string;
  size: number;
  lastModified: number;
  sha256?: string;
  /** The server's name for it, so that parts can be given up. */
  uploadId?: string;
  /** Opens the file again, where the browser gives such a thing. */
  handle?: FileSystemFileHandle;
  /** The dropped folder it came from. */
  root?: FileSystemDirectoryHandle;
  /** The sentence with which it failed. */
  problem?: string;
}

/** Where unfinished uploads of one queue outlive the page. */
export interface UnfinishedStore {
  load(): Promise<Unfinished[]>;
  keep(files: Unfinished[]): Promise<void>;
  drop(ids: string[]): Promise<void>;
}

/**
 * Unfinished uploads in IndexedDB.
 * @param scope tells the queues of one browser apart
 */
export function unfinishedInBrowser(scope: string): UnfinishedStore {
  const store = createStore('oriel-uploads', 'unfinished');
  const key = (id: string) => `${scope}/${id}`;
  return {
    async load() {
      const all = await entries<string, Unfinished>(store);
      return all.filter(([name]) => name.startsWith(`${scope}/`)).map(([, file]) => file);
    },
    keep: (files) =>
      setMany(
        files.map((file): [string, Unfinished] => [key(file.id), file]),
        store,
      ),
    drop: (ids) => delMany(ids.map(key), store),
  };
}

/** For browsers that allow no storage (some private windows): uploads work, a reload forgets them. */
export const nothingKept: UnfinishedStore = {
  load: () => Promise.resolve([]),
  keep: () => Promise.resolve(),
  drop: () => Promise.resolve(),
};
