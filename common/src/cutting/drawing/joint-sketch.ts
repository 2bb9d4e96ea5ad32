import { jointPlan, type JointPlanInput } from '../joints.ts';
import { inWords } from './cut-words.ts';
import { lineOf, type Box, type SketchLine } from './geometry.ts';

/** A slab with its joints in feet, from its own corner: here positions are the plan's own. */
export interface JointSketch {
  readonly box: Box;
  readonly outline: readonly SketchLine[];
  readonly joints: readonly SketchLine[];
  readonly text: readonly string[];
}

/**
 * The plan of `jointPlan`, drawn: the slab's edges and every joint where it falls.
 * @throws CuttingInputError as `jointPlan` does
 */
export function jointSketch(input: JointPlanInput): JointSketch {
  const plan = jointPlan(input);
  const { lengthFt, widthFt } = input;
  return {
    box: { x: 0, y: 0, width: lengthFt, height: widthFt },
    outline: [
      lineOf('edge', [0, 0], [lengthFt, 0]),
      lineOf('edge', [lengthFt, 0], [lengthFt, widthFt]),
      lineOf('edge', [lengthFt, widthFt], [0, widthFt]),
      lineOf('edge', [0, widthFt], [0, 0]),
    ],
    joints: [
      ...plan.jointsAlongLengthFt.map((x) => lineOf('joint', [x, 0], [x, widthFt])),
      ...plan.jointsAlongWidthFt.map((y) => lineOf('joint', [0, y], [lengthFt, y])),
    ],
    text: [
      `Slab ${inWords(lengthFt)} × ${inWords(widthFt)} ft in ${inWords(plan.panelsAlongLength)} × ${inWords(plan.panelsAlongWidth)} panels, the largest ${inWords(plan.panelLengthFt)} × ${inWords(plan.panelWidthFt)} ft.`,
      `${inWords(plan.sawFt)} ft of joints, ${inWords(plan.depthIn)} in deep.`,
    ],
  };
}
