import { jointPlan } from '../joints.ts';
import { lipTreatmentOf } from '../lip.ts';
import { sourceOf } from '../tables/provenance.ts';
import { lipRules } from '../tables/lip.ts';
import type {
  BarCut,
  BlockCut,
  ChaseCut,
  CurbCut,
  CutTakeoff,
  JointsCut,
  LineCut,
  LipCut,
  PipeCut,
} from '../types.ts';
import { arithmetic, put, type WorkingInput, type WorkingStep } from '../working.ts';
import { inchFeetStep, takeoffOf, weightStep } from './quantities.ts';

/** A plain saw line: its length times the count, at its depth. */
export function takeoffLine(cut: LineCut): CutTakeoff {
  const sawFt = cut.lengthFt * cut.count;
  return takeoffOf(cut, {
    sawFt,
    depthIn: cut.depthIn,
    working: [lengthStep(cut, sawFt), inchFeetStep(sawFt, cut.depthIn)],
  });
}

/** Contraction joints of a slab, as many and as long as the joint plan finds. */
export function takeoffJoints(cut: JointsCut): CutTakeoff {
  const plan = jointPlan(cut);
  const sawFt = plan.sawFt * cut.count;
  const step = sawFeetStep('joints of one slab × count', sawFt, [
    put('joints of one slab', plan.sawFt, 'ft'),
    put('count', cut.count, ''),
  ]);
  return takeoffOf(cut, {
    sawFt,
    depthIn: plan.depthIn,
    working: [...plan.working, step, inchFeetStep(sawFt, plan.depthIn)],
  });
}

/** A curb is sawn along its length; its depth is the curb's height. */
export function takeoffCurb(cut: CurbCut): CutTakeoff {
  const sawFt = cut.lengthFt * cut.count;
  return takeoffOf(cut, {
    sawFt,
    depthIn: cut.heightIn,
    working: [lengthStep(cut, sawFt), inchFeetStep(sawFt, cut.heightIn)],
  });
}

/** Two saw lines, and the groove chipped out between them. */
export function takeoffChase(cut: ChaseCut): CutTakeoff {
  const { lengthFt, widthIn, depthIn, count } = cut;
  const sawFt = 2 * lengthFt * count;
  const cuFt = ((lengthFt * widthIn * depthIn) / 144) * count;
  const step = sawFeetStep('2 × L × count', sawFt, [put('L', lengthFt, 'ft'), put('count', count, '')]);
  return takeoffOf(cut, {
    sawFt,
    depthIn,
    removedCuFt: cuFt,
    working: [step, inchFeetStep(sawFt, depthIn), weightStep(cuFt, undefined)],
  });
}

/** Block units cut one by one: saw feet are the cut length in inches ÷ 12, times the units. */
export function takeoffBlock(cut: BlockCut): CutTakeoff {
  const { cutLengthIn, depthIn, count } = cut;
  const sawFt = (cutLengthIn / 12) * count;
  const step = sawFeetStep('cut length ÷ 12 × units', sawFt, [
    put('cut length', cutLengthIn, 'in'),
    put('units', count, ''),
  ]);
  return takeoffOf(cut, {
    sawFt,
    depthIn,
    pieceCuts: count,
    working: [step, inchFeetStep(sawFt, depthIn)],
  });
}

/** Pipes are sold by the piece; the wall is not known, so no saw feet or face are counted. */
export function takeoffPipe(cut: PipeCut): CutTakeoff {
  return takeoffOf(cut, { pieceCuts: cut.count, working: [piecesStep(cut.count)] });
}

export function takeoffBar(cut: BarCut): CutTakeoff {
  const sawSqFt = ((Math.PI / 4) * cut.diameterIn * cut.diameterIn * cut.count) / 144;
  const faceStep: WorkingStep = {
    label: 'Cut face',
    formula: 'π ÷ 4 × Ø² × count ÷ 144',
    inputs: [put('Ø', cut.diameterIn, 'in'), put('count', cut.count, '')],
    value: sawSqFt,
    unit: 'sq ft',
    source: arithmetic,
  };
  return takeoffOf(cut, {
    sawSqFt,
    pieceCuts: cut.count,
    working: [piecesStep(cut.count), faceStep],
  });
}

/** The blade runs the width of the lip, flat, as deep as the bevel or ramp is long; a wedge comes off. */
export function takeoffLip(cut: LipCut): CutTakeoff {
  const { widthFt, heightIn, runPerRise, count } = cut;
  const { treatment, cutLengthIn } = lipTreatmentOf(heightIn, runPerRise);
  const treatmentStep: WorkingStep = {
    label: 'Length of the cut',
    formula: 'none to ¼ in; to ½ in a bevel, 2 × height; above a ramp, run × height',
    inputs: [put('height', heightIn, 'in'), put('run', runPerRise, 'to 1'), put('treatment', treatment, '')],
    value: cutLengthIn,
    unit: 'in',
    source: sourceOf(lipRules.source),
  };
  if (treatment === 'none') return takeoffOf(cut, { working: [treatmentStep] });
  const sawFt = widthFt * count;
  const cuFt = ((widthFt * heightIn * cutLengthIn) / 2 / 144) * count;
  const step = sawFeetStep('W × count', sawFt, [put('W', widthFt, 'ft'), put('count', count, '')]);
  return takeoffOf(cut, {
    sawFt,
    depthIn: cutLengthIn,
    removedCuFt: cuFt,
    working: [treatmentStep, step, inchFeetStep(sawFt, cutLengthIn), weightStep(cuFt, undefined)],
  });
}

function lengthStep(cut: { readonly lengthFt: number; readonly count: number }, sawFt: number): WorkingStep {
  return sawFeetStep('L × count', sawFt, [put('L', cut.lengthFt, 'ft'), put('count', cut.count, '')]);
}

function sawFeetStep(formula: string, sawFt: number, inputs: readonly WorkingInput[]): WorkingStep {
  return { label: 'Saw feet', formula, inputs, value: sawFt, unit: 'ft', source: arithmetic };
}

function piecesStep(count: number): WorkingStep {
  return {
    label: 'Pieces cut',
    formula: 'count',
    inputs: [put('count', count, '')],
    value: count,
    unit: 'pieces',
    source: arithmetic,
  };
}
