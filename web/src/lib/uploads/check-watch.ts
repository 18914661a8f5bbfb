import type { Clock } from './clock.ts';
import type { CheckState, UploadTransport } from './transport.ts';
import type { UploadItem } from './upload-item.ts';

/** The first question comes so soon after a file is complete, in milliseconds; the following ones ever later. */
const FIRST = 500;
const LONGEST = 4_000;
/** Uploads asked about in one request. */
const A_QUESTION = 100;

/** Asks the server how its checks of whole files stand: one question at a time for all of them. */
export class CheckWatch {
  /** The next question is not asked before this moment. */
  nextAt = 0;
  #wait = FIRST;
  #asking = false;

  constructor(
    private readonly transport: UploadTransport,
    private readonly clock: Clock,
  ) {}

  /** Whether it is time to ask, with `waiting` files being checked. */
  due(waiting: number, now: number): boolean {
    return waiting > 0 && !this.#asking && now >= this.nextAt;
  }

  /** Something was heard of the checks (or a file was just completed): ask soon. */
  soon(): void {
    this.#wait = FIRST;
    this.nextAt = Math.min(Math.max(this.nextAt, this.clock.now()), this.clock.now() + FIRST);
  }

  /** Puts the next question off until the server can have something to say about a file that was just completed. */
  completed(waitingBefore: number): void {
    if (waitingBefore === 0) this.nextAt = this.clock.now() + FIRST;
    this.#wait = FIRST;
  }

  /**
   * @param checking the files being checked, oldest first
   * @returns the files whose check is over, with its result
   */
  async ask(checking: Iterable<UploadItem>): Promise<Map<UploadItem, CheckState>> {
    const asked = new Map<string, UploadItem>();
    for (const item of checking) {
      if (item.uploadId !== undefined && asked.size < A_QUESTION) asked.set(item.uploadId, item);
    }
    this.#asking = true;
    try {
      const states = await this.transport.check([...asked.keys()], new AbortController().signal);
      return over(states, asked);
    } finally {
      this.#asking = false;
      this.nextAt = this.clock.now() + this.#wait;
      this.#wait = Math.min(LONGEST, this.#wait * 2);
    }
  }
}

function over(states: CheckState[], asked: Map<string, UploadItem>): Map<UploadItem, CheckState> {
  const result = new Map<UploadItem, CheckState>();
  for (const state of states) {
    const item = asked.get(state.uploadId);
    if (item && state.state !== 'checking') result.set(item, state);
  }
  return result;
}
