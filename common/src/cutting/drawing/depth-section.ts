import { checkChoice, checkList, checkNumber, checkNumberOr, checkObject } from '../check.ts';
import { CuttingInputError } from '../input-error.ts';
import { thicknessInRange } from '../limits.ts';
import { inWords } from './cut-words.ts';
import type { Box, Point } from './geometry.ts';

export const sectionElements = ['slab', 'wall'] as const;
export type SectionElement = (typeof sectionElements)[number];

/** What lies beyond the far face, the quietest first; `loudness` follows this order. */
export const beyondKinds = ['soil', 'unoccupied', 'occupied', 'unknown'] as const;
export type BeyondKind = (typeof beyondKinds)[number];

/** A mat of reinforcement; `coverIn` from the entry face to the bar. */
export interface SectionMat {
  readonly coverIn: number;
  readonly barDiameterIn: number;
  readonly spacingIn: number;
}

/** A line known to run through the element; `depthIn` from the entry face to its near side. */
export interface SectionLine {
  readonly name: string;
  readonly depthIn: number;
  readonly diameterIn: number;
}

export interface DepthSectionInput {
  readonly element: SectionElement;
  readonly thicknessIn: number;
  /** Depth reached by each pass, as `passPlan` gives it; the last may go through. */
  readonly passDepthsIn: readonly number[];
  readonly mats?: readonly SectionMat[] | undefined;
  readonly embedded?: readonly SectionLine[] | undefined;
  readonly beyond: BeyondKind;
}

export interface SectionCircle {
  readonly centre: Point;
  readonly radiusIn: number;
  /** True where the deepest pass reaches it. */
  readonly isReached: boolean;
}

/**
 * A section in inches. In a slab the entry face is the top and depth runs down; in a wall it is the left face and
 * depth runs right.
 */
export interface DepthSection {
  readonly element: SectionElement;
  /** The concrete. */
  readonly body: Box;
  /** One step a pass, in order; together they are the cut. */
  readonly passes: readonly { readonly pass: number; readonly depthIn: number; readonly box: Box }[];
  readonly mats: readonly { readonly mat: number; readonly bars: readonly SectionCircle[] }[];
  readonly embedded: readonly (SectionCircle & { readonly name: string })[];
  readonly beyond: { readonly kind: BeyondKind; readonly loudness: 1 | 2 | 3 | 4; readonly box: Box };
  readonly box: Box;
  readonly text: readonly string[];
}

interface CheckedSection {
  readonly element: SectionElement;
  readonly thicknessIn: number;
  readonly passDepthsIn: readonly number[];
  readonly mats: readonly SectionMat[];
  readonly embedded: readonly SectionLine[];
  readonly beyond: BeyondKind;
}

const maxPassesDrawn = 100;
const maxMats = 8;
const maxEmbedded = 50;
const maxBarsDrawn = 60;

/**
 * An element cut open: passes stepped down, mats and known lines, and what lies beyond.
 * @throws CuttingInputError also when the passes do not deepen
 */
export function depthSection(input: DepthSectionInput): DepthSection {
  const section = checkSection(checkObject(input, 'input'));
  const { thicknessIn, element, beyond } = section;
  const deepestIn = Math.max(0, ...section.passDepthsIn);
  const alongIn = Math.max(24, 2.5 * thicknessIn);
  const beyondIn = Math.max(thicknessIn / 3, deepestIn - thicknessIn + 2);
  const turn = element === 'slab' ? slabTurn : wallTurn;
  const loudness = (beyondKinds.indexOf(beyond) + 1) as 1 | 2 | 3 | 4;
  return {
    element,
    body: turn.box({ x: 0, y: 0, width: alongIn, height: thicknessIn }),
    passes: stepPasses(section.passDepthsIn, alongIn).map((step) => ({ ...step, box: turn.box(step.box) })),
    mats: section.mats.map((mat, index) => ({
      mat: index,
      bars: matBars(mat, { alongIn, deepestIn }).map((bar) => ({ ...bar, centre: turn.point(bar.centre) })),
    })),
    embedded: embeddedLines(section.embedded, { alongIn, deepestIn }).map((line) => ({
      ...line,
      centre: turn.point(line.centre),
    })),
    beyond: {
      kind: beyond,
      loudness,
      box: turn.box({ x: 0, y: thicknessIn, width: alongIn, height: beyondIn }),
    },
    box: turn.box({ x: 0, y: 0, width: alongIn, height: thicknessIn + beyondIn }),
    text: sectionText(section, deepestIn),
  };
}

interface Turn {
  readonly box: (box: Box) => Box;
  readonly point: (point: Point) => Point;
}

const slabTurn: Turn = { box: (box) => box, point: (point) => point };

// A wall is the same section on its side: along becomes up and depth becomes right.
const wallTurn: Turn = {
  box: ({ x, y, width, height }) => ({ x: y, y: x, width: height, height: width }),
  point: ({ x, y }) => ({ x: y, y: x }),
};

function checkSection(fields: Readonly<Record<string, unknown>>): CheckedSection {
  const thicknessIn = checkNumber(fields.thicknessIn, 'thicknessIn', thicknessInRange);
  return {
    element: checkChoice(fields.element, 'element', sectionElements),
    thicknessIn,
    passDepthsIn: checkPasses(fields.passDepthsIn),
    mats: checkList(fields.mats ?? [], 'mats', maxMats).map((mat, index) =>
      checkMat(mat, `mats[${index}]`, thicknessIn),
    ),
    embedded: checkList(fields.embedded ?? [], 'embedded', maxEmbedded).map((line, index) =>
      checkLine(line, `embedded[${index}]`, thicknessIn),
    ),
    beyond: checkChoice(fields.beyond, 'beyond', beyondKinds),
  };
}

function checkPasses(value: unknown): readonly number[] {
  let beforeIn = 0;
  return checkList(value, 'passDepthsIn', maxPassesDrawn).map((depth, index) => {
    const field = `passDepthsIn[${index}]`;
    const depthIn = checkNumber(depth, field, { above: 0, max: 1_200, unit: 'in' });
    if (depthIn <= beforeIn) {
      throw new CuttingInputError({
        field,
        allowed: `deeper than the pass before, ${beforeIn} in`,
        given: depthIn,
      });
    }
    beforeIn = depthIn;
    return depthIn;
  });
}

function checkMat(value: unknown, path: string, thicknessIn: number): SectionMat {
  const fields = checkObject(value, path);
  return {
    coverIn: checkNumber(fields.coverIn, `${path}.coverIn`, { min: 0, max: thicknessIn, unit: 'in' }),
    barDiameterIn: checkNumber(fields.barDiameterIn, `${path}.barDiameterIn`, {
      above: 0,
      max: 3,
      unit: 'in',
    }),
    spacingIn: checkNumber(fields.spacingIn, `${path}.spacingIn`, { min: 1, max: 120, unit: 'in' }),
  };
}

function checkLine(value: unknown, path: string, thicknessIn: number): SectionLine {
  const fields = checkObject(value, path);
  const { name } = fields;
  if (typeof name !== 'string' || name === '' || name.length > 80) {
    throw new CuttingInputError({
      field: `${path}.name`,
      allowed: 'a text of 1 to 80 characters',
      given: name,
    });
  }
  return {
    name,
    depthIn: checkNumber(fields.depthIn, `${path}.depthIn`, { min: 0, max: thicknessIn, unit: 'in' }),
    diameterIn: checkNumberOr(fields.diameterIn, `${path}.diameterIn`, { above: 0, max: 60, unit: 'in' }, 1),
  };
}

/** The middle of the section as a stair, one tread a pass. */
function stepPasses(
  depthsIn: readonly number[],
  alongIn: number,
): readonly { pass: number; depthIn: number; box: Box }[] {
  const startIn = alongIn * 0.2;
  const treadIn = (alongIn * 0.6) / Math.max(1, depthsIn.length);
  return depthsIn.map((depthIn, index) => ({
    pass: index + 1,
    depthIn,
    box: { x: startIn + index * treadIn, y: 0, width: treadIn, height: depthIn },
  }));
}

function matBars(
  mat: SectionMat,
  { alongIn, deepestIn }: { alongIn: number; deepestIn: number },
): readonly SectionCircle[] {
  const radiusIn = mat.barDiameterIn / 2;
  const bars = Math.min(maxBarsDrawn, Math.floor(alongIn / mat.spacingIn) + 1);
  const firstIn = (alongIn - (bars - 1) * mat.spacingIn) / 2;
  return Array.from({ length: bars }, (_, bar) => ({
    centre: { x: firstIn + bar * mat.spacingIn, y: mat.coverIn + radiusIn },
    radiusIn,
    isReached: deepestIn > mat.coverIn,
  }));
}

/** Spread over the section; where along it they run is not known. */
function embeddedLines(
  lines: readonly SectionLine[],
  { alongIn, deepestIn }: { alongIn: number; deepestIn: number },
): readonly (SectionCircle & { readonly name: string })[] {
  return lines.map((line, index) => ({
    name: line.name,
    centre: { x: (alongIn * (index + 1)) / (lines.length + 1), y: line.depthIn + line.diameterIn / 2 },
    radiusIn: line.diameterIn / 2,
    isReached: deepestIn > line.depthIn,
  }));
}

const beyondWords: Readonly<Record<BeyondKind, string>> = {
  soil: 'soil',
  unoccupied: 'an unoccupied space',
  occupied: 'an OCCUPIED space: watch and protect before cutting',
  unknown: 'UNKNOWN: find out before cutting',
};

function sectionText(section: CheckedSection, deepestIn: number): readonly string[] {
  const { element, thicknessIn, passDepthsIn, mats, embedded, beyond } = section;
  const passes = passDepthsIn.map((depthIn) => inWords(depthIn)).join(', ');
  const reached = (depthIn: number) => (deepestIn > depthIn ? 'the cut reaches it' : 'below the cut');
  return [
    `${element === 'slab' ? 'Slab' : 'Wall'} ${inWords(thicknessIn)} in thick.`,
    ...(passDepthsIn.length === 0 ? [] : [`Passes to ${passes} in.`]),
    ...mats.map(
      (mat) =>
        `Bars ${inWords(mat.barDiameterIn)} in at ${inWords(mat.spacingIn)} in, ${inWords(mat.coverIn)} in deep: ${reached(mat.coverIn)}.`,
    ),
    ...embedded.map((line) => `${line.name}, ${inWords(line.depthIn)} in deep: ${reached(line.depthIn)}.`),
    `${element === 'slab' ? 'Below' : 'Behind'}: ${beyondWords[beyond]}.`,
  ];
}
