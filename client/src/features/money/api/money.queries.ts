import type {
  BooksView,
  FundingView,
  Release,
  ReleaseView,
  SetAside,
  SetAsideQuote,
  StatementView,
} from '@kerfyard/common/payments';
import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import { api } from '../../../lib/api-client.ts';
import { workKeys } from '../../work/api/work.queries.ts';

export const moneyKeys = {
  all: ['money'] as const,
  statement: (subcontractId: string | undefined) => ['money', 'statement', subcontractId ?? 'all'] as const,
  quote: (subcontractId: string, lines: readonly string[]) =>
    ['money', 'quote', subcontractId, ...lines] as const,
  books: ['money', 'books'] as const,
};

/** A company's statement, of one subcontract or of all. */
export function statementQuery(subcontractId?: string) {
  return queryOptions({
    queryKey: moneyKeys.statement(subcontractId),
    queryFn: ({ signal }) =>
      api.get<StatementView>('/api/payments/statement', { signal, query: { subcontractId } }),
    meta: { live: true },
  });
}

/** What setting these lines aside costs; computed by the server, nothing is stored. */
export function setAsideQuoteQuery(subcontractId: string, sovLineIds: readonly string[]) {
  const lines = [...sovLineIds].sort();
  return queryOptions({
    queryKey: moneyKeys.quote(subcontractId, lines),
    queryFn: () =>
      api.post<SetAsideQuote>(`/api/subcontracts/${subcontractId}/set-aside-quote`, {
        sovLineIds: lines,
        method: 'card',
      }),
    enabled: lines.length > 0,
    staleTime: 60_000,
    retry: false,
  });
}

/** Ask for the money of these lines; the payment page's address follows by the subcontract's own query. */
export function useSetAside(subcontractId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (input: SetAside) =>
      api.post<FundingView>(`/api/subcontracts/${subcontractId}/set-aside`, input, {
        idempotencyKey: input.id,
      }),
    onSettled: () => client.invalidateQueries({ queryKey: workKeys.one(subcontractId) }),
  });
}

/** Release what an accepted completion lists. */
export function useRelease(subcontractId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (input: Release) =>
      api.post<ReleaseView>('/api/releases', input, { idempotencyKey: input.id }),
    onSettled: async () => {
      await client.invalidateQueries({ queryKey: workKeys.one(subcontractId) });
      await client.invalidateQueries({ queryKey: moneyKeys.all });
    },
  });
}

/** Staff: the platform's books. */
export const booksQuery = queryOptions({
  queryKey: moneyKeys.books,
  queryFn: ({ signal }) => api.get<BooksView>('/api/staff/books', { signal }),
  refetchInterval: 15_000,
});
