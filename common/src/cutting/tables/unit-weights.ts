import type { Provenance } from './provenance.ts';

/** Unit weight of a material in pounds per cubic foot. */
export interface UnitWeight {
  readonly material: 'reinforced_concrete' | 'plain_concrete' | 'brick_hard' | 'asphalt' | 'steel';
  readonly pcf: number;
  readonly source: Provenance;
}

export const unitWeights: readonly UnitWeight[] = [
  {
    material: 'reinforced_concrete',
    pcf: 150,
    source: {
      document: 'Rescue and rigging manuals',
      section: 'Weights of materials: concrete, stone, reinforced',
      certainty: 'published',
    },
  },
  {
    material: 'plain_concrete',
    pcf: 144,
    source: { document: 'ASCE 7', section: 'Table C3-2', certainty: 'from memory' },
  },
  {
    material: 'brick_hard',
    pcf: 130,
    source: { document: 'ASCE 7', section: 'Table C3-2', certainty: 'from memory' },
  },
  {
    material: 'asphalt',
    pcf: 145,
    source: { document: 'Paving estimating handbooks', certainty: 'from memory' },
  },
  {
    material: 'steel',
    pcf: 490,
    source: { document: 'Rescue rigging manuals', certainty: 'from memory' },
  },
];

/**
 * Concrete masonry is weighed by the wall, in pounds per square foot: the units are hollow, and 125 pcf is the
 * block's material only.
 */
export interface MasonryWallWeight {
  readonly wall: 'cmu_8in_hollow' | 'cmu_8in_grouted';
  readonly psf: number;
  readonly source: Provenance;
}

const masonrySource: Provenance = {
  document: 'ASCE 7',
  section: 'Table C3-1, 125 pcf units',
  certainty: 'from memory',
};

export const masonryWallWeights: readonly MasonryWallWeight[] = [
  { wall: 'cmu_8in_hollow', psf: 36, source: masonrySource },
  { wall: 'cmu_8in_grouted', psf: 82, source: masonrySource },
];

/** Used wherever no other density is given. */
export const reinforcedConcretePcf = 150;

export const reinforcedConcreteSource: Provenance = {
  document: 'Rescue and rigging manuals',
  section: 'Weights of materials: concrete, stone, reinforced, 150 lb per cu ft',
  certainty: 'published',
};
