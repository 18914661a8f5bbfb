import { useEffect, useRef } from 'react';

/** Hands the token of a link over once, though effects may run twice; another token is handed over as well. */
export function useHandOver(token: string, handOver: () => void): void {
  const handed = useRef('');
  useEffect(() => {
    if (handed.current === token) return;
    handed.current = token;
    handOver();
  }, [handOver, token]);
}
