import type { Award, BidTabulationView } from '@kerfyard/common/bids';
import type { Plugs } from '@kerfyard/common/scopes';
import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import { api } from '../../../lib/api-client.ts';
import { scopeKeys } from '../../scopes/api/scope.queries.ts';

export const tabulationKeys = {
  of: (scopeId: string) => ['tabulation', scopeId] as const,
};

/** Bids side by side; sealed before due it holds how many there are and nothing else. */
export function tabulationQuery(scopeId: string) {
  return queryOptions({
    queryKey: tabulationKeys.of(scopeId),
    queryFn: ({ signal }) => api.get<BidTabulationView>(`/api/scopes/${scopeId}/bids`, { signal }),
    meta: { live: true },
  });
}

/** Price what bids leave out; the server answers with the totals it makes of them. */
export function useSetPlugs(scopeId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (plugs: Plugs) => api.put<BidTabulationView>(`/api/scopes/${scopeId}/plugs`, plugs),
    // One after the other: the whole list travels, so the later one must also arrive later.
    scope: { id: `plugs-${scopeId}` },
    onSuccess: (view) => client.setQueryData(tabulationKeys.of(scopeId), view),
  });
}

/** Award one bid; of many presses at once one wins and the others hear why not. */
export function useAward(scopeId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: ({ award, key }: { award: Award; key: string }) =>
      api.post<{ subcontractId: string }>(`/api/scopes/${scopeId}/award`, award, { idempotencyKey: key }),
    onSettled: () =>
      Promise.all([
        client.invalidateQueries({ queryKey: tabulationKeys.of(scopeId) }),
        client.invalidateQueries({ queryKey: scopeKeys.all }),
      ]),
  });
}
