import type { Context } from '../../api/context.ts';
import type { StaffActor } from '../../api/middleware/actor.ts';
import type { DrawnFrame } from '../scenes/draw.ts';

/** What every act of the demo has at hand. */
export interface Stage {
  ctx: Context;
  owner: StaffActor;
  assistant: StaffActor;
  frames: readonly DrawnFrame[];
  /** Runs waiting jobs where no worker does; a worker's process is waited for otherwise. */
  runJobs?: (() => Promise<void>) | undefined;
}

const PATIENCE_MS = 10 * 60_000;

/** Waits until the worker has brought something about. @throws Error that names it, after ten minutes */
export async function until<T>(stage: Pick<Stage, 'runJobs'>, what: string, look: () => Promise<T | undefined>): Promise<T> {
  const begun = Date.now();
  for (;;) {
    await stage.runJobs?.();
    const found = await look();
    if (found !== undefined) return found;
    if (Date.now() - begun > PATIENCE_MS) throw new Error(`The demo waited ten minutes for ${what}.`);
    await new Promise((resolve) => setTimeout(resolve, 200));
  }
}

/** A day so many days from today, "2026-12-05". */
export function dayFromNow(days: number): string {
  return new Date(Date.now() + days * 86_400_000).toISOString().slice(0, 10);
}
