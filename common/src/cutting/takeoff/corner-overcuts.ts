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

const unknownOvercut: CornerOvercut = { overcutIn: undefined, cautions: [noBladeCaution], working: [] };

/** Overcut of a slab or wall by the blade named; a pass-through left out is 0, the longest overcut. */
export function cornerOvercut(cut: {
  readonly thicknessIn: number;
  readonly bladeDiameterIn?: number | undefined;
  readonly passThroughIn?: number | undefined;
}): CornerOvercut {
  const { thicknessIn, bladeDiameterIn } = cut;
  if (bladeDiameterIn === undefined) return unknownOvercut;
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

/** Overcut inches at each of `ends` cut ends, `count` times. */
export interface CutEnds {
  readonly overcutIn: number;
  readonly ends: number;
  readonly count: number;
}

/** Overcut of all cut ends and pieces of the count together, in feet; sizes in inches. */
export function overcutFeet({ overcutIn, ends, count }: CutEnds): number {
  return (overcutIn * ends * count) / 12;
}

/** The same with its working, for a person to check. */
export function overcutFeetStep(cutEnds: CutEnds): WorkingStep {
  return {
    label: 'Overcuts',
    formula: 'overcut × cut ends × count ÷ 12',
    inputs: [
      put('overcut', cutEnds.overcutIn, 'in'),
      put('cut ends', cutEnds.ends, ''),
      put('count', cutEnds.count, ''),
    ],
    value: overcutFeet(cutEnds),
    unit: 'ft',
    source: arithmetic,
  };
}
