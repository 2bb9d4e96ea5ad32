import type { MeView } from '@kerfyard/common/people';
import type { StatementView } from '@kerfyard/common/payments';
import { QueryClient } from '@tanstack/react-query';
import { screen } from '@testing-library/react';
import type { ComponentType } from 'react';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { sessionKeys } from '../features/session/api/session.queries.ts';
import { loadWords } from '../lib/i18n.ts';
import { answerRequests } from '../test/answers.ts';
import { renderInApp } from '../test/render.tsx';
import BidsPage from './bids-page.tsx';
import ScopesPage from './scopes-page.tsx';
import StatementPage from './statement-page.tsx';
import TalkPage from './talk-page.tsx';
import WorkPage from './work-page.tsx';

vi.setConfig({ testTimeout: 20_000 });
afterEach(() => vi.unstubAllGlobals());

const me: MeView = {
  user: { id: 'u1', name: 'Ada Quill', email: 'ada@example.com', isStaff: false },
  company: { id: 'c1', name: 'North Pier', kind: 'general_contractor' },
  role: 'owner',
  permissions: ['scope.write', 'talk', 'money.read'],
  limits: { signCents: null, setAsideCents: null, changeCents: null },
  unread: { messages: 0 },
};

const nothingMoved: StatementView = {
  side: 'gc',
  lines: [],
  totals: {
    setAsideCents: 0,
    chargesCents: 0,
    heldCents: 0,
    releasedCents: 0,
    feesCents: 0,
    retainageCents: 0,
    payableCents: 0,
    transferredCents: 0,
  },
};

const noPage = () => ({ status: 200, body: { items: [], nextCursor: null } });

describe('a list with nothing in it yet says what will come', () => {
  it.each<[string, ComponentType, string[]]>([
    ['No scope yet', ScopesPage, ['scopes', 'scope']],
    ['No bid yet', BidsPage, ['bid']],
    ['No work under contract yet', WorkPage, ['work', 'visits']],
    ['No talk yet', TalkPage, ['talk']],
    ['Nothing has moved yet', StatementPage, ['money']],
  ])('%s', async (title, Page, words) => {
    await loadWords(words);
    answerRequests({
      'GET /api/scopes': noPage,
      'GET /api/bids': noPage,
      'GET /api/subcontracts': noPage,
      'GET /api/threads': noPage,
      'GET /api/visits': () => ({ status: 200, body: [] }),
      'GET /api/payments/statement': () => ({ status: 200, body: nothingMoved }),
    });
    const client = new QueryClient({ defaultOptions: { queries: { retry: false } } });
    client.setQueryData(sessionKeys.me, me);
    renderInApp(<Page />, { client });
    expect(await screen.findByRole('heading', { name: title })).toBeVisible();
    expect(screen.queryByRole('alert')).toBeNull();
  });
});
