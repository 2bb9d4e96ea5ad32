import type { Page } from '@kerfyard/common/api';
import type { BidInput, BidListItem, OwnBidView } from '@kerfyard/common/bids';
import { infiniteQueryOptions, queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import { api } from '../../../lib/api-client.ts';
import { isApiError } from '../../../lib/api-error.ts';
import { openScopesKeys } from '../../open-scopes/api/open-scopes.queries.ts';

export const bidKeys = {
  all: ['bids'] as const,
  lists: ['bids', 'list'] as const,
  own: (scopeId: string) => ['bids', 'own', scopeId] as const,
  draft: (scopeId: string) => ['bids', 'draft', scopeId] as const,
};

/** A crew's own bids, newest first, read on by key. */
export const bidsQuery = infiniteQueryOptions({
  queryKey: bidKeys.lists,
  queryFn: ({ signal, pageParam }) =>
    api.get<Page<BidListItem>>('/api/bids', { signal, query: { cursor: pageParam } }),
  initialPageParam: null as string | null,
  getNextPageParam: (page) => page.nextCursor,
  meta: { live: true },
});

async function getOr404<T>(path: string, signal: AbortSignal): Promise<T | null> {
  try {
    return await api.get<T>(path, { signal });
  } catch (error) {
    if (isApiError(error, 'not_found')) return null;
    throw error;
  }
}

/** The crew's own bid on a scope, or null when none is in. */
export function ownBidQuery(scopeId: string) {
  return queryOptions({
    queryKey: bidKeys.own(scopeId),
    queryFn: ({ signal }) => getOr404<OwnBidView>(`/api/scopes/${scopeId}/own-bid`, signal),
    meta: { live: true },
  });
}

/** What was typed of a bid and not sent yet; kept encrypted at the server. */
export function bidDraftQuery(scopeId: string) {
  return queryOptions({
    queryKey: bidKeys.draft(scopeId),
    queryFn: ({ signal }) =>
      getOr404<{ draft: Record<string, unknown> | null }>(`/api/scopes/${scopeId}/bid-draft`, signal),
    staleTime: Infinity,
  });
}

export const saveBidDraft = (scopeId: string, draft: Record<string, unknown>) =>
  api.put<void>(`/api/scopes/${scopeId}/bid-draft`, { draft });

function useBidMutation<Input>(scopeId: string, mutationFn: (input: Input) => Promise<OwnBidView>) {
  const client = useQueryClient();
  return useMutation({
    mutationFn,
    onSettled: async () => {
      await client.invalidateQueries({ queryKey: bidKeys.all });
      await client.invalidateQueries({ queryKey: openScopesKeys.all });
    },
  });
}

/** Hand in a bid, or revise the one that is in; sending the same again changes nothing. */
export function usePlaceBid(scopeId: string) {
  return useBidMutation(scopeId, (input: BidInput) =>
    api.put<OwnBidView>(`/api/scopes/${scopeId}/own-bid`, input),
  );
}

export function useWithdrawBid(scopeId: string) {
  return useBidMutation(scopeId, () => api.post<OwnBidView>(`/api/scopes/${scopeId}/own-bid/withdraw`));
}
