import type { Page } from '@kerfyard/common/api';
import type { ScopeCardView } from '@kerfyard/common/scopes';
import { screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { afterEach, beforeAll, describe, expect, it, vi } from 'vitest';
import { loadWords } from '../lib/i18n.ts';
import { answerRequests, problem, type Answer } from '../test/answers.ts';
import { renderInApp } from '../test/render.tsx';
import OpenScopesPage from './open-scopes-page.tsx';

vi.setConfig({ testTimeout: 20_000 });
beforeAll(() => loadWords(['open-scopes']));
afterEach(() => vi.unstubAllGlobals());

function card(id: string, title: string): ScopeCardView {
  return {
    id,
    number: 'K-1042',
    title,
    status: 'open',
    mode: 'sealed',
    dueAt: '2099-01-05T21:00:00.000Z',
    timeZone: 'America/Denver',
    city: 'Denver',
    state: 'CO',
    distanceMi: 12,
    methods: ['flat_saw'],
    indoors: false,
    totals: {
      sawFt: 84,
      overcutFt: 0,
      inchFeet: 504,
      sawSqFt: 0,
      coreHoles: 0,
      coreInches: 0,
      crossCutFt: 0,
      pieces: 0,
      pieceCuts: 0,
      removedCuFt: 0,
      removedLb: 0,
    },
    cuts: [
      {
        id: 'c1',
        mark: 'T1',
        note: '',
        cut: { kind: 'trench', lengthFt: 40, widthFt: 2, thicknessIn: 6, sideCuts: 2, endCuts: 2, count: 1 },
      },
    ],
    cutCount: 1,
    gc: { id: 'gc', name: 'North Pier' },
    gcRecord: { due: 4, awarded: 3 },
    publishedAt: '2026-12-01T15:00:00.000Z',
    revision: 1,
    ownBid: null,
    bidCount: null,
  };
}

const answered = (items: ScopeCardView[], nextCursor: string | null = null): Answer => {
  const body: Page<ScopeCardView> = { items, nextCursor };
  return () => ({ status: 200, body });
};

describe('the list of open scopes', () => {
  it('shows each scope as a card whose face is its cut sketch', async () => {
    answerRequests({ 'GET /api/open-scopes': answered([card('s1', 'Drain trench')]) });
    renderInApp(<OpenScopesPage />);
    const article = (await screen.findByRole('link', { name: 'Drain trench' })).closest('article');
    expect(within(article as HTMLElement).getByRole('img', { name: /^Cut sketch/ })).toBeVisible();
    expect(article).toHaveTextContent('504');
  });

  it('reads on by key, keeping what it has', async () => {
    const seen = answerRequests({
      'GET /api/open-scopes': [
        answered([card('s1', 'Drain trench')], 'after-s1'),
        answered([card('s2', 'Sleeves')]),
      ],
    });
    renderInApp(<OpenScopesPage />);
    await userEvent.click(await screen.findByRole('button', { name: 'Show more' }));
    expect(await screen.findByRole('link', { name: 'Sleeves' })).toBeVisible();
    expect(screen.getByRole('link', { name: 'Drain trench' })).toBeVisible();
    expect(seen.at(-1)?.url).toContain('cursor=after-s1');
    expect(screen.queryByRole('button', { name: 'Show more' })).toBeNull();
  });

  it('keeps its filters in the address, asks the server for them, and clears them', async () => {
    const seen = answerRequests({ 'GET /api/open-scopes': answered([]) });
    const { router } = renderInApp(<OpenScopesPage />, { path: '/open-scopes?method=core_drill' });
    const filters = screen.getByLabelText('Filter the open scopes');
    expect(within(filters).getByLabelText('Method')).toHaveValue('core_drill');
    await userEvent.selectOptions(within(filters).getByLabelText('Distance from your yard'), '50');
    await userEvent.selectOptions(within(filters).getByLabelText('Sawing'), '500');
    await userEvent.selectOptions(within(filters).getByLabelText('Bids due'), '3');
    const search = new URLSearchParams(router.state.location.search);
    expect(Object.fromEntries(search)).toMatchObject({
      method: 'core_drill',
      withinMiles: '50',
      minInchFeet: '500',
    });
    expect(Date.parse(search.get('dueBefore') ?? '')).toBeGreaterThan(Date.now() + 2 * 86_400_000);
    await waitFor(() => expect(seen.at(-1)?.url).toContain('minInchFeet=500'));
    expect(seen.at(-1)?.url).toContain('withinMiles=50');
    await userEvent.click(within(filters).getByRole('button', { name: 'Clear filters' }));
    expect(router.state.location.search).toBe('');
    expect(within(filters).getByLabelText('Method')).toHaveValue('');
  });

  it('says what will come when nothing is open, and what to widen when filters let nothing through', async () => {
    answerRequests({ 'GET /api/open-scopes': answered([]) });
    const { router } = renderInApp(<OpenScopesPage />);
    expect(await screen.findByRole('heading', { name: 'Nothing open right now' })).toBeVisible();
    await router.navigate('/?withinMiles=25');
    expect(await screen.findByRole('heading', { name: 'Nothing fits these filters' })).toBeVisible();
  });

  it('says that it could not be read, with the request’s number, and reads it when asked again', async () => {
    answerRequests({
      'GET /api/open-scopes': [() => problem(500, 'internal'), answered([card('s1', 'Drain trench')])],
    });
    renderInApp(<OpenScopesPage />);
    const alert = await screen.findByRole('alert');
    expect(alert).toHaveTextContent('r-1');
    await userEvent.click(within(alert).getByRole('button', { name: 'Try again' }));
    expect(await screen.findByRole('link', { name: 'Drain trench' })).toBeVisible();
  });

  it('says once that a scope arrived, and nothing about those that were there', async () => {
    answerRequests({
      'GET /api/open-scopes': [
        answered([card('s1', 'Drain trench')]),
        answered([card('s2', 'Sleeves'), card('s1', 'Drain trench')]),
      ],
    });
    const { client } = renderInApp(<OpenScopesPage />);
    await screen.findByRole('link', { name: 'Drain trench' });
    expect(screen.queryByText(/new scope on the list/)).toBeNull();
    await client.invalidateQueries();
    expect(await screen.findByText('1 new scope on the list')).toBeInTheDocument();
  });
});
