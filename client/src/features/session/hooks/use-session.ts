import type { MeView, PermissionName } from '@kerfyard/common/people';
import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { useNavigate } from 'react-router-dom';
import { dropAllTails } from '../../../lib/draft-tail.ts';
import { paths } from '../../../lib/paths.ts';
import { sessionGate } from '../../../lib/session-gate.ts';
import { line } from '../../../lib/socket.ts';
import { meQuery, postSignOut, remember, sessionKeys } from '../api/session.queries.ts';

/** Who is signed in, or null. On pages inside the signed-in layout use `useSession`. */
export function useMaybeSession(): MeView | null {
  return useQuery({ ...meQuery, enabled: false }).data ?? null;
}

/**
 * Who is signed in, on a page that only signed-in people reach.
 * @throws Error outside the signed-in layout
 */
export function useSession(): MeView {
  const me = useMaybeSession();
  if (me === null) throw new Error('useSession: used outside the signed-in layout');
  return me;
}

/** Whether the signed-in person's role carries a permission: what to offer. The server decides anew. */
export function useCan(): (name: PermissionName) => boolean {
  const me = useMaybeSession();
  return (name) => me?.permissions.includes(name) ?? false;
}

/** Take over a fresh sign-in: nothing of the person before stays in memory. */
export function useBecome(): (me: MeView) => void {
  const client = useQueryClient();
  return (me) => {
    client.clear();
    client.setQueryData(sessionKeys.me, me);
    remember(me);
  };
}

/** Sign out: cookies at the server, then everything kept here. */
export function useSignOut() {
  const client = useQueryClient();
  const navigate = useNavigate();
  return useMutation({
    // The line closes first: the server would tell it that the session ended, and it would try to refresh it.
    onMutate: () => line.disconnect(),
    mutationFn: postSignOut,
    onError: () => void line.connect(),
    onSuccess: async () => {
      dropAllTails();
      sessionGate.know(null);
      client.setQueryData(sessionKeys.me, null);
      await navigate(paths.home);
      client.clear();
    },
  });
}
