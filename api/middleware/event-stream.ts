import type { Response } from 'express';
import type { Live } from '../db/live.ts';

/** A line every so often keeps proxies from closing a quiet stream. */
const BREATH_SECONDS = 25;

/**
 * Sends the changes of a topic as server-sent events until the browser goes away. The events say what changed; the page asks anew.
 * @param stillMay asked with every breath: where it throws the stream ends, and the browser that comes back meets the gate
 */
export function streamEvents(
  live: Pick<Live, 'listen'>,
  topic: string,
  { res, stillMay, breathSeconds = BREATH_SECONDS }: { res: Response; stillMay: () => Promise<unknown>; breathSeconds?: number },
): void {
  res.writeHead(200, {
    'Content-Type': 'text/event-stream; charset=utf-8',
    'Cache-Control': 'private, no-store, no-transform',
    'X-Accel-Buffering': 'no',
  });
  res.write('retry: 2000\n: here\n\n');
  const stop = live.listen(topic, ({ topic: _topic, ...change }) => res.write(`data: ${JSON.stringify(change)}\n\n`));
  const breath = setInterval(() => {
    stillMay().then(
      () => res.write(': \n\n'),
      () => res.end(),
    );
  }, breathSeconds * 1000);
  res.once('close', () => {
    clearInterval(breath);
    stop();
  });
}
