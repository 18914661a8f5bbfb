/** The time as the upload queue sees it; tests bring one of their own. */
export interface Clock {
  /** Milliseconds since the epoch. */
  now(): number;
  /** Runs `act` once after `ms` milliseconds; the answer cancels it. */
  after(ms: number, act: () => void): () => void;
}

/** The browser's own clock. */
export const realClock: Clock = {
  now: () => Date.now(),
  after(ms, act) {
    const timer = setTimeout(act, ms);
    return () => clearTimeout(timer);
  },
};
