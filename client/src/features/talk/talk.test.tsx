import type { Page } from '@kerfyard/common/api';
import type { MessageView, PostMessage, ThreadView } from '@kerfyard/common/talk';
import { act, cleanup, screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { afterEach, beforeEach, expect, it, vi } from 'vitest';
import { loadWords } from '../../lib/i18n.ts';
import { answerRequests, problem, type Answer, type SeenRequest } from '../../test/answers.ts';
import { renderInApp } from '../../test/render.tsx';
import { ScopeTalk } from './components/scope-talk.tsx';
import { ScopeThreads } from './components/scope-threads.tsx';
import { ThreadPanel } from './components/thread-panel.tsx';

const gc = { id: 'gc', name: 'Harrow & Pell Builders' };
const crew = { id: 'crew', name: 'Sablon Cutting' };

const message = (seq: number, change: Partial<MessageView> = {}): MessageView => ({
  id: `m${seq}`,
  seq,
  author: { id: 'milo', name: 'Milo Brandt' },
  company: gc,
  isOwn: false,
  body: `words ${seq}`,
  files: [],
  sentAt: '2026-12-01T15:00:00.000Z',
  ...change,
});
const own = (seq: number, body: string) =>
  message(seq, { body, isOwn: true, company: crew, author: { id: 'me', name: 'Ines Vale' } });
const thread = (change: Partial<ThreadView> = {}): ThreadView => ({
  id: 't1',
  scopeId: 's1',
  subcontractId: null,
  title: 'Stair opening, level 2',
  otherSide: gc,
  lastMessage: null,
  unread: 0,
  ...change,
});
const page = <Item,>(
  items: Item[],
  nextCursor: string | null = null,
): { status: number; body: Page<Item> } => ({
  status: 200,
  body: { items, nextCursor },
});

/** The test document scrolls nothing: the test says what is on the screen. */
let look: ((isIntersecting: boolean) => void) | null = null;
beforeEach(async () => {
  await loadWords(['talk']);
  sessionStorage.clear();
  vi.stubGlobal(
    'IntersectionObserver',
    class {
      constructor(report: (entries: { isIntersecting: boolean }[]) => void) {
        look = (isIntersecting) => act(() => report([{ isIntersecting }]));
      }
      observe() {
        // Nothing is on the screen until the test says so.
      }
      disconnect() {
        look = null;
      }
    },
  );
});
afterEach(() => vi.unstubAllGlobals());

function showThread(routes: Record<string, Answer | Answer[]>, view: ThreadView = thread()): SeenRequest[] {
  const seen = answerRequests({
    'GET /api/threads/t1': () => ({ status: 200, body: view }),
    'GET /api/threads/t1/messages': () => page([message(2), message(1)]),
    ...routes,
  });
  renderInApp(<ThreadPanel threadId="t1" />);
  return seen;
}

const posts = (seen: SeenRequest[], path: string) =>
  seen.filter((request) => request.method === 'POST' && request.url === path);
const entries = async () =>
  within(await screen.findByRole('list', { name: /Messages/ })).getAllByRole('listitem');

it('shows the last message first and reads older ones by their number when asked', async () => {
  const seen = showThread({
    'GET /api/threads/t1/messages': [() => page([message(30), message(29)], '29'), () => page([message(28)])],
  });
  expect((await entries())[0]).toHaveTextContent('words 30');
  await userEvent.click(screen.getByRole('button', { name: 'Earlier messages' }));
  await screen.findByText('words 28');
  expect(seen.at(-1)?.url).toContain('before=29');
  expect((await entries()).map((entry) => entry.textContent)).toHaveLength(3);
  expect(screen.queryByRole('button', { name: 'Earlier messages' })).not.toBeInTheDocument();
});

it('sends words, puts the answer on top and is empty again', async () => {
  const seen = showThread({
    'POST /api/threads/t1/messages': ({ body }) => ({
      status: 201,
      body: own(3, (body as PostMessage).body),
    }),
  });
  const field = await screen.findByLabelText('Write to Harrow & Pell Builders');
  await userEvent.type(field, 'Gate 2 at 6:30{Control>}{Enter}{/Control}');
  await waitFor(() => expect(field).toHaveValue(''));
  expect((await entries())[0]).toHaveTextContent('Gate 2 at 6:30');
  const [sent] = posts(seen, '/api/threads/t1/messages');
  expect(sent?.headers.get('Idempotency-Key')).toBe((sent?.body as PostMessage).id);
  expect(sessionStorage.length).toBe(0);
});

it('refuses an empty message without asking the server', async () => {
  const seen = showThread({});
  await userEvent.click(await screen.findByRole('button', { name: 'Send' }));
  expect(await screen.findAllByText(/Write something or add a photo/)).not.toHaveLength(0);
  expect(posts(seen, '/api/threads/t1/messages')).toHaveLength(0);
});

it('keeps the words when no answer comes, and sends them again as the same message, also after a reload', async () => {
  let isDown = true;
  const seen = showThread({
    'POST /api/threads/t1/messages': () => {
      if (isDown) throw new TypeError('Failed to fetch');
      return { status: 201, body: own(3, 'Key is with the guard') };
    },
  });
  await userEvent.type(await screen.findByLabelText(/Write to/), 'Key is with the guard');
  await userEvent.click(screen.getByRole('button', { name: 'Send' }));
  expect(await screen.findByText('No answer came.')).toBeInTheDocument();

  cleanup();
  renderInApp(<ThreadPanel threadId="t1" />);
  isDown = false;
  expect(await screen.findByLabelText(/Write to/)).toHaveValue('Key is with the guard');
  await userEvent.click(screen.getByRole('button', { name: 'Send' }));
  await waitFor(() => expect(screen.getByLabelText(/Write to/)).toHaveValue(''));
  const ids = posts(seen, '/api/threads/t1/messages').map((request) => (request.body as PostMessage).id);
  expect(ids).toHaveLength(2);
  expect(new Set(ids).size).toBe(1);
});

it('says that an earlier try arrived when its words were changed since, and sends the new ones as another', async () => {
  const seen = showThread({
    'POST /api/threads/t1/messages': [
      () => problem(409, 'key_reused'),
      () => ({ status: 201, body: own(3, 'Gate 5') }),
    ],
  });
  await userEvent.type(await screen.findByLabelText(/Write to/), 'Gate 5');
  await userEvent.click(screen.getByRole('button', { name: 'Send' }));
  expect(await screen.findByText(/did arrive/)).toBeInTheDocument();
  expect(screen.getByLabelText(/Write to/)).toHaveValue('Gate 5');
  await userEvent.click(screen.getByRole('button', { name: 'Send' }));
  await waitFor(() => expect(screen.getByLabelText(/Write to/)).toHaveValue(''));
  const ids = posts(seen, '/api/threads/t1/messages').map((request) => (request.body as PostMessage).id);
  expect(new Set(ids).size).toBe(2);
});

it('marks as new what was not seen, and as read only once it is on the screen', async () => {
  const seen = showThread(
    { 'POST /api/threads/t1/read': () => ({ status: 200, body: { messages: 0 } }) },
    thread({ unread: 1 }),
  );
  const [newest, older] = await entries();
  expect(within(newest!).getByText('New')).toBeInTheDocument();
  expect(within(older!).queryByText('New')).not.toBeInTheDocument();
  expect(posts(seen, '/api/threads/t1/read')).toHaveLength(0);
  look?.(true);
  await waitFor(() => expect(posts(seen, '/api/threads/t1/read')).toHaveLength(1));
  expect(posts(seen, '/api/threads/t1/read')[0]?.body).toEqual({ seq: 2 });
});

it('warns that prices belong in the bid, until there is a subcontract', async () => {
  showThread({});
  expect(await screen.findByText(/prices belong in the bid/)).toBeInTheDocument();
});

it('leaves the warning out once there is a subcontract', async () => {
  showThread({}, thread({ subcontractId: 'w1' }));
  await entries();
  expect(screen.queryByText(/prices belong in the bid/)).not.toBeInTheDocument();
});

it('says so when a thread is not to be seen', async () => {
  answerRequests({
    'GET /api/threads/t1': () => problem(404, 'not_found'),
    'GET /api/threads/t1/messages': () => problem(404, 'not_found'),
  });
  renderInApp(<ThreadPanel threadId="t1" />);
  expect(await screen.findByRole('alert')).toHaveTextContent('Not found, or not yours to see.');
});

it('opens a crew’s thread with its first message', async () => {
  let opened = false;
  const seen = answerRequests({
    'GET /api/threads': () => page(opened ? [thread()] : []),
    'POST /api/scopes/s1/threads': () => {
      opened = true;
      return { status: 200, body: thread() };
    },
    'POST /api/threads/t1/messages': () => ({ status: 201, body: own(1, 'Is there a lift?') }),
    'GET /api/threads/t1': () => ({ status: 200, body: thread() }),
    'GET /api/threads/t1/messages': () => page([own(1, 'Is there a lift?')]),
  });
  renderInApp(<ScopeTalk scopeId="s1" gc={gc} />);
  await userEvent.type(await screen.findByLabelText(/Write to/), 'Is there a lift?');
  expect(posts(seen, '/api/scopes/s1/threads')).toHaveLength(0);
  await userEvent.click(screen.getByRole('button', { name: 'Send' }));
  expect((await entries())[0]).toHaveTextContent('Is there a lift?');
  expect(screen.getByLabelText(/Write to/)).toHaveValue('');
});

it('lists a scope’s bidders with what waits, and opens one in place by keyboard', async () => {
  const theirs = thread({
    otherSide: crew,
    unread: 2,
    lastMessage: { body: 'Is there a lift?', sentAt: '2026-12-01T15:00:00.000Z', authorName: 'Ines Vale' },
  });
  answerRequests({
    'GET /api/threads': () => page([theirs]),
    'GET /api/threads/t1': () => ({ status: 200, body: theirs }),
    'GET /api/threads/t1/messages': () => page([message(1, { company: crew, body: 'Is there a lift?' })]),
  });
  renderInApp(<ScopeThreads scopeId="s1" />);
  const row = await screen.findByRole('button', { name: /Sablon Cutting.*2 new messages.*Is there a lift/ });
  row.focus();
  await userEvent.keyboard('{Enter}');
  expect(row).toHaveAttribute('aria-expanded', 'true');
  expect(await screen.findByLabelText('Write to Sablon Cutting')).toBeInTheDocument();
});

it('says what will stand beside a scope nobody has written about', async () => {
  answerRequests({ 'GET /api/threads': () => page([]) });
  renderInApp(<ScopeThreads scopeId="s1" />);
  expect(await screen.findByText(/No crew has written yet/)).toBeInTheDocument();
});
