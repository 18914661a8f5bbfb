import type { Clock } from '../../web/src/lib/uploads/clock.ts';
import type { FoundFile } from '../../web/src/lib/uploads/found-file.ts';
import { Gate } from '../../web/src/lib/uploads/gate.ts';
import type { Hasher } from '../../web/src/lib/uploads/hash-pool.ts';
import {
  TransportProblem,
  type CheckState,
  type Offer,
  type OfferAnswer,
  type UploadTransport,
} from '../../web/src/lib/uploads/transport.ts';
import type { Unfinished, UnfinishedStore } from '../../web/src/lib/uploads/unfinished.ts';
import type { UploadView } from '../../web/src/lib/uploads/upload-item.ts';
import { UploadQueue } from '../../web/src/lib/uploads/upload-queue.ts';

/** A clock that stands still until a test moves it. */
export class HandClock implements Clock {
  #now = 1_000_000;
  #alarms = new Set<{ at: number; act: () => void }>();

  now = () => this.#now;

  after = (ms: number, act: () => void) => {
    const alarm = { at: this.#now + ms, act };
    this.#alarms.add(alarm);
    return () => void this.#alarms.delete(alarm);
  };

  /** Moves on by `ms`, stopping at each alarm and letting promises settle there. */
  async pass(ms: number): Promise<void> {
    const end = this.#now + ms;
    await settle();
    for (;;) {
      const next = [...this.#alarms].filter((alarm) => alarm.at <= end).sort((one, other) => one.at - other.at)[0];
      if (!next) break;
      this.#now = Math.max(this.#now, next.at);
      this.#alarms.delete(next);
      next.act();
      await settle();
    }
    this.#now = end;
  }
}

/** Lets promises settle: reading a Blob takes turns of the real event loop. */
export async function settle(): Promise<void> {
  for (let turn = 0; turn < 4; turn += 1) await new Promise((resolve) => setImmediate(resolve));
}

interface Held {
  id: string;
  offer: Offer;
  parts: Map<number, number>;
  state: 'open' | 'checking' | 'done' | 'failed';
  problem?: string;
}

type Call = 'offer' | 'part' | 'complete' | 'check';

/** A server in memory that keeps what it was sent over its own restarts and over several queues. */
export class MemoryServer implements UploadTransport {
  readonly uploads = new Map<string, Held>();
  readonly calls: string[] = [];
  partSize = 10;
  /** How long each request takes on the clock. */
  takes = 20;
  inFlight = 0;
  most = 0;
  /** Asked before each request is answered; a problem it gives is the answer. */
  trouble: (call: Call, detail: string) => TransportProblem | undefined = () => undefined;
  /** What the check finds, by the name of the file. */
  verdict: (name: string) => string | undefined = () => undefined;
  /** Sums of the files that the commission has already. */
  readonly known = new Set<string>();

  constructor(private readonly clock: Clock) {}

  async offer(offer: Offer, signal: AbortSignal): Promise<OfferAnswer> {
    await this.#request('offer', offer.name, signal);
    if (this.known.has(offer.sha256)) return { kind: 'known', sentence: 'It is in the commission already.' };
    const there = [...this.uploads.values()].find((one) => one.offer.sha256 === offer.sha256 && ['open', 'checking'].includes(one.state));
    if (there?.state === 'checking') return { kind: 'checking', uploadId: there.id };
    const held: Held = there ?? { id: `up-${this.uploads.size + 1}`, offer, parts: new Map(), state: 'open' };
    this.uploads.set(held.id, held);
    return { kind: 'upload', uploadId: held.id, partSize: this.partSize, partsThere: [...held.parts.keys()] };
  }

  async putPart(id: string, number: number, bytes: Blob, progress: (loaded: number) => void, signal: AbortSignal) {
    const held = this.#find(id);
    const half = this.clock.after(this.takes / 2, () => progress(Math.floor(bytes.size / 2)));
    try {
      await this.#request('part', `${held.offer.name} ${number}`, signal);
    } finally {
      half();
    }
    held.parts.set(number, bytes.size);
  }

  async complete(id: string, signal: AbortSignal): Promise<void> {
    const held = this.#find(id);
    await this.#request('complete', held.offer.name, signal);
    const bytes = [...held.parts.values()].reduce((sum, size) => sum + size, 0);
    if (bytes !== held.offer.size) throw new Error(`${held.offer.name}: ${bytes} of ${held.offer.size} bytes arrived`);
    held.state = 'checking';
  }

  async check(ids: string[], signal: AbortSignal): Promise<CheckState[]> {
    await this.#request('check', ids.join(), signal);
    return ids.map((uploadId) => {
      const problem = this.verdict(this.#find(uploadId).offer.name);
      return problem === undefined ? { uploadId, state: 'done' } : { uploadId, state: 'failed', problem };
    });
  }

  abandon(id: string): Promise<void> {
    this.calls.push(`abandon ${id}`);
    this.uploads.delete(id);
    return Promise.resolve();
  }

  #find(id: string): Held {
    const held = this.uploads.get(id);
    if (!held) throw new TransportProblem('gone', 'There is no such upload.');
    return held;
  }

  async #request(call: Call, detail: string, signal: AbortSignal): Promise<void> {
    this.calls.push(`${call} ${detail}`);
    this.inFlight += 1;
    this.most = Math.max(this.most, this.inFlight);
    try {
      await this.#wait(signal);
      const problem = this.trouble(call, detail);
      if (problem) throw problem;
    } finally {
      this.inFlight -= 1;
    }
  }

  #wait(signal: AbortSignal): Promise<void> {
    return new Promise((resolve, reject) => {
      const stop = () => {
        cancel();
        reject(new DOMException('Stopped.', 'AbortError'));
      };
      const cancel = this.clock.after(this.takes, () => {
        signal.removeEventListener('abort', stop);
        resolve();
      });
      signal.addEventListener('abort', stop, { once: true });
    });
  }
}

/** The sum of a file is its own text, so that equal files have equal sums. */
export const plainHasher: Hasher = { width: 2, sum: (file) => file.text().then((text) => `sum of ${text}`) };

/** Unfinished uploads in memory, over several queues. */
export class MemoryShelf implements UnfinishedStore {
  readonly files = new Map<string, Unfinished>();
  load = () => Promise.resolve([...this.files.values()]);
  keep = (files: Unfinished[]) => Promise.resolve(files.forEach((file) => this.files.set(file.id, file)));
  drop = (ids: string[]) => Promise.resolve(ids.forEach((id) => this.files.delete(id)));
}

/** A file of `size` bytes whose text begins with its name. */
export function fileOf(name: string, size: number, folder = ''): FoundFile {
  const text = name.padEnd(size, '.').slice(0, size);
  return { file: new File([text], name, { lastModified: 1_700_000_000_000 }), path: folder + name };
}

/** A queue against a server in memory, on a clock moved by hand. */
export function startQueue(given: { clock?: HandClock; server?: MemoryServer; shelf?: MemoryShelf; hasher?: Hasher } = {}) {
  const clock = given.clock ?? new HandClock();
  const server = given.server ?? new MemoryServer(clock);
  const shelf = given.shelf ?? new MemoryShelf();
  const gate = new Gate();
  const queue = new UploadQueue({
    transport: server,
    hasher: given.hasher ?? plainHasher,
    unfinished: shelf,
    gate,
    clock,
    chance: () => 0.5,
  });
  const files = (): UploadView[] => {
    queue.store.flush();
    return queue.store.ids().flatMap((id) => queue.store.view(id) ?? []);
  };
  const states = (): Record<string, string> => Object.fromEntries(files().map((file) => [file.path, file.state]));
  const fileNamed = (name: string): UploadView => {
    const file = files().find((one) => one.name === name);
    if (!file) throw new Error(`${name} is not in the list`);
    return file;
  };
  return { clock, server, shelf, queue, files, states, fileNamed };
}
