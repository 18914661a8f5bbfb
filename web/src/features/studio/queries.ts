import { queryOptions } from '@tanstack/react-query';
import type { Currency, StudioSettings, StudioStorage } from '../../../../api/contract/studios.ts';
import { api } from '../../lib/api.ts';

export const studioKeys = { settings: ['studio', 'settings'] as const, storage: ['studio', 'storage'] as const };

export const studioQuery = queryOptions({
  queryKey: studioKeys.settings,
  queryFn: ({ signal }) => api.get<StudioSettings>('/api/studio', { signal }),
});

export const currenciesQuery = queryOptions({
  queryKey: ['currencies'],
  queryFn: ({ signal }) => api.get<{ items: Currency[] }>('/api/currencies', { signal }),
  staleTime: Infinity,
});

/** What is stored changes with every upload: asked for anew at every visit. */
export const storageQuery = queryOptions({
  queryKey: studioKeys.storage,
  queryFn: ({ signal }) => api.get<StudioStorage>('/api/studio/storage', { signal }),
  staleTime: 0,
});
