import { screen, waitFor } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { useState } from 'react';
import { afterEach, beforeAll, expect, it, vi } from 'vitest';
import { api } from '../../../lib/api-client.ts';
import { confirmGate } from '../../../lib/confirm-gate.ts';
import { answerRequests, problem } from '../../../test/answers.ts';
import { renderInApp } from '../../../test/render.tsx';
import { ConfirmYou } from './confirm-you.tsx';

function Page() {
  const [text, setText] = useState('');
  const [state, setState] = useState('typing');
  const send = () =>
    api.post('/api/sensitive', { text }, { idempotencyKey: 'one-press' }).then(
      () => setState('done'),
      () => setState('given up'),
    );
  return (
    <>
      <input aria-label="Note" value={text} onChange={(event) => setText(event.target.value)} />
      <button type="button" onClick={() => void send()}>
        Send
      </button>
      <p>{state}</p>
      <ConfirmYou />
    </>
  );
}

// Loaded on demand: not to be waited for in here.
beforeAll(() => import('./confirm-you-dialog.tsx'));
afterEach(() => {
  confirmGate.answer(false);
  vi.unstubAllGlobals();
});

async function typeAndSend() {
  await userEvent.type(screen.getByLabelText('Note'), 'typed before');
  await userEvent.click(screen.getByRole('button', { name: 'Send' }));
  await screen.findByRole('dialog', { name: 'Is it still you?' });
}

it('D-17 asks for the password in place and goes on with the very same request', async () => {
  const seen = answerRequests({
    'POST /api/sensitive': [() => problem(403, 'confirm_with_password'), () => ({ status: 204 })],
    'POST /api/account/confirm': [
      () => problem(422, 'invalid_input', [{ path: 'password', message: 'That is not your password' }]),
      () => ({ status: 204 }),
    ],
  });
  renderInApp(<Page />);
  await typeAndSend();
  const password = await screen.findByLabelText('Password');
  await waitFor(() => expect(password).toHaveFocus());
  await userEvent.type(password, 'wrong{Enter}');
  await waitFor(() => expect(password).toHaveAccessibleDescription(/not your password/));
  await userEvent.clear(password);
  await userEvent.type(password, 'a slow wet saw at dawn{Enter}');
  await screen.findByText('done');
  expect(screen.queryByRole('dialog')).toBeNull();
  expect(screen.getByLabelText('Note')).toHaveValue('typed before');
  const sent = seen.filter((request) => request.url === '/api/sensitive');
  expect(sent.map(({ body, headers }) => [body, headers.get('Idempotency-Key')])).toEqual([
    [{ text: 'typed before' }, 'one-press'],
    [{ text: 'typed before' }, 'one-press'],
  ]);
});

it('D-18, E-11 asks for a code where there is a second factor; it may be pasted, or a recovery code given', async () => {
  const seen = answerRequests({
    'POST /api/sensitive': [() => problem(403, 'confirm_with_code'), () => ({ status: 204 })],
    'POST /api/account/confirm': () => ({ status: 204 }),
  });
  renderInApp(<Page />);
  await typeAndSend();
  const code = await screen.findByLabelText('Code from your authenticator app');
  expect(code).toHaveAttribute('autocomplete', 'one-time-code');
  expect(code).toHaveAttribute('inputmode', 'numeric');
  await userEvent.click(screen.getByRole('button', { name: /Use a recovery code/ }));
  expect(screen.getByLabelText('Recovery code')).toHaveAttribute('inputmode', 'text');
  await userEvent.click(screen.getByRole('button', { name: /authenticator app instead/ }));
  await userEvent.click(screen.getByLabelText('Code from your authenticator app'));
  await userEvent.paste('123 456');
  await userEvent.click(screen.getByRole('button', { name: 'Go on' }));
  await screen.findByText('done');
  expect(seen.find((request) => request.url === '/api/account/confirm')?.body).toEqual({ code: '123 456' });
});

it('gives up when turned down, and nothing typed is lost', async () => {
  answerRequests({ 'POST /api/sensitive': () => problem(403, 'confirm_with_password') });
  renderInApp(<Page />);
  await typeAndSend();
  await userEvent.click(await screen.findByRole('button', { name: 'Not now' }));
  await screen.findByText('given up');
  expect(screen.getByLabelText('Note')).toHaveValue('typed before');
});
