import { waitAfter } from './back-off.ts';
import { CheckWatch } from './check-watch.ts';
import { realClock, type Clock } from './clock.ts';
import type { FoundFile } from './found-file.ts';
import type { Gate } from './gate.ts';
import type { Hasher } from './hash-pool.ts';
import { openHeld } from './held-files.ts';
import { itemOf, itemOfUnfinished, kept } from './item-of.ts';
import { Line } from './line.ts';
import { BEGUN_AT_ONCE, nextRequest, type NextRequest } from './next-request.ts';
import { perform, type Outcome } from './perform.ts';
import { QueueStore } from './queue-store.ts';
import { readAhead } from './read-ahead.ts';
import { Shelves } from './shelves.ts';
import { TransportProblem, type UploadTransport } from './transport.ts';
import type { UnfinishedStore } from './unfinished.ts';
import type { Stage, UploadItem } from './upload-item.ts';
import { Wake } from './wake.ts';

/** What a queue needs from outside. */
export interface QueueParts {
  transport: UploadTransport;
  hasher: Hasher;
  unfinished: UnfinishedStore;
  gate: Gate;
  clock?: Clock;
  /** A number from 0 up to 1, for the jitter of the waits. */
  chance?: () => number;
}

/** After so many failures of the server over one file in a row, a person has to look. */
const ENOUGH = 8;
const UNREADABLE = 'The file cannot be read any more: it was moved, renamed or changed.';

/** The uploads of one commission and purpose: what is sent next, what failed, what waits. */
export class UploadQueue {
  readonly store: QueueStore;
  readonly #parts: Required<QueueParts>;
  readonly #shelves = new Shelves();
  readonly #line = new Line();
  readonly #checks: CheckWatch;
  readonly #wake: Wake;
  #paused = false;
  #problem: string | undefined;

  constructor(parts: QueueParts) {
    this.#parts = { clock: realClock, chance: Math.random, ...parts };
    this.#wake = new Wake(this.#parts.clock, () => this.#pump());
    this.#checks = new CheckWatch(this.#parts.transport, this.#parts.clock);
    this.store = new QueueStore(this.#parts.clock, this.#shelves.all, () => ({
      paused: this.#paused,
      problem: this.#problem ?? this.#line.problem ?? (this.#line.online ? undefined : 'You are offline.'),
    }));
    parts.gate.whenFree(() => this.#pump());
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
    this.#keep(fresh.filter((item) => item.stage === 'new'));
    this.store.touchList();
    this.#pump();
  }

  /** Stops what is under way; what is not yet with the server will be sent again. */
  pause(): void {
    this.#paused = true;
    for (const item of this.#shelves.in('open')) {
      if (item.partsFlying.size > 0 || item.asking) item.unsure = true;
      item.halt();
      this.store.touch(item);
    }
    this.store.speed.clear();
    this.store.flush();
  }

  /** Goes on after {@link pause}, or after the person signed in again. */
  resume(): void {
    this.#paused = false;
    this.#problem = undefined;
    this.tryNow();
    this.store.flush();
  }

  /** Forgets the waits: the person or the browser says that it is worth trying now. */
  tryNow(): void {
    this.#line.tryNow();
    for (const item of this.#shelves.in('open')) item.notBefore = 0;
    this.#checks.soon();
    this.#pump();
  }

  /** What the browser says about its network. */
  setOnline(online: boolean): void {
    this.#line.online = online;
    this.store.touch();
    if (online) this.tryNow();
  }

  /** Takes a file out of the list; parts that are there are given up, a file that is done stays in the commission. */
  cancel(id: string): void {
    const item = this.#shelves.all.get(id);
    if (!item) return;
    item.halt();
    if (item.uploadId !== undefined && !['done', 'known'].includes(item.stage)) {
      void this.#parts.transport.abandon(item.uploadId);
    }
    this.#shelves.remove(item);
    for (const twin of this.#shelves.in('known')) if (twin.twinOf === item) this.#move(twin, 'new');
    this.#drop([item]);
    this.store.touchList();
    this.#pump();
  }

  /** Takes everything out of the list that is not finished. */
  cancelAll(): void {
    for (const item of [...this.#shelves.all.values()]) {
      if (!['done', 'known', 'left-out'].includes(item.stage)) this.cancel(item.id);
    }
  }

  /** Takes out of the list what needs nothing more. */
  clearFinished(): void {
    for (const stage of ['done', 'known', 'left-out'] satisfies Stage[]) {
      for (const item of [...this.#shelves.in(stage)]) this.#shelves.remove(item);
    }
    this.store.touchList();
  }

  /** Tries one failed file again, from reading it on. */
  retry(id: string): void {
    const item = this.#shelves.all.get(id);
    if (item?.stage !== 'failed') return;
    item.sha256 = undefined;
    this.#goOn(item, item.file);
    this.#pump();
  }

  /** Tries all failed files again. */
  retryFailed(): void {
    for (const item of [...this.#shelves.in('failed')]) this.retry(item.id);
  }

  /** Brings back what an earlier visit left, and goes on with what may be opened without asking. */
  async restore(): Promise<void> {
    const files = await this.#parts.unfinished.load().catch(() => []);
    for (const file of files) if (!this.#shelves.all.has(file.id)) this.#put(itemOfUnfinished(file));
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
    this.#pump();
  }

  #put(item: UploadItem): UploadItem {
    this.#shelves.put(item);
    this.store.touch(item);
    return item;
  }

  #move(item: UploadItem, stage: Stage): void {
    this.#shelves.move(item, stage);
    this.store.touch(item);
  }

  /** Starts a file over that was held or failed; the parts that are there are learned by the next offer. */
  #goOn(item: UploadItem, file: File | undefined): void {
    item.halt();
    item.file = file;
    item.failures = 0;
    item.notBefore = 0;
    item.problem = undefined;
    this.#move(item, file ? 'new' : 'held');
  }

  #pump(): void {
    if (this.#paused) return;
    readAhead(this.#shelves, this.#parts.hasher, this.#read);
    for (const item of this.#shelves.in('read')) {
      if (this.#shelves.in('open').size >= BEGUN_AT_ONCE) break;
      item.unsure = true;
      this.#move(item, 'open');
    }
    this.#send();
    this.#sleep();
  }

  #send(): void {
    const { gate, clock } = this.#parts;
    for (;;) {
      const now = clock.now();
      if (gate.busy >= this.#line.room(now, gate.limit)) return;
      if (this.#checks.due(this.#shelves.in('checking').size, now)) {
        this.#check();
        continue;
      }
      const next = nextRequest(this.#shelves.in('open'), now);
      if (!next) return;
      this.#make(next);
    }
  }

  #sleep(): void {
    const moments = [this.#line.openAt];
    for (const item of this.#shelves.in('open')) moments.push(item.notBefore);
    if (this.#shelves.in('checking').size > 0) moments.push(this.#checks.nextAt);
    this.#wake.at(moments);
  }

  #make(next: NextRequest): void {
    const { item } = next;
    const { signal } = item.stop;
    const moved = (bytes: number) => {
      this.store.speed.add(this.#parts.clock.now(), bytes);
      this.store.touch(item);
    };
    void this.#parts.gate
      .pass(() => perform(next, this.#parts.transport, moved))
      .then((outcome) => (signal.aborted ? undefined : this.#worked(item, outcome)))
      .catch((error: unknown) => (signal.aborted ? undefined : this.#failed(item, error, next)));
    this.store.touch(item);
  }
}
