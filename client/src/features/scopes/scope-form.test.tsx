import type { MeView } from '@kerfyard/common/people';
import type { ScopeDetailView, ScopeDraft } from '@kerfyard/common/scopes';
import { QueryClient } from '@tanstack/react-query';
import { cleanup, screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { loadWords } from '../../lib/i18n.ts';
import { answerRequests, problem, type Answer, type SeenRequest } from '../../test/answers.ts';
import { renderInApp } from '../../test/render.tsx';
import { sessionKeys } from '../session/api/session.queries.ts';
import { scopeKeys } from './api/scope.queries.ts';
import { ScopeForm, type DraftScope } from './components/form/scope-form.tsx';
import { tailKey } from './draft-saver.ts';
import { emptyScope, toDraft } from './scope-form-values.ts';

vi.setConfig({ testTimeout: 20_000 });

const me: MeView = {
  user: { id: 'u1', name: 'Ada Quill', email: 'ada@example.test', isStaff: false },
  company: { id: 'gc', kind: 'general_contractor', name: 'North Pier' },
  role: 'owner',
  permissions: ['scope.read', 'scope.write', 'scope.award', 'bid.tabulate'],
  limits: { signCents: null, setAsideCents: null, changeCents: null },
  unread: { messages: 0 },
};

function scopeWith(draft: ScopeDraft, version = 1): DraftScope {
  return {
    id: 's1',
    number: 'K-1042',
    status: 'draft',
    seq: 0,
    gc: { id: 'gc', name: 'North Pier' },
    isOwn: true,
    body: null,
    isSiteHeldBack: false,
    revision: null,
    totals: null,
    methods: [],
    draft: { version, body: draft },
    files: [],
    publishedAt: null,
    dueAt: null,
    closedReason: null,
    distanceMi: null,
    gcRecord: { due: 0, awarded: 0 },
    bidCount: 0,
    subcontractId: null,
  };
}

const denver = {
  zip: '80202',
  city: 'Denver',
  state: 'CO',
  lat: 39.7491,
  lon: -104.9946,
  timeZone: 'America/Denver',
};

/** Everything a scope needs, but the due time. */
const nearlyWhole: ScopeDraft = {
  ...toDraft(
    {
      ...emptyScope,
      title: 'Drain trench',
      site: { ...emptyScope.site, ...denver, name: 'Annex', address: '914 Ninth Street' },
      conditions: {
        ...emptyScope.conditions,
        element: 'slab_on_grade',
        face: 'floor',
        below: 'soil',
        indoors: false,
        enginesAllowed: true,
        overcutsAllowed: true,
      },
      terms: { ...emptyScope.terms, workFrom: '2099-01-11', workTo: '2099-02-05' },
    },
    [
      {
        id: '018f3a1e-0000-7000-8000-000000000001',
        mark: 'T1',
        note: '',
        cut: { kind: 'trench', lengthFt: 40, widthFt: 2, thicknessIn: 6, sideCuts: 2, endCuts: 2, count: 1 },
      },
    ],
  ),
};

function show(scope: DraftScope, routes: Record<string, Answer | Answer[]> = {}) {
  let version = scope.draft.version;
  const seen = answerRequests({
    'PUT /api/scopes/s1/draft': () => ({ status: 200, body: { version: ++version } }),
    'GET /api/places/zip/80202': () => ({ status: 200, body: denver }),
    ...routes,
  });
  const client = new QueryClient({ defaultOptions: { queries: { retry: false } } });
  client.setQueryData(sessionKeys.me, me);
  client.setQueryData(scopeKeys.one('s1'), scope satisfies ScopeDetailView);
  renderInApp(<ScopeForm scope={scope} onReload={() => undefined} />, { client });
  return { seen, client };
}

const saves = (seen: SeenRequest[]) =>
  seen
    .filter((request) => request.method === 'PUT')
    .map((request) => request.body as { version: number; draft: ScopeDraft });

beforeEach(async () => {
  await loadWords(['scopes', 'scope']);
  sessionStorage.clear();
});
// Leaving the page sends what is unsaved: the answers must still be there.
afterEach(() => {
  cleanup();
  vi.unstubAllGlobals();
});

describe('the form of a scope', () => {
  it('says everything that is missing at once, beside the fields and in a summary that leads there', async () => {
    const user = userEvent.setup();
    show(scopeWith(toDraft(emptyScope, [])));
    expect(screen.queryByText(/fields need another look/)).toBeNull();
    await user.click(screen.getByRole('button', { name: 'Publish' }));
    const summary = (await screen.findByText(/fields need another look/)).parentElement as HTMLElement;
    for (const line of [
      'Title',
      'ZIP code',
      'Cut list: At least one cut',
      'Element',
      'Indoors',
      'Bids due',
    ]) {
      expect(within(summary).getByRole('button', { name: new RegExp(line) })).toBeVisible();
    }
    // City, state, position and zone come with the ZIP code.
    expect(within(summary).queryByRole('button', { name: /City/ })).toBeNull();
    await user.click(within(summary).getByRole('button', { name: /Street address/ }));
    const address = screen.getByLabelText('Street address');
    expect(address).toHaveFocus();
    expect(address).toBeInvalid();
    await user.type(address, '914 Ninth Street');
    await waitFor(() => expect(within(summary).queryByRole('button', { name: /Street address/ })).toBeNull());
    expect(address).toBeValid();
  });

  it('reads quantities from what is typed, by keyboard alone, and saves it', async () => {
    const user = userEvent.setup();
    const { seen } = show(scopeWith(toDraft(emptyScope, [])));
    await user.click(screen.getByRole('button', { name: 'Add trench' }));
    // The focus waits in the first figure.
    await user.keyboard('40{Tab}2{Tab}6');
    const sawing = await screen.findByRole('button', { name: /^Sawing: 504 in-ft/ });
    await user.click(sawing);
    expect(await screen.findByRole('dialog', { name: /Sawing/ })).toBeVisible();
    await user.keyboard('{Escape}');
    await user.click(screen.getByLabelText('Thickness'));
    await user.keyboard('{Enter}');
    expect(screen.getAllByLabelText('Mark').map((input) => (input as HTMLInputElement).value)).toEqual([
      'T1',
      'T2',
    ]);
    expect(screen.getAllByLabelText('Length')[1]).toHaveFocus();
    await user.keyboard('{ArrowUp}');
    expect(screen.getAllByLabelText('Length')[0]).toHaveFocus();
    await waitFor(() => expect(saves(seen).at(-1)?.draft.cuts).toHaveLength(2), { timeout: 4000 });
    expect(saves(seen)[0]?.version).toBe(1);
    expect(await screen.findByText(/^Saved \d+ s ago$/)).toBeVisible();
  });

  it('shows the three ways to treat a corner with what each comes to', async () => {
    const user = userEvent.setup();
    show(scopeWith(toDraft(emptyScope, [])));
    await user.click(screen.getByRole('button', { name: 'Add opening' }));
    await user.keyboard('4{Tab}8{Tab}8');
    await user.click(screen.getByRole('button', { name: 'Details of cut O1' }));
    await user.type(screen.getByLabelText('Blade'), '24');
    await user.type(screen.getByLabelText('Blade through the far face'), '1');
    // Eight ends of 6.82 in; a core in each corner is twice that across.
    const corners = screen.getByRole('group', { name: 'Corners' });
    expect(await within(corners).findByText('4.5 ft past the corners')).toBeVisible();
    expect(within(corners).getByText('4 cores of 13.6 in')).toBeVisible();
    await user.click(within(corners).getByRole('radio', { name: /Cored/ }));
    expect(await screen.findByRole('button', { name: /^Cores: 4/ })).toBeVisible();
  });

  it('takes city, state, position and zone from the ZIP code', async () => {
    const user = userEvent.setup();
    const { seen } = show(scopeWith(toDraft(emptyScope, [])));
    expect(screen.getByLabelText('Bids due')).toBeDisabled();
    await user.type(screen.getByLabelText('ZIP code'), '80202');
    await waitFor(() => expect(screen.getByLabelText('City')).toHaveValue('Denver'));
    expect(screen.getByText(/America\/Denver/, { selector: '[id$="-hint"]' })).toBeVisible();
    expect(screen.getByLabelText('Bids due')).toBeEnabled();
    await waitFor(() => expect(saves(seen).at(-1)?.draft.site).toMatchObject(denver), { timeout: 4000 });
  });

  it('fills the responsibility sheet by what is cut and where, and leaves what was decided by hand', async () => {
    const user = userEvent.setup();
    const { seen } = show(scopeWith(nearlyWhole));
    expect(await screen.findByText(/^\d+ ours, \d+ the crew's, the rest not needed\.$/)).toBeVisible();
    await user.click(screen.getByRole('button', { name: 'Open the whole sheet' }));
    const row = (name: string) => within(screen.getByRole('radiogroup', { name }));
    expect(row('Ventilation').getByRole('radio', { name: 'Not needed' })).toBeChecked();
    await user.click(row('Water').getByRole('radio', { name: 'Crew' }));
    await user.click(within(screen.getByRole('radiogroup', { name: 'Indoors' })).getByLabelText('Yes'));
    await waitFor(() => expect(row('Ventilation').getByRole('radio', { name: 'Ours' })).toBeChecked());
    expect(row('Water').getByRole('radio', { name: 'Crew' })).toBeChecked();
    await waitFor(
      () => {
        const sheet = saves(seen).at(-1)?.draft.responsibilities;
        expect(sheet).toHaveLength(26);
        expect(sheet?.find((one) => one.item === 'water')?.by).toBe('crew');
      },
      { timeout: 4000 },
    );
  });

  it('asks before publishing, sends the version it has saved, and shows what the server finds', async () => {
    const user = userEvent.setup();
    const whole = { ...nearlyWhole, bidding: { mode: 'sealed', dueAt: inTwoWeeks() } };
    const { seen } = show(scopeWith(whole, 7), {
      'POST /api/scopes/s1/publish': () =>
        problem(422, 'invalid_input', [{ path: 'bidding.dueAt', message: 'Bids must be due in the future' }]),
    });
    await waitFor(() => expect(saves(seen)).toHaveLength(1), { timeout: 4000 });
    await user.click(screen.getByRole('button', { name: 'Publish' }));
    const dialog = await screen.findByRole('alertdialog', { name: 'Publish this scope?' });
    expect(within(dialog).getByText(/never changes afterwards/)).toBeVisible();
    await user.click(within(dialog).getByRole('button', { name: 'Publish now' }));
    await waitFor(() => expect(seen.at(-1)?.url).toBe('/api/scopes/s1/publish'));
    expect(seen.at(-1)?.body).toEqual({ version: 8 });
    expect(await within(dialog).findByText(/words for invalid_input/)).toBeVisible();
    await user.click(within(dialog).getByRole('button', { name: 'Cancel' }));
    expect(
      await screen.findByRole('button', { name: 'Bids due: Bids must be due in the future' }),
    ).toBeVisible();
  });

  it('goes on with what this tab has kept, and says when someone else saved meanwhile', async () => {
    sessionStorage.setItem(
      `kerfyard.draft.${tailKey('s1')}`,
      JSON.stringify({ version: 3, draft: { ...nearlyWhole, title: 'Typed last' } }),
    );
    const user = userEvent.setup();
    const { seen } = show(scopeWith(nearlyWhole, 3), {
      'PUT /api/scopes/s1/draft': [
        () => problem(409, 'stale_version'),
        () => ({ status: 200, body: { version: 10 } }),
      ],
      'GET /api/scopes/s1': () => ({ status: 200, body: scopeWith({ ...nearlyWhole, title: 'Theirs' }, 9) }),
    });
    expect(screen.getByLabelText('Title')).toHaveValue('Typed last');
    await user.click(await screen.findByRole('button', { name: 'Keep mine' }, { timeout: 4000 }));
    await waitFor(() =>
      expect(saves(seen).at(-1)).toMatchObject({ version: 9, draft: { title: 'Typed last' } }),
    );
    await waitFor(() => expect(screen.queryByRole('button', { name: 'Keep mine' })).toBeNull());
  });
});

function inTwoWeeks(): string {
  return new Date(Date.now() + 14 * 86_400_000).toISOString();
}
