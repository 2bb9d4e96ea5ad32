import { cylinderCuFt } from '../weights.ts';
import { reinforcedConcretePcf, reinforcedConcreteSource } from '../tables/unit-weights.ts';
import { sourceOf } from '../tables/provenance.ts';
import type { CoreGroup, Cut, CutTakeoff } from '../types.ts';
import { arithmetic, put, type WorkingStep } from '../working.ts';

const nothing = {
  sawFt: 0,
  overcutFt: 0,
  inchFeet: 0,
  sawSqFt: 0,
  coreHoles: 0,
  coreInches: 0,
  crossCutFt: 0,
  pieceCuts: 0,
  removedCuFt: 0,
  removedLb: 0,
  depthIn: null,
  pieces: null,
  cores: [] as readonly CoreGroup[],
  cautions: [] as readonly string[],
  working: [] as readonly WorkingStep[],
};

/** A takeoff with zero for everything its kind of cut does not have. */
export function takeoffOf(cut: Cut, quantities: Partial<Omit<CutTakeoff, 'kind' | 'count'>>): CutTakeoff {
  return { kind: cut.kind, count: cut.count, ...nothing, ...quantities };
}

/** Saw feet carried to inch-feet and square feet of face. */
export function sawnTo(
  sawFt: number,
  depthIn: number,
): Pick<CutTakeoff, 'sawFt' | 'depthIn' | 'inchFeet' | 'sawSqFt'> {
  return { sawFt, depthIn, inchFeet: sawFt * depthIn, sawSqFt: (sawFt * depthIn) / 12 };
}

/** Hole count and core-inches of one group of equal cores. */
export function coresOf(group: CoreGroup): Pick<CutTakeoff, 'coreHoles' | 'coreInches' | 'cores'> {
  return { coreHoles: group.holes, coreInches: group.coreInches, cores: [group] };
}

/** Concrete removed, at 150 pcf unless the removal says otherwise. */
export function removed(
  cuFt: number,
  densityPcf = reinforcedConcretePcf,
): Pick<CutTakeoff, 'removedCuFt' | 'removedLb'> {
  return { removedCuFt: cuFt, removedLb: cuFt * densityPcf };
}

/** Volume of `holes` whole cores. */
export function coreCuFt({
  diameterIn,
  depthIn,
  holes,
}: {
  diameterIn: number;
  depthIn: number;
  holes: number;
}): number {
  return cylinderCuFt(diameterIn, depthIn) * holes;
}

export function inchFeetStep(sawFt: number, depthIn: number): WorkingStep {
  return {
    label: 'Inch-feet',
    formula: 'saw feet × depth',
    inputs: [put('saw feet', sawFt, 'ft'), put('depth', depthIn, 'in')],
    value: sawFt * depthIn,
    unit: 'in-ft',
    source: arithmetic,
  };
}

const concreteWeightSource = sourceOf(reinforcedConcreteSource);

export function weightStep(cuFt: number, densityPcf: number | undefined): WorkingStep {
  const pcf = densityPcf ?? reinforcedConcretePcf;
  return {
    label: 'Weight removed',
    formula: 'volume × density',
    inputs: [put('volume', cuFt, 'cu ft'), put('density', pcf, 'pcf')],
    value: cuFt * pcf,
    unit: 'lb',
    source: densityPcf === undefined ? concreteWeightSource : arithmetic,
  };
}
