import { useEffect, useRef } from 'react';
import { listen, type LiveChange } from '../../lib/live.ts';

type Hearer = (change: LiveChange) => void;
const lines = new Map<string, { hearers: Set<Hearer>; stop: () => void }>();

function hear(path: string, hearer: Hearer): () => void {
  let line = lines.get(path);
  if (!line) {
    const hearers = new Set<Hearer>();
    line = { hearers, stop: listen(path, (change) => hearers.forEach((each) => each(change))) };
    lines.set(path, line);
  }
  const { hearers, stop } = line;
  hearers.add(hearer);
  return () => {
    hearers.delete(hearer);
    if (hearers.size > 0) return;
    lines.delete(path);
    stop();
  };
}

/** Hears what changes in a commission. All parts of a page share one stream, since a browser opens few to one server. */
export function useCommissionChanges(commissionId: string, tell: Hearer): void {
  const latest = useRef(tell);
  useEffect(() => {
    latest.current = tell;
  });
  useEffect(() => hear(`/api/commissions/${commissionId}/events`, (change) => latest.current(change)), [commissionId]);
}
