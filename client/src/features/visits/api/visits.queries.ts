import type { ProposeVisit, VisitView, VisitWindow } from '@kerfyard/common/visits';
import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import { api } from '../../../lib/api-client.ts';
import { workKeys } from '../../work/api/work.queries.ts';

export const visitKeys = {
  all: ['visits'] as const,
  span: (from: string, to: string) => ['visits', from, to] as const,
};

/** All visits of the company between two instants. */
export function visitsQuery(span: { from: string; to: string }) {
  return queryOptions({
    queryKey: visitKeys.span(span.from, span.to),
    queryFn: ({ signal }) => api.get<VisitView[]>('/api/visits', { signal, query: span }),
    meta: { live: true },
  });
}

function useVisitMutation<Input>(mutationFn: (input: Input) => Promise<unknown>) {
  const client = useQueryClient();
  return useMutation({
    mutationFn,
    onSettled: async () => {
      await client.invalidateQueries({ queryKey: visitKeys.all });
      await client.invalidateQueries({ queryKey: workKeys.all });
    },
  });
}

export function useProposeVisit() {
  return useVisitMutation((input: ProposeVisit) =>
    api.post<VisitView>('/api/visits', input, { idempotencyKey: input.id }),
  );
}

export function useConfirmVisit(visitId: string) {
  return useVisitMutation((window: VisitWindow) =>
    api.post<VisitView>(`/api/visits/${visitId}/confirm`, { window }),
  );
}

export function useStartVisit(visitId: string) {
  return useVisitMutation(() => api.post<VisitView>(`/api/visits/${visitId}/start`));
}

export function useFinishVisit(visitId: string) {
  return useVisitMutation(() => api.post<VisitView>(`/api/visits/${visitId}/finish`));
}

export function useCancelVisit(visitId: string) {
  return useVisitMutation((reason: string) =>
    api.post<VisitView>(`/api/visits/${visitId}/cancel`, { reason }),
  );
}
