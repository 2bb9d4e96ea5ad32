import type { DemoPersonView, MeView } from '@kerfyard/common/people';
import { fireEvent, screen } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { afterEach, beforeAll, describe, expect, it, vi } from 'vitest';
import { loadWords } from '../../lib/i18n.ts';
import { answerRequests } from '../../test/answers.ts';
import { renderInApp } from '../../test/render.tsx';
import { DemoDoors } from './components/demo-doors.tsx';
import { ExamplePanel } from './components/example-panel.tsx';
import { exampleScope } from './example-scope.ts';

beforeAll(() => loadWords(['first-look']));
afterEach(() => vi.unstubAllGlobals());

const person = (key: string, kind: DemoPersonView['kind']): DemoPersonView => ({
  key,
  name: `Name of ${key}`,
  company: kind === 'staff' ? null : `Company of ${key}`,
  kind,
  role: kind === 'staff' ? 'staff' : 'owner',
});

describe('the example', () => {
  it('takes off what the trade would: a trench 40 × 2 ft in 6 in with its cross cuts', () => {
    const scope = exampleScope({ trenchFt: 40, slabIn: 6 });
    // Trench 2 × 40 + 2 × 2 + 6 cross cuts × 2 ft = 96; opening 2 × 7 + 2 × 4 + 2 × 4 = 30 LF (common practice).
    expect(scope.sawFt).toBe(126);
    expect(scope.inchFeet).toBe(756);
    expect(scope.heaviestLb).toBeLessThanOrEqual(1000);
    const { contractCents, setAsideCents, releasedCents, retainageCents } = scope.money;
    expect(setAsideCents).toBeLessThan(contractCents);
    expect(releasedCents + retainageCents).toBeLessThan(setAsideCents);
  });

  it('counts anew while the slab gets thicker', () => {
    renderInApp(<ExamplePanel />);
    expect(screen.getByRole('button', { name: /^Length by depth: 756 in-ft/ })).toBeInTheDocument();
    fireEvent.change(screen.getByLabelText('Slab'), { target: { value: '8' } });
    expect(screen.queryByRole('button', { name: /^Length by depth: 756 in-ft/ })).toBeNull();
    expect(screen.getByLabelText('Slab')).toHaveAttribute('aria-valuetext', '8 in');
  });
});

describe('the demo', () => {
  it('is entered with one press, as either side', async () => {
    const seen = answerRequests({
      'GET /api/demo/people': () => ({
        status: 200,
        body: [
          person('gc', 'general_contractor'),
          person('crew', 'cutting_contractor'),
          person('ines', 'staff'),
        ],
      }),
      'POST /api/demo/sign-in': () => ({ status: 200, body: { user: { id: 'u' } } as MeView }),
    });
    const entered: MeView[] = [];
    renderInApp(<DemoDoors onSignedIn={(me) => entered.push(me)} />);
    await userEvent.click(await screen.findByRole('button', { name: 'As a cutting crew' }));
    expect(seen.at(-1)?.body).toEqual({ key: 'crew' });
    expect(entered).toHaveLength(1);
    expect(screen.getByText('Name of ines')).toBeInTheDocument();
  });

  it('shows no door where there is no demo', async () => {
    const seen = answerRequests({ 'GET /api/demo/people': () => ({ status: 200, body: [] }) });
    renderInApp(<DemoDoors onSignedIn={() => undefined} />);
    await vi.waitFor(() => expect(seen).toHaveLength(1));
    expect(screen.queryByRole('button')).toBeNull();
  });
});
