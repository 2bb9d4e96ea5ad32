import type { CutKind } from '../types.ts';
import { commonPracticeSource } from './common-practice.ts';
import type { SourcedTable } from './provenance.ts';

export const cuttingMethods = [
  'flat_saw',
  'wall_saw',
  'hand_saw',
  'ring_saw',
  'chain_saw',
  'wire_saw',
  'core_drill',
  'stitch_drill',
  'joint_saw',
] as const;
export type CuttingMethod = (typeof cuttingMethods)[number];

export const workFaces = ['floor', 'wall', 'ceiling'] as const;
export type WorkFace = (typeof workFaces)[number];

/** What a method commonly does. `maxDepthIn` is from one face; null is where no depth stops it. */
export interface MethodRule {
  readonly works: readonly CutKind[];
  readonly faces: readonly WorkFace[];
  readonly maxDepthIn: number | null;
  /** A round blade that turns at a corner cuts past it. */
  readonly runsPastCorners: boolean;
  /** Two faces double the depth. */
  readonly doublesFromBothFaces: boolean;
  readonly needsBothFaces: boolean;
  /** Narrowest doorway the machine goes through. */
  readonly minDoorwayIn: number | null;
  /** Floor load under machine and operator. */
  readonly floorLoadPsf: number | null;
}

const anyFace = workFaces;

/** Depths of saws with a round blade come from the reach table instead where it names the mount. */
export const methodRules: SourcedTable<Readonly<Record<CuttingMethod, MethodRule>>> = {
  source: commonPracticeSource,
  rows: {
    flat_saw: {
      works: ['line', 'trench', 'opening', 'joints'],
      faces: ['floor'],
      maxDepthIn: 17.75,
      runsPastCorners: true,
      doublesFromBothFaces: false,
      needsBothFaces: false,
      minDoorwayIn: 36,
      floorLoadPsf: 150,
    },
    wall_saw: {
      works: ['line', 'trench', 'opening', 'curb'],
      faces: anyFace,
      maxDepthIn: 18,
      runsPastCorners: true,
      doublesFromBothFaces: true,
      needsBothFaces: false,
      minDoorwayIn: null,
      floorLoadPsf: null,
    },
    hand_saw: {
      works: ['line', 'trench', 'opening', 'curb', 'chase', 'block', 'pipe', 'bar', 'lip'],
      faces: anyFace,
      maxDepthIn: 6,
      runsPastCorners: true,
      doublesFromBothFaces: true,
      needsBothFaces: false,
      minDoorwayIn: null,
      floorLoadPsf: null,
    },
    ring_saw: {
      works: ['line', 'trench', 'opening', 'curb', 'pipe'],
      faces: anyFace,
      maxDepthIn: 12,
      runsPastCorners: true,
      doublesFromBothFaces: true,
      needsBothFaces: false,
      minDoorwayIn: null,
      floorLoadPsf: null,
    },
    chain_saw: {
      works: ['line', 'trench', 'opening', 'pipe'],
      faces: anyFace,
      maxDepthIn: 25,
      runsPastCorners: false,
      doublesFromBothFaces: true,
      needsBothFaces: false,
      minDoorwayIn: null,
      floorLoadPsf: null,
    },
    wire_saw: {
      works: ['line', 'opening', 'wire', 'pipe'],
      faces: anyFace,
      maxDepthIn: null,
      runsPastCorners: false,
      doublesFromBothFaces: false,
      needsBothFaces: true,
      minDoorwayIn: null,
      floorLoadPsf: null,
    },
    core_drill: {
      works: ['core'],
      faces: anyFace,
      maxDepthIn: null,
      runsPastCorners: false,
      doublesFromBothFaces: false,
      needsBothFaces: false,
      minDoorwayIn: null,
      floorLoadPsf: null,
    },
    stitch_drill: {
      works: ['line', 'opening', 'stitch'],
      faces: anyFace,
      maxDepthIn: null,
      runsPastCorners: false,
      doublesFromBothFaces: false,
      needsBothFaces: false,
      minDoorwayIn: null,
      floorLoadPsf: null,
    },
    joint_saw: {
      works: ['joints'],
      faces: ['floor'],
      maxDepthIn: 4.75,
      runsPastCorners: false,
      doublesFromBothFaces: false,
      needsBothFaces: false,
      minDoorwayIn: null,
      floorLoadPsf: null,
    },
  },
};

/** Where no engine may run, a walk-behind saw is electric: shallower, lighter. */
export const electricFlatSaw: SourcedTable<{ readonly maxDepthIn: number; readonly floorLoadPsf: number }> = {
  source: commonPracticeSource,
  rows: { maxDepthIn: 8, floorLoadPsf: 50 },
};

/** The largest core barrel commonly run. */
export const largestCoreIn: SourcedTable<number> = { source: commonPracticeSource, rows: 72 };
