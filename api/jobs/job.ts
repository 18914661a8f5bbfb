import type { Context } from '../context.ts';

export interface JobTools {
  /** Ends when the worker stops or the job ran too long. */
  signal: AbortSignal;
  attempt: number;
  lastAttempt: boolean;
}

/**
 * A piece of background work. Payloads carry ids only; `run` reads the row again, stops quietly where the work is done,
 * and may be killed at any point and run again.
 */
export interface Job<Payload = unknown> {
  name: string;
  run(ctx: Context, payload: Payload, tools: JobTools): Promise<void>;
  /** Tries before it is given up; 8 by default, with exponential back-off. */
  maxAttempts?: number;
  /** Seconds after which `signal` ends it; 300 by default. */
  timeoutSeconds?: number;
  /** Cron pattern for work that comes by itself, in UTC. */
  every?: string;
}
