import type { MeView } from '@kerfyard/common/people';
import { screen, waitFor } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { afterEach, expect, it, vi } from 'vitest';
import { answerRequests, problem } from '../../../test/answers.ts';
import { renderInApp } from '../../../test/render.tsx';
import { SignInForm } from './sign-in-form.tsx';

afterEach(() => vi.unstubAllGlobals());

const me = { user: { id: 'milo' } } as MeView;

it('D-18 asks for the code after the password, without losing either, and says when it does not fit', async () => {
  const seen = answerRequests({
    'POST /api/auth/sign-in': [
      () => problem(401, 'second_factor_needed'),
      () => problem(401, 'wrong_code'),
      () => ({ status: 200, body: me }),
    ],
  });
  const onSignedIn = vi.fn();
  renderInApp(<SignInForm onSignedIn={onSignedIn} />);
  await userEvent.type(screen.getByLabelText('E-mail'), 'milo@north.example');
  await userEvent.type(screen.getByLabelText('Password'), 'a slow wet saw at dawn{Enter}');
  const code = await screen.findByLabelText('Code from your authenticator app');
  await waitFor(() => expect(code).toHaveFocus());
  expect(screen.queryByText(/do not match/)).toBeNull();
  await userEvent.type(code, '111111{Enter}');
  await screen.findByText(/does not fit/);
  await userEvent.clear(code);
  await userEvent.paste('222222');
  await userEvent.click(screen.getByRole('button', { name: 'Sign in' }));
  await waitFor(() => expect(onSignedIn).toHaveBeenCalledWith(me));
  const known = { email: 'milo@north.example', password: 'a slow wet saw at dawn' };
  expect(seen.map(({ body }) => body)).toEqual([
    known,
    { ...known, code: '111111' },
    { ...known, code: '222222' },
  ]);
});
