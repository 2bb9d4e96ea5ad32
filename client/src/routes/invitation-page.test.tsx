import type { InvitationOfferView } from '@kerfyard/common/people';
import { screen } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { afterEach, beforeAll, expect, it, vi } from 'vitest';
import { loadWords } from '../lib/i18n.ts';
import { answerRequests, problem } from '../test/answers.ts';
import { renderInApp } from '../test/render.tsx';
import InvitationPage from './invitation-page.tsx';

beforeAll(() => loadWords(['people']));
afterEach(() => vi.unstubAllGlobals());

const offer: InvitationOfferView = {
  email: 'cy@north.example',
  company: { name: 'North Pier', kind: 'general_contractor' },
  invitedBy: 'Ada Quill',
  role: 'manager',
  expiresAt: '2026-12-04T12:00:00.000Z',
  hasAccount: false,
};

it('reads the offer, takes it up, and leads to the sign-in with the address filled in', async () => {
  const seen = answerRequests({
    'POST /api/auth/invitation': () => ({ status: 200, body: offer }),
    'POST /api/auth/invitation/accept': () => ({ status: 204 }),
  });
  renderInApp(<InvitationPage />, { path: '/invitation?token=abc' });
  await screen.findByRole('heading', { name: 'Join North Pier' });
  expect(screen.getByText(/Ada Quill invites you as Manager/)).toBeInTheDocument();
  await userEvent.type(screen.getByLabelText('Your name'), 'Cy Larch');
  await userEvent.type(screen.getByLabelText('Password'), 'a slow wet saw at dawn{Enter}');
  await screen.findByRole('heading', { name: 'You are in' });
  expect(screen.getByLabelText('E-mail')).toHaveValue('cy@north.example');
  expect(seen.at(-1)?.body).toEqual({ token: 'abc', name: 'Cy Larch', password: 'a slow wet saw at dawn' });
});

it.each([
  ['link_used', 409, /was used already/],
  ['link_expired', 409, /has run out/],
  ['link_unknown', 422, /not whole/],
] as const)('says why a link does not work: %s', async (code, status, words) => {
  answerRequests({ 'POST /api/auth/invitation': () => problem(status, code) });
  renderInApp(<InvitationPage />, { path: '/invitation?token=abc' });
  expect(await screen.findByText(words)).toBeInTheDocument();
  expect(screen.queryByLabelText('Password')).toBeNull();
});

it('says when the address has an account, and what to do then', async () => {
  answerRequests({
    'POST /api/auth/invitation': () => ({ status: 200, body: { ...offer, hasAccount: true } }),
  });
  renderInApp(<InvitationPage />, { path: '/invitation?token=abc' });
  expect(await screen.findByText('cy@north.example has an account already.')).toBeInTheDocument();
  expect(screen.queryByLabelText('Password')).toBeNull();
});
