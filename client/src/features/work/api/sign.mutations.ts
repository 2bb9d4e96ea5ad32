import type { Sign } from '@kerfyard/common/subcontracts';
import { useMutation, useQueryClient } from '@tanstack/react-query';
import { api } from '../../../lib/api-client.ts';
import { workKeys } from './work.queries.ts';

/** Sign the subcontract as read: the hash of the document goes along, so that nobody signs other words. */
export function useSign(subcontractId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (input: Sign) => api.post<void>(`/api/subcontracts/${subcontractId}/sign`, input),
    onSettled: () => client.invalidateQueries({ queryKey: workKeys.all }),
  });
}
