import type { CutKind } from '../scopes/cut.schema.ts';
import type { BidUnit } from './bid.schema.ts';

/**
 * What each kind of cut is sold by, the usual unit first (common practice, no source). `each` is one of the cut's
 * count: a hole, an opening, a block, a bar.
 */
export const bidUnitsOfKind: Readonly<Record<CutKind, readonly [BidUnit, ...BidUnit[]]>> = {
  line: ['in_ft', 'lf', 'each', 'lump'],
  trench: ['in_ft', 'lf', 'each', 'lump'],
  opening: ['in_ft', 'lf', 'each', 'lump'],
  core: ['each', 'core_in', 'lump'],
  stitch: ['core_in', 'each', 'lump'],
  joints: ['lf', 'in_ft', 'each', 'lump'],
  wire: ['sq_ft', 'each', 'lump'],
  curb: ['lf', 'in_ft', 'each', 'lump'],
  chase: ['lf', 'in_ft', 'each', 'lump'],
  block: ['each', 'in_ft', 'lump'],
  pipe: ['each', 'lump'],
  bar: ['each', 'lump'],
  lip: ['lf', 'in_ft', 'each', 'lump'],
};

/** The unit a cut is usually sold by. */
export function usualUnit(kind: CutKind): BidUnit {
  return bidUnitsOfKind[kind][0];
}
