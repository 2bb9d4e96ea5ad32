import type { BidTabulationView, OpenedBidView } from '@kerfyard/common/bids';
import type { MeView } from '@kerfyard/common/people';
import { prefillResponsibilities, type ScopeBody, type ScopeDetailView } from '@kerfyard/common/scopes';
import { QueryClient } from '@tanstack/react-query';
import { screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { Route, Routes } from 'react-router-dom';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { sessionKeys } from '../features/session/api/session.queries.ts';
import { loadWords } from '../lib/i18n.ts';
import { line } from '../lib/socket.ts';
import { answerRequests, problem, type Answer, type SeenRequest } from '../test/answers.ts';
import { renderInApp } from '../test/render.tsx';
import ScopeBidsPage from './scope-bids-page.tsx';

vi.setConfig({ testTimeout: 20_000 });

const cutId = '018f3a1e-0000-7000-8000-000000000001';
const body: ScopeBody = {
  title: 'Drain trench',
  summary: '',
  site: {
    name: 'Annex',
    address: '914 Ninth Street',
    city: 'Denver',
    state: 'CO',
    zip: '80202',
    lat: 39.7491,
    lon: -104.9946,
    timeZone: 'America/Denver',
    contact: '',
  },
  cuts: [
    {
      id: cutId,
      mark: 'T1',
      note: '',
      cut: { kind: 'trench', lengthFt: 40, widthFt: 2, thicknessIn: 6, sideCuts: 2, endCuts: 2, count: 1 },
    },
  ],
  conditions: {
    element: 'slab_on_grade',
    face: 'floor',
    indoors: false,
    floor: '',
    steel: 'mesh',
    postTension: 'proved_none',
    below: 'soil',
    enginesAllowed: true,
    overcutsAllowed: true,
    workHours: '',
    access: '',
  },
  responsibilities: prefillResponsibilities({
    kinds: ['trench'],
    indoors: false,
    face: 'floor',
    below: 'soil',
  }),
  terms: {
    priceForm: 'either',
    retainageBasisPoints: 0,
    standbyFreeMinutes: 30,
    answerDays: 7,
    bidValidDays: 30,
    workFrom: '2099-01-11',
    workTo: '2099-02-05',
    wages: 'open_shop',
    notes: '',
  },
  bidding: { mode: 'sealed', dueAt: '2099-01-05T21:00:00.000Z' },
};

const scope: ScopeDetailView = {
  id: 's1',
  number: 'K-1042',
  status: 'open',
  seq: 1,
  gc: { id: 'gc', name: 'North Pier' },
  isOwn: true,
  body,
  isSiteHeldBack: false,
  revision: 1,
  totals: null,
  methods: [],
  draft: null,
  files: [],
  publishedAt: '2026-12-01T15:00:00.000Z',
  dueAt: body.bidding.dueAt,
  closedReason: null,
  distanceMi: null,
  gcRecord: { due: 0, awarded: 0 },
  bidCount: 2,
  subcontractId: null,
};

function bid(id: string, name: string, change: Partial<OpenedBidView['input']> = {}): OpenedBidView {
  const lumpCents = id === 'b1' ? 500_000 : 520_000;
  return {
    id,
    crew: { id: `crew-${id}`, name },
    input: {
      revision: 1,
      price: { form: 'lump', lumpCents },
      answers: [],
      inclusions: [],
      exclusions: [],
      note: '',
      validDays: 30,
      startFrom: null,
      ...change,
    },
    priced: {
      totalCents: lumpCents,
      lines: [],
      computedCents: lumpCents,
      minimumCents: 0,
      minimumApplied: false,
      mobilizationCents: 0,
    },
    submittedAt: '2026-12-01T15:00:00.000Z',
    distanceMi: 12,
  };
}

function tabulation(plugCents: number, change: Partial<BidTabulationView> = {}): BidTabulationView {
  return {
    mode: 'sealed',
    status: 'due',
    count: 2,
    openedAt: '2026-12-01T15:00:00.000Z',
    rows: [
      { item: 'cut', plugCents: 0 },
      { item: 'slurry', plugCents },
    ],
    bids: [bid('b1', 'Sablon Cutting', { exclusions: ['Night work'] }), bid('b2', 'Tarn Sawing')],
    tabulated: [
      {
        bidId: 'b1',
        baseCents: 500_000,
        plugsCents: plugCents,
        unclear: 0,
        adjustedCents: 500_000 + plugCents,
        answers: { cut: 'included', slurry: 'excluded' },
      },
      {
        bidId: 'b2',
        baseCents: 520_000,
        plugsCents: 0,
        unclear: 1,
        adjustedCents: 520_000,
        answers: { cut: 'included', slurry: 'unclear' },
      },
    ],
    awardedBidId: null,
    ...change,
  };
}

function show(view: BidTabulationView, routes: Record<string, Answer | Answer[]> = {}): SeenRequest[] {
  const me: MeView = {
    user: { id: 'u1', name: 'Ada Quill', email: 'ada@example.test', isStaff: false },
    company: { id: 'gc', kind: 'general_contractor', name: 'North Pier' },
    role: 'owner',
    permissions: ['scope.read', 'scope.write', 'scope.award', 'bid.tabulate'],
    limits: { signCents: null, setAsideCents: null, changeCents: null },
    unread: { messages: 0 },
  };
  const seen = answerRequests({
    'GET /api/scopes/s1': () => ({ status: 200, body: scope }),
    'GET /api/scopes/s1/bids': () => ({ status: 200, body: view }),
    ...routes,
  });
  const client = new QueryClient({ defaultOptions: { queries: { retry: false } } });
  client.setQueryData(sessionKeys.me, me);
  renderInApp(
    <Routes>
      <Route path="/scopes/:scopeId/bids" element={<ScopeBidsPage />} />
      <Route path="/work/:id" element={<p>The subcontract</p>} />
    </Routes>,
    { client, path: '/scopes/s1/bids' },
  );
  return seen;
}

beforeEach(async () => {
  await loadWords(['tabulation', 'scopes', 'scope', 'bid']);
});
afterEach(() => {
  vi.unstubAllGlobals();
  vi.restoreAllMocks();
});

const isLive = () => vi.spyOn(line, 'state').mockReturnValue('live');

describe('bids on a scope', () => {
  it('says how many sealed bids are in and when they open, and nothing else', async () => {
    show(tabulation(0, { status: 'open', bids: [], tabulated: [], openedAt: null }));
    expect(await screen.findByRole('heading', { name: '2 sealed bids are in' })).toBeVisible();
    expect(screen.getByText('Mon, Jan 5, 2:00 PM MST')).toBeVisible();
    expect(screen.queryByRole('table')).toBeNull();
    expect(screen.queryByText(/\$/)).toBeNull();
  });

  it('puts bids side by side and adds back what one leaves out, as the server counts it', async () => {
    const user = userEvent.setup();
    const seen = show(tabulation(0), {
      'PUT /api/scopes/s1/plugs': () => ({ status: 200, body: tabulation(75_050) }),
    });
    const table = await screen.findByRole('table');
    const slurry = within(table).getByRole('row', { name: /Slurry/ });
    expect(within(slurry).getByText('Excluded')).toBeVisible();
    expect(within(slurry).getByText('Not said')).toBeVisible();
    const plug = screen.getByRole('textbox', { name: 'Our plug for Slurry' });
    await user.clear(plug);
    await user.type(plug, '750.50{Enter}');
    await waitFor(() =>
      expect(seen.find((request) => request.method === 'PUT')?.body).toEqual({
        plugs: [
          { item: 'cut', cents: 0 },
          { item: 'slurry', cents: 75_050 },
        ],
      }),
    );
    const adjusted = await screen.findByRole('button', {
      name: /^Sablon Cutting, Adjusted price: \$5,750\.50/,
    });
    await user.click(adjusted);
    const working = await screen.findByRole('dialog');
    expect(within(working).getByText('Slurry')).toBeVisible();
    await user.keyboard('{Escape}');
    // The picture in words.
    expect(
      screen.getByText('Sablon Cutting: base $5,000.00, left out $750.50, adjusted $5,750.50'),
    ).toBeInTheDocument();
  });

  it('keeps a plug that could not be saved and says why', async () => {
    const user = userEvent.setup();
    show(tabulation(0), { 'PUT /api/scopes/s1/plugs': () => problem(409, 'illegal_move') });
    const plug = await screen.findByRole('textbox', { name: 'Our plug for Slurry' });
    await user.clear(plug);
    await user.type(plug, '750{Enter}');
    expect(await screen.findByText(/words for illegal_move/)).toBeVisible();
    expect(plug).toHaveValue('750');
  });

  it('offers no award while the line is down', async () => {
    show(tabulation(0));
    expect(await screen.findByRole('button', { name: 'Award to Sablon Cutting' })).toBeDisabled();
  });

  it('awards only after asking, with a reason for the others, and goes to the subcontract', async () => {
    isLive();
    const user = userEvent.setup();
    const seen = show(tabulation(0), {
      'POST /api/scopes/s1/award': [
        () => problem(409, 'already_awarded'),
        () => ({ status: 201, body: { subcontractId: 'sub1' } }),
      ],
    });
    await user.click(await screen.findByRole('button', { name: 'Award to Tarn Sawing' }));
    const dialog = await screen.findByRole('alertdialog', { name: 'Award to Tarn Sawing?' });
    expect(within(dialog).getByText(/\$5,200\.00, the price of the bid/)).toBeVisible();
    expect(within(dialog).getByText(/1 item is not said/)).toBeVisible();
    await user.selectOptions(within(dialog).getByLabelText('Reason the others are told'), 'Start date');
    await user.click(within(dialog).getByRole('button', { name: 'Award' }));
    // Someone was first: said in place, nothing gone.
    expect(await within(dialog).findByText(/words for already_awarded/)).toBeVisible();
    await user.click(within(dialog).getByRole('button', { name: 'Award' }));
    expect(await screen.findByText('The subcontract')).toBeVisible();
    const posts = seen.filter((request) => request.method === 'POST');
    expect(posts[1]?.body).toEqual({ bidId: 'b2', reason: 'start_date', note: '' });
    // A refusal is remembered under its key, so the second press has another one.
    expect(posts[0]?.headers.get('Idempotency-Key')).not.toBe(posts[1]?.headers.get('Idempotency-Key'));
  });

  it('shows live prices of ranked bids before due, without an award', async () => {
    isLive();
    show(tabulation(0, { mode: 'ranked', status: 'open', openedAt: null }));
    expect(await screen.findByText(/An award is possible from the due time on/)).toBeVisible();
    expect(screen.getAllByText('$5,200.00').length).toBeGreaterThan(0);
    expect(screen.queryByRole('button', { name: /^Award/ })).toBeNull();
  });

  it('asks for a reason before closing without an award', async () => {
    const user = userEvent.setup();
    const seen = show(tabulation(0), {
      'POST /api/scopes/s1/close': () => ({
        status: 200,
        body: { ...scope, status: 'closed_without_award' },
      }),
    });
    await user.click(await screen.findByRole('button', { name: 'Close without an award' }));
    const dialog = await screen.findByRole('alertdialog');
    const close = within(dialog).getByRole('button', { name: 'Close without an award' });
    expect(close).toBeDisabled();
    await user.type(within(dialog).getByLabelText('Reason'), 'The owner put it off.');
    await user.click(close);
    await waitFor(() =>
      expect(seen.find((request) => request.method === 'POST')?.body).toEqual({
        reason: 'The owner put it off.',
      }),
    );
  });
});
