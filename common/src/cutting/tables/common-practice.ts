import type { Provenance, SourcedTable } from './provenance.ts';

export const commonPracticeSource: Provenance = {
  document: 'Common practice of cutting crews, no source',
  certainty: 'common practice',
};

export const productionMethods = [
  'flat_saw',
  'flat_saw_electric',
  'wall_saw',
  'hand_saw',
  'ring_saw',
  'chain_saw',
  'wire_saw',
  'joint_saw',
] as const;
export type ProductionMethod = (typeof productionMethods)[number];

/** Work done in an hour on site, normal moves included, travel not. */
export interface ProductionRate {
  readonly unit: 'in-ft' | 'sq ft' | 'ft';
  readonly lowPerHour: number;
  readonly highPerHour: number;
}

export const productionRates: SourcedTable<Readonly<Record<ProductionMethod, ProductionRate>>> = {
  source: commonPracticeSource,
  rows: {
    flat_saw: { unit: 'in-ft', lowPerHour: 300, highPerHour: 600 },
    flat_saw_electric: { unit: 'in-ft', lowPerHour: 150, highPerHour: 400 },
    wall_saw: { unit: 'in-ft', lowPerHour: 60, highPerHour: 200 },
    hand_saw: { unit: 'in-ft', lowPerHour: 30, highPerHour: 80 },
    ring_saw: { unit: 'in-ft', lowPerHour: 30, highPerHour: 60 },
    chain_saw: { unit: 'in-ft', lowPerHour: 20, highPerHour: 50 },
    wire_saw: { unit: 'sq ft', lowPerHour: 8, highPerHour: 25 },
    joint_saw: { unit: 'ft', lowPerHour: 150, highPerHour: 400 },
  },
};

/** Feed of a core rig up to a bit diameter; larger bits have no common figure here. */
export interface CoringRate {
  readonly upToDiameterIn: number;
  readonly inchesPerMinute: number;
}

export const coringRates: SourcedTable<readonly CoringRate[]> = {
  source: commonPracticeSource,
  rows: [
    { upToDiameterIn: 3, inchesPerMinute: 1 },
    { upToDiameterIn: 6, inchesPerMinute: 0.8 },
    { upToDiameterIn: 12, inchesPerMinute: 0.5 },
  ],
};

/** Setting up for each core, minutes. */
export const coreSetUpMinutes: SourcedTable<{ readonly low: number; readonly high: number }> = {
  source: commonPracticeSource,
  rows: { low: 5, high: 15 },
};

/** Water to the cut, gallons per minute. */
export const waterGallonsPerMinute: SourcedTable<
  Readonly<Record<'flat' | 'wall' | 'hand' | 'core', number>>
> = {
  source: commonPracticeSource,
  rows: { flat: 3, wall: 2, hand: 0.3, core: 1 },
};

export const commonKerfIn: SourcedTable<number> = { source: commonPracticeSource, rows: 0.2 };

export const standbyFreeMinutes: SourcedTable<number> = { source: commonPracticeSource, rows: 30 };

/** Price factors in percent. */
export const commonFactorsPct: SourcedTable<
  Readonly<Record<'heavy_bar' | 'overhead' | 'finished_space' | 'night', number>>
> = {
  source: commonPracticeSource,
  rows: { heavy_bar: 150, overhead: 175, finished_space: 140, night: 130 },
};

/** The usual limit of rim speed for a masonry wheel held by hand, surface feet per minute. */
export const usualRimSpeedLimitSfm: SourcedTable<number> = { source: commonPracticeSource, rows: 16_000 };

/** What one large cordless pack does: scored inch-feet, blocks halved, or 5/8-in bars cut. */
export const workPerBatteryPack: SourcedTable<Readonly<Record<'inchFeet' | 'blocks' | 'bars', number>>> = {
  source: commonPracticeSource,
  rows: { inchFeet: 25, blocks: 30, bars: 80 },
};
