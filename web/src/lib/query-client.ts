import { QueryClient } from '@tanstack/react-query';
import { ApiProblem } from './api.ts';

/** What a second try cannot mend is not tried again: a refusal stays a refusal. */
export function worthRetrying(failures: number, error: unknown): boolean {
  if (!(error instanceof ApiProblem)) return false;
  return failures < 2 && (error.status === 0 || error.status === 502 || error.status === 503);
}

/** The one cache of the page. Live updates tell when something is stale, so focus alone asks for nothing within 30 s. */
export const queryClient = new QueryClient({
  defaultOptions: {
    queries: { retry: worthRetrying, staleTime: 30_000, gcTime: 10 * 60_000, networkMode: 'always' },
    // Without a line a deed fails at once with a sentence. Kept back until the line is there it would happen later, when nobody expects it.
    mutations: { retry: false, networkMode: 'always' },
  },
});
