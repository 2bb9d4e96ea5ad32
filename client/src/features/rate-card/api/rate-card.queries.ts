import type { RateCardView, SaveRateCard } from '@kerfyard/common/people';
import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import { api } from '../../../lib/api-client.ts';

export const rateCardKeys = { own: ['company', 'rate-card'] as const };

/** The crew's own rate card; nobody else's can be asked for. */
export const rateCardQuery = queryOptions({
  queryKey: rateCardKeys.own,
  queryFn: ({ signal }) => api.get<RateCardView>('/api/company/rate-card', { signal }),
});

/** Save the whole card; the answer replaces what is shown. */
export function useSaveRateCard() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (input: SaveRateCard) => api.put<RateCardView>('/api/company/rate-card', input),
    onSuccess: (view) => client.setQueryData(rateCardKeys.own, view),
  });
}
