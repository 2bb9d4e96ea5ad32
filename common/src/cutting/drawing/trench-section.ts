import { trenchPlan, type TrenchPlanInput } from '../trench.ts';
import { inWords } from './cut-words.ts';
import type { Box, Point } from './geometry.ts';

/** A height measured in the section, from one depth to another. */
export interface SectionDimension {
  readonly name: 'slab' | 'cover' | 'dig';
  readonly fromIn: number;
  readonly toIn: number;
}

/** A trench across its run, inches; depth runs down from the finished surface. */
export interface TrenchSection {
  /** Slab that stays, left and right of the trench. */
  readonly slabs: readonly [Box, Box];
  readonly trench: Box;
  /** Null where the conduit lies on the ground. */
  readonly bedding: Box | null;
  readonly conduit: { readonly centre: Point; readonly radiusIn: number };
  readonly dimensions: readonly SectionDimension[];
  readonly box: Box;
  readonly text: readonly string[];
}

/**
 * The trench of `trenchPlan`, cut across: slab, bedding, conduit, and the heights that make its depth.
 * @throws CuttingInputError as `trenchPlan` does
 */
export function trenchSection(input: TrenchPlanInput): TrenchSection {
  const plan = trenchPlan(input);
  const { slabThicknessIn, widthIn, beddingIn } = input;
  const sideIn = Math.max(12, widthIn / 2);
  const slab = (x: number): Box => ({ x, y: 0, width: sideIn, height: slabThicknessIn });
  const conduitTopIn = plan.digDepthIn - beddingIn - plan.conduitIn;
  const coverFromIn = input.coverFrom === 'underside_of_slab' ? slabThicknessIn : 0;
  return {
    slabs: [slab(0), slab(sideIn + widthIn)],
    trench: { x: sideIn, y: 0, width: widthIn, height: plan.digDepthIn },
    bedding:
      beddingIn === 0
        ? null
        : { x: sideIn, y: plan.digDepthIn - beddingIn, width: widthIn, height: beddingIn },
    conduit: {
      centre: { x: sideIn + widthIn / 2, y: conduitTopIn + plan.conduitIn / 2 },
      radiusIn: plan.conduitIn / 2,
    },
    dimensions: [
      { name: 'slab', fromIn: 0, toIn: slabThicknessIn },
      { name: 'cover', fromIn: coverFromIn, toIn: conduitTopIn },
      { name: 'dig', fromIn: 0, toIn: plan.digDepthIn },
    ],
    box: { x: 0, y: 0, width: widthIn + 2 * sideIn, height: plan.digDepthIn * 1.1 },
    text: [
      `Trench ${inWords(widthIn)} in wide through a slab of ${inWords(slabThicknessIn)} in, dug ${inWords(plan.digDepthIn)} in deep from the finished surface.`,
      `Conduit ${inWords(plan.conduitIn)} in outside diameter under ${inWords(conduitTopIn - coverFromIn)} in of cover from the ${coverFromIn === 0 ? 'finished surface' : 'underside of the slab'}, at least ${inWords(plan.coverIn)} in required${beddingIn === 0 ? '' : `, on ${inWords(beddingIn)} in of bedding`}.`,
      ...plan.cautions,
    ],
  };
}
