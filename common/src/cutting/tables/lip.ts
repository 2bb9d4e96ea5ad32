import type { SourcedTable } from './provenance.ts';

export interface LipRules {
  /** A vertical change up to this needs nothing. */
  readonly verticalIn: number;
  /** Up to this a bevel is enough. */
  readonly bevelIn: number;
  readonly bevelRunPerRise: number;
  /** The steepest ramp on new work. */
  readonly rampRunPerRise: number;
}

export const lipRules: SourcedTable<LipRules> = {
  source: {
    document: 'ADA Standards for Accessible Design',
    section: '303.2 to 303.4 and 405.2',
    edition: '2010',
    certainty: 'published',
  },
  rows: { verticalIn: 0.25, bevelIn: 0.5, bevelRunPerRise: 2, rampRunPerRise: 12 },
};
