import { commonFactorsPct, priceCuts, type PricedCuts } from '@kerfyard/common/cutting';
import { formatMoney } from '../../../lib/format.ts';
import {
  choiceField,
  defineCalculator,
  numberField,
  rowsField,
  setField,
  switchField,
  type ResultBlock,
} from '../calculator.ts';
import { renamed } from '../evaluate.ts';

const priceUnits = ['lf', 'inch_feet', 'core_inches', 'holes', 'square_feet', 'hours', 'each'] as const;
const unitSigns: Record<(typeof priceUnits)[number], string> = {
  lf: 'LF',
  inch_feet: 'in-ft',
  core_inches: 'core-in',
  holes: 'hole',
  square_feet: 'sq ft',
  hours: 'h',
  each: 'each',
};
const factorNames = ['heavy_bar', 'overhead', 'finished_space', 'night'] as const;
const dollarsRange = { min: 0, max: 1_000_000, unit: 'dollars' } as const;
const quantityRange = { min: 0, max: 10_000_000, unit: '' } as const;
const tripRange = { min: 1, max: 99, integer: true, unit: '' } as const;

/**
 * Quantity × rate × factors, the minimum against the sum. Starts with common practice: about $10 a foot and a $200
 * minimum make 12 ft $200.
 */
export default defineCalculator({
  name: 'price',
  fields: {
    lines: rowsField(
      {
        quantity: numberField('', 1, quantityRange),
        unit: choiceField(priceUnits, 'lf'),
        rate: numberField('$', 1, dollarsRange),
        trip: numberField('', 1, tripRange),
      },
      [[12, 'lf', 10, 1]],
    ),
    factors: setField(factorNames),
    minimum: numberField('$', 200, dollarsRange),
    mobilization: numberField('$', 0, dollarsRange),
    minimumIncludesMobilization: switchField(true),
    factorCapPct: numberField('%', 250),
  },
  sections: [
    { name: 'lines', fields: ['lines'] },
    { name: 'factors', fields: ['factors', 'factorCapPct'] },
    { name: 'trip', fields: ['minimum', 'mobilization', 'minimumIncludesMobilization'] },
  ],
  cautions: ['price_not_offer'],
  compute: (values) => {
    const factors = values.factors.map((name) => commonFactorsPct.rows[name]);
    const priced = renamed({ minimumCents: 'minimum', mobilizationCents: 'mobilization' }, () =>
      priceCuts({
        lines: values.lines.map((line, index) => ({
          id: index + 1,
          trip: line.trip,
          quantity: scaled(line.quantity, 100),
          unit: unitSigns[line.unit],
          rate: scaled(line.rate, 10_000),
          factors,
        })),
        extras: [],
        minimumCents: scaled(values.minimum, 100),
        mobilizationCents: scaled(values.mobilization, 100),
        minimumIncludesMobilization: values.minimumIncludesMobilization,
        factorCapPct: values.factorCapPct,
      }),
    );
    return {
      blocks: [
        {
          figures: [
            {
              name: 'total',
              value: formatMoney(priced.totalCents),
              unit: '',
              working: priced.working,
              isLead: true,
            },
            ...priced.lines.map((line) => ({
              name: 'line',
              value: formatMoney(line.cents),
              unit: '',
              working: priced.working.filter((step) => step.label === `Line ${line.id}`),
            })),
          ],
        },
        ...priced.trips.map((trip): ResultBlock => tripBlock(trip, priced)),
      ],
      cautions: [],
      warnings: priced.lines.some((line) => line.isFactorCapped) ? ['factor_cap'] : [],
    };
  },
});

/** Where a sum meets the minimum: both are shown, and which of them holds. */
function tripBlock(trip: PricedCuts['trips'][number], priced: PricedCuts): ResultBlock {
  const working = priced.working.filter((step) => step.label === `Trip ${trip.trip}`);
  return {
    name: 'trip',
    figures: [
      { name: 'computed', value: formatMoney(trip.computedCents), unit: '', working },
      { name: 'holds', value: { word: trip.minimumApplied ? 'price.minimum' : 'price.sum' }, unit: '' },
      { name: 'tripTotal', value: formatMoney(trip.cents), unit: '', working },
    ],
  };
}

/**
 * A typed number in the engine's whole units. What falls between two of them stays between, so that the engine
 * refuses it instead of this rounding a price.
 */
function scaled(value: number, unitsPerOne: number): number {
  const exact = value * unitsPerOne;
  const whole = Math.round(exact);
  return Math.abs(exact - whole) < 1e-6 ? whole : exact;
}
