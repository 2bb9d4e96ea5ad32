import type { Page } from '@kerfyard/common/api';
import type { SubcontractListItem, SubcontractStatus, SubcontractView } from '@kerfyard/common/subcontracts';
import { infiniteQueryOptions, queryOptions } from '@tanstack/react-query';
import { api } from '../../../lib/api-client.ts';

export const workKeys = {
  all: ['work'] as const,
  lists: ['work', 'list'] as const,
  list: (status: SubcontractStatus | undefined) => ['work', 'list', status ?? 'all'] as const,
  one: (id: string) => ['work', 'subcontract', id] as const,
};

/** A company's subcontracts, newest first, read on by key. */
export function subcontractsQuery(status?: SubcontractStatus) {
  return infiniteQueryOptions({
    queryKey: workKeys.list(status),
    queryFn: ({ signal, pageParam }) =>
      api.get<Page<SubcontractListItem>>('/api/subcontracts', {
        signal,
        query: { cursor: pageParam, status },
      }),
    initialPageParam: null as string | null,
    getNextPageParam: (page) => page.nextCursor,
    meta: { live: true },
  });
}

/** One subcontract, whole: paper, lines, visits, completions, money. */
export function subcontractQuery(id: string) {
  return queryOptions({
    queryKey: workKeys.one(id),
    queryFn: ({ signal }) => api.get<SubcontractView>(`/api/subcontracts/${id}`, { signal }),
    meta: { live: true },
  });
}
