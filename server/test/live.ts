import { once } from 'node:events';
import { io, type Socket } from 'socket.io-client';
import type { ClientToServerEvents, Hint, ServerToClientEvents, Watch } from '@kerfyard/common/realtime';
import type { Client } from './client.ts';

export type LiveClient = Socket<ServerToClientEvents, ClientToServerEvents>;

export interface Line {
  socket: LiveClient;
  hints: Hint[];
  watch: (watch: Watch) => Promise<boolean>;
  /** The first hint that fits, also one that came before. */
  hint: (fits: (hint: Hint) => boolean, timeoutMs?: number) => Promise<Hint>;
  close: () => void;
}

/** Opens a socket as this browser's page does. Rejects with the server's reason. */
export async function openLine(client: Client, headers: Record<string, string> = {}): Promise<Line> {
  const socket: LiveClient = io(client.url, {
    transports: ['websocket'],
    reconnection: false,
    forceNew: true,
    extraHeaders: { Origin: client.url, Cookie: client.cookieHeader, ...headers },
  });
  const hints: Hint[] = [];
  socket.on('hint', (hint) => hints.push(hint));
  await new Promise<void>((resolve, reject) => {
    socket.once('connect', resolve);
    socket.once('connect_error', (error) => {
      socket.close();
      reject(error);
    });
  });
  return {
    socket,
    hints,
    watch: async (watch) => (await socket.timeout(5_000).emitWithAck('watch', watch)).ok,
    hint: (fits, timeoutMs = 5_000) => waitForHint(socket, hints, fits, timeoutMs),
    close: () => socket.close(),
  };
}

async function waitForHint(
  socket: LiveClient,
  hints: Hint[],
  fits: (hint: Hint) => boolean,
  timeoutMs: number,
): Promise<Hint> {
  const stop = AbortSignal.timeout(timeoutMs);
  for (;;) {
    const found = hints.find(fits);
    if (found !== undefined) return found;
    await once(socket as unknown as EventTarget & NodeJS.EventEmitter, 'hint', { signal: stop });
  }
}
