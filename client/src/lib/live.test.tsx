import type { Hint } from '@kerfyard/common/realtime';
import { QueryClient, QueryClientProvider, useQuery } from '@tanstack/react-query';
import { act, render, screen } from '@testing-library/react';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { answerRequests, problem } from '../test/answers.ts';
import { refetchAfterGaps, useIsLive, useLiveHints, useWatch } from './live.ts';
import { line } from './socket.ts';

/** Stands for the library's socket; the browser journeys use the real one. */
class FakeSocket {
  handlers = new Map<string, (argument?: unknown) => void>();
  emitted: [string, unknown][] = [];
  connected = false;
  active = true;
  connectCalls = 0;
  on(event: string, handler: (argument?: unknown) => void) {
    this.handlers.set(event, handler);
  }
  emit(event: string, argument: unknown) {
    this.emitted.push([event, argument]);
  }
  connect() {
    this.connectCalls += 1;
  }
  disconnect() {
    this.connected = false;
  }
  say(event: string, argument?: unknown) {
    if (event === 'connect') this.connected = true;
    if (event === 'disconnect') this.connected = false;
    act(() => this.handlers.get(event)?.(argument));
  }
  hint(hint: Hint) {
    this.say('hint', hint);
  }
}

const sockets = vi.hoisted(() => ({ current: null as unknown }));
vi.mock('socket.io-client', () => ({
  io: () => {
    sockets.current = new FakeSocket();
    return sockets.current;
  },
}));

async function opened(): Promise<FakeSocket> {
  await line.connect();
  return sockets.current as FakeSocket;
}

beforeEach(() => vi.useFakeTimers());
afterEach(() => {
  line.disconnect();
  vi.useRealTimers();
  vi.unstubAllGlobals();
});

function Board({ load }: { load: () => Promise<number> }) {
  const { data } = useQuery({ queryKey: ['scope', 's1'], queryFn: load, meta: { live: true } });
  useWatch('scope', 's1');
  useLiveHints({ bids: ({ scopeId }) => [['scope', scopeId]] });
  const isLive = useIsLive();
  return (
    <button type="button" disabled={!isLive}>
      award {data}
    </button>
  );
}

function show() {
  const client = new QueryClient();
  let loads = 0;
  const stop = refetchAfterGaps(client);
  const view = render(
    <QueryClientProvider client={client}>
      <Board load={() => Promise.resolve((loads += 1))} />
    </QueryClientProvider>,
  );
  return { client, loads: () => loads, stop, view };
}

const settle = (ms: number) => act(() => vi.advanceTimersByTimeAsync(ms));

describe('the live line', () => {
  it('fetches once for many hints of one thing', async () => {
    const socket = await opened();
    const board = show();
    socket.say('connect');
    await settle(10);
    const before = board.loads();
    for (let seq = 1; seq <= 50; seq += 1) socket.hint({ topic: 'bids', scopeId: 's1', seq });
    socket.hint({ topic: 'bids', scopeId: 'other', seq: 1 });
    await settle(1000);
    expect(board.loads()).toBe(before + 1);
    board.stop();
  });

  it('loses no hint to a page that is left within the wait', async () => {
    const socket = await opened();
    const board = show();
    socket.say('connect');
    await settle(10);
    socket.hint({ topic: 'bids', scopeId: 's1', seq: 1 });
    expect(board.client.getQueryState(['scope', 's1'])?.isInvalidated).toBe(false);
    board.view.unmount();
    expect(board.client.getQueryState(['scope', 's1'])?.isInvalidated).toBe(true);
    board.stop();
  });

  it('makes what no page shows stale with any hint, and leaves what is not live alone', async () => {
    const socket = await opened();
    const board = show();
    await board.client.prefetchQuery({ queryKey: ['place'], queryFn: () => Promise.resolve(1) });
    socket.say('connect');
    await settle(10);
    board.view.unmount();
    socket.hint({ topic: 'visits' });
    expect(board.client.getQueryState(['scope', 's1'])?.isInvalidated).toBe(true);
    expect(board.client.getQueryState(['place'])?.isInvalidated).toBe(false);
    board.stop();
  });

  it('disables what moves money or awards until the line is live, and again when it drops', async () => {
    const socket = await opened();
    const board = show();
    expect(screen.getByRole('button')).toBeDisabled();
    socket.say('connect');
    expect(screen.getByRole('button')).toBeEnabled();
    socket.say('disconnect');
    expect(screen.getByRole('button')).toBeDisabled();
    expect(line.state()).toBe('reconnecting');
    board.stop();
  });

  it('fetches everything live once when it opens: hints from before then were missed', async () => {
    const socket = await opened();
    const board = show();
    await settle(10);
    expect(board.loads()).toBe(1);
    socket.say('connect');
    await settle(10);
    expect(board.loads()).toBe(2);
    board.stop();
  });

  it('watches again and fetches everything live once after the line came back', async () => {
    const socket = await opened();
    const board = show();
    socket.say('connect');
    await settle(10);
    const before = board.loads();
    socket.say('disconnect');
    socket.emitted = [];
    socket.say('connect');
    await settle(3000);
    expect(socket.emitted).toEqual([['watch', { topic: 'scope', id: 's1' }]]);
    expect(board.loads()).toBe(before + 1);
    board.stop();
  });

  it('fetches everything live once when a sequence has a gap, and not when it has none', async () => {
    const socket = await opened();
    const board = show();
    socket.say('connect');
    await settle(10);
    const before = board.loads();
    socket.hint({ topic: 'scope', scopeId: 's1', seq: 4 });
    socket.hint({ topic: 'scope', scopeId: 's1', seq: 5 });
    await settle(3000);
    expect(board.loads()).toBe(before);
    socket.hint({ topic: 'scope', scopeId: 's1', seq: 8 });
    await settle(3000);
    expect(board.loads()).toBe(before + 1);
    board.stop();
  });

  it('lets go of what is no longer shown', async () => {
    const socket = await opened();
    const board = show();
    socket.say('connect');
    board.view.unmount();
    expect(socket.emitted.at(-1)).toEqual(['unwatch', { topic: 'scope', id: 's1' }]);
    board.stop();
  });

  it('refreshes the session after a refused handshake and connects again; without a session it stays off', async () => {
    const seen = answerRequests({
      'POST /api/auth/refresh': [() => ({ status: 204 }), () => problem(401, 'unauthenticated')],
    });
    const socket = await opened();
    socket.active = false;
    socket.say('connect_error');
    await settle(3000);
    expect(seen).toHaveLength(1);
    expect(socket.connectCalls).toBe(1);
    localStorage.clear();
    // Ended elsewhere: the server closes the line, and the session cannot be refreshed.
    socket.say('disconnect', 'io server disconnect');
    await settle(3000);
    expect(socket.connectCalls).toBe(1);
    expect(line.state()).toBe('off');
  });
});
