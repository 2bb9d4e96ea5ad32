import { lazy, Suspense } from 'react';
import { useSessionAsked } from '../../../lib/session-gate.ts';

// The form's code is only needed when a session ran out.
const SignInAgainDialog = lazy(() => import('./sign-in-again-dialog.tsx'));

/** Asks to sign in again over the page when a request met an ended session. */
export function SignInAgain() {
  const asked = useSessionAsked();
  if (!asked) return null;
  return (
    <Suspense fallback={null}>
      <SignInAgainDialog />
    </Suspense>
  );
}
