import type { Page } from '@kerfyard/common/api';
import type { ScopeCardView } from '@kerfyard/common/scopes';
import { infiniteQueryOptions } from '@tanstack/react-query';
import { api } from '../../../lib/api-client.ts';

/** Filters as they stand in the address; the server checks them. */
export interface OpenScopesFilter {
  method?: string | undefined;
  withinMiles?: string | undefined;
  dueBefore?: string | undefined;
  minInchFeet?: string | undefined;
  maxInchFeet?: string | undefined;
  sort?: string | undefined;
}

export const openScopesKeys = {
  all: ['open-scopes'] as const,
  list: (filter: OpenScopesFilter) => ['open-scopes', filter] as const,
};

/** Scopes a crew may bid on, read on by key. */
export function openScopesQuery(filter: OpenScopesFilter) {
  return infiniteQueryOptions({
    queryKey: openScopesKeys.list(filter),
    queryFn: ({ signal, pageParam }) =>
      api.get<Page<ScopeCardView>>('/api/open-scopes', { signal, query: { ...filter, cursor: pageParam } }),
    initialPageParam: null as string | null,
    getNextPageParam: (page) => page.nextCursor,
    meta: { live: true },
  });
}
