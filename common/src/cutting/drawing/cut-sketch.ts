import { takeoffCutList } from '../takeoff/takeoff-cut-list.ts';
import type { Cut, CutTakeoff } from '../types.ts';
import { shapeOf } from './cut-shapes.ts';
import { describeCut, describeTakeoff, inWords } from './cut-words.ts';
import { boxAround, lineOf, moveShape, type Box, type CutShape, type SketchLine } from './geometry.ts';

/** Printed on every sketch made from typed cuts. Written dimensions govern over scaled ones. */
export const sketchNote = 'Shapes to scale, positions not; not for layout.';

/** One cut of the list, drawn once however often it is cut. All lengths are feet. */
export interface SketchedCut extends CutShape {
  /** Place in the list, from 0. */
  readonly index: number;
  readonly kind: Cut['kind'];
  readonly count: number;
  /** In words; the label of the shape and its text equivalent. */
  readonly words: string;
  /** Around the shape, overcuts included. */
  readonly box: Box;
}

export interface CutSketch {
  readonly cuts: readonly SketchedCut[];
  /** Cuts of the list that are not drawn. */
  readonly omitted: number;
  readonly bar: { readonly lengthFt: number; readonly line: SketchLine; readonly label: string };
  /** Around everything, bar and a margin included; starts at 0, 0. */
  readonly box: Box;
  readonly note: string;
  /** The whole sketch in words, one sentence a cut, the note last. */
  readonly text: readonly string[];
}

const barFt = 10;
const smallBarFt = 1;
// A bar over three times as long as the largest shape would shrink the shapes away.
const smallestForLongBarFt = 3;
// Wide enough for a card or a sheet lying on its side.
const rowAspect = 1.6;

/**
 * A cut list drawn to scale: each cut once, in tidy rows in the order of the list, with a bar for scale. Only the
 * first `maxCuts` are drawn; the text names how many are left out.
 * @throws CuttingInputError for any cut that `takeoffCutList` refuses
 */
export function cutSketch(
  cuts: readonly Cut[],
  { maxCuts = 60 }: { readonly maxCuts?: number } = {},
): CutSketch {
  const takeoff = takeoffCutList({ cuts });
  const shown = cuts.slice(0, maxCuts);
  const shapes = shown.map((cut, index) => ({ cut, shape: shapeAtOrigin(cut, takeoff.cuts[index]) }));
  const gapFt = gapBetween(shapes.map(({ shape }) => boxAround(shape)));
  const places = placeInRows(
    shapes.map(({ shape }) => boxAround(shape)),
    gapFt,
  );
  const drawn = shapes.map(({ cut, shape }, index): SketchedCut => {
    const place = places.boxes[index] ?? { x: 0, y: 0, width: 0, height: 0 };
    return {
      index,
      kind: cut.kind,
      count: cut.count,
      words: describeCut(cut),
      box: place,
      ...moveShape(shape, place),
    };
  });
  const bar = scaleBar(places.boxes, places.bottomFt + gapFt, gapFt);
  const rightFt = Math.max(bar.lengthFt, ...places.boxes.map((box) => box.x + box.width - gapFt)) + 2 * gapFt;
  const omitted = cuts.length - shown.length;
  return {
    cuts: drawn,
    omitted,
    bar,
    box: { x: 0, y: 0, width: rightFt, height: bar.line.from.y + gapFt },
    note: sketchNote,
    text: sketchText(drawn, takeoff.cuts, omitted),
  };
}

function shapeAtOrigin(cut: Cut, takeoff: CutTakeoff | undefined): CutShape {
  if (takeoff === undefined) return { lines: [], circles: [], isSimplified: false };
  const shape = shapeOf(cut, takeoff);
  const box = boxAround(shape);
  return moveShape(shape, { x: -box.x, y: -box.y });
}

function gapBetween(boxes: readonly Box[]): number {
  const areaSqFt = boxes.reduce((sum, box) => sum + box.width * box.height, 0);
  const largestFt = Math.max(0, ...boxes.map((box) => Math.max(box.width, box.height)));
  return Math.max(0.25, 0.08 * Math.sqrt(areaSqFt), 0.03 * largestFt);
}

/** Left to right, a new row when one is full; every box keeps its size. */
function placeInRows(boxes: readonly Box[], gapFt: number): { boxes: readonly Box[]; bottomFt: number } {
  const spaceSqFt = boxes.reduce((sum, box) => sum + (box.width + gapFt) * (box.height + gapFt), 0);
  const rowFt = Math.max(Math.sqrt(spaceSqFt * rowAspect), ...boxes.map((box) => box.width + gapFt));
  const placed: Box[] = [];
  let x = gapFt;
  let y = gapFt;
  let rowHeightFt = 0;
  for (const { width, height } of boxes) {
    if (x > gapFt && x + width > rowFt) {
      x = gapFt;
      y += rowHeightFt + gapFt;
      rowHeightFt = 0;
    }
    placed.push({ x, y, width, height });
    x += width + gapFt;
    rowHeightFt = Math.max(rowHeightFt, height);
  }
  return { boxes: placed, bottomFt: y + rowHeightFt };
}

function scaleBar(boxes: readonly Box[], y: number, x: number): CutSketch['bar'] {
  const largestFt = Math.max(0, ...boxes.map((box) => Math.max(box.width, box.height)));
  const lengthFt = largestFt > 0 && largestFt < smallestForLongBarFt ? smallBarFt : barFt;
  return { lengthFt, line: lineOf('edge', [x, y], [x + lengthFt, y]), label: `${lengthFt} ft` };
}

function sketchText(
  drawn: readonly SketchedCut[],
  takeoffs: readonly CutTakeoff[],
  omitted: number,
): readonly string[] {
  const sentences = drawn.map(({ index, words, isSimplified }) => {
    const takeoff = takeoffs[index];
    const quantities = takeoff === undefined ? '' : describeTakeoff(takeoff);
    const simplified = isSimplified ? ' Drawn as its outline.' : '';
    return `${index + 1}. ${words}${quantities === '' ? '' : `: ${quantities}`}.${simplified}`;
  });
  const rest = omitted === 0 ? [] : [`And ${inWords(omitted)} more cuts that are not drawn.`];
  return [...sentences, ...rest, sketchNote];
}
