import { lazy, Suspense } from 'react';
import { useSessionEnd } from '../hooks/use-session-end.ts';

const SessionEndingDialog = lazy(() => import('./session-ending-dialog.tsx'));

/** Warns before a session ends for want of use, and extends it on a press. */
export function SessionEnding() {
  const end = useSessionEnd();
  if (end === null) return null;
  return (
    <Suspense fallback={null}>
      <SessionEndingDialog key={end.endsAt} end={end} />
    </Suspense>
  );
}
