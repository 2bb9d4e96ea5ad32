import type { CompletionView, SubmitCompletion } from '@kerfyard/common/completions';
import { useMutation, useQueryClient } from '@tanstack/react-query';
import { api } from '../../../lib/api-client.ts';
import { workKeys } from '../../work/api/work.queries.ts';

function useCompletionMutation<Input>(
  subcontractId: string,
  mutationFn: (input: Input) => Promise<CompletionView>,
) {
  const client = useQueryClient();
  return useMutation({
    mutationFn,
    onSettled: () => client.invalidateQueries({ queryKey: workKeys.one(subcontractId) }),
  });
}

/** Say what was cut and ask for its payment. */
export function useSubmitCompletion(subcontractId: string) {
  return useCompletionMutation(subcontractId, (input: SubmitCompletion) =>
    api.post<CompletionView>('/api/completions', input, { idempotencyKey: input.id }),
  );
}

export function useAcceptCompletion(subcontractId: string) {
  return useCompletionMutation(subcontractId, (id: string) =>
    api.post<CompletionView>(`/api/completions/${id}/accept`),
  );
}

export function useWithdrawCompletion(subcontractId: string) {
  return useCompletionMutation(subcontractId, (id: string) =>
    api.post<CompletionView>(`/api/completions/${id}/withdraw`),
  );
}
