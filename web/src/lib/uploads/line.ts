import { waitAfter } from './back-off.ts';

/**
 * The connection that all files share. When it fails, every file waits together, and after the wait one single request
 * tries it: a server that comes back is not met by everything at once.
 */
export class Line {
  /** Nothing is sent before this moment (milliseconds since the epoch). */
  openAt = 0;
  /** Failures since something last went through. */
  failures = 0;
  /** What the browser says about its network. */
  online = true;
  /** The sentence of the last failure, while it lasts. */
  problem: string | undefined;

  /** How many requests may be under way at `now`, of at most `all`. */
  room(now: number, all: number): number {
    if (!this.online || now < this.openAt) return 0;
    return this.failures > 0 ? 1 : all;
  }

  /**
   * Notes that a request got no useful answer.
   * Requests that were under way together fail together: only the first of them lengthens the wait.
   */
  failed(now: number, problem: string, wish: number | undefined, chance: number): void {
    this.problem = problem;
    if (now < this.openAt && wish === undefined) return;
    if (now >= this.openAt) this.failures += 1;
    this.openAt = Math.max(this.openAt, now + waitAfter(this.failures, wish, chance));
  }

  /** Something went through. What was under way before a failure does not end the wait after it. */
  worked(now: number): void {
    if (now < this.openAt) return;
    this.failures = 0;
    this.openAt = 0;
    this.problem = undefined;
  }

  /** The person or the browser says that it is worth trying now. */
  tryNow(): void {
    this.openAt = 0;
  }
}
