import { lazy, Suspense } from 'react';
import { useProofAsked } from '../../../lib/confirm-gate.ts';

// The form's code is only needed before a sensitive act.
const ConfirmYouDialog = lazy(() => import('./confirm-you-dialog.tsx'));

/** Asks who one still is when a request needs a recent sign-in. */
export function ConfirmYou() {
  const proof = useProofAsked();
  if (proof === null) return null;
  return (
    <Suspense fallback={null}>
      <ConfirmYouDialog proof={proof} />
    </Suspense>
  );
}
