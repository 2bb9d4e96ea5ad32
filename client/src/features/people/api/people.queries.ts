import type {
  AcceptInvitation,
  EditMember,
  InvitationOfferView,
  Invite,
  PeopleView,
} from '@kerfyard/common/people';
import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import { api } from '../../../lib/api-client.ts';

export const peopleKeys = {
  own: ['company', 'people'] as const,
  offer: (token: string) => ['invitation', token] as const,
};

/** The people of one's company, and the invitations that wait. */
export const peopleQuery = queryOptions({
  queryKey: peopleKeys.own,
  queryFn: ({ signal }) => api.get<PeopleView>('/api/company/people', { signal }),
});

function usePeopleMutation<Variables>(mutationFn: (variables: Variables) => Promise<void>) {
  const client = useQueryClient();
  return useMutation({
    mutationFn,
    onSettled: () => client.invalidateQueries({ queryKey: peopleKeys.own }),
  });
}

export const useInvite = () =>
  usePeopleMutation((body: Invite) =>
    api.post<void>('/api/company/invitations', body, { idempotencyKey: body.id }),
  );

export const useWithdrawInvitation = () =>
  usePeopleMutation((id: string) => api.delete<void>(`/api/company/invitations/${id}`));

export const useEditMember = () =>
  usePeopleMutation(({ id, ...body }: EditMember & { id: string }) =>
    api.put<void>(`/api/company/people/${id}`, body),
  );

export const useDeactivate = () =>
  usePeopleMutation((id: string) => api.post<void>(`/api/company/people/${id}/deactivate`));

export const useReactivate = () =>
  usePeopleMutation((id: string) => api.post<void>(`/api/company/people/${id}/reactivate`));

/** For a colleague who lost phone and recovery codes. */
export const useRemoveTheirSecondFactor = () =>
  usePeopleMutation((id: string) => api.delete<void>(`/api/company/people/${id}/second-factor`));

/** What a link offers. Read by POST, so that its token stands in no log; reading does not use it up. */
export function offerQuery(token: string) {
  return queryOptions({
    queryKey: peopleKeys.offer(token),
    queryFn: () =>
      api.post<InvitationOfferView>('/api/auth/invitation', { token }, { whenSignedOut: 'throw' }),
    staleTime: Infinity,
  });
}

export const postAccept = (body: AcceptInvitation) =>
  api.post<void>('/api/auth/invitation/accept', body, { whenSignedOut: 'throw' });
