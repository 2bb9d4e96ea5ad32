import { sourceOf } from '../tables/provenance.ts';
import { reinforcedConcretePcf, reinforcedConcreteSource } from '../tables/unit-weights.ts';
import type { CoreGroup, Cut, CutTakeoff, PieceSummary } from '../types.ts';
import { arithmetic, put, type WorkingStep } from '../working.ts';

/** What the takeoff of one kind of cut measures; everything left out is none. All with `count` but `pieces`. */
export interface Measured {
  readonly sawFt?: number;
  readonly depthIn?: number;
  readonly overcutFt?: number;
  /** Where the face is not saw feet × depth. */
  readonly sawSqFt?: number;
  readonly crossCutFt?: number;
  readonly pieceCuts?: number;
  readonly removedCuFt?: number;
  /** 150 pcf when left out. */
  readonly densityPcf?: number | undefined;
  readonly pieces?: PieceSummary | null;
  readonly core?: CoreGroup | undefined;
  readonly cautions?: readonly string[];
  readonly working: readonly WorkingStep[];
}

const noCores: readonly CoreGroup[] = [];
const noCautions: readonly string[] = [];

/**
 * Carries what was measured to all quantities of a takeoff. Lists of thousands are taken off on each keystroke,
 * so it is written out field by field, in one order for every kind: spreading objects together took three times
 * as long.
 */
export function takeoffOf(cut: Cut, measured: Measured): CutTakeoff {
  const { sawFt = 0, depthIn = null, core, removedCuFt = 0 } = measured;
  const inchFeet = depthIn === null ? 0 : sawFt * depthIn;
  return {
    kind: cut.kind,
    count: cut.count,
    sawFt,
    overcutFt: measured.overcutFt ?? 0,
    inchFeet,
    sawSqFt: measured.sawSqFt ?? inchFeet / 12,
    coreHoles: core?.holes ?? 0,
    coreInches: core?.coreInches ?? 0,
    crossCutFt: measured.crossCutFt ?? 0,
    pieceCuts: measured.pieceCuts ?? 0,
    removedCuFt,
    removedLb: removedCuFt * (measured.densityPcf ?? reinforcedConcretePcf),
    depthIn,
    pieces: measured.pieces ?? null,
    cores: core === undefined ? noCores : [core],
    cautions: measured.cautions ?? noCautions,
    working: measured.working,
  };
}

/** Inch-feet with their working: feet sawn × depth in inches. */
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

/** Pounds removed with their working; without a density, reinforced concrete of the source named in it. */
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
