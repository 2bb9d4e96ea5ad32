import { jointPlan } from '../joints.ts';
import { lipTreatmentOf } from '../lip.ts';
import { overcutOf } from '../overcut.ts';
import { stitchHoles } from '../stitch.ts';
import { checkUncutSides } from '../takeoff/opening.ts';
import type {
  Cut,
  CutTakeoff,
  JointsCut,
  OpeningCut,
  OpeningSide,
  PieceSummary,
  StitchCut,
  TrenchCut,
  WireCut,
} from '../types.ts';
import { lineOf, type CutShape, type SketchCircle, type SketchLine } from './geometry.ts';

/** Beyond this many lines or holes of one kind a shape is drawn as its outline alone. */
const maxMarks = 400;

interface PanelSides {
  readonly lengthFt: number;
  readonly widthFt: number;
  readonly cutSides: ReadonlySet<OpeningSide>;
}

/** One of a cut (whatever its count), to scale in feet, around its own origin. */
export function shapeOf(cut: Cut, takeoff: CutTakeoff): CutShape {
  switch (cut.kind) {
    case 'opening':
      return openingShape(cut, takeoff.pieces);
    case 'trench':
      return trenchShape(cut, takeoff.pieces);
    case 'stitch':
      return stitchShape(cut);
    case 'joints':
      return jointsShape(cut);
    case 'wire':
      return wireShape(cut);
    case 'core':
      return circleShape('core', cut.diameterIn);
    case 'pipe':
      return circleShape('section', cut.outsideDiameterIn);
    case 'bar':
      return circleShape('section', cut.diameterIn);
    case 'line':
    case 'curb':
      return linesShape([lineOf('cut', [0, 0], [cut.lengthFt, 0])]);
    case 'chase':
      return linesShape([0, cut.widthIn / 12].map((y) => lineOf('cut', [0, y], [cut.lengthFt, y])));
    case 'block':
      return linesShape([lineOf('cut', [0, 0], [cut.cutLengthIn / 12, 0])]);
    case 'lip':
      return lipShape(cut.widthFt, lipTreatmentOf(cut.heightIn, cut.runPerRise).cutLengthIn / 12);
  }
}

function openingShape(cut: OpeningCut, pieces: PieceSummary | null): CutShape {
  const uncut = checkUncutSides(cut.uncutSides);
  const sides = (['top', 'bottom', 'left', 'right'] as const).filter((side) => !uncut.has(side));
  const panel = { lengthFt: cut.lengthFt, widthFt: cut.widthFt, cutSides: new Set(sides) };
  const overcutFt = cut.corners === 'square' ? 0 : overcutFeetOf(cut);
  const cross = crossCuts(panel, pieces);
  return {
    lines: [
      ...sideLines(panel),
      ...(cut.corners === 'overcut' ? overcutLines(panel, overcutFt) : []),
      ...cross.lines,
    ],
    circles: cut.corners === 'cored' && overcutFt > 0 ? cornerCores(panel, overcutFt) : [],
    isSimplified: cross.isSimplified,
  };
}

function trenchShape(cut: TrenchCut, pieces: PieceSummary | null): CutShape {
  const cutSides = new Set<OpeningSide>(['top']);
  if (cut.sideCuts !== 1) cutSides.add('bottom');
  if (cut.endCuts >= 1) cutSides.add('left');
  if (cut.endCuts === 2) cutSides.add('right');
  const panel = { lengthFt: cut.lengthFt, widthFt: cut.widthFt, cutSides };
  const cross = crossCuts(panel, pieces);
  return {
    lines: [...sideLines(panel), ...overcutLines(panel, overcutFeetOf(cut)), ...cross.lines],
    circles: [],
    isSimplified: cross.isSimplified,
  };
}

function overcutFeetOf(cut: OpeningCut | TrenchCut): number {
  if (cut.bladeDiameterIn === undefined) return 0;
  const { bladeDiameterIn, thicknessIn, passThroughIn = 0 } = cut;
  return overcutOf({ bladeDiameterIn, thicknessIn, passThroughIn }) / 12;
}

function sideLines({ lengthFt, widthFt, cutSides }: PanelSides): readonly SketchLine[] {
  const role = (side: OpeningSide) => (cutSides.has(side) ? 'cut' : 'edge');
  return [
    lineOf(role('top'), [0, 0], [lengthFt, 0]),
    lineOf(role('bottom'), [0, widthFt], [lengthFt, widthFt]),
    lineOf(role('left'), [0, 0], [0, widthFt]),
    lineOf(role('right'), [lengthFt, 0], [lengthFt, widthFt]),
  ];
}

interface Corner {
  readonly x: number;
  readonly y: number;
  /** Away from the opening. */
  readonly outX: -1 | 1;
  readonly outY: -1 | 1;
}

/** Corners where two cut sides meet. */
function corners({ lengthFt, widthFt, cutSides }: PanelSides): readonly Corner[] {
  const levels = [
    { side: 'top', y: 0, outY: -1 },
    { side: 'bottom', y: widthFt, outY: 1 },
  ] as const;
  const uprights = [
    { side: 'left', x: 0, outX: -1 },
    { side: 'right', x: lengthFt, outX: 1 },
  ] as const;
  return levels.flatMap(({ side: level, ...vertical }) =>
    uprights
      .filter(({ side: upright }) => cutSides.has(level) && cutSides.has(upright))
      .map(({ x, outX }) => ({ x, outX, ...vertical })),
  );
}

function overcutLines(panel: PanelSides, overcutFt: number): readonly SketchLine[] {
  if (overcutFt === 0) return [];
  return corners(panel).flatMap(({ x, y, outX, outY }) => [
    lineOf('overcut', [x, y], [x + outX * overcutFt, y]),
    lineOf('overcut', [x, y], [x, y + outY * overcutFt]),
  ]);
}

/** Inside the corner, tangent to both lines: as wide as two overcuts. */
function cornerCores(panel: PanelSides, overcutFt: number): readonly SketchCircle[] {
  return corners(panel).map(({ x, y, outX, outY }) => ({
    role: 'core',
    centre: { x: x - outX * overcutFt, y: y - outY * overcutFt },
    radiusFt: overcutFt,
  }));
}

function crossCuts(
  { lengthFt, widthFt }: PanelSides,
  pieces: PieceSummary | null,
): { lines: readonly SketchLine[]; isSimplified: boolean } {
  if (pieces === null) return { lines: [], isSimplified: false };
  const alongLength = Math.round(lengthFt / pieces.lengthFt);
  const alongWidth = Math.round(widthFt / pieces.widthFt);
  if (alongLength + alongWidth > maxMarks) return { lines: [], isSimplified: true };
  const across = Array.from({ length: alongLength - 1 }, (_, index) => {
    const x = ((index + 1) * lengthFt) / alongLength;
    return lineOf('cross_cut', [x, 0], [x, widthFt]);
  });
  const along = Array.from({ length: alongWidth - 1 }, (_, index) => {
    const y = ((index + 1) * widthFt) / alongWidth;
    return lineOf('cross_cut', [0, y], [lengthFt, y]);
  });
  return { lines: [...across, ...along], isSimplified: false };
}

/** An open run in one row; a closed one as a square of the same perimeter, its true shape not being known. */
function stitchShape(cut: StitchCut): CutShape {
  const { holes, pitchIn } = stitchHoles(cut);
  const radiusFt = cut.bitDiameterIn / 24;
  const sideFt = cut.lengthIn / 12 / 4;
  if (holes > maxMarks) {
    const lengthFt = cut.lengthIn / 12;
    const lines = cut.closed ? squareLines('cut', sideFt) : [lineOf('cut', [0, 0], [lengthFt, 0])];
    return { lines, circles: [], isSimplified: true };
  }
  const circles = Array.from({ length: holes }, (_, hole): SketchCircle => {
    const alongFt = (hole * pitchIn) / 12;
    const centre = cut.closed ? pointOnSquare(alongFt, sideFt) : { x: radiusFt + alongFt, y: radiusFt };
    return { role: 'core', centre, radiusFt };
  });
  return { lines: [], circles, isSimplified: false };
}

function pointOnSquare(alongFt: number, sideFt: number): { x: number; y: number } {
  const side = Math.min(3, Math.floor(alongFt / sideFt));
  const restFt = alongFt - side * sideFt;
  if (side === 0) return { x: restFt, y: 0 };
  if (side === 1) return { x: sideFt, y: restFt };
  if (side === 2) return { x: sideFt - restFt, y: sideFt };
  return { x: 0, y: sideFt - restFt };
}

function jointsShape(cut: JointsCut): CutShape {
  const { lengthFt, widthFt } = cut;
  const plan = jointPlan(cut);
  const outline = sideLines({ lengthFt, widthFt, cutSides: new Set() });
  if (plan.jointsAlongLengthFt.length + plan.jointsAlongWidthFt.length > maxMarks) {
    return { lines: outline, circles: [], isSimplified: true };
  }
  return linesShape([
    ...outline,
    ...plan.jointsAlongLengthFt.map((x) => lineOf('joint', [x, 0], [x, widthFt])),
    ...plan.jointsAlongWidthFt.map((y) => lineOf('joint', [0, y], [lengthFt, y])),
  ]);
}

/** A square face of the same area, with up to four pilot cores at its corners. */
function wireShape(cut: WireCut): CutShape {
  const sideFt = Math.sqrt(cut.areaSqFt);
  const ends = [
    { x: 0, y: 0 },
    { x: sideFt, y: 0 },
    { x: 0, y: sideFt },
    { x: sideFt, y: sideFt },
  ];
  const circles = ends
    .slice(0, cut.pilotCores)
    .map((centre): SketchCircle => ({ role: 'core', centre, radiusFt: cut.pilotDiameterIn / 24 }));
  return { lines: squareLines('cut', sideFt), circles, isSimplified: cut.pilotCores > ends.length };
}

function squareLines(role: 'cut', sideFt: number): readonly SketchLine[] {
  return [
    lineOf(role, [0, 0], [sideFt, 0]),
    lineOf(role, [sideFt, 0], [sideFt, sideFt]),
    lineOf(role, [sideFt, sideFt], [0, sideFt]),
    lineOf(role, [0, sideFt], [0, 0]),
  ];
}

/** The lip itself is the edge; the cut ends where bevel or ramp meets the walk. */
function lipShape(widthFt: number, cutLengthFt: number): CutShape {
  const edge = lineOf('edge', [0, 0], [widthFt, 0]);
  return linesShape(
    cutLengthFt === 0 ? [edge] : [edge, lineOf('cut', [0, cutLengthFt], [widthFt, cutLengthFt])],
  );
}

function circleShape(role: SketchCircle['role'], diameterIn: number): CutShape {
  const radiusFt = diameterIn / 24;
  return {
    lines: [],
    circles: [{ role, centre: { x: radiusFt, y: radiusFt }, radiusFt }],
    isSimplified: false,
  };
}

function linesShape(lines: readonly SketchLine[]): CutShape {
  return { lines, circles: [], isSimplified: false };
}
