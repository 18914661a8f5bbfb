/** Requests of uploads that may be under way at the same time, over all files and all commissions. */
export const AT_ONCE = 4;

/** Counts the requests under way and tells those who wait when one has ended. */
export class Gate {
  /** Requests under way. */
  busy = 0;
  readonly #waiting = new Set<() => void>();

  constructor(readonly limit = AT_ONCE) {}

  /** Runs `request` in one of the places. The caller has looked at {@link busy} before. */
  async pass<T>(request: () => Promise<T>): Promise<T> {
    this.busy += 1;
    try {
      return await request();
    } finally {
      this.busy -= 1;
      for (const tell of this.#waiting) queueMicrotask(tell);
    }
  }

  /** `tell` is called after each request that ended; the answer ends that. */
  whenFree(tell: () => void): () => void {
    this.#waiting.add(tell);
    return () => this.#waiting.delete(tell);
  }
}
