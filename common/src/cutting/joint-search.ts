import { compareNearly, isWithin, wholeUp } from './rounding.ts';

/** A slab to be jointed: bays (column lines) along each side, at least one, lengths in feet. */
export interface JointSearchInput {
  readonly baysAlongLengthFt: readonly number[];
  readonly baysAlongWidthFt: readonly number[];
  readonly maxSpacingFt: number;
  readonly maxAspect: number;
}

/** Panels in each bay. */
export interface JointGrid {
  readonly panelsPerBayAlongLength: readonly number[];
  readonly panelsPerBayAlongWidth: readonly number[];
  readonly sawFt: number;
  /** Worst of all panels, at least 1. */
  readonly aspect: number;
}

interface Division {
  readonly panelsPerBay: readonly number[];
  readonly lines: number;
  readonly widestFt: number;
  readonly narrowestFt: number;
}

/** The most panels along one side of a slab, over all its bays. */
export const maxPanelsAlongSide = 10_000;

/**
 * Division of the bays with the least interior saw feet whose panels obey spacing and aspect, or undefined when
 * none of at most 10,000 panels a side does.
 *
 * For a given widest panel the fewest panels per bay give, at once, the least sawing and the widest narrowest
 * panel. So it is enough to walk the widest panel along the length downwards and, for each, to take the widest
 * panel along the width that spacing and aspect allow: nothing narrower can do better.
 */
export function leastSawingJoints(input: JointSearchInput): JointGrid | undefined {
  const lengthFt = sum(input.baysAlongLengthFt);
  const widthFt = sum(input.baysAlongWidthFt);
  let best: JointGrid | undefined;
  let alongLength = divide(input.baysAlongLengthFt, input.maxSpacingFt);
  while (alongLength.lines < maxPanelsAlongSide) {
    if (best !== undefined && compareNearly(alongLength.lines * widthFt, best.sawFt) > 0) break;
    const widestAlongWidthFt = Math.min(input.maxSpacingFt, input.maxAspect * alongLength.narrowestFt);
    const alongWidth = divide(input.baysAlongWidthFt, widestAlongWidthFt);
    const isSquareEnough = isWithin(alongLength.widestFt, input.maxAspect * alongWidth.narrowestFt);
    if (isSquareEnough && alongWidth.lines < maxPanelsAlongSide) {
      const grid = {
        panelsPerBayAlongLength: alongLength.panelsPerBay,
        panelsPerBayAlongWidth: alongWidth.panelsPerBay,
        sawFt: alongLength.lines * widthFt + alongWidth.lines * lengthFt,
        aspect: worstAspect(alongLength, alongWidth),
      };
      if (best === undefined || isBetter(grid, best)) best = grid;
    }
    alongLength = divideFiner(input.baysAlongLengthFt, alongLength);
  }
  return best;
}

function isBetter(grid: JointGrid, best: JointGrid): boolean {
  return (compareNearly(grid.sawFt, best.sawFt) || compareNearly(grid.aspect, best.aspect)) < 0;
}

function divide(baysFt: readonly number[], widestFt: number): Division {
  return describeDivision(
    baysFt,
    baysFt.map((bayFt) => Math.max(1, wholeUp(bayFt / widestFt))),
  );
}

/** The next division with a narrower widest panel: one more panel in every bay that holds the widest. */
function divideFiner(baysFt: readonly number[], division: Division): Division {
  const panelsPerBay = baysFt.map((bayFt, bay) => {
    const panels = division.panelsPerBay[bay] ?? 1;
    return compareNearly(bayFt / panels, division.widestFt) === 0 ? panels + 1 : panels;
  });
  return describeDivision(baysFt, panelsPerBay);
}

function describeDivision(baysFt: readonly number[], panelsPerBay: readonly number[]): Division {
  let widestFt = 0;
  let narrowestFt = Infinity;
  for (const [bay, bayFt] of baysFt.entries()) {
    const panelFt = bayFt / (panelsPerBay[bay] ?? 1);
    widestFt = Math.max(widestFt, panelFt);
    narrowestFt = Math.min(narrowestFt, panelFt);
  }
  return { panelsPerBay, lines: sum(panelsPerBay) - 1, widestFt, narrowestFt };
}

function worstAspect(alongLength: Division, alongWidth: Division): number {
  return Math.max(
    alongLength.widestFt / alongWidth.narrowestFt,
    alongWidth.widestFt / alongLength.narrowestFt,
  );
}

function sum(numbers: readonly number[]): number {
  return numbers.reduce((total, number) => total + number, 0);
}
