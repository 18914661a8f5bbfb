import { useQueryClient } from '@tanstack/react-query';
import { useEffect } from 'react';
import { ApiProblem } from '../../lib/api.ts';
import { meKey } from './queries.ts';

/** Any request that is refused because nobody is signed in any more has the page ask who is. */
export function useSessionEnd(): void {
  const queries = useQueryClient();
  useEffect(() => {
    const hear = (error: unknown, key?: readonly unknown[]) => {
      if (error instanceof ApiProblem && error.code === 'no-staff' && key?.[0] !== meKey[0])
        void queries.invalidateQueries({ queryKey: meKey });
    };
    const stops = [
      queries.getQueryCache().subscribe((event) => {
        if (event.type === 'updated' && event.action.type === 'error') hear(event.action.error, event.query.queryKey);
      }),
      queries.getMutationCache().subscribe((event) => {
        if (event.type === 'updated' && event.action.type === 'error') hear(event.action.error);
      }),
    ];
    return () => stops.forEach((stop) => stop());
  }, [queries]);
}
