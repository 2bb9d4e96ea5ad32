import { checkNumber, checkNumberOr, checkObject } from './check.ts';
import { bladeDiameterInRange, countRange, passThroughInRange, thicknessInRange } from './limits.ts';
import { overcutOf, overcutStep } from './overcut.ts';
import { checkUncutSides, cutCorners } from './takeoff/opening.ts';
import type { CornerTreatment, OpeningSide } from './types.ts';
import { arithmetic, put, type WorkingStep } from './working.ts';

/** The extra quantities of one way to treat the corners of an opening, `count` included. */
export interface CornerChoice {
  readonly corners: CornerTreatment;
  readonly overcutFt: number;
  readonly coreHoles: number;
  readonly coreDiameterIn: number;
  readonly coreInches: number;
  /** Feet short of full depth that chain, hand saw or chipping must finish. */
  readonly squareFinishFt: number;
}

export interface CornerChoices {
  readonly overcutIn: number;
  /** Cut ends that meet at a corner, of one opening. */
  readonly cutEnds: number;
  readonly choices: readonly CornerChoice[];
  readonly working: readonly WorkingStep[];
}

/**
 * The three ways to treat the corners of an opening side by side: let the blade run past, core the corners
 * (tangent to both lines), or stop at the corner and finish square.
 * @throws CuttingInputError
 */
export function cornerChoices(input: {
  readonly thicknessIn: number;
  readonly bladeDiameterIn: number;
  readonly passThroughIn?: number | undefined;
  readonly uncutSides?: readonly OpeningSide[] | undefined;
  readonly count: number;
}): CornerChoices {
  const fields = checkObject(input, 'input');
  const thicknessIn = checkNumber(fields.thicknessIn, 'thicknessIn', thicknessInRange);
  const bladeDiameterIn = checkNumber(fields.bladeDiameterIn, 'bladeDiameterIn', bladeDiameterInRange);
  const passThroughIn = checkNumberOr(fields.passThroughIn, 'passThroughIn', passThroughInRange, 0);
  const count = checkNumber(fields.count, 'count', countRange);
  const corners = cutCorners(checkUncutSides(fields.uncutSides));
  const overcutIn = overcutOf({ bladeDiameterIn, thicknessIn, passThroughIn });
  const cutEnds = 2 * corners;
  const runPastFt = (cutEnds * overcutIn * count) / 12;
  const none = { overcutFt: 0, coreHoles: 0, coreDiameterIn: 0, coreInches: 0, squareFinishFt: 0 };
  const coreHoles = corners * count;
  return {
    overcutIn,
    cutEnds,
    choices: [
      { corners: 'overcut', ...none, overcutFt: runPastFt },
      {
        corners: 'cored',
        ...none,
        coreHoles,
        coreDiameterIn: coreHoles === 0 ? 0 : 2 * overcutIn,
        coreInches: coreHoles * thicknessIn,
      },
      { corners: 'square', ...none, squareFinishFt: runPastFt },
    ],
    working: [
      overcutStep({ bladeDiameterIn, thicknessIn, passThroughIn }),
      {
        label: 'Run past, or left to finish square',
        formula: 'overcut × cut ends × count ÷ 12',
        inputs: [put('overcut', overcutIn, 'in'), put('cut ends', cutEnds, ''), put('count', count, '')],
        value: runPastFt,
        unit: 'ft',
        source: arithmetic,
      },
    ],
  };
}
