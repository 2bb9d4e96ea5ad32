import { emptyRateCard, type Method, type RateCard, type RateCardView } from '@kerfyard/common/people';
import { cutSchema, prefillResponsibilities, type ScopeBody } from '@kerfyard/common/scopes';
import { cleanup, screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { loadWords } from '../../../lib/i18n.ts';
import { answerRequests } from '../../../test/answers.ts';
import { renderInApp } from '../../../test/render.tsx';
import { JobEstimate } from './job-estimate.tsx';

const trench = cutSchema.parse({
  kind: 'trench',
  lengthFt: 40,
  widthFt: 2,
  thicknessIn: 6,
  count: 1,
  removal: { maxPieceLb: 600, maxSideFt: 4 },
});
const body = {
  cuts: [{ id: 'a', mark: 'T1', note: '', cut: trench }],
  conditions: { face: 'floor', below: 'soil', indoors: false, enginesAllowed: true, overcutsAllowed: true },
  responsibilities: prefillResponsibilities({
    kinds: ['trench'],
    indoors: false,
    face: 'floor',
    below: 'soil',
  }),
} as unknown as ScopeBody;
const methods = new Map<string, Method>([['a', 'flat_saw']]);
const priced = {
  totalCents: 65_000,
  lines: [],
  computedCents: 52_020,
  minimumCents: 65_000,
  minimumApplied: true,
  mobilizationCents: 0,
};

beforeEach(() => loadWords(['estimate', 'scope']));
afterEach(() => {
  cleanup();
  sessionStorage.clear();
  vi.unstubAllGlobals();
});

function show(card: RateCard | null, distanceMi: number | null = null) {
  const view: RateCardView = { card, version: card === null ? 0 : 1, updatedAt: null };
  const seen = answerRequests({ 'GET /api/company/rate-card': () => ({ status: 200, body: view }) });
  renderInApp(
    <JobEstimate scopeId="s1" body={body} methods={methods} priced={priced} distanceMi={distanceMi} />,
  );
  return seen;
}

describe('the estimate beside a bid', () => {
  it('says hours by common practice, the usual ones beside them, and opens the working', async () => {
    show(null, 40);
    // 612 in-ft at 600 and at 300 an hour; 2 h of travel and three half hours.
    const hours = await screen.findByRole('button', { name: /Crew hours.*4\.5 to 5\.5 h/ });
    expect(screen.getAllByText(/^Common practice/).length).toBeGreaterThan(0);
    expect(screen.getByText(/650\.00: the minimum is the price/)).toBeInTheDocument();
    await userEvent.click(hours);
    const working = await screen.findByRole('dialog');
    expect(within(working).getAllByText('quantity ÷ rate')).toHaveLength(2);
    expect(within(working).getAllByText(/Common practice/i).length).toBeGreaterThan(0);
  });

  it('uses the rate card’s pace and costs, says they are the crew’s, and sets the cost against the price', async () => {
    const card = emptyRateCard();
    card.production.perHour.flat_saw = 306;
    card.costs = { crewHourCents: 10_000, bladeRate: 1_000, bitRate: null };
    show(card);
    // 2 h of sawing and 1.5 h beside it at $100; 612 in-ft at 10 cents.
    expect(await screen.findByRole('button', { name: /Your cost.*\$411\.20/ })).toBeInTheDocument();
    expect(screen.getByRole('button', { name: /Left over.*\$238\.80/ })).toBeInTheDocument();
    expect(screen.getAllByText(/^Your numbers/).length).toBeGreaterThan(2);
  });

  it('counts again as hours are typed, keeps them in this tab, sends nothing, and names what it does not take', async () => {
    const seen = show(null);
    await userEvent.click(await screen.findByText('Travel, set-up, truck and power'));
    const travel = screen.getByLabelText('Travel');
    await userEvent.clear(travel);
    await userEvent.type(travel, '3');
    expect(await screen.findByRole('button', { name: /Crew hours.*5\.5 to 6\.5 h/ })).toBeInTheDocument();
    expect(sessionStorage.getItem('kerfyard.draft.estimate.s1')).toContain('"travelHours":3');
    expect(seen.filter(({ method }) => method !== 'GET')).toEqual([]);
    await userEvent.clear(travel);
    await userEvent.type(travel, '-3');
    expect(await screen.findByRole('alert')).toHaveTextContent(/^Travel: must be /);
  });
});
