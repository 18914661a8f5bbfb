/** The first wait after a failure, in milliseconds. */
export const FIRST_WAIT = 1_000;
/** No wait is longer than this, unless the server asks for it. */
export const LONGEST_WAIT = 30_000;
/** A server's wish beyond this is cut: a person is looking at the page. */
const LONGEST_WISH = 5 * 60_000;

/**
 * Milliseconds to wait after the `failures`-th failure in a row (from 1): doubling, cut at {@link LONGEST_WAIT}, of which
 * the upper half is left to chance so that many browsers do not return in step (common practice, "equal jitter").
 * @param wish what the server asked for by Retry-After, in milliseconds; it is never undercut
 * @param chance a number from 0 up to 1
 */
export function waitAfter(failures: number, wish: number | undefined, chance: number): number {
  const whole = Math.min(LONGEST_WAIT, FIRST_WAIT * 2 ** Math.max(0, failures - 1));
  const own = whole / 2 + (whole / 2) * chance;
  return Math.round(wish === undefined ? own : Math.max(own, Math.min(wish, LONGEST_WISH)));
}

/**
 * Reads Retry-After (RFC 9110 10.2.3: delay-seconds or an HTTP-date).
 * @returns milliseconds from `now`, or undefined where the header is missing or not readable
 */
export function retryAfterMs(header: string | null, now: number): number | undefined {
  if (header === null || header.trim() === '') return undefined;
  if (/^\s*\d+\s*$/.test(header)) return Number(header) * 1000;
  const date = Date.parse(header);
  return Number.isNaN(date) ? undefined : Math.max(0, date - now);
}
