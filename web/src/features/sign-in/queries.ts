import { queryOptions } from '@tanstack/react-query';
import type { ConfirmEmailLink, JoinLink, Me, PasswordResetLink } from '../../../../api/contract/sign-in.ts';
import { api } from '../../lib/api.ts';

export const meKey = ['me'] as const;

/** Who works at this browser, for which studio, and what they may do. Fails with 401 where nobody is signed in. */
export const meQuery = queryOptions({
  queryKey: meKey,
  queryFn: ({ signal }) => api.get<Me>('/api/me', { signal }),
  staleTime: 60_000,
});

interface Looks {
  'confirm-email': ConfirmEmailLink;
  'password-resets': PasswordResetLink;
  join: JoinLink;
}

/** Whether the link in a mail still works, and what it is for. The token travels in the body: addresses end up in logs. */
export function linkQuery<Kind extends keyof Looks>(kind: Kind, token: string) {
  return queryOptions({
    queryKey: ['link', kind, token],
    queryFn: ({ signal }) => api.post<Looks[Kind]>(`/api/${kind}/look`, { token }, { signal }),
    gcTime: 0,
    staleTime: Infinity,
  });
}
