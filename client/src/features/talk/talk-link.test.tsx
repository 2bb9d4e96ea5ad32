import type { Hint } from '@kerfyard/common/realtime';
import { act, screen, waitFor } from '@testing-library/react';
import { afterEach, beforeEach, expect, it, vi } from 'vitest';
import { loadWords } from '../../lib/i18n.ts';
import { line } from '../../lib/socket.ts';
import { answerRequests, type SeenRequest } from '../../test/answers.ts';
import { renderInApp } from '../../test/render.tsx';
import { TalkLink } from './components/talk-link.tsx';
import { ThreadPanel } from './components/thread-panel.tsx';

/** Stands for the library's socket; the browser journeys use the real one. */
const handlers = new Map<string, (argument?: unknown) => void>();
vi.mock('socket.io-client', () => ({
  io: () => ({
    connected: true,
    on: (event: string, handler: (argument?: unknown) => void) => handlers.set(event, handler),
    emit: () => undefined,
    disconnect: () => undefined,
  }),
}));
const hint = (seq: number) => {
  const said: Hint = { topic: 'thread', threadId: 't1', seq };
  act(() => handlers.get('hint')?.(said));
};

const gc = { id: 'gc', name: 'Harrow & Pell Builders' };
let written = 1;
let unread = 0;

function server(): SeenRequest[] {
  return answerRequests({
    'GET /api/threads/unread': () => ({ status: 200, body: { messages: unread } }),
    'GET /api/threads/t1': () => ({
      status: 200,
      body: {
        id: 't1',
        scopeId: 's1',
        subcontractId: null,
        title: 'Stair opening',
        otherSide: gc,
        lastMessage: null,
        unread,
      },
    }),
    'GET /api/threads/t1/messages': () => ({
      status: 200,
      body: {
        items: Array.from({ length: written }, (_, index) => ({
          id: `m${written - index}`,
          seq: written - index,
          author: { id: 'milo', name: 'Milo Brandt' },
          company: gc,
          isOwn: false,
          body: `words ${written - index}`,
          files: [],
          sentAt: '2026-12-01T15:00:00.000Z',
        })),
        nextCursor: null,
      },
    }),
  });
}

beforeEach(async () => {
  await loadWords(['talk']);
  written = 1;
  unread = 0;
  vi.stubGlobal(
    'IntersectionObserver',
    class {
      observe() {
        // Nothing is on the screen in these tests.
      }
      disconnect() {
        // See above.
      }
    },
  );
  await line.connect();
});
afterEach(() => {
  line.disconnect();
  vi.unstubAllGlobals();
});

const asked = (seen: SeenRequest[], path: string) =>
  seen.filter((request) => request.url.split('?')[0] === path).length;

function show() {
  renderInApp(
    <>
      <TalkLink />
      <ThreadPanel threadId="t1" />
    </>,
  );
}

it('brings a message that a hint names, counts it and says it', async () => {
  server();
  show();
  await screen.findByText('words 1');
  expect(screen.getByRole('link', { name: 'Talk' })).toBeInTheDocument();
  written = 2;
  unread = 1;
  hint(2);
  expect(await screen.findByText('words 2')).toBeInTheDocument();
  expect(await screen.findByRole('link', { name: 'Talk 1 new message' })).toBeInTheDocument();
  expect(screen.getByTestId('polite')).toHaveTextContent(/1 new message|Milo Brandt: words 2/);
});

it('does not read the messages again for what was only read in another window', async () => {
  unread = 1;
  const seen = server();
  show();
  await screen.findByRole('link', { name: 'Talk 1 new message' });
  const before = asked(seen, '/api/threads/t1/messages');
  unread = 0;
  hint(1);
  expect(await screen.findByRole('link', { name: 'Talk' })).toBeInTheDocument();
  expect(asked(seen, '/api/threads/t1/messages')).toBe(before);
});

it('says nothing when messages are read, only when more come', async () => {
  unread = 2;
  server();
  show();
  await screen.findByRole('link', { name: 'Talk 2 new messages' });
  unread = 0;
  hint(1);
  await screen.findByRole('link', { name: 'Talk' });
  await waitFor(() => expect(screen.getByTestId('polite')).toBeEmptyDOMElement());
});
