import type { MeView } from '@kerfyard/common/people';
import { QueryClient } from '@tanstack/react-query';
import { screen, waitFor } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { useState } from 'react';
import { afterEach, beforeEach, expect, it, vi } from 'vitest';
import { api } from '../../../lib/api-client.ts';
import { sessionGate } from '../../../lib/session-gate.ts';
import { answerRequests, problem } from '../../../test/answers.ts';
import { renderInApp } from '../../../test/render.tsx';
import { meQuery } from '../api/session.queries.ts';
import { SignInAgain } from './sign-in-again.tsx';

// The line reopens after the sign-in; here nothing listens at the other end.
vi.mock('socket.io-client', () => ({ io: () => ({ on: () => undefined, disconnect: () => undefined }) }));

const me = (id: string): MeView => ({
  user: { id, name: 'Milo', email: 'milo@north.example', isStaff: false },
  company: null,
  role: null,
  permissions: [],
  limits: { signCents: null, setAsideCents: null, changeCents: null },
  unread: { messages: 0 },
});

function Page() {
  const [text, setText] = useState('');
  const [state, setState] = useState('typing');
  const save = async () => {
    await api.put('/api/note', { text }).then(
      () => setState('saved'),
      () => setState('given up'),
    );
  };
  return (
    <>
      <input aria-label="Note" value={text} onChange={(event) => setText(event.target.value)} />
      <button type="button" onClick={() => void save()}>
        Save
      </button>
      <p>{state}</p>
      <SignInAgain />
    </>
  );
}

beforeEach(() => {
  localStorage.clear();
  sessionGate.know({ userId: 'milo', email: 'milo@north.example' });
});
afterEach(() => {
  sessionGate.know(null);
  vi.unstubAllGlobals();
});

async function typeAndSave() {
  await userEvent.type(screen.getByLabelText('Note'), 'typed before');
  await userEvent.click(screen.getByRole('button', { name: 'Save' }));
  await screen.findByRole('dialog', { name: 'Please sign in again' });
}

it('asks over the page, keeps what was typed, and goes on with the same request', async () => {
  const seen = answerRequests({
    'PUT /api/note': [() => problem(401, 'unauthenticated'), () => ({ status: 204 })],
    'POST /api/auth/refresh': () => problem(401, 'unauthenticated'),
    'POST /api/auth/sign-in': () => ({ status: 200, body: me('milo') }),
  });
  renderInApp(<Page />);
  await typeAndSave();
  await waitFor(() => expect(screen.getByLabelText('Password')).toHaveFocus());
  expect(screen.getByLabelText('E-mail')).toHaveValue('milo@north.example');
  await userEvent.type(screen.getByLabelText('Password'), 'a slow wet saw at dawn{Enter}');
  await screen.findByText('saved');
  expect(screen.queryByRole('dialog')).toBeNull();
  expect(screen.getByLabelText('Note')).toHaveValue('typed before');
  expect(seen.at(-1)?.body).toEqual({ text: 'typed before' });
});

it('asks too when it was the page itself that asked who is signed in', async () => {
  answerRequests({
    'GET /api/auth/me': [() => problem(401, 'unauthenticated'), () => ({ status: 200, body: me('milo') })],
    'POST /api/auth/refresh': () => problem(401, 'unauthenticated'),
    'POST /api/auth/sign-in': () => ({ status: 200, body: me('milo') }),
  });
  renderInApp(<Page />);
  const answer = new QueryClient().fetchQuery(meQuery);
  await screen.findByRole('dialog', { name: 'Please sign in again' });
  await userEvent.type(screen.getByLabelText('Password'), 'a slow wet saw at dawn{Enter}');
  expect(await answer).toEqual(me('milo'));
});

it('says a wrong password in the dialog and stays', async () => {
  answerRequests({
    'PUT /api/note': () => problem(401, 'unauthenticated'),
    'POST /api/auth/refresh': () => problem(401, 'unauthenticated'),
    'POST /api/auth/sign-in': () => problem(401, 'wrong_credentials'),
  });
  renderInApp(<Page />);
  await typeAndSave();
  await userEvent.type(screen.getByLabelText('Password'), 'wrong{Enter}');
  expect(await screen.findByText(/do not match an account/)).toBeInTheDocument();
  await userEvent.click(screen.getByRole('button', { name: 'Not now' }));
  await screen.findByText('given up');
  expect(screen.getByLabelText('Note')).toHaveValue('typed before');
});

it("does not send one person's work under another's name", async () => {
  const seen = answerRequests({
    'PUT /api/note': () => problem(401, 'unauthenticated'),
    'POST /api/auth/refresh': () => problem(401, 'unauthenticated'),
    'POST /api/auth/sign-in': () => ({ status: 200, body: me('dana') }),
  });
  const { router } = renderInApp(<Page />, { path: '/company' });
  await typeAndSave();
  await userEvent.type(screen.getByLabelText('Password'), 'another one{Enter}');
  await screen.findByText('given up');
  expect(seen.filter((request) => request.url === '/api/note')).toHaveLength(1);
  await waitFor(() => expect(router.state.location.pathname).toBe('/'));
});
