import type { Page } from '@kerfyard/common/api';
import type { OwnScopesQuery, OwnScopeView, ScopeDetailView } from '@kerfyard/common/scopes';
import { infiniteQueryOptions, queryOptions } from '@tanstack/react-query';
import { api } from '../../../lib/api-client.ts';

export const scopeKeys = {
  all: ['scopes'] as const,
  ownLists: ['scopes', 'own'] as const,
  ownList: (status: string | undefined) => ['scopes', 'own', status ?? 'all'] as const,
  one: (id: string) => ['scopes', 'one', id] as const,
};

/** The general contractor's own scopes, newest change first, read on by key. */
export function ownScopesQuery(status?: OwnScopesQuery['status']) {
  return infiniteQueryOptions({
    queryKey: scopeKeys.ownList(status),
    queryFn: ({ signal, pageParam }) =>
      api.get<Page<OwnScopeView>>('/api/scopes', { signal, query: { cursor: pageParam, status } }),
    initialPageParam: null as string | null,
    getNextPageParam: (page) => page.nextCursor,
    meta: { live: true },
  });
}

/** One scope as the reader may see it. */
export function scopeQuery(id: string) {
  return queryOptions({
    queryKey: scopeKeys.one(id),
    queryFn: ({ signal }) => api.get<ScopeDetailView>(`/api/scopes/${id}`, { signal }),
    meta: { live: true },
  });
}
