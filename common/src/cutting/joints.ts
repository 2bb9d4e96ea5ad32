import { checkList, checkNumber, checkNumberOr, checkObject } from './check.ts';
import { CuttingInputError } from './input-error.ts';
import { leastSawingJoints, maxPanelsAlongSide, type JointGrid } from './joint-search.ts';
import { capFtRange, jointThicknessInRange, lengthFtRange, spacingFactorRange } from './limits.ts';
import { wholeUp } from './rounding.ts';
import { jointRules } from './tables/joints.ts';
import { sourceOf } from './tables/provenance.ts';
import { arithmetic, put, type WorkingStep } from './working.ts';

export interface JointPlanInput {
  readonly lengthFt: number;
  readonly widthFt: number;
  readonly thicknessIn: number;
  /** Spacing in thicknesses, 24 to 36. */
  readonly spacingFactor?: number | undefined;
  /** Applied after the factor. */
  readonly capFt?: number | undefined;
  readonly maxAspect?: number | undefined;
  /** Bay lengths between column lines; together they must make up the side. */
  readonly baysAlongLengthFt?: readonly number[] | undefined;
  readonly baysAlongWidthFt?: readonly number[] | undefined;
}

export interface JointPlan {
  readonly maxSpacingFt: number;
  readonly panelsAlongLength: number;
  readonly panelsAlongWidth: number;
  /** Of the largest panel where bays differ. */
  readonly panelLengthFt: number;
  readonly panelWidthFt: number;
  /** Longer over shorter side of the worst panel. */
  readonly aspect: number;
  readonly sawFt: number;
  readonly depthIn: number;
  /** Null where the slab is too thick for early entry. */
  readonly earlyEntryDepthIn: number | null;
  /** Feet from the start of each side to every interior joint. */
  readonly jointsAlongLengthFt: readonly number[];
  readonly jointsAlongWidthFt: readonly number[];
  readonly working: readonly WorkingStep[];
}

interface CheckedJoints {
  readonly lengthFt: number;
  readonly widthFt: number;
  readonly thicknessIn: number;
  readonly spacingFactor: number;
  readonly capFt: number;
  readonly maxAspect: number;
  readonly baysAlongLengthFt: readonly number[];
  readonly baysAlongWidthFt: readonly number[];
}

const maxBays = 200;
// Bay lengths are read off a plan to the sixteenth of an inch at best.
const bayToleranceFt = 0.01;

/**
 * Contraction joints with the least interior saw feet whose panels obey spacing and aspect; exact. With bays a
 * joint falls on every bay line and each bay divides evenly.
 * @throws CuttingInputError also when the bays do not add up to the side, or no grid obeys the aspect
 */
export function jointPlan(input: JointPlanInput): JointPlan {
  const joints = checkJoints(checkObject(input, 'input'));
  const maxSpacingFt = Math.min((joints.spacingFactor * joints.thicknessIn) / 12, joints.capFt);
  const grid = searchGrid(joints, maxSpacingFt);
  const { depthIn, earlyEntryDepthIn } = jointDepths(joints.thicknessIn);
  const plan = {
    maxSpacingFt,
    panelsAlongLength: total(grid.panelsPerBayAlongLength),
    panelsAlongWidth: total(grid.panelsPerBayAlongWidth),
    panelLengthFt: largestPanel(joints.baysAlongLengthFt, grid.panelsPerBayAlongLength),
    panelWidthFt: largestPanel(joints.baysAlongWidthFt, grid.panelsPerBayAlongWidth),
    aspect: grid.aspect,
    sawFt: grid.sawFt,
    depthIn,
    earlyEntryDepthIn,
    jointsAlongLengthFt: jointOffsets(joints.baysAlongLengthFt, grid.panelsPerBayAlongLength),
    jointsAlongWidthFt: jointOffsets(joints.baysAlongWidthFt, grid.panelsPerBayAlongWidth),
  };
  return { ...plan, working: jointWorking(plan, joints) };
}

/** Depth of a conventional joint, t/4 and at least 1 in, and of an early-entry one. */
export function jointDepths(thicknessIn: number): { depthIn: number; earlyEntryDepthIn: number | null } {
  const { depthFraction, minDepthIn, earlyEntry } = jointRules;
  return {
    depthIn: Math.max(thicknessIn * depthFraction.value, minDepthIn.value),
    earlyEntryDepthIn: thicknessIn <= earlyEntry.maxThicknessIn ? earlyEntry.depthIn : null,
  };
}

/**
 * Saws that finish inside the window: ⌈sawFt ÷ (feetPerHour × windowHours)⌉.
 * @throws CuttingInputError
 */
export function sawsForWindow(input: {
  readonly sawFt: number;
  readonly feetPerHour: number;
  readonly windowHours: number;
}): number {
  const fields = checkObject(input, 'input');
  const sawFt = checkNumber(fields.sawFt, 'sawFt', { min: 0, max: 10_000_000, unit: 'ft' });
  const feetPerHour = checkNumber(fields.feetPerHour, 'feetPerHour', { above: 0, max: 10_000, unit: 'ft/h' });
  const windowHours = checkNumber(fields.windowHours, 'windowHours', { above: 0, max: 168, unit: 'h' });
  return wholeUp(sawFt / (feetPerHour * windowHours));
}

function checkJoints(fields: Readonly<Record<string, unknown>>): CheckedJoints {
  const lengthFt = checkNumber(fields.lengthFt, 'lengthFt', lengthFtRange);
  const widthFt = checkNumber(fields.widthFt, 'widthFt', lengthFtRange);
  return {
    lengthFt,
    widthFt,
    thicknessIn: checkNumber(fields.thicknessIn, 'thicknessIn', jointThicknessInRange),
    spacingFactor: checkNumberOr(fields.spacingFactor, 'spacingFactor', spacingFactorRange, 30),
    capFt: checkNumberOr(fields.capFt, 'capFt', capFtRange, jointRules.capFtCip6.value),
    maxAspect: checkNumberOr(
      fields.maxAspect,
      'maxAspect',
      { min: 1, max: 10, unit: 'to 1' },
      jointRules.maxAspect.value,
    ),
    baysAlongLengthFt: checkBays(fields.baysAlongLengthFt, 'baysAlongLengthFt', lengthFt),
    baysAlongWidthFt: checkBays(fields.baysAlongWidthFt, 'baysAlongWidthFt', widthFt),
  };
}

function checkBays(value: unknown, field: string, sideFt: number): readonly number[] {
  if (value === undefined) return [sideFt];
  const bays = checkList(value, field, maxBays).map((bay, index) =>
    checkNumber(bay, `${field}[${index}]`, lengthFtRange),
  );
  if (Math.abs(total(bays) - sideFt) > bayToleranceFt) {
    throw new CuttingInputError({ field, allowed: `bays that add up to ${sideFt} ft`, given: total(bays) });
  }
  return bays;
}

function searchGrid(joints: CheckedJoints, maxSpacingFt: number): JointGrid {
  const grid = leastSawingJoints({ ...joints, maxSpacingFt });
  if (grid !== undefined) return grid;
  const longestFt = Math.max(joints.lengthFt, joints.widthFt);
  const tooMany = longestFt / maxSpacingFt > maxPanelsAlongSide;
  throw new CuttingInputError({
    field: tooMany ? 'capFt' : 'maxAspect',
    allowed: `wide enough that at most ${maxPanelsAlongSide.toLocaleString('en-US')} panels a side obey it`,
    given: tooMany ? joints.capFt : joints.maxAspect,
  });
}

function largestPanel(baysFt: readonly number[], panelsPerBay: readonly number[]): number {
  return baysFt.reduce((largest, bayFt, bay) => Math.max(largest, bayFt / (panelsPerBay[bay] ?? 1)), 0);
}

function jointOffsets(baysFt: readonly number[], panelsPerBay: readonly number[]): readonly number[] {
  const offsets: number[] = [];
  let startFt = 0;
  for (const [bay, bayFt] of baysFt.entries()) {
    const panels = panelsPerBay[bay] ?? 1;
    for (let panel = 1; panel <= panels; panel += 1) offsets.push(startFt + (bayFt * panel) / panels);
    startFt += bayFt;
  }
  // The last offset is the edge of the slab, not a joint.
  return offsets.slice(0, -1);
}

function total(numbers: readonly number[]): number {
  return numbers.reduce((sum, number) => sum + number, 0);
}

function jointWorking(plan: Omit<JointPlan, 'working'>, joints: CheckedJoints): readonly WorkingStep[] {
  return [
    {
      label: 'Widest spacing',
      formula: 'min(factor × thickness ÷ 12, cap)',
      inputs: [
        put('factor', joints.spacingFactor, 'thicknesses'),
        put('thickness', joints.thicknessIn, 'in'),
        put('cap', joints.capFt, 'ft'),
      ],
      value: plan.maxSpacingFt,
      unit: 'ft',
      source: sourceOf(jointRules.spacingFactor.source),
    },
    {
      label: 'Interior joints',
      formula:
        '(panels along length − 1) × W + (panels along width − 1) × L, the least that obeys spacing and aspect',
      inputs: [
        put('panels along length', plan.panelsAlongLength, ''),
        put('panels along width', plan.panelsAlongWidth, ''),
        put('W', joints.widthFt, 'ft'),
        put('L', joints.lengthFt, 'ft'),
        put('aspect limit', joints.maxAspect, 'to 1'),
      ],
      value: plan.sawFt,
      unit: 'ft',
      source: arithmetic,
    },
    {
      label: 'Joint depth',
      formula: 'max(thickness ÷ 4, 1 in)',
      inputs: [put('thickness', joints.thicknessIn, 'in')],
      value: plan.depthIn,
      unit: 'in',
      source: sourceOf(jointRules.depthFraction.source),
    },
  ];
}
