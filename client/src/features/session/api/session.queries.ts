import type { Confirm, MeView, SessionEndView, SignIn, SignUp } from '@kerfyard/common/people';
import { queryOptions } from '@tanstack/react-query';
import { api } from '../../../lib/api-client.ts';
import { isApiError } from '../../../lib/api-error.ts';
import { sessionGate } from '../../../lib/session-gate.ts';

export const sessionKeys = { me: ['session', 'me'] as const, end: ['session', 'end'] as const };

/**
 * Who is signed in; null when nobody is. Whoever was signed in on this page is asked to sign in again: with a null the
 * page would go, and what is typed on it too.
 */
export const meQuery = queryOptions({
  queryKey: sessionKeys.me,
  staleTime: Infinity,
  meta: { live: true },
  queryFn: async ({ signal }): Promise<MeView | null> => {
    const wasSignedIn = sessionGate.known() !== null;
    try {
      const me = await api.get<MeView>('/api/auth/me', {
        signal,
        whenSignedOut: wasSignedIn ? 'ask' : 'throw',
      });
      remember(me);
      return me;
    } catch (error) {
      if (wasSignedIn || !isApiError(error, 'unauthenticated')) throw error;
      sessionGate.know(null);
      return null;
    }
  },
});

export function remember(me: MeView): void {
  sessionGate.know({ userId: me.user.id, email: me.user.email });
}

export const postSignUp = (body: SignUp, idempotencyKey: string) =>
  api.post<void>('/api/auth/sign-up', body, { idempotencyKey, whenSignedOut: 'throw' });

export const postVerify = (token: string) =>
  api.post<void>('/api/auth/verify', { token }, { whenSignedOut: 'throw' });

export const postSignIn = (body: SignIn) =>
  api.post<MeView>('/api/auth/sign-in', body, { whenSignedOut: 'throw' });

export const postSignOut = () => api.post<void>('/api/auth/sign-out', undefined, { whenSignedOut: 'throw' });

/** Says again who one is; what waited goes on afterwards. */
export const postConfirm = (body: Confirm) => api.post<void>('/api/account/confirm', body);

/** Until when the session lasts unless it is used. */
export const sessionEndQuery = queryOptions({
  queryKey: sessionKeys.end,
  staleTime: Infinity,
  queryFn: ({ signal }) => api.get<SessionEndView>('/api/account/session', { signal }),
});
