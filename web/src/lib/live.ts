import { useEffect, useRef } from 'react';

/** What the server tells through an event stream. `lost` is our own: the line was down and changes may have been missed. */
export type LiveChange = { type: string; [name: string]: unknown } | { type: 'lost' };

const FIRST_WAIT = 1_000;
const LONGEST_WAIT = 30_000;

function readChange(data: string): LiveChange {
  try {
    const value: unknown = JSON.parse(data);
    if (value && typeof value === 'object') return { type: 'changed', ...value };
  } catch {
    // A stream may carry plain words too; something has changed in any case.
  }
  return { type: 'changed' };
}

/**
 * Listens to an event stream until the returned function is called. A browser gives up for good when the server answers
 * with an error (while it restarts, say), so the stream is opened again with a growing pause; after each gap a `lost`
 * is told, because changes during the gap were not heard. With `fromStart` it is told once at the beginning too: for data
 * that was read before the stream was open.
 */
export function listen(path: string, tell: (change: LiveChange) => void, fromStart = false): () => void {
  let source: EventSource | undefined;
  let timer: ReturnType<typeof setTimeout> | undefined;
  let wait = FIRST_WAIT;
  let hadGap = fromStart;

  const open = () => {
    source = new EventSource(path);
    source.onopen = () => {
      wait = FIRST_WAIT;
      if (hadGap) tell({ type: 'lost' });
      hadGap = false;
    };
    source.onmessage = (event: MessageEvent<string>) => tell(readChange(event.data));
    source.onerror = () => {
      hadGap = true;
      if (source?.readyState !== EventSource.CLOSED) return;
      timer = setTimeout(open, wait);
      wait = Math.min(wait * 2, LONGEST_WAIT);
    };
  };

  open();
  return () => {
    clearTimeout(timer);
    source?.close();
  };
}

/** Listens while the component is on the page; `path` undefined means: not yet. */
export function useLive(path: string | undefined, tell: (change: LiveChange) => void): void {
  const latest = useRef(tell);
  useEffect(() => {
    latest.current = tell;
  });
  useEffect(() => {
    if (!path) return;
    return listen(path, (change) => latest.current(change), true);
  }, [path]);
}
