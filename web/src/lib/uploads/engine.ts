import { waitAfter } from './back-off.ts';
import { CheckWatch } from './check-watch.ts';
import type { Clock } from './clock.ts';
import type { Gate } from './gate.ts';
import type { Hasher } from './hash-pool.ts';
import type { Line } from './line.ts';
import { BEGUN_AT_ONCE, nextRequest, type NextRequest } from './next-request.ts';
import { perform, type Outcome } from './perform.ts';
import { readAhead } from './read-ahead.ts';
import { isReadable } from './readable.ts';
import type { Shelves } from './shelves.ts';
import { TransportProblem, type CheckState, type UploadTransport } from './transport.ts';
import type { Stage, UploadItem } from './upload-item.ts';
import { Wake } from './wake.ts';

/** After so many failures of the server over one file in a row, a person has to look. */
const ENOUGH = 8;
const UNREADABLE = 'The file cannot be read any more: it was moved, renamed or changed.';

/** What the engine works with. */
export interface EngineParts {
  transport: UploadTransport;
  hasher: Hasher;
  gate: Gate;
  line: Line;
  clock: Clock;
  /** A number from 0 up to 1, for the jitter of the waits. */
  chance: () => number;
}

/** Who hears what the engine does. */
export interface EngineEars {
  moved(item: UploadItem, bytes: number): void;
  changed(item: UploadItem): void;
  /** Something is known of the file that a later visit can use: its sum, its upload. */
  learned(item: UploadItem): void;
  /** The file is done, known or failed. */
  settled(item: UploadItem): void;
  /** Nothing can go on before the person does something. */
  stuck(sentence: string): void;
}

/** Moves files through the stages: reads, offers, sends, completes, asks for the check, waits and tries again. */
export class Engine {
  readonly #checks: CheckWatch;
  readonly #wake: Wake;

  constructor(
    private readonly parts: EngineParts,
    private readonly shelves: Shelves,
    private readonly ears: EngineEars,
    private readonly stopped: () => boolean,
  ) {
    this.#wake = new Wake(parts.clock, () => this.pump());
    this.#checks = new CheckWatch(parts.transport, parts.clock);
    parts.gate.whenFree(() => this.pump());
  }

  /** Starts everything that may start now. Called after each change; costs little when nothing may. */
  pump(): void {
    if (this.stopped()) return;
    readAhead(this.shelves, this.parts.hasher, {
      started: (item) => this.ears.changed(item),
      read: (item, sha256) => this.#read(item, sha256),
      unreadable: (item) => this.#settle(item, 'failed', UNREADABLE),
    });
    this.#begin();
    this.#send();
    this.#sleep();
  }

  /** Forgets the waits: it is worth trying now. */
  tryNow(): void {
    this.parts.line.tryNow();
    for (const item of this.shelves.in('open')) item.notBefore = 0;
    this.#checks.soon();
    this.pump();
  }

  /** The server's check of a whole file is over. */
  checked(item: UploadItem, { state, problem }: CheckState): void {
    if (item.stage === 'checking') this.#settle(item, state === 'done' ? 'done' : 'failed', problem);
  }

  move(item: UploadItem, stage: Stage): void {
    this.shelves.move(item, stage);
    this.ears.changed(item);
  }

  #read(item: UploadItem, sha256: string): void {
    item.sha256 = sha256;
    const first = this.shelves.firstWith(sha256, item);
    if (first) {
      item.twinOf = first;
      this.#settle(item, 'known', `The same picture as ${first.path}.`);
    } else {
      this.move(item, 'read');
      this.ears.learned(item);
    }
    this.pump();
  }

  #begin(): void {
    for (const item of this.shelves.in('read')) {
      if (this.shelves.in('open').size >= BEGUN_AT_ONCE) return;
      item.unsure = true;
      this.move(item, 'open');
    }
  }

  #send(): void {
    const { gate, clock } = this.parts;
    for (;;) {
      const now = clock.now();
      if (gate.busy >= this.parts.line.room(now, gate.limit)) return;
      if (this.#checks.due(this.shelves.in('checking').size, now)) {
        void gate.pass(() => this.#check());
        continue;
      }
      const next = nextRequest(this.shelves.in('open'), now);
      if (!next) return;
      void gate.pass(() => this.#make(next));
    }
  }

  #sleep(): void {
    const moments = [this.parts.line.openAt];
    for (const item of this.shelves.in('open')) moments.push(item.notBefore);
    if (this.shelves.in('checking').size > 0) moments.push(this.#checks.nextAt);
    this.#wake.at(moments);
  }

  async #make(next: NextRequest): Promise<void> {
    const { item } = next;
    const { signal } = item.stop;
    try {
      const outcome = await perform(next, this.parts.transport, (bytes) => this.ears.moved(item, bytes));
      if (!signal.aborted) this.#worked(next, outcome);
    } catch (error) {
      const readable = await isReadable(item);
      if (signal.aborted) return;
      if (readable) this.#failed(item, error);
      else this.#settle(item, 'failed', UNREADABLE);
    }
  }

  #worked({ kind, item }: NextRequest, outcome: Outcome): void {
    this.parts.line.worked(this.parts.clock.now());
    // After a failure the parts are asked for first; that this works says nothing about the part that failed.
    if (kind !== 'offer') item.failures = 0;
    item.problem = undefined;
    if (outcome.kind === 'known') return this.#settle(item, 'known', outcome.sentence);
    if (kind === 'offer') this.ears.learned(item);
    if (outcome.kind === 'going') return this.ears.changed(item);
    this.#checks.completed(this.shelves.in('checking').size);
    this.move(item, 'checking');
  }

  #failed(item: UploadItem, error: unknown): void {
    const problem = asProblem(error);
    if (problem.kind === 'refused') return this.#settle(item, 'failed', problem.message);
    // Whether the part arrived is not known, and the server may have been restarted: ask before sending on.
    item.unsure = true;
    item.problem = problem.message;
    if (problem.kind === 'signed-out') this.ears.stuck(problem.message);
    else if (problem.kind === 'line' || problem.kind === 'busy') this.#lineFailed(problem);
    else this.#serverFailed(item, problem);
    this.ears.changed(item);
  }

  #lineFailed(problem: TransportProblem): void {
    this.parts.line.failed(this.parts.clock.now(), problem.message, problem.waitMs, this.parts.chance());
  }

  #serverFailed(item: UploadItem, problem: TransportProblem): void {
    item.failures += 1;
    if (item.failures >= ENOUGH) return this.#settle(item, 'failed', problem.message);
    item.notBefore = this.parts.clock.now() + waitAfter(item.failures, problem.waitMs, this.parts.chance());
    if (problem.kind === 'gone') item.forgetParts();
  }

  async #check(): Promise<void> {
    try {
      const over = await this.#checks.ask(this.shelves.in('checking'));
      this.parts.line.worked(this.parts.clock.now());
      if (over.size > 0) this.#checks.soon();
      for (const [item, state] of over) this.checked(item, state);
    } catch (error) {
      const problem = asProblem(error);
      if (problem.kind === 'signed-out') this.ears.stuck(problem.message);
      else this.#lineFailed(problem);
    }
  }

  #settle(item: UploadItem, stage: 'done' | 'known' | 'failed', sentence: string | undefined): void {
    if (stage === 'failed') item.halt();
    item.problem = sentence;
    // A file that needs nothing more is let go; one that failed or leans on its twin may still have to be sent.
    if (stage !== 'failed' && !item.twinOf) item.file = undefined;
    this.move(item, stage);
    this.ears.settled(item);
  }
}

function asProblem(error: unknown): TransportProblem {
  if (error instanceof TransportProblem) return error;
  return new TransportProblem('server', error instanceof Error ? error.message : 'The request failed.');
}
