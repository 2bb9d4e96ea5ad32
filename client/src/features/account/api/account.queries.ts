import type {
  AccountView,
  ChangeEmail,
  ChangePassword,
  NewSecondFactorView,
  RecoveryCodesView,
  ResetPassword,
  SessionView,
} from '@kerfyard/common/people';
import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import { api } from '../../../lib/api-client.ts';

export const accountKeys = { own: ['account'] as const, sessions: ['account', 'sessions'] as const };

/** One's own account: address, second factor. */
export const accountQuery = queryOptions({
  queryKey: accountKeys.own,
  queryFn: ({ signal }) => api.get<AccountView>('/api/account', { signal }),
});

/** Where one is signed in. */
export const sessionsQuery = queryOptions({
  queryKey: accountKeys.sessions,
  queryFn: ({ signal }) => api.get<SessionView[]>('/api/account/sessions', { signal }),
});

function useAccountMutation<Variables, Result>(mutationFn: (variables: Variables) => Promise<Result>) {
  const client = useQueryClient();
  return useMutation({
    mutationFn,
    onSettled: () => client.invalidateQueries({ queryKey: accountKeys.own }),
  });
}

export const useChangePassword = () =>
  useAccountMutation((body: ChangePassword) => api.put<void>('/api/account/password', body));

export const useChangeEmail = () =>
  useAccountMutation((body: ChangeEmail) => api.post<void>('/api/account/email', body));

/** A fresh secret; nothing is asked for until its first code has come back. */
export const useBeginSecondFactor = () =>
  useMutation({ mutationFn: () => api.post<NewSecondFactorView>('/api/account/second-factor') });

/** The first code of the app. The caller shows the recovery codes, which come only once. */
export const postSecondFactorCode = (code: string) =>
  api.post<RecoveryCodesView>('/api/account/second-factor/confirm', { code });

export const useRemoveSecondFactor = () =>
  useAccountMutation(() => api.delete<void>('/api/account/second-factor'));

export const useRenewRecoveryCodes = () =>
  useAccountMutation(() => api.post<RecoveryCodesView>('/api/account/recovery-codes'));

export const useEndSession = () =>
  useAccountMutation((id: string) => api.delete<void>(`/api/account/sessions/${id}`));

export const useEndOtherSessions = () => useAccountMutation(() => api.delete<void>('/api/account/sessions'));

/** Asks for the link; the answer is the same for every address. */
export const postAskReset = (email: string) =>
  api.post<void>('/api/auth/reset', { email }, { whenSignedOut: 'throw' });

export const postReset = (body: ResetPassword) =>
  api.post<void>('/api/auth/reset/use', body, { whenSignedOut: 'throw' });

export const postConfirmEmail = (token: string) =>
  api.post<void>('/api/auth/email/confirm', { token }, { whenSignedOut: 'throw' });
