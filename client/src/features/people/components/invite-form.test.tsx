import { screen, waitFor } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { afterEach, beforeAll, expect, it, vi } from 'vitest';
import { loadWords } from '../../../lib/i18n.ts';
import { answerRequests, problem } from '../../../test/answers.ts';
import { renderInApp } from '../../../test/render.tsx';
import { InviteForm } from './invite-form.tsx';

beforeAll(() => loadWords(['people']));
afterEach(() => vi.unstubAllGlobals());

it('sends role and limits in cents, each press under an id of its own, and shows only limits that mean something', async () => {
  const seen = answerRequests({ 'POST /api/company/invitations': () => ({ status: 201 }) });
  renderInApp(<InviteForm kind="general_contractor" />);
  expect(screen.getByLabelText(/May sign up to/)).toBeInTheDocument();
  await userEvent.click(screen.getByRole('radio', { name: /^Owner/ }));
  expect(screen.queryByLabelText(/up to/)).toBeNull();
  await userEvent.click(screen.getByRole('radio', { name: /^Accounts/ }));
  expect(screen.queryByLabelText(/May sign up to/)).toBeNull();
  await userEvent.type(screen.getByLabelText(/May set aside up to/), '2,500.50');
  await userEvent.type(screen.getByLabelText('E-mail of the person'), 'Cy@North.example{Enter}');
  // Beside the button, and read out.
  expect(await screen.findAllByText('The invitation to cy@north.example is on its way')).toHaveLength(2);
  await userEvent.type(screen.getByLabelText('E-mail of the person'), 'di@north.example{Enter}');
  await waitFor(() => expect(seen).toHaveLength(2));
  const bodies = seen.map(({ body }) => body as { id: string });
  expect(bodies[0]).toMatchObject({
    email: 'cy@north.example',
    role: 'accounts',
    limits: { signCents: null, setAsideCents: 250_050, changeCents: null },
  });
  expect(bodies[1]?.id).not.toBe(bodies[0]?.id);
  expect(seen[0]?.headers.get('Idempotency-Key')).toBe(bodies[0]?.id);
});

it('keeps what was typed when the server says no', async () => {
  answerRequests({
    'POST /api/company/invitations': () =>
      problem(422, 'invalid_input', [{ path: 'email', message: 'Ben is with you already' }]),
  });
  renderInApp(<InviteForm kind="cutting_contractor" />);
  const email = screen.getByLabelText('E-mail of the person');
  await userEvent.type(email, 'ben@north.example{Enter}');
  await waitFor(() => expect(email).toHaveAccessibleDescription(/with you already/));
  expect(email).toHaveValue('ben@north.example');
});
