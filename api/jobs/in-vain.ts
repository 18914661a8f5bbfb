import { PixelsFailure } from '../imaging/pixels/pixels.ts';
import { Refusal } from '../imaging/refusal.ts';
import type { JobTools } from './job.ts';

/** A picture that ends its process, or takes too long, so many times would do so for ever. */
const MOST_FAILURES = 3;

/** Whether a picture has brought down the process at work on it too often. */
export function failedTooOften(error: unknown, { attempt }: Pick<JobTools, 'attempt'>): boolean {
  return error instanceof PixelsFailure && attempt >= MOST_FAILURES;
}

/** Whether trying work on pixels again is in vain: the picture cannot be read, or it was tried often enough. */
export function isInVain(error: unknown, { attempt, lastAttempt }: Pick<JobTools, 'attempt' | 'lastAttempt'>): boolean {
  return lastAttempt || error instanceof Refusal || failedTooOften(error, { attempt });
}
