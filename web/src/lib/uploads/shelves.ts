import type { Stage, UploadItem } from './upload-item.ts';

const ON_THE_WAY: Stage[] = ['read', 'open', 'checking'];

/** All files of a queue, and those of each stage in the order in which they reached it. */
export class Shelves {
  readonly all = new Map<string, UploadItem>();
  readonly #shelves = new Map<Stage, Set<UploadItem>>();
  readonly #alike = new Map<string, Set<UploadItem>>();
  readonly #bySum = new Map<string, UploadItem>();

  /** The files in a stage, oldest first. */
  in(stage: Stage): ReadonlySet<UploadItem> {
    return this.#shelf(stage);
  }

  /** Takes in a new file. */
  put(item: UploadItem): void {
    this.all.set(item.id, item);
    this.#shelf(item.stage).add(item);
    const key = likeness(item);
    const alike = this.#alike.get(key) ?? new Set();
    this.#alike.set(key, alike.add(item));
  }

  move(item: UploadItem, stage: Stage): void {
    this.#shelf(item.stage).delete(item);
    item.stage = stage;
    this.#shelf(stage).add(item);
  }

  remove(item: UploadItem): void {
    this.all.delete(item.id);
    this.#shelf(item.stage).delete(item);
    this.#alike.get(likeness(item))?.delete(item);
  }

  /** Files that by name, size and time of change are the same file. */
  like(file: Pick<File, 'name' | 'size' | 'lastModified'>): UploadItem[] {
    return [...(this.#alike.get(likeness(file)) ?? [])];
  }

  /** Another file with the same bytes that is on its way; without one, `item` is from now on the first with its bytes. */
  firstWith(sha256: string, item: UploadItem): UploadItem | undefined {
    const first = this.#bySum.get(sha256);
    if (first && first !== item && this.all.has(first.id) && ON_THE_WAY.includes(first.stage)) return first;
    this.#bySum.set(sha256, item);
    return undefined;
  }

  #shelf(stage: Stage): Set<UploadItem> {
    const shelf = this.#shelves.get(stage) ?? new Set();
    this.#shelves.set(stage, shelf);
    return shelf;
  }
}

function likeness(file: Pick<File, 'name' | 'size' | 'lastModified'>): string {
  return `${file.size}/${file.lastModified}/${file.name}`;
}
