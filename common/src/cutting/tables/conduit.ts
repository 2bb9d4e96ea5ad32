import type { SourcedTable } from './provenance.ts';

export const conduitKinds = ['pvc', 'rmc', 'emt'] as const;
export type ConduitKind = (typeof conduitKinds)[number];

export const tradeSizes = [
  '1/2',
  '3/4',
  '1',
  '1-1/4',
  '1-1/2',
  '2',
  '2-1/2',
  '3',
  '3-1/2',
  '4',
  '5',
  '6',
] as const;
export type TradeSize = (typeof tradeSizes)[number];

const pipeIn: Readonly<Record<TradeSize, number>> = {
  '1/2': 0.84,
  '3/4': 1.05,
  '1': 1.315,
  '1-1/4': 1.66,
  '1-1/2': 1.9,
  '2': 2.375,
  '2-1/2': 2.875,
  '3': 3.5,
  '3-1/2': 4,
  '4': 4.5,
  '5': 5.563,
  '6': 6.625,
};

/** EMT is thinner to 2 in, has pipe's diameter from there, and is not made over 4 in. */
const emtIn: Readonly<Partial<Record<TradeSize, number>>> = {
  '1/2': 0.706,
  '3/4': 0.922,
  '1': 1.163,
  '1-1/4': 1.51,
  '1-1/2': 1.74,
  '2': 2.197,
  '2-1/2': 2.875,
  '3': 3.5,
  '3-1/2': 4,
  '4': 4.5,
};

/** Outside diameters, inches, each kind with its own source. */
export const conduitOutsideDiameters: Readonly<
  Record<ConduitKind, SourcedTable<Readonly<Partial<Record<TradeSize, number>>>>>
> = {
  pvc: {
    source: { document: 'ASTM D1785', section: 'Outside diameters, iron pipe size', certainty: 'published' },
    rows: pipeIn,
  },
  rmc: {
    source: { document: 'Iron pipe size tables', section: 'Outside diameters', certainty: 'published' },
    rows: pipeIn,
  },
  emt: {
    source: { document: 'ANSI C80.3', section: 'Outside diameters', certainty: 'from memory' },
    rows: emtIn,
  },
};
