import type { Cut } from '@kerfyard/common/cutting';
import { screen, within } from '@testing-library/react';
import { describe, expect, it } from 'vitest';
import { renderInApp } from '../test/render.tsx';
import { CutSketch } from './cut-sketch.tsx';

const trench: Cut = { kind: 'trench', lengthFt: 40, widthFt: 2, thicknessIn: 6, endCuts: 2, count: 1 };
const cores: Cut = { kind: 'core', diameterIn: 4, depthIn: 8, count: 6 };

describe('CutSketch', () => {
  it('has a text equivalent with each cut, its quantities and the caution', () => {
    renderInApp(<CutSketch cuts={[trench, cores]} />);
    const drawing = screen.getByRole('img', { name: 'Cut sketch, 2 cuts' });
    expect(drawing).toHaveAccessibleDescription(/1\. Trench 40 × 2 ft, 6 in thick: 84 ft sawn, 504 in-ft/);
    expect(drawing).toHaveAccessibleDescription(/2\. Core 4 in, 8 in deep, 6 of them: 6 cores, 48 core-in/);
    expect(drawing).toHaveAccessibleDescription(/not for layout/);
  });

  it('on a card says the first five and how many more there are', () => {
    const many = Array.from({ length: 7 }, () => cores);
    const { container } = renderInApp(<CutSketch cuts={many} look="card" cutCount={90} />);
    const sentences = within(container.querySelector('ul') as HTMLElement).getAllByRole('listitem');
    expect(sentences).toHaveLength(6);
    expect(sentences.at(-1)).toHaveTextContent('and 85 more cuts');
  });

  it('shows what it was given for an empty or half-typed list instead of breaking', () => {
    renderInApp(<CutSketch cuts={[{ ...trench, lengthFt: Number.NaN }]} empty="Type a length" />);
    expect(screen.getByText('Type a length')).toBeInTheDocument();
    expect(screen.queryByRole('img')).toBeNull();
  });
});
