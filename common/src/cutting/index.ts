export { CuttingInputError } from './input-error.ts';
export { describeRange, type NumberRange } from './check.ts';
export * from './types.ts';
export * from './limits.ts';
export type { Certainty, NumberOrigin, WorkingInput, WorkingSource, WorkingStep } from './working.ts';
export { inchFeet } from './inch-feet.ts';
export { takeoffCut } from './takeoff/takeoff-cut.ts';
export { takeoffCutList } from './takeoff/takeoff-cut-list.ts';
export { piecePlan, type PiecePlan, type PiecePlanInput } from './pieces.ts';
export {
  cornerCoreDiameterIn,
  corePlacements,
  overcutIn,
  type CorePlacement,
  type OvercutInput,
} from './overcut.ts';
export { coreWeightLb, slabWeightLb, type CoreWeightInput, type SlabWeightInput } from './weights.ts';
export { passPlan, type PassPlan, type PassPlanInput } from './passes.ts';
export { stitchHoles, stitchPitchToleranceIn, type StitchHoles, type StitchInput } from './stitch.ts';
export {
  bladeReachIn,
  rpmForSurfaceSpeed,
  surfaceSpeedSfm,
  type BladeReachInput,
  type CompanyReach,
} from './blades.ts';
export { jointPlan, sawsForWindow, type JointPlan, type JointPlanInput } from './joints.ts';
export { lipTreatment, type LipTreatment, type LipTreatmentKind } from './lip.ts';
export * from './pricing.ts';
export * from './tables/index.ts';
