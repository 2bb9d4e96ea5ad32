import { takeoffCutList, type Cut } from '@kerfyard/common/cutting';
import { expect, it } from 'vitest';
import { totalWorking } from './total-working.ts';

const cuts: Cut[] = [
  { kind: 'line', lengthFt: 100, depthIn: 6, count: 1 },
  { kind: 'core', diameterIn: 4, depthIn: 8, count: 3 },
  { kind: 'line', lengthFt: 10, depthIn: 4, count: 2 },
];

it('shows each sawn cut by its number and ends with the sum of what they come to', () => {
  const takeoff = takeoffCutList({ cuts });
  const steps = totalWorking(takeoff, 'inchFeet', { label: 'All cuts', unit: 'in-ft' });
  // 100 ft × 6 in + 2 × 10 ft × 4 in
  expect(steps.at(-1)).toMatchObject({
    label: 'All cuts',
    value: 680,
    inputs: [
      { name: '1.', value: 600 },
      { name: '3.', value: 80 },
    ],
  });
  expect(steps.map((step) => step.label.slice(0, 2))).not.toContain('2.');
  expect(steps.some((step) => step.value === 600)).toBe(true);
});

it('needs no sum for a single cut', () => {
  const takeoff = takeoffCutList({ cuts: cuts.slice(0, 2) });
  const steps = totalWorking(takeoff, 'sawFt', { label: 'All cuts', unit: 'ft' });
  expect(steps.at(-1)).toMatchObject({ value: 100 });
  expect(steps.some((step) => step.label === 'All cuts')).toBe(false);
});
