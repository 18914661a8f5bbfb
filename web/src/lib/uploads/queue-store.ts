import type { Clock } from './clock.ts';
import { secondsLeft, SpeedMeter } from './speed.ts';
import { addUp, type UploadTotals } from './totals.ts';
import type { UploadItem, UploadView } from './upload-item.ts';

/** The page is told of changes at most this often, in milliseconds. */
const EVERY = 250;

/**
 * The queue as an external store for React. Progress events come by the hundred a second; here they become at most four
 * snapshots a second, in which only the files that changed are new objects.
 */
export class QueueStore {
  readonly speed = new SpeedMeter();
  #listeners = new Set<() => void>();
  #views = new Map<string, UploadView>();
  #dirty = new Set<UploadItem>();
  #ids: readonly string[] = [];
  #idsChanged = false;
  #cancelFlush: (() => void) | undefined;
  #totals: UploadTotals;

  constructor(
    private readonly clock: Clock,
    private readonly items: ReadonlyMap<string, UploadItem>,
    private readonly mood: () => Pick<UploadTotals, 'paused' | 'problem'>,
  ) {
    this.#totals = this.#addUp();
  }

  /** For useSyncExternalStore. */
  subscribe = (listener: () => void): (() => void) => {
    this.#listeners.add(listener);
    return () => this.#listeners.delete(listener);
  };

  /** The same object until something changed. */
  totals = (): UploadTotals => this.#totals;

  /** The ids of all files in the order in which they came; the same array until one came or went. */
  ids = (): readonly string[] => this.#ids;

  /** One file; the same object until it changed. */
  view = (id: string): UploadView | undefined => this.#views.get(id);

  /** Notes that an item (or the mood of the whole) changed; listeners hear of it soon. */
  touch(item?: UploadItem): void {
    if (item) this.#dirty.add(item);
    this.#cancelFlush ??= this.clock.after(EVERY, () => this.flush());
  }

  /** Notes that items came or went. */
  touchList(): void {
    this.#idsChanged = true;
    this.touch();
  }

  /** Makes the snapshot and tells the listeners now. */
  flush(): void {
    this.#cancelFlush?.();
    this.#cancelFlush = undefined;
    for (const item of this.#dirty) this.#views.set(item.id, item.view());
    this.#dirty.clear();
    if (this.#idsChanged) this.#takeIds();
    this.#totals = this.#addUp();
    for (const listener of this.#listeners) listener();
    // The speed falls and the time left grows even when nothing moves.
    if (this.#totals.perSecond !== undefined && this.#totals.running) this.#cancelFlush ??= this.clock.after(1000, () => this.flush());
  }

  #takeIds(): void {
    this.#idsChanged = false;
    this.#ids = [...this.items.keys()];
    for (const id of this.#views.keys()) if (!this.items.has(id)) this.#views.delete(id);
  }

  #addUp(): UploadTotals {
    const { going, left, ...sum } = addUp(this.items.values());
    const mood = this.mood();
    const perSecond = mood.paused || left === 0 ? undefined : this.speed.perSecond(this.clock.now());
    return {
      ...sum,
      ...mood,
      perSecond,
      secondsLeft: secondsLeft(left, perSecond),
      running: going > 0 && !mood.paused,
    };
  }
}
