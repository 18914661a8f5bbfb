import { realClock, type Clock } from './clock.ts';
import { Engine, type EngineParts } from './engine.ts';
import type { FoundFile } from './found-file.ts';
import { openHeld } from './held-files.ts';
import { itemOf, itemOfUnfinished } from './item-of.ts';
import { Line } from './line.ts';
import { Memory } from './memory.ts';
import { QueueStore } from './queue-store.ts';
import { Shelves } from './shelves.ts';
import type { CheckState } from './transport.ts';
import type { UnfinishedStore } from './unfinished.ts';
import type { Stage, UploadItem, UploadView } from './upload-item.ts';

/** What a queue needs from outside. */
export type QueueParts = Omit<EngineParts, 'clock' | 'chance' | 'line'> & {
  unfinished: UnfinishedStore;
  clock?: Clock;
  /** A number from 0 up to 1, for the jitter of the waits. */
  chance?: () => number;
};

const FINISHED: Stage[] = ['done', 'known', 'left-out'];

/** The uploads of one commission and purpose: what a person can do with them. */
export class UploadQueue {
  /** What the page shows. */
  readonly store: QueueStore;
  readonly #line = new Line();
  readonly #shelves = new Shelves();
  readonly #memory: Memory;
  readonly #engine: Engine;
  readonly #transport: QueueParts['transport'];
  readonly #settledListeners = new Set<(file: UploadView) => void>();
  #paused = false;
  /** What keeps everything from going on until the person does something. */
  #stuck: string | undefined;

  constructor(parts: QueueParts) {
    const { clock = realClock, chance = Math.random } = parts;
    this.#transport = parts.transport;
    this.#memory = new Memory(parts.unfinished);
    this.store = new QueueStore(clock, this.#shelves.all, () => ({
      paused: this.#paused,
      problem: this.#stuck ?? this.#lineProblem(),
    }));
    const ears = {
      moved: (item: UploadItem, bytes: number) => {
        this.store.speed.add(clock.now(), bytes);
        this.store.touch(item);
      },
      changed: (item: UploadItem) => this.store.touch(item),
      learned: (item: UploadItem) => this.#memory.keep([item]),
      settled: (item: UploadItem) => this.#settled(item),
      stuck: (sentence: string) => {
        this.#stuck = sentence;
        this.pause();
      },
    };
    this.#engine = new Engine({ ...parts, clock, chance, line: this.#line }, this.#shelves, ears, () => this.#paused);
  }

  /** Takes in files; those of an earlier visit are recognised and go on, those already in the list are not doubled. */
  add(found: readonly FoundFile[]): void {
    const fresh: UploadItem[] = [];
    for (const one of found) {
      const alike = this.#shelves.like(one.file);
      const held = alike.find((item) => item.stage === 'held');
      const same = alike.find((item) => item.path === one.path);
      if (held) this.#goOn(held, one.file);
      else if (same?.stage === 'failed') this.#goOn(same, one.file);
      else if (!same) fresh.push(this.#put(itemOf(one)));
    }
    this.#memory.keep(fresh.filter((item) => item.stage === 'new'));
    this.store.touchList();
    this.#engine.pump();
  }

  /** Stops what is under way; what is not yet with the server will be sent again. */
  pause(): void {
    this.#paused = true;
    for (const item of this.#shelves.in('open')) {
      item.halt();
      item.unsure = true;
      this.store.touch(item);
    }
    this.store.speed.clear();
    this.store.flush();
  }

  /** Goes on after {@link pause}, or after the person signed in again. */
  resume(): void {
    this.#paused = false;
    this.#stuck = undefined;
    this.#engine.tryNow();
    this.store.flush();
  }

  /** Forgets the waits after failures: it is worth trying now. */
  tryNow(): void {
    this.#engine.tryNow();
  }

  /** The server told by itself how a check ended; without this the queue asks now and then. */
  heard(state: CheckState): void {
    if (state.state === 'checking') return;
    for (const item of this.#shelves.in('checking')) {
      if (item.uploadId === state.uploadId) this.#engine.checked(item, state);
    }
  }

  /** What the browser says about its network. */
  setOnline(online: boolean): void {
    this.#line.online = online;
    this.store.touch();
    if (online) this.#engine.tryNow();
  }

  /** Takes a file out of the list; parts that are there are given up, a file that is done stays in the commission. */
  cancel(id: string): void {
    const item = this.#shelves.all.get(id);
    if (!item) return;
    item.halt();
    if (item.uploadId !== undefined && !FINISHED.includes(item.stage)) void this.#transport.abandon(item.uploadId);
    this.#shelves.remove(item);
    this.#freeTwins(item);
    this.#memory.drop([item]);
    this.store.touchList();
    this.#engine.pump();
  }

  /** Takes everything out of the list that is not finished. */
  cancelAll(): void {
    const open = [...this.#shelves.all.values()].filter((item) => !FINISHED.includes(item.stage));
    for (const item of open.reverse()) this.cancel(item.id);
  }

  /** Takes out of the list what needs nothing more. */
  clearFinished(): void {
    for (const stage of FINISHED) for (const item of [...this.#shelves.in(stage)]) this.#shelves.remove(item);
    this.store.touchList();
  }

  /** Tries one failed file again, from reading it on. */
  retry(id: string): void {
    const item = this.#shelves.all.get(id);
    if (item?.stage !== 'failed') return;
    item.sha256 = undefined;
    this.#goOn(item, item.file);
    this.#engine.pump();
  }

  /** Tries all failed files again. */
  retryFailed(): void {
    for (const item of [...this.#shelves.in('failed')]) this.retry(item.id);
  }

  /** Brings back what an earlier visit left, and goes on with what may be opened without asking. */
  async restore(): Promise<void> {
    for (const file of await this.#memory.load()) {
      // What was dropped again before this was read is on its way already.
      if (this.#shelves.all.has(file.id)) continue;
      if (this.#shelves.like(file).some((item) => item.file)) this.#memory.forget(file.id);
      else this.#put(itemOfUnfinished(file));
    }
    this.store.touchList();
    await this.continueHeld(false);
  }

  /**
   * Opens the files of an earlier visit again.
   * @param ask ask for permission; only allowed within a click
   */
  async continueHeld(ask = true): Promise<void> {
    const opened = await openHeld([...this.#shelves.in('held')], ask);
    for (const [item, file] of opened) if (item.stage === 'held') this.#goOn(item, file);
    this.#engine.pump();
  }

  /** `tell` hears of each file that is done, known or failed; the answer ends that. */
  whenSettled(tell: (file: UploadView) => void): () => void {
    this.#settledListeners.add(tell);
    return () => this.#settledListeners.delete(tell);
  }

  #put(item: UploadItem): UploadItem {
    this.#shelves.put(item);
    this.store.touch(item);
    return item;
  }

  /** Starts a file over that was held or failed; which parts are there is learned by the next offer. */
  #goOn(item: UploadItem, file: File | undefined): void {
    item.halt();
    item.file = file;
    item.failures = 0;
    item.notBefore = 0;
    item.problem = undefined;
    item.twinOf = undefined;
    this.#engine.move(item, file ? 'new' : 'held');
  }

  #settled(item: UploadItem): void {
    if (item.stage === 'failed') {
      this.#memory.keep([item]);
      this.#freeTwins(item);
    } else if (!item.twinOf) {
      this.#memory.drop([item, ...this.#twinsOf(item)]);
    }
    const view = item.view();
    for (const tell of this.#settledListeners) tell(view);
  }

  /** The file that others leaned on will not arrive: they have to go themselves. */
  #freeTwins(item: UploadItem): void {
    for (const twin of this.#twinsOf(item)) this.#goOn(twin, twin.file);
  }

  #twinsOf(item: UploadItem): UploadItem[] {
    return [...this.#shelves.in('known')].filter((twin) => twin.twinOf === item);
  }

  #lineProblem(): string | undefined {
    const { online, problem } = this.#line;
    return online ? problem : 'There is no network. The upload goes on as soon as there is one.';
  }
}
