export { CuttingInputError } from './input-error.ts';
export { checkNumber, describeRange, type NumberRange } from './check.ts';
export * from './types.ts';
export * from './limits.ts';
export type { Certainty, NumberOrigin, WorkingInput, WorkingSource, WorkingStep } from './working.ts';
export * from './tables/index.ts';

export { inchFeet } from './inch-feet.ts';
export { takeoffCut } from './takeoff/takeoff-cut.ts';
export { takeoffCutList } from './takeoff/takeoff-cut-list.ts';
export { firstPullCaution, piecePlan, type PiecePlan, type PiecePlanInput } from './pieces.ts';
export {
  cornerCoreDiameterIn,
  corePlacements,
  overcutIn,
  type CorePlacement,
  type OvercutInput,
} from './overcut.ts';
export * from './corner-choices.ts';
export { coreWeightLb, slabWeightLb, type CoreWeightInput, type SlabWeightInput } from './weights.ts';
export * from './passes.ts';
export { stitchHoles, stitchPitchToleranceIn, type StitchHoles, type StitchInput } from './stitch.ts';
export {
  bladeReachIn,
  bladeReachWithSource,
  rpmForSurfaceSpeed,
  surfaceSpeedSfm,
  type BladeReachInput,
  type CompanyReach,
  type KnownReach,
} from './blades.ts';
export * from './methods.ts';
export * from './production.ts';

export * from './exposure/silica.ts';
export * from './exposure/noise.ts';
export * from './exposure/vibration.ts';

export * from './slings.ts';
export * from './cover.ts';
export * from './excavation.ts';
export * from './trench.ts';
export { jointPlan, sawsForWindow, type JointPlan, type JointPlanInput } from './joints.ts';
export * from './haul.ts';
export { lipTreatment, type LipTreatment, type LipTreatmentKind } from './lip.ts';
export * from './power.ts';
export * from './dig-date.ts';
export * from './crew-hours.ts';
export * from './pricing.ts';
export * from './tabulation.ts';
export { explain } from './explain.ts';

export { cutSketch, sketchNote, type CutSketch, type SketchedCut } from './drawing/cut-sketch.ts';
export { describeCut, describeTakeoff } from './drawing/cut-words.ts';
export * from './drawing/depth-section.ts';
export * from './drawing/joint-sketch.ts';
export * from './drawing/trench-section.ts';
export type {
  Box,
  CircleRole,
  CutShape,
  LineRole,
  Point,
  SketchCircle,
  SketchLine,
} from './drawing/geometry.ts';
