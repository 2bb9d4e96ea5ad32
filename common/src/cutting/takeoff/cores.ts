import { checkStitch, layOutStitch, stitchWorking } from '../stitch.ts';
import type { CoreCut, CutTakeoff, StitchCut, WireCut } from '../types.ts';
import { arithmetic, put, type WorkingStep } from '../working.ts';
import { takeoffOf, weightStep } from './quantities.ts';
import { cylinderCuFt } from '../weights.ts';

/** Cores: core-inches are depth times count; what comes out is a cylinder each. */
export function takeoffCore(cut: CoreCut): CutTakeoff {
  const { diameterIn, depthIn, count } = cut;
  const coreInches = depthIn * count;
  const cuFt = cylinderCuFt(diameterIn, depthIn) * count;
  return takeoffOf(cut, {
    core: { diameterIn, holes: count, coreInches },
    removedCuFt: cuFt,
    working: [coreInchesStep({ holes: count, depthIn }), weightStep(cuFt, undefined)],
  });
}

/** A stitched line: its holes, and the concrete they take out, laps counted once. */
export function takeoffStitch(cut: StitchCut): CutTakeoff {
  const run = checkStitch(cut);
  const layout = layOutStitch(run);
  const { holes, pitchIn } = layout;
  const { bitDiameterIn, depthIn, count } = cut;
  const laps = run.closed ? holes : holes - 1;
  const lapSqIn = lapAreaSqIn(bitDiameterIn / 2, pitchIn);
  const holeSqIn = (Math.PI / 4) * bitDiameterIn * bitDiameterIn;
  const cuFt = ((holes * holeSqIn - laps * lapSqIn) * depthIn * count) / 1_728;
  const allHoles = holes * count;
  return takeoffOf(cut, {
    core: { diameterIn: bitDiameterIn, holes: allHoles, coreInches: allHoles * depthIn },
    removedCuFt: cuFt,
    working: [
      ...stitchWorking(run, layout),
      coreInchesStep({ holes: allHoles, depthIn }),
      weightStep(cuFt, undefined),
    ],
  });
}

/** A wire cut is sold by its face; pilot cores let the wire in. */
export function takeoffWire(cut: WireCut): CutTakeoff {
  const { areaSqFt, pilotCores, pilotDiameterIn, depthIn, count } = cut;
  const holes = pilotCores * count;
  const cuFt = cylinderCuFt(pilotDiameterIn, depthIn) * holes;
  const sawSqFt = areaSqFt * count;
  const faceStep: WorkingStep = {
    label: 'Cut face',
    formula: 'area × count',
    inputs: [put('area', areaSqFt, 'sq ft'), put('count', count, '')],
    value: sawSqFt,
    unit: 'sq ft',
    source: arithmetic,
  };
  const pilots = { diameterIn: pilotDiameterIn, holes, coreInches: holes * depthIn };
  return takeoffOf(cut, {
    sawSqFt,
    core: holes === 0 ? undefined : pilots,
    removedCuFt: cuFt,
    working:
      holes === 0 ? [faceStep] : [faceStep, coreInchesStep({ holes, depthIn }), weightStep(cuFt, undefined)],
  });
}

/** Area two equal circles share, in square inches; none when they do not meet. */
function lapAreaSqIn(radiusIn: number, pitchIn: number): number {
  if (pitchIn >= 2 * radiusIn) return 0;
  const half = pitchIn / 2;
  return (
    2 * radiusIn * radiusIn * Math.acos(half / radiusIn) -
    pitchIn * Math.sqrt(radiusIn * radiusIn - half * half)
  );
}

function coreInchesStep({ holes, depthIn }: { holes: number; depthIn: number }): WorkingStep {
  return {
    label: 'Core-inches in all',
    formula: 'holes × depth',
    inputs: [put('holes', holes, ''), put('depth', depthIn, 'in')],
    value: holes * depthIn,
    unit: 'core-in',
    source: arithmetic,
  };
}
