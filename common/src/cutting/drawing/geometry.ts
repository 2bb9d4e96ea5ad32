/** A point in the drawing; x runs right and y runs down, like on a screen. */
export interface Point {
  readonly x: number;
  readonly y: number;
}

/**
 * What a line stands for. `cut`: sawn. `overcut`: the kerf past a corner. `cross_cut`: inside the outline. `joint`:
 * a contraction joint. `edge`: not sawn (an existing edge, a slab's outline, a face).
 */
export type LineRole = 'cut' | 'overcut' | 'cross_cut' | 'joint' | 'edge';

export interface SketchLine {
  readonly role: LineRole;
  readonly from: Point;
  readonly to: Point;
}

/** `core`: drilled. `section`: a pipe or bar seen end on, cut through. */
export type CircleRole = 'core' | 'section';

export interface SketchCircle {
  readonly role: CircleRole;
  readonly centre: Point;
  readonly radiusFt: number;
}

export interface Box {
  readonly x: number;
  readonly y: number;
  readonly width: number;
  readonly height: number;
}

/** Lines and circles of one cut around its own origin. */
export interface CutShape {
  readonly lines: readonly SketchLine[];
  readonly circles: readonly SketchCircle[];
  /** True where the shape has more lines or holes than are drawn. */
  readonly isSimplified: boolean;
}

/** Smallest box around lines and circles; a point at the origin when there are none. */
export function boxAround(shape: Pick<CutShape, 'lines' | 'circles'>): Box {
  let [left, top, right, bottom] = [Infinity, Infinity, -Infinity, -Infinity];
  const include = (x: number, y: number, margin: number) => {
    left = Math.min(left, x - margin);
    top = Math.min(top, y - margin);
    right = Math.max(right, x + margin);
    bottom = Math.max(bottom, y + margin);
  };
  for (const { from, to } of shape.lines) {
    include(from.x, from.y, 0);
    include(to.x, to.y, 0);
  }
  for (const { centre, radiusFt } of shape.circles) include(centre.x, centre.y, radiusFt);
  return left > right
    ? { x: 0, y: 0, width: 0, height: 0 }
    : { x: left, y: top, width: right - left, height: bottom - top };
}

/** The same shape moved. */
export function moveShape(shape: CutShape, by: Point): CutShape {
  const move = (point: Point): Point => ({ x: point.x + by.x, y: point.y + by.y });
  return {
    lines: shape.lines.map((line) => ({ ...line, from: move(line.from), to: move(line.to) })),
    circles: shape.circles.map((circle) => ({ ...circle, centre: move(circle.centre) })),
    isSimplified: shape.isSimplified,
  };
}

/** Short form for a line of a role between two points. */
export function lineOf(
  role: LineRole,
  from: readonly [number, number],
  to: readonly [number, number],
): SketchLine {
  return { role, from: { x: from[0], y: from[1] }, to: { x: to[0], y: to[1] } };
}
