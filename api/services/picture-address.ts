import { createHmac, timingSafeEqual } from 'node:crypto';
import type { Config } from '../config.ts';
import type { Store } from './storage.ts';

/** Addresses stay the same within a window, so that browsers keep the pictures, and end with the window after it. */
export const WINDOW_SECONDS = 6 * 60 * 60;

/** When an address made now begins to be the one it is, and when it ends. Unix seconds. */
export function windowAt(now: number): { from: number; until: number } {
  const from = Math.floor(now / 1000 / WINDOW_SECONDS) * WINDOW_SECONDS;
  return { from, until: from + 2 * WINDOW_SECONDS };
}

/** One seal opens a picture in all its sizes: a list of a thousand then compresses to a third. */
function seal(secret: string, key: string, until: number): string {
  const picture = key.replace(/-\d+\.jpg$/, '');
  return createHmac('sha256', secret).update(`picture\n${until}\n${picture}`).digest('base64url');
}

/** The signed address of a picture (never of an original): served by the application, or by the store itself. */
export async function pictureAddress(context: { config: Config; store: Store }, key: string, now = Date.now()): Promise<string> {
  const { from, until } = windowAt(now);
  if (context.config.picturesFrom === 'store') return context.store.presign(key, new Date(from * 1000), 2 * WINDOW_SECONDS);
  return `/pictures/${key}?until=${until}&seal=${seal(context.config.secret, key, until)}`;
}

/** Whether an address is one of ours and has not ended. Compares in constant time. */
export function sealHolds(secret: string, key: string, until: number, given: string, now = Date.now()): boolean {
  if (!Number.isSafeInteger(until) || until * 1000 < now) return false;
  const expected = Buffer.from(seal(secret, key, until));
  const offered = Buffer.from(given);
  return expected.length === offered.length && timingSafeEqual(expected, offered);
}
