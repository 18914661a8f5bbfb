/** Speed is the mean over this many milliseconds. */
const WINDOW = 12_000;

interface Sample {
  at: number;
  bytes: number;
}

/** Bytes a second as a moving average over the last twelve seconds in which something was under way. */
export class SpeedMeter {
  #samples: Sample[] = [];
  #since: number | undefined;

  /** Notes that `bytes` more have left by `now`. */
  add(now: number, bytes: number): void {
    this.#since ??= now;
    this.#samples.push({ at: now, bytes });
    this.#forget(now);
  }

  /** Forgets everything: after a pause the time that nothing moved must not count. */
  clear(): void {
    this.#samples = [];
    this.#since = undefined;
  }

  /** Bytes a second, or undefined in the first second, where any number would be a guess. */
  perSecond(now: number): number | undefined {
    this.#forget(now);
    if (this.#since === undefined) return undefined;
    const span = Math.min(WINDOW, now - this.#since);
    if (span < 1000) return undefined;
    return this.#samples.reduce((sum, sample) => sum + sample.bytes, 0) / (span / 1000);
  }

  #forget(now: number): void {
    const first = this.#samples.findIndex((sample) => sample.at > now - WINDOW);
    this.#samples = first === -1 ? [] : this.#samples.slice(first);
  }
}

/** Seconds until `left` bytes are sent, or undefined where nothing moves. */
export function secondsLeft(left: number, perSecond: number | undefined): number | undefined {
  if (left <= 0) return 0;
  if (perSecond === undefined || perSecond < 1) return undefined;
  return left / perSecond;
}
