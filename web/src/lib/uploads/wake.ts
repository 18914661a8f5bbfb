import type { Clock } from './clock.ts';

/** One alarm for the earliest of several moments. */
export class Wake {
  #cancel: (() => void) | undefined;

  constructor(
    private readonly clock: Clock,
    private readonly ring: () => void,
  ) {}

  /** Rings at the earliest moment that is still to come; earlier alarms are forgotten. */
  at(moments: readonly number[]): void {
    this.#cancel?.();
    this.#cancel = undefined;
    const now = this.clock.now();
    const next = Math.min(...moments.filter((moment) => moment > now));
    if (Number.isFinite(next)) this.#cancel = this.clock.after(next - now, this.ring);
  }
}
