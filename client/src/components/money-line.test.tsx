import { screen } from '@testing-library/react';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { renderInApp } from '../test/render.tsx';
import { MoneyLine } from './money-line.tsx';
import { moneyParts } from './money-parts.ts';

describe('MoneyLine', () => {
  it('says in words what the bar shows, and draws the parts to scale', () => {
    const { container } = renderInApp(
      <MoneyLine
        money={{
          contractCents: 1_000_000,
          setAsideCents: 600_000,
          releasedCents: 250_000,
          retainageCents: 50_000,
          objectedCents: 0,
        }}
      />,
    );
    expect(
      screen.getByRole('img', {
        name: 'Contract $10,000.00: Released $2,500.00, Set aside, held $3,000.00, Retainage $500.00, Not set aside yet $4,000.00',
      }),
    ).toBeInTheDocument();
    const widths = [...container.querySelectorAll('svg[role="img"] g > rect:first-child')].map((rect) =>
      Number(rect.getAttribute('width')),
    );
    expect(widths).toEqual([250, 300, 50, 400]);
  });

  it('always sums to its length, whatever the ledger says', () => {
    const cents = fc.integer({ min: 0, max: 1_000_000_000 });
    fc.assert(
      fc.property(
        cents,
        cents,
        cents,
        cents,
        cents,
        (contractCents, setAsideCents, releasedCents, retainageCents, objectedCents) => {
          const { parts, totalCents } = moneyParts({
            contractCents,
            setAsideCents,
            releasedCents,
            retainageCents,
            objectedCents,
          });
          expect(parts.reduce((sum, part) => sum + part.cents, 0)).toBe(totalCents);
          expect(totalCents).toBeGreaterThanOrEqual(contractCents);
        },
      ),
    );
  });
});
