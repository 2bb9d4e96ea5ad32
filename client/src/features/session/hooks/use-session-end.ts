import type { SessionEndView } from '@kerfyard/common/people';
import { useQuery, useQueryClient } from '@tanstack/react-query';
import { useEffect, useState } from 'react';
import { deviceMs, nowMs } from '../../../lib/clock.ts';
import { sessionEndQuery, sessionKeys } from '../api/session.queries.ts';

/** The warning comes this long before the end: enough to read it and press (WCAG 2.2.1 asks for 20 seconds). */
export const WARN_MS = 5 * 60_000;

/** Asked for this lately, the server's answer is believed: another tab may have used the session since an older one. */
const FRESH_MS = 30_000;

/** The end of the session once it is near, else null. */
export function useSessionEnd(): SessionEndView | null {
  const client = useQueryClient();
  const { data, dataUpdatedAt } = useQuery(sessionEndQuery);
  const [near, setNear] = useState<string | null>(null);
  useEffect(() => {
    const left = data === undefined ? 0 : Date.parse(data.endsAt) - nowMs();
    if (data === undefined || left <= 0) return undefined;
    const check = () => {
      if (deviceMs() - dataUpdatedAt < FRESH_MS) setNear(data.endsAt);
      else void client.invalidateQueries({ queryKey: sessionKeys.end });
    };
    const timer = setTimeout(check, Math.max(0, left - WARN_MS));
    return () => clearTimeout(timer);
  }, [client, data, dataUpdatedAt]);
  return data !== undefined && near === data.endsAt ? data : null;
}
