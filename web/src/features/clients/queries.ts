import { infiniteQueryOptions, queryOptions } from '@tanstack/react-query';
import type { ClientDetail, ClientPage } from '../../../../api/contract/clients.ts';
import { api } from '../../lib/api.ts';

export const clientKeys = {
  all: ['clients'] as const,
  one: (id: string) => ['clients', id] as const,
};

/** The studio's clients by name, page by page. */
export function clientsQuery(search: string) {
  return infiniteQueryOptions({
    queryKey: [...clientKeys.all, 'list', search],
    queryFn: ({ signal, pageParam }) =>
      api.get<ClientPage>('/api/clients', { signal, query: { search: search || undefined, after: pageParam } }),
    initialPageParam: undefined as string | undefined,
    getNextPageParam: (page) => page.next ?? undefined,
  });
}

/** The clients to choose from: those whose name or contact holds the words, at most 200. */
export function clientChoicesQuery(search: string) {
  return queryOptions({
    queryKey: [...clientKeys.all, 'choices', search],
    queryFn: ({ signal }) => api.get<ClientPage>('/api/clients', { signal, query: { search: search || undefined, limit: 200 } }),
  });
}

export function clientQuery(id: string) {
  return queryOptions({
    queryKey: clientKeys.one(id),
    queryFn: ({ signal }) => api.get<ClientDetail>(`/api/clients/${id}`, { signal }),
  });
}
