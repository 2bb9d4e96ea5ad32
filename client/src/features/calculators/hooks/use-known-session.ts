import { useQueryClient } from '@tanstack/react-query';
import { useEffect } from 'react';
import { sessionGate } from '../../../lib/session-gate.ts';
import { meQuery } from '../../session/api/session.queries.ts';

/** Lets the frame offer the way back to one's pages; nobody is asked for where nobody has signed in. */
export function useKnownSession(): void {
  const client = useQueryClient();
  useEffect(() => {
    if (sessionGate.hinted()) void client.prefetchQuery(meQuery);
  }, [client]);
}
