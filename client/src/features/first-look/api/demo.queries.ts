import type { DemoPersonView, MeView } from '@kerfyard/common/people';
import { queryOptions, useMutation } from '@tanstack/react-query';
import { api } from '../../../lib/api-client.ts';

/** The people of the demo; none where there is no demo. */
export const demoPeopleQuery = queryOptions({
  queryKey: ['demo', 'people'] as const,
  staleTime: Infinity,
  queryFn: ({ signal }) => api.get<DemoPersonView[]>('/api/demo/people', { signal, whenSignedOut: 'throw' }),
});

/** One press into the demo. */
export function useDemoSignIn(onSignedIn: (me: MeView) => void) {
  return useMutation({
    mutationFn: (key: string) => api.post<MeView>('/api/demo/sign-in', { key }, { whenSignedOut: 'throw' }),
    onSuccess: onSignedIn,
  });
}
