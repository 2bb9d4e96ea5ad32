import type { Hint, Watch } from '@kerfyard/common/realtime';
import { useQueryClient, type QueryClient, type QueryKey } from '@tanstack/react-query';
import { useEffect, useRef, useSyncExternalStore } from 'react';
import { line, type LineState } from './socket.ts';

/** Hints arriving within this time cost one round of fetching. */
const COALESCE_MS = 250;
/** After a dropped line all clients come back together: each waits up to this long. */
const JITTER_MS = 2000;

/** The state of the live line, for showing it. */
export function useLine(): LineState {
  return useSyncExternalStore(line.onState, line.state);
}

/**
 * Whether what the page shows is being kept up to date. Buttons that move money or award are disabled while it is not:
 * nobody signs for a state that has passed.
 */
export function useIsLive(): boolean {
  return useLine() === 'live';
}

/** Hold the hints of one scope, subcontract or thread for as long as the component is mounted. */
export function useWatch(topic: Watch['topic'], id: string | undefined): void {
  useEffect(() => {
    if (id === undefined) return undefined;
    return line.watch({ topic, id });
  }, [topic, id]);
}

/** For each topic, the keys of the queries a hint makes stale. */
export type HintKeys = {
  [Topic in Hint['topic']]?: (hint: Extract<Hint, { topic: Topic }>) => readonly QueryKey[];
};

/**
 * Turn hints into refetches. Call it in the component that shows the data; mark the queries
 * `meta: { live: true }` so that they are fetched again after the line was down.
 */
export function useLiveHints(keys: HintKeys): void {
  const client = useQueryClient();
  const latest = useRef(keys);
  useEffect(() => {
    latest.current = keys;
  });
  useEffect(() => {
    const stale = new Map<string, QueryKey>();
    let timer: ReturnType<typeof setTimeout> | undefined;
    const flush = () => {
      timer = undefined;
      const batch = [...stale.values()];
      stale.clear();
      for (const queryKey of batch) void client.invalidateQueries({ queryKey });
    };
    const stop = line.onEvent((event) => {
      if (event.kind !== 'hint') return;
      for (const key of keysOf(latest.current, event.hint)) stale.set(JSON.stringify(key), key);
      if (stale.size > 0) timer ??= setTimeout(flush, COALESCE_MS);
    });
    return () => {
      stop();
      clearTimeout(timer);
      // Leaving the page within the wait must not lose what was heard: the next page may show the same query.
      flush();
    };
  }, [client]);
}

function keysOf<Topic extends Hint['topic']>(
  keys: HintKeys,
  hint: Extract<Hint, { topic: Topic }>,
): readonly QueryKey[] {
  const find = keys[hint.topic] as ((hint: Hint) => readonly QueryKey[]) | undefined;
  return find?.(hint) ?? [];
}

/**
 * When the line opens, and after a reconnect or a gap: every live query on the screen once, the latter two spread over
 * two seconds. With any hint: live queries that no page shows now are stale, since only a shown page knows which hint is
 * about it. Returns the stop.
 */
export function refetchAfterGaps(client: QueryClient): () => void {
  let timer: ReturnType<typeof setTimeout> | undefined;
  const stop = line.onEvent((event) => {
    if (event.kind === 'hint') {
      void client.invalidateQueries({
        predicate: (query) => query.meta?.live === true && !query.isActive(),
        refetchType: 'none',
      });
    }
    if (event.kind !== 'refresh') return;
    timer ??= setTimeout(
      () => {
        timer = undefined;
        void client.invalidateQueries({ predicate: (query) => query.meta?.live === true });
      },
      event.atOnce ? 0 : Math.random() * JITTER_MS,
    );
  });
  return () => {
    stop();
    clearTimeout(timer);
  };
}
