import type { IncomingMessage } from 'node:http';
import type { Socket } from 'node:net';

/** What goes wrong with the requests that match. */
export interface Fault {
  /** HTTP method; every method where left out. */
  method?: string;
  /** Matched against "bucket/key"; every key where left out. */
  keyPattern?: RegExp | string;
  /** Answer this status without doing anything. */
  status?: number;
  /** Cut the connection after so many bytes of the body (of the request, or of the answer to a GET). */
  dropConnectionAfterBytes?: number;
  /** Do the work, then cut the connection instead of answering. */
  loseAnswer?: boolean;
  /** Wait so long before anything else. */
  delayMs?: number;
  /** How many requests; 1 where left out. */
  times?: number;
}

/** Switch for tests: makes the next matching requests fail in the way asked for. */
export class Faults {
  private waiting: Fault[] = [];
  /** Requests that met a fault, in order, as "PUT bucket/key". */
  readonly met: string[] = [];

  failNext(fault: Fault): void {
    this.waiting.push({ ...fault, times: fault.times ?? 1 });
  }

  clear(): void {
    this.waiting = [];
    this.met.length = 0;
  }

  /** The fault that this request meets, counted down; undefined where none matches. */
  take(method: string, target: string): Fault | undefined {
    const fault = this.waiting.find((one) => (one.method ?? method) === method && matches(one.keyPattern, target));
    if (!fault) return undefined;
    this.met.push(`${method} ${target}`);
    fault.times = (fault.times ?? 1) - 1;
    if (fault.times <= 0) this.waiting = this.waiting.filter((one) => one !== fault);
    return fault;
  }
}

function matches(pattern: Fault['keyPattern'], target: string): boolean {
  if (pattern === undefined) return true;
  return typeof pattern === 'string' ? target.includes(pattern) : pattern.test(target);
}

/** The type says otherwise, but a request whose line is gone has no socket any more. */
export const lineOf = (req: IncomingMessage): Socket | null => req.socket as Socket | null;

/** Ends the connection without a word. */
export function cutLine(req: IncomingMessage): void {
  lineOf(req)?.destroy();
}

/** Passes bytes on until the limit, then cuts the connection. */
export async function* cutAfter(source: AsyncIterable<Buffer>, bytes: number, req: IncomingMessage): AsyncGenerator<Buffer> {
  let left = bytes;
  for await (const chunk of source) {
    yield chunk.subarray(0, left);
    left -= chunk.length;
    if (left > 0) continue;
    // What was passed on must leave before the line goes down.
    await new Promise((resolve) => setTimeout(resolve, 20));
    cutLine(req);
    throw new Error('The connection was cut on purpose.');
  }
}
