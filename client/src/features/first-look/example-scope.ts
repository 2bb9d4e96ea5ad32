import { priceCuts, takeoffCutList, type Cut, type WorkingStep } from '@kerfyard/common/cutting';
import type { MoneyLineView } from '@kerfyard/common/payments';
import { totalWorking } from '../../lib/total-working.ts';

/** The invented scope of the first page; the visitor may change its trench and slab. */
export interface ExampleInput {
  trenchFt: number;
  slabIn: number;
}

export interface ExampleScope {
  cuts: Cut[];
  sawFt: number;
  inchFeet: number;
  coreHoles: number;
  pieces: number;
  heaviestLb: number | null;
  working: {
    sawFt: WorkingStep[];
    inchFeet: WorkingStep[];
    pieces: WorkingStep[];
    price: readonly WorkingStep[];
  };
  priceCents: number;
  money: MoneyLineView;
}

const PIECE_LIMIT_LB = 1000;
// Rates of the invented crew, in hundredths of a cent: $2.90 an inch-foot, $8.50 a core-inch.
const SAW_RATE = 29_000;
const CORE_RATE = 85_000;

/** Takes the example off and prices it by an invented crew's rate card; pure, so it may run on every keystroke. */
export function exampleScope({ trenchFt, slabIn }: ExampleInput): ExampleScope {
  const removal = { densityPcf: 150, allowancePct: 10, maxPieceLb: PIECE_LIMIT_LB };
  const cuts: Cut[] = [
    { kind: 'trench', lengthFt: trenchFt, widthFt: 2, thicknessIn: slabIn, endCuts: 2, count: 1, removal },
    {
      kind: 'opening',
      lengthFt: 7,
      widthFt: 4,
      thicknessIn: slabIn,
      corners: 'overcut',
      bladeDiameterIn: 24,
      passThroughIn: 0.5,
      count: 1,
      removal,
    },
    { kind: 'core', diameterIn: 8, depthIn: slabIn, count: 3 },
  ];
  const takeoff = takeoffCutList({ cuts });
  const { totals } = takeoff;
  const price = priceCuts({
    lines: [
      {
        id: 'saw',
        trip: 1,
        quantity: Math.round(totals.inchFeet * 100),
        unit: 'in-ft',
        rate: SAW_RATE,
        factors: [],
      },
      {
        id: 'core',
        trip: 1,
        quantity: Math.round(totals.coreInches * 100),
        unit: 'core-in',
        rate: CORE_RATE,
        factors: [],
      },
    ],
    extras: [],
    minimumCents: 120_000,
    mobilizationCents: 0,
  });
  return {
    cuts,
    sawFt: totals.sawFt,
    inchFeet: totals.inchFeet,
    coreHoles: totals.coreHoles,
    pieces: totals.pieces,
    heaviestLb: totals.heaviestPieceLb,
    working: {
      sawFt: totalWorking(takeoff, 'sawFt', { label: 'All cuts', unit: 'ft' }),
      inchFeet: totalWorking(takeoff, 'inchFeet', { label: 'All cuts', unit: 'in-ft' }),
      pieces: takeoff.cuts.flatMap((cut) =>
        cut.working.filter((step) => /piece|cross cut/i.test(step.label)),
      ),
      price: price.working,
    },
    priceCents: price.totalCents,
    money: moneyOf(price.totalCents),
  };
}

/** Half way through: all set aside, the trench released, a tenth of that kept back. */
function moneyOf(contractCents: number): MoneyLineView {
  const released = Math.floor(contractCents * 0.45);
  const retainage = Math.floor(released * 0.1);
  return {
    contractCents,
    setAsideCents: Math.floor(contractCents * 0.8),
    releasedCents: released - retainage,
    retainageCents: retainage,
    objectedCents: 0,
  };
}
