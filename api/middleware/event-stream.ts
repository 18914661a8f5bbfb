import type { Request, Response } from 'express';
import type { Live } from '../db/live.ts';

/** A line every so often keeps proxies from closing a quiet stream. */
const BREATH_SECONDS = 25;

/** Sends the changes of a topic as server-sent events until the browser goes away. The events say what changed; the page asks anew. */
export function streamEvents(live: Live, topic: string, req: Request, res: Response): void {
  res.writeHead(200, {
    'Content-Type': 'text/event-stream; charset=utf-8',
    'Cache-Control': 'private, no-store, no-transform',
    'X-Accel-Buffering': 'no',
  });
  res.write('retry: 2000\n: here\n\n');
  const stop = live.listen(topic, ({ topic: _topic, ...change }) => res.write(`data: ${JSON.stringify(change)}\n\n`));
  const breath = setInterval(() => res.write(': \n\n'), BREATH_SECONDS * 1000);
  req.once('close', () => {
    clearInterval(breath);
    stop();
    res.end();
  });
}
