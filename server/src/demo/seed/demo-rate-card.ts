import {
  emptyRateCard,
  type Method,
  type RateCard,
  type RateRow,
  type RateUnit,
} from '@kerfyard/common/people';
import type { CutKind } from '@kerfyard/common/scopes';

const rate = (
  method: Method,
  unit: RateUnit,
  dollars: number,
  band: { upToIn?: number; kind?: CutKind } = {},
): RateRow => ({
  method,
  unit,
  kind: band.kind ?? null,
  upToIn: band.upToIn ?? null,
  rate: Math.round(dollars * 10_000),
});

/** The invented rate card of one crew of the demo: invented dollars, in the order of size that the trade charges. */
export const demoRateCard: RateCard = {
  ...emptyRateCard(),
  rates: [
    rate('flat_saw', 'in_ft', 0.85, { upToIn: 6 }),
    rate('flat_saw', 'in_ft', 1.15, { upToIn: 12 }),
    rate('flat_saw', 'in_ft', 1.6),
    rate('wall_saw', 'in_ft', 2.4, { upToIn: 8 }),
    rate('wall_saw', 'in_ft', 2.95),
    rate('hand_saw', 'in_ft', 3.1),
    rate('hand_saw', 'each', 6.5, { kind: 'bar' }),
    rate('hand_saw', 'each', 7, { kind: 'block' }),
    rate('joint_saw', 'lf', 1.1),
    rate('core_drill', 'each', 65, { upToIn: 2 }),
    rate('core_drill', 'each', 85, { upToIn: 4 }),
    rate('core_drill', 'core_in', 14, { upToIn: 8 }),
    rate('core_drill', 'core_in', 22),
    rate('chain_saw', 'in_ft', 5.2),
  ],
  factors: { heavy_bar: 150, overhead: 175, finished_space: 140, night: 130 },
  minimumCents: 85_000,
  mobilizationCents: 25_000,
  standbyHourCents: 19_500,
  costs: { crewHourCents: 14_500, bladeRate: 1_400, bitRate: 6_500 },
  production: {
    ...emptyRateCard().production,
    perHour: { ...emptyRateCard().production.perHour, flat_saw: 420, wall_saw: 110, joint_saw: 260 },
    coreSetUpMinutes: 10,
  },
};
