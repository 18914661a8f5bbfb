import type { QueryClient } from '@tanstack/react-query';
import type { Me } from '../../../../api/contract/sign-in.ts';
import { meKey } from './queries.ts';

/** Forgets everything the page knows: what somebody else saw at this browser is nobody's business now. */
export function startOver(queries: QueryClient, me?: Me): void {
  // The link that led here is still on the page; asking for it again would only find that it was used.
  queries.removeQueries({ predicate: ({ queryKey }) => queryKey[0] !== 'link' });
  if (me) queries.setQueryData(meKey, me);
}
