import type { Provenance, SourcedTable } from './provenance.ts';

/** Hours a day allowed at a level, slow response. */
export interface AllowedNoise {
  readonly dba: number;
  readonly hours: number;
}

export const constructionNoise: SourcedTable<readonly AllowedNoise[]> = {
  source: { document: '29 CFR 1926.52', section: 'Table D-2', certainty: 'published' },
  rows: [
    { dba: 90, hours: 8 },
    { dba: 92, hours: 6 },
    { dba: 95, hours: 4 },
    { dba: 97, hours: 3 },
    { dba: 100, hours: 2 },
    { dba: 102, hours: 1.5 },
    { dba: 105, hours: 1 },
    { dba: 110, hours: 0.5 },
    { dba: 115, hours: 0.25 },
  ],
};

/** T = 8 / 2^((L − criterion) / exchange); levels under the threshold do not count. */
export interface NoiseDoseRule {
  readonly criterionDba: number;
  readonly exchangeDb: number;
  readonly thresholdDba: number;
  /** TWA = slope · log10(D / 100) + criterion. */
  readonly twaSlope: number;
  readonly source: Provenance;
}

export const generalIndustryNoise: NoiseDoseRule = {
  criterionDba: 90,
  exchangeDb: 5,
  thresholdDba: 80,
  twaSlope: 16.61,
  source: { document: '29 CFR 1910.95', section: 'Appendix A', certainty: 'published' },
};

/** The publication states no threshold in its formula; every level counts. */
export const nioshNoise: NoiseDoseRule = {
  criterionDba: 85,
  exchangeDb: 3,
  thresholdDba: 0,
  twaSlope: 10,
  source: {
    document: 'NIOSH Publication 98-126',
    section: 'Recommended exposure limit',
    edition: '1998',
    certainty: 'published',
  },
};
