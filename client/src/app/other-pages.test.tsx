import type { MeView } from '@kerfyard/common/people';
import { Theme } from '@radix-ui/themes';
import { QueryClient } from '@tanstack/react-query';
import { render, screen } from '@testing-library/react';
import { createMemoryRouter, RouterProvider } from 'react-router-dom';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { Announcer } from '../components/announcer.tsx';
import { sessionKeys } from '../features/session/api/session.queries.ts';
import { ApiError } from '../lib/api-error.ts';
import { renderInApp } from '../test/render.tsx';
import { guarded, mayOpen } from './guard.tsx';
import { RouteError } from './route-error.tsx';

afterEach(() => vi.restoreAllMocks());

/** A page whose loader fails, inside the app. */
function showFailing(error: unknown) {
  // The router says in the console what a page threw.
  vi.spyOn(console, 'error').mockImplementation(() => undefined);
  const router = createMemoryRouter([
    {
      path: '/',
      loader: () => {
        throw error;
      },
      HydrateFallback: () => null,
      element: <p>the page</p>,
      errorElement: <RouteError />,
    },
  ]);
  render(
    <Theme>
      <Announcer>
        <RouterProvider router={router} />
      </Announcer>
    </Theme>,
  );
}

describe('E-22 a page that broke', () => {
  it('says so with a way on, and nothing of what it threw', async () => {
    showFailing(new TypeError('cannot read id of undefined'));
    expect(await screen.findByRole('heading', { level: 1, name: 'This page did not load' })).toBeVisible();
    expect(screen.getByRole('button', { name: 'Load it again' })).toBeVisible();
    expect(document.body).not.toHaveTextContent('undefined');
  });

  it('names the request when the server failed, and offers another try', async () => {
    showFailing(new ApiError({ code: 'internal', status: 500, message: 'Something', requestId: 'r-77' }));
    expect(await screen.findByRole('alert')).toHaveTextContent('r-77');
    expect(screen.getByRole('button', { name: 'Try again' })).toBeVisible();
  });

  it('offers no other try where none would help', async () => {
    showFailing(new ApiError({ code: 'not_found', status: 404, message: 'Not found' }));
    expect(await screen.findByRole('alert')).toBeVisible();
    expect(screen.queryByRole('button', { name: 'Try again' })).toBeNull();
  });
});

const person = (kind: 'general_contractor' | 'cutting_contractor' | null, isStaff = false): MeView => ({
  user: { id: 'u1', name: 'Ada', email: 'ada@example.com', isStaff },
  company: kind === null ? null : { id: 'c1', name: 'North Pier', kind },
  role: kind === null ? null : 'owner',
  permissions: [],
  limits: { signCents: null, setAsideCents: null, changeCents: null },
  unread: { messages: 0 },
});

describe('E-22 a page of another kind of account', () => {
  const Secret = () => <p>only for crews</p>;
  const Guarded = guarded(Secret, 'cutting_contractor');

  function showAs(me: MeView) {
    const client = new QueryClient();
    client.setQueryData(sessionKeys.me, me);
    renderInApp(<Guarded />, { client });
  }

  it('says that it is not for this one, and shows nothing of it', () => {
    showAs(person('general_contractor'));
    expect(screen.getByRole('heading', { level: 1, name: 'Not for your account' })).toBeVisible();
    expect(screen.queryByText('only for crews')).toBeNull();
  });

  it('opens to its own', () => {
    showAs(person('cutting_contractor'));
    expect(screen.getByText('only for crews')).toBeVisible();
  });

  it('knows who may open what', () => {
    const gc = person('general_contractor');
    const staff = person(null, true);
    const audiences = [
      'anyone',
      'signed_in',
      'company',
      'general_contractor',
      'cutting_contractor',
      'staff',
    ] as const;
    const openTo = (me: MeView | null) => audiences.filter((audience) => mayOpen(me, audience));
    expect(openTo(null)).toEqual(['anyone']);
    expect(openTo(gc)).toEqual(['anyone', 'signed_in', 'company', 'general_contractor']);
    expect(openTo(staff)).toEqual(['anyone', 'signed_in', 'staff']);
  });
});
