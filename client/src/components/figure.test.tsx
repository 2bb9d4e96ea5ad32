import { inchFeet, takeoffCut } from '@kerfyard/common/cutting';
import { screen } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { describe, expect, it } from 'vitest';
import { renderInApp } from '../test/render.tsx';
import { Figure } from './figure.tsx';

describe('Figure', () => {
  it('is plain text when there is nothing to open', () => {
    renderInApp(<Figure label="Sawing" value={inchFeet({ lengthFt: 102, depthIn: 6 })} unit="in-ft" />);
    expect(screen.getByText('612')).toBeInTheDocument();
    expect(screen.queryByRole('button')).toBeNull();
  });

  it('opens to the formula, the numbers put in and whose number it was', async () => {
    const taken = takeoffCut({
      kind: 'trench',
      lengthFt: 40,
      widthFt: 2,
      thicknessIn: 6,
      endCuts: 2,
      count: 1,
    });
    renderInApp(<Figure label="Sawing" value={taken.inchFeet} unit="in-ft" working={taken.working} />);
    await userEvent.click(screen.getByRole('button', { name: /^Sawing: 504 in-ft/ }));
    const working = await screen.findByRole('dialog', { name: 'How it was worked out: Sawing' });
    for (const step of taken.working) expect(working).toHaveTextContent(step.formula);
    expect(working).toHaveTextContent(/40 ft/);
    await userEvent.keyboard('{Escape}');
    expect(screen.queryByRole('dialog')).toBeNull();
    expect(screen.getByRole('button')).toHaveFocus();
  });
});
