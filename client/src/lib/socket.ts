import type { ClientToServerEvents, Hint, ServerToClientEvents, Watch } from '@kerfyard/common/realtime';
import { refreshSession } from './api-client.ts';
import type { Socket } from 'socket.io-client';

/**
 * The live line: one socket for the page, its code loaded after the first content. It carries hints only; what they
 * name is fetched again. Everything here survives a page without a line: nothing waits for the socket.
 */
export type LineState = 'off' | 'connecting' | 'live' | 'reconnecting';
/**
 * `refresh`: hints may have been missed, so everything live is to be fetched again once. `atOnce` when this page alone
 * asks; after a dropped line all clients come back together.
 */
export type LineEvent = { kind: 'hint'; hint: Hint } | { kind: 'refresh'; atOnce: boolean };

type LiveSocket = Socket<ServerToClientEvents, ClientToServerEvents>;

let socket: LiveSocket | null = null;
let wanted = false;
let state: LineState = 'off';
const stateListeners = new Set<() => void>();
const eventListeners = new Set<(event: LineEvent) => void>();
const watches = new Map<string, { watch: Watch; holders: number }>();
const lastSeq = new Map<string, number>();

function setState(next: LineState): void {
  if (state === next) return;
  state = next;
  for (const listener of stateListeners) listener();
}

function emit(event: LineEvent): void {
  for (const listener of eventListeners) listener(event);
}

export const line = {
  state: () => state,
  onState(listener: () => void): () => void {
    stateListeners.add(listener);
    return () => stateListeners.delete(listener);
  },
  onEvent(listener: (event: LineEvent) => void): () => void {
    eventListeners.add(listener);
    return () => eventListeners.delete(listener);
  },
  connect,
  disconnect,
  watch,
};

/** Open the line (once; later calls do nothing until `disconnect`). */
async function connect(): Promise<void> {
  if (wanted) return;
  wanted = true;
  setState('connecting');
  const { io } = await import('socket.io-client');
  if (!wanted) return;
  const opened: LiveSocket = io({ withCredentials: true, transports: ['websocket', 'polling'] });
  socket = opened;
  let wasLive = false;
  opened.on('connect', () => {
    for (const { watch: item } of watches.values()) opened.emit('watch', item, () => undefined);
    setState('live');
    // What was said while the line was down is lost, and so is what was said between a page's first requests and its
    // line: someone back from the payment page would wait for a hint that came in between.
    emit({ kind: 'refresh', atOnce: !wasLive });
    wasLive = true;
    lastSeq.clear();
  });
  opened.on('disconnect', (reason) => {
    setState(wanted ? 'reconnecting' : 'off');
    // The server closed it: its session's access ran out, or the server is going down. The library leaves it at that.
    if (reason === 'io server disconnect') void reopen(opened);
  });
  opened.on('connect_error', () => {
    setState('reconnecting');
    // `active` means the library tries again by itself; after a refused handshake it does not.
    if (!opened.active) void reopen(opened);
  });
  opened.on('hint', (hint) => {
    if (hasGap(hint)) emit({ kind: 'refresh', atOnce: false });
    emit({ kind: 'hint', hint });
  });
}

/** After a refusal: refresh the session, wait a little, try again. The wait keeps a refusing server from a storm. */
async function reopen(refused: LiveSocket): Promise<void> {
  const renewed = await refreshSession().catch(() => true);
  if (!wanted || socket !== refused || refused.active) return;
  if (!renewed) {
    // The next request asks the person to sign in; `disconnect` and `connect` follow from that.
    wanted = false;
    setState('off');
    refused.disconnect();
    socket = null;
    return;
  }
  setTimeout(() => {
    if (wanted && socket === refused) refused.connect();
  }, 2000);
}

function disconnect(): void {
  wanted = false;
  socket?.disconnect();
  socket = null;
  lastSeq.clear();
  setState('off');
}

/** Ask for the hints of one thing; the returned function lets go of it. Counted, so two parts of a page may share. */
function watch(item: Watch): () => void {
  const key = `${item.topic}:${item.id}`;
  const held = watches.get(key);
  if (held !== undefined) {
    held.holders += 1;
  } else {
    watches.set(key, { watch: item, holders: 1 });
    if (socket?.connected === true) socket.emit('watch', item, () => undefined);
  }
  return () => {
    const current = watches.get(key);
    if (current === undefined) return;
    current.holders -= 1;
    if (current.holders > 0) return;
    watches.delete(key);
    if (socket?.connected === true) socket.emit('unwatch', item);
  };
}

/** Sequences count per topic and thing; a jump means a hint was lost. */
function hasGap(hint: Hint): boolean {
  if (!('seq' in hint)) return false;
  const id = 'scopeId' in hint ? hint.scopeId : 'subcontractId' in hint ? hint.subcontractId : hint.threadId;
  const key = `${hint.topic}:${id}`;
  const before = lastSeq.get(key);
  lastSeq.set(key, Math.max(before ?? 0, hint.seq));
  return before !== undefined && hint.seq > before + 1;
}
