import type { WorkingStep } from './working.ts';

/** Every kind of cut the engine takes off. */
export const cutKinds = [
  'line',
  'trench',
  'opening',
  'core',
  'stitch',
  'joints',
  'wire',
  'curb',
  'chase',
  'block',
  'pipe',
  'bar',
  'lip',
] as const;
export type CutKind = (typeof cutKinds)[number];

export const openingSides = ['top', 'bottom', 'left', 'right'] as const;
export type OpeningSide = (typeof openingSides)[number];

/** `overcut`: the blade runs past; `cored`: a core in each corner; `square`: finished by chain, hand or chipping. */
export const cornerTreatments = ['overcut', 'cored', 'square'] as const;
export type CornerTreatment = (typeof cornerTreatments)[number];

/** How the piece must come out: weight and size limits that decide the cross cuts. */
export interface Removal {
  readonly densityPcf: number;
  /** Added to the weight for bond and kerf bind at the first pull. */
  readonly allowancePct?: number | undefined;
  readonly maxPieceLb: number;
  /** Neither side of a piece may be longer. */
  readonly maxSideFt?: number | undefined;
  /** The shorter side of a piece may not be longer: a doorway. */
  readonly maxShortSideFt?: number | undefined;
}

export interface LineCut {
  readonly kind: 'line';
  readonly lengthFt: number;
  readonly depthIn: number;
  readonly count: number;
}

export interface TrenchCut {
  readonly kind: 'trench';
  readonly lengthFt: number;
  readonly widthFt: number;
  readonly thicknessIn: number;
  /** 2 when left out; 1 where the other side is an edge or a joint. */
  readonly sideCuts?: 1 | 2 | undefined;
  readonly endCuts: 0 | 1 | 2;
  readonly bladeDiameterIn?: number | undefined;
  readonly passThroughIn?: number | undefined;
  readonly count: number;
  readonly removal?: Removal | undefined;
}

/** An opening in a slab or wall. In a wall `lengthFt` is along the floor; left and right are its uprights. */
export interface OpeningCut {
  readonly kind: 'opening';
  readonly lengthFt: number;
  readonly widthFt: number;
  readonly thicknessIn: number;
  readonly uncutSides?: readonly OpeningSide[] | undefined;
  readonly corners: CornerTreatment;
  readonly bladeDiameterIn?: number | undefined;
  readonly passThroughIn?: number | undefined;
  readonly count: number;
  readonly removal?: Removal | undefined;
}

export interface CoreCut {
  readonly kind: 'core';
  readonly diameterIn: number;
  readonly depthIn: number;
  readonly count: number;
}

/** A row of overlapping cores; `lengthIn` is measured along the hole-centre line. */
export interface StitchCut {
  readonly kind: 'stitch';
  readonly lengthIn: number;
  readonly bitDiameterIn: number;
  readonly overlapIn: number;
  readonly closed: boolean;
  readonly depthIn: number;
  readonly count: number;
}

/** Contraction joints in a slab of `lengthFt` × `widthFt`. */
export interface JointsCut {
  readonly kind: 'joints';
  readonly lengthFt: number;
  readonly widthFt: number;
  readonly thicknessIn: number;
  readonly spacingFactor: number;
  readonly capFt: number;
  /** Longer over shorter side of a panel; 1.5 when left out. */
  readonly maxAspect?: number | undefined;
  /** Between column lines; together they make up the side. */
  readonly baysAlongLengthFt?: readonly number[] | undefined;
  readonly baysAlongWidthFt?: readonly number[] | undefined;
  readonly count: number;
}

/** A wire-saw cut of `areaSqFt` of face; `depthIn` is the depth of each pilot core. */
export interface WireCut {
  readonly kind: 'wire';
  readonly areaSqFt: number;
  readonly pilotCores: number;
  readonly pilotDiameterIn: number;
  readonly depthIn: number;
  readonly count: number;
}

export interface CurbCut {
  readonly kind: 'curb';
  readonly lengthFt: number;
  readonly heightIn: number;
  readonly count: number;
}

/** A shallow groove between two saw lines. */
export interface ChaseCut {
  readonly kind: 'chase';
  readonly lengthFt: number;
  readonly widthIn: number;
  readonly depthIn: number;
  readonly count: number;
}

/** Masonry units cut one by one; `count` is the number of units. */
export interface BlockCut {
  readonly kind: 'block';
  readonly cutLengthIn: number;
  readonly depthIn: number;
  readonly count: number;
}

/** Pipes cut through, sold by the piece. */
export interface PipeCut {
  readonly kind: 'pipe';
  readonly outsideDiameterIn: number;
  readonly count: number;
}

/** Reinforcing bars cut through, sold by the piece. */
export interface BarCut {
  readonly kind: 'bar';
  readonly diameterIn: number;
  readonly count: number;
}

/** A raised edge on a walk, cut to a bevel or a ramp. */
export interface LipCut {
  readonly kind: 'lip';
  readonly widthFt: number;
  readonly heightIn: number;
  readonly runPerRise: number;
  readonly count: number;
}

/** One line of a cut list. Feet for runs and plan sizes, inches for depths, thicknesses and diameters. */
export type Cut =
  | LineCut
  | TrenchCut
  | OpeningCut
  | CoreCut
  | StitchCut
  | JointsCut
  | WireCut
  | CurbCut
  | ChaseCut
  | BlockCut
  | PipeCut
  | BarCut
  | LipCut;

/** The pieces of one opening or trench. Sides and weight are those of the heaviest piece, allowance included. */
export interface PieceSummary {
  readonly count: number;
  readonly lengthFt: number;
  readonly widthFt: number;
  readonly weightLb: number;
}

/** Cores of one diameter; null where corner cores are asked for but no blade says how large. */
export interface CoreGroup {
  readonly diameterIn: number | null;
  readonly holes: number;
  readonly coreInches: number;
}

/** What a cut comes to, `count` included (except `pieces`, which describes one opening). */
export interface CutQuantities {
  /** Sides, ends, perimeter and cross cuts; overcuts are apart. */
  readonly sawFt: number;
  readonly overcutFt: number;
  /** `sawFt` × depth. */
  readonly inchFeet: number;
  /** Square feet of cut face. */
  readonly sawSqFt: number;
  readonly coreHoles: number;
  readonly coreInches: number;
  /** Part of `sawFt`. */
  readonly crossCutFt: number;
  /** Blocks, pipes and bars cut one by one. */
  readonly pieceCuts: number;
  readonly removedCuFt: number;
  /** True weight, without lifting allowance. */
  readonly removedLb: number;
}

export interface CutTakeoff extends CutQuantities {
  readonly kind: CutKind;
  readonly count: number;
  /** Depth of the sawing; null for kinds that are not sawn to a depth. */
  readonly depthIn: number | null;
  readonly pieces: PieceSummary | null;
  readonly cores: readonly CoreGroup[];
  readonly cautions: readonly string[];
  readonly working: readonly WorkingStep[];
}

/** Saw feet at one depth: "LF at depth". */
export interface SawAtDepth {
  readonly depthIn: number;
  readonly sawFt: number;
  readonly inchFeet: number;
}

export interface CutListTotals extends CutQuantities {
  readonly cores: readonly CoreGroup[];
  readonly sawAtDepth: readonly SawAtDepth[];
  /** Pieces of all openings and trenches with a removal plan. */
  readonly pieces: number;
  readonly heaviestPieceLb: number | null;
}

export interface CutListTakeoff {
  readonly totals: CutListTotals;
  /** In the order of the list. */
  readonly cuts: readonly CutTakeoff[];
}
