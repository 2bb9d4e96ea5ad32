import { overcutOf, overcutStep } from '../overcut.ts';
import { bladeMounts, bladeReach } from '../tables/blade-reach.ts';
import { arithmetic, put, type WorkingStep } from '../working.ts';

/** The run-past at one cut end, or undefined where no blade is named. */
export interface CornerOvercut {
  readonly overcutIn: number | undefined;
  readonly cautions: readonly string[];
  readonly working: readonly WorkingStep[];
}

export const noBladeCaution = 'Overcuts are not counted: no blade is named.';
export const overReachCaution = 'The cut is deeper than this blade commonly reaches; check the saw at hand.';
export const brokenWebCaution =
  'Cross cuts that stop at the side line are not full depth near their ends: the webs are broken, or the cut overruns.';
export const shortCrossCutCaution =
  'The trench is narrower than two overcuts: a cross cut that stops at the side lines nowhere cuts full depth.';

const deepestReachByDiameter = new Map<number, number>();
for (const { diameterIn, reachIn } of bladeMounts.flatMap((mount) => bladeReach.rows[mount])) {
  deepestReachByDiameter.set(diameterIn, Math.max(reachIn, deepestReachByDiameter.get(diameterIn) ?? 0));
}

/** Overcut of a slab or wall by the blade named; a pass-through left out is 0, the longest overcut. */
export function cornerOvercut(cut: {
  readonly thicknessIn: number;
  readonly bladeDiameterIn?: number | undefined;
  readonly passThroughIn?: number | undefined;
}): CornerOvercut {
  const { thicknessIn, bladeDiameterIn } = cut;
  if (bladeDiameterIn === undefined) return { overcutIn: undefined, cautions: [noBladeCaution], working: [] };
  const passThroughIn = cut.passThroughIn ?? 0;
  const overcutIn = overcutOf({ bladeDiameterIn, thicknessIn, passThroughIn });
  const reachIn = deepestReachByDiameter.get(bladeDiameterIn);
  const isPastReach = reachIn !== undefined && thicknessIn + passThroughIn > reachIn;
  return {
    overcutIn,
    cautions: isPastReach ? [overReachCaution] : [],
    working: [overcutStep({ bladeDiameterIn, thicknessIn, passThroughIn })],
  };
}

/** Overcut feet of `ends` cut ends, times `count`, with its step. */
export function overcutFeet({ overcutIn, ends, count }: { overcutIn: number; ends: number; count: number }): {
  readonly overcutFt: number;
  readonly step: WorkingStep;
} {
  const overcutFt = (overcutIn * ends * count) / 12;
  return {
    overcutFt,
    step: {
      label: 'Overcuts',
      formula: 'overcut × cut ends × count ÷ 12',
      inputs: [put('overcut', overcutIn, 'in'), put('cut ends', ends, ''), put('count', count, '')],
      value: overcutFt,
      unit: 'ft',
      source: arithmetic,
    },
  };
}
