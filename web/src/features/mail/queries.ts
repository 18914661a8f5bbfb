import { infiniteQueryOptions, queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import type { ListMails, MailContent, MailRow, MailsPage } from '../../../../api/contract/mail.ts';
import { api } from '../../lib/api.ts';

export type MailFilter = ListMails['state'];

export const mailKeys = { all: ['mails'] as const, list: (state: MailFilter) => ['mails', 'list', state] as const };

/** The outbox, newest first. While something waits in it, it is asked for again and again. */
export function mailsQuery(state: MailFilter) {
  return infiniteQueryOptions({
    queryKey: mailKeys.list(state),
    queryFn: ({ pageParam, signal }) => api.get<MailsPage>('/api/mails', { query: { state, after: pageParam }, signal }),
    initialPageParam: null as string | null,
    getNextPageParam: (last) => last.next,
    refetchInterval: ({ state: { data } }) => (data?.pages.some((page) => page.items.some(isUnderWay)) ? 5_000 : false),
  });
}

function isUnderWay({ state }: MailRow): boolean {
  return state === 'waiting' || state === 'handing-over';
}

export function mailQuery(id: string) {
  return queryOptions({
    queryKey: ['mails', 'one', id],
    queryFn: ({ signal }) => api.get<MailContent>(`/api/mails/${id}`, { signal }),
  });
}

export interface MailDeed {
  what: 'send-again' | 'withdraw';
  id: string;
}

/** Sends a mail again, or keeps it from going out. */
export function useMailDeed() {
  const queries = useQueryClient();
  return useMutation({
    mutationFn: ({ what, id }: MailDeed) => api.post<MailRow>(`/api/mails/${id}/${what}`),
    onSettled: () => queries.invalidateQueries({ queryKey: mailKeys.all }),
  });
}
