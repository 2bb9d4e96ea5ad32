import type { VisitView } from '@kerfyard/common/visits';
import { expect, it } from 'vitest';
import { blocksBetween } from './visit-blocks.ts';

const window = (day: string) => ({
  startsAt: `2026-12-${day}T12:00:00.000Z`,
  endsAt: `2026-12-${day}T20:00:00.000Z`,
});
const visit = (id: string, part: Partial<VisitView>) =>
  ({ id, status: 'confirmed', windows: [], window: null, ...part }) as VisitView;
const week = { startsAt: '2026-12-07T00:00:00.000Z', endsAt: '2026-12-14T00:00:00.000Z' };

it('shows confirmed windows and each window on offer, in order, and leaves out cancelled and other weeks', () => {
  const blocks = blocksBetween(week, [
    visit('later', { window: window('20') }),
    visit('confirmed', { window: window('10') }),
    visit('offered', { status: 'proposed', windows: [window('11'), window('09'), window('15')] }),
    visit('cancelled', { status: 'cancelled', windows: [window('08')] }),
  ]);
  expect(blocks.map((block) => [block.visit.id, block.startsAt.slice(8, 10), block.isOffer])).toEqual([
    ['offered', '09', true],
    ['confirmed', '10', false],
    ['offered', '11', true],
  ]);
});
