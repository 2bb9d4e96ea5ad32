import type { SourcedTable } from './provenance.ts';

export const soilTypes = ['rock', 'A', 'B', 'C', 'unclassified'] as const;
export type SoilType = (typeof soilTypes)[number];

export interface ExcavationLimits {
  readonly ladderDepthFt: number;
  readonly ladderTravelFt: number;
  readonly protectiveSystemDepthFt: number;
  readonly engineerDepthFt: number;
  readonly spoilSetbackFt: number;
}

export const excavationLimits: SourcedTable<ExcavationLimits> = {
  source: {
    document: '29 CFR 1926',
    section: '651(c)(2), 651(j)(2), 652(a)(1), Appendix B',
    certainty: 'published',
  },
  rows: {
    ladderDepthFt: 4,
    ladderTravelFt: 25,
    protectiveSystemDepthFt: 5,
    engineerDepthFt: 20,
    spoilSetbackFt: 2,
  },
};

/** Flattest run needed per foot of rise, excavations to 20 ft; rock stands upright. */
export const slopeRunPerRise: SourcedTable<Readonly<Record<SoilType, number>>> = {
  source: { document: '29 CFR 1926 Subpart P', section: 'Appendix B, Table B-1', certainty: 'published' },
  rows: { rock: 0, A: 0.75, B: 1, C: 1.5, unclassified: 1.5 },
};

export const disturbedSoilNote =
  'Soil under a slab or in an old trench is previously disturbed: never type A.';
