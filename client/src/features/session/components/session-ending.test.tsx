import { act, screen, waitFor } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { afterEach, beforeAll, beforeEach, expect, it, vi } from 'vitest';
import { sessionGate } from '../../../lib/session-gate.ts';
import { answerRequests } from '../../../test/answers.ts';
import { renderInApp } from '../../../test/render.tsx';
import { SessionEnding } from './session-ending.tsx';

const start = Date.parse('2026-12-01T12:00:00.000Z');
const after = (minutes: number) => new Date(start + minutes * 60_000).toISOString();
const pass = (minutes: number) => act(() => vi.advanceTimersByTimeAsync(minutes * 60_000));
const user = userEvent.setup({ advanceTimers: (ms) => void vi.advanceTimersByTime(ms) });

// Loaded on demand: not to be waited for in here.
beforeAll(() => import('./session-ending-dialog.tsx'));
beforeEach(() => {
  localStorage.clear();
  vi.useFakeTimers({ now: start, shouldAdvanceTime: true });
});
afterEach(() => {
  vi.useRealTimers();
  vi.unstubAllGlobals();
});

it('E-09 warns five minutes before the end and extends on a press', async () => {
  const seen = answerRequests({
    'GET /api/account/session': [
      () => ({ status: 200, body: { endsAt: after(60), isFinal: false } }),
      () => ({ status: 200, body: { endsAt: after(60), isFinal: false } }),
      () => ({ status: 200, body: { endsAt: after(10_080), isFinal: false } }),
    ],
    'POST /api/auth/refresh': () => ({ status: 204 }),
  });
  renderInApp(<SessionEnding />);
  await waitFor(() => expect(seen).toHaveLength(1));
  await pass(54);
  expect(screen.queryByRole('alertdialog')).toBeNull();
  await pass(1.1);
  await screen.findByRole('alertdialog', { name: 'Your sign-in is about to end' });
  expect(screen.getByText(/It ends in 4 min/)).toBeInTheDocument();
  await user.click(screen.getByRole('button', { name: 'Stay signed in' }));
  await waitFor(() => expect(screen.queryByRole('alertdialog')).toBeNull());
  expect(seen.map(({ method, url }) => `${method} ${url}`)).toEqual([
    'GET /api/account/session',
    'GET /api/account/session',
    'POST /api/auth/refresh',
    'GET /api/account/session',
  ]);
  await pass(10);
  expect(screen.queryByRole('alertdialog')).toBeNull();
});

it('E-09 stays silent when another tab has used the session meanwhile', async () => {
  const seen = answerRequests({
    'GET /api/account/session': [
      () => ({ status: 200, body: { endsAt: after(60), isFinal: false } }),
      () => ({ status: 200, body: { endsAt: after(600), isFinal: false } }),
    ],
  });
  renderInApp(<SessionEnding />);
  await waitFor(() => expect(seen).toHaveLength(1));
  await pass(56);
  await waitFor(() => expect(seen).toHaveLength(2));
  expect(screen.queryByRole('alertdialog')).toBeNull();
});

it('E-09 at the last moment of a session offers to sign in again in place', async () => {
  const seen = answerRequests({
    'GET /api/account/session': () => ({ status: 200, body: { endsAt: after(4), isFinal: true } }),
  });
  renderInApp(<SessionEnding />);
  const asking = vi.spyOn(sessionGate, 'ask').mockResolvedValue();
  await user.click(await screen.findByRole('button', { name: 'Sign in again now' }));
  await waitFor(() => expect(asking).toHaveBeenCalledOnce());
  expect(seen.some(({ method }) => method === 'POST')).toBe(false);
});
