import type { CutData, CutKind, CutLine } from '@kerfyard/common/scopes';

const kindWords: Record<CutKind, string> = {
  line: 'Saw line',
  trench: 'Trench',
  opening: 'Opening',
  core: 'Core',
  stitch: 'Stitch drilling',
  joints: 'Contraction joints',
  wire: 'Wire-saw cut',
  curb: 'Curb cut',
  chase: 'Chase',
  block: 'Block cut',
  pipe: 'Pipe cut',
  bar: 'Bar cut',
  lip: 'Lip',
};

/** A number as people write it: at most two decimals, no trailing zeros, thousands apart. */
export function figure(value: number, decimals: 0 | 1 | 2 = 2): string {
  return figures[decimals].format(value);
}

const withDecimals = (decimals: number) =>
  new Intl.NumberFormat('en-US', { maximumFractionDigits: decimals });
const figures = [withDecimals(0), withDecimals(1), withDecimals(2)] as const;

export function kindWord(kind: CutKind): string {
  return kindWords[kind];
}

/** Sizes of one cut, without its count: "40 × 2 ft, 6 in thick". */
export function cutSize(cut: CutData): string {
  switch (cut.kind) {
    case 'line':
      return `${figure(cut.lengthFt)} ft, ${figure(cut.depthIn)} in deep`;
    case 'core':
      return `${figure(cut.diameterIn)} in dia., ${figure(cut.depthIn)} in deep`;
    case 'trench':
    case 'opening':
    case 'joints':
      return `${figure(cut.lengthFt)} × ${figure(cut.widthFt)} ft, ${figure(cut.thicknessIn)} in thick`;
    case 'stitch':
      return `${figure(cut.lengthIn)} in along the holes, ${figure(cut.bitDiameterIn)} in bit, ${figure(cut.depthIn)} in deep`;
    case 'wire':
      return `${figure(cut.areaSqFt)} sq ft of face`;
    case 'curb':
      return `${figure(cut.lengthFt)} ft, ${figure(cut.heightIn)} in high`;
    case 'chase':
      return `${figure(cut.lengthFt)} ft, ${figure(cut.widthIn)} in wide, ${figure(cut.depthIn)} in deep`;
    case 'block':
      return `${figure(cut.cutLengthIn)} in long, ${figure(cut.depthIn)} in deep`;
    case 'pipe':
      return `${figure(cut.outsideDiameterIn)} in outside dia.`;
    case 'bar':
      return `${figure(cut.diameterIn)} in dia.`;
    case 'lip':
      return `${figure(cut.widthFt)} ft wide, ${figure(cut.heightIn)} in high`;
  }
}

/** What else decides the work of a cut: sides left uncut, corners, pieces, pilots. Empty when nothing does. */
export function cutDetails(cut: CutData): string {
  switch (cut.kind) {
    case 'trench':
      return [...trenchDetails(cut), ...pieceDetails(cut)].join('; ');
    case 'opening':
      return [...openingDetails(cut), ...pieceDetails(cut)].join('; ');
    case 'stitch':
      return `${cut.closed ? 'closed loop' : 'open line'}; holes overlap ${figure(cut.overlapIn)} in`;
    case 'joints':
      return jointDetails(cut).join('; ');
    case 'wire':
      return cut.pilotCores === 0
        ? 'no pilot cores'
        : `${figure(cut.pilotCores)} pilot core${cut.pilotCores === 1 ? '' : 's'} ${figure(cut.pilotDiameterIn)} in dia., ${figure(cut.depthIn)} in deep`;
    case 'lip':
      return `ramp at 1 in ${figure(cut.runPerRise)}`;
    default:
      return '';
  }
}

function jointDetails(cut: Extract<CutData, { kind: 'joints' }>): string[] {
  const { maxAspect, baysAlongLengthFt, baysAlongWidthFt } = cut;
  const bays = (side: string, baysFt: readonly number[] | undefined) =>
    baysFt === undefined
      ? []
      : [`column bays along the ${side} ${baysFt.map((bay) => figure(bay)).join(', ')} ft`];
  return [
    `spacing ${figure(cut.spacingFactor)} thicknesses, at most ${figure(cut.capFt)} ft`,
    ...(maxAspect === undefined ? [] : [`panels at most ${figure(maxAspect)} to 1`]),
    ...bays('length', baysAlongLengthFt),
    ...bays('width', baysAlongWidthFt),
  ];
}

function trenchDetails({ sideCuts, endCuts }: Extract<CutData, { kind: 'trench' }>): string[] {
  return [
    sideCuts === 2 ? 'both sides cut' : 'one side cut',
    `${endCuts === 0 ? 'no' : endCuts} end cut${endCuts === 1 ? '' : 's'}`,
  ];
}

const cornerWords = {
  overcut: 'corners overcut',
  cored: 'corners cored',
  square: 'square corners, no overcuts',
} as const;

function openingDetails({ corners, uncutSides = [] }: Extract<CutData, { kind: 'opening' }>): string[] {
  return [cornerWords[corners], ...(uncutSides.length > 0 ? [`not cut: ${uncutSides.join(', ')}`] : [])];
}

function pieceDetails({ removal }: Extract<CutData, { removal?: unknown }>): string[] {
  return removal === undefined ? [] : [`pieces to ${figure(removal.maxPieceLb)} lb`];
}

/** One line of the cut list in words, as a schedule of values and a mail say it. */
export function cutWords(line: CutLine): string {
  const count = line.cut.count === 1 ? '' : `${figure(line.cut.count)} × `;
  return `${line.mark}: ${count}${kindWord(line.cut.kind).toLowerCase()} ${cutSize(line.cut)}`;
}
