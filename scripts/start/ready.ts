import { setTimeout as pause } from 'node:timers/promises';

const PATIENCE_MS = 90_000;

/** Waits until /healthz answers 200. @throws Error with the reason of the last answer where it does not come to that */
export async function untilHealthy(address: string): Promise<void> {
  const deadline = Date.now() + PATIENCE_MS;
  let reason = 'no answer';
  while (Date.now() < deadline) {
    try {
      const answer = await fetch(`${address}/healthz`, { signal: AbortSignal.timeout(5000) });
      if (answer.status === 200) return;
      reason = `${answer.status} ${await answer.text()}`;
    } catch (error) {
      reason = error instanceof Error ? error.message : String(error);
    }
    await pause(100);
  }
  throw new Error(`The API was not ready within ${PATIENCE_MS / 1000} s: ${reason}`);
}
