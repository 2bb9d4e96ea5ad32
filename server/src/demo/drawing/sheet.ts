export type Pdf = PDFKit.PDFDocument;
/** A place on the sheet, in points from its upper left corner. */
export type Point = readonly [x: number, y: number];

/** What the title block of a sheet says. Everything is invented for the demo. */
export interface SheetData {
  project: string;
  address: string;
  /** The firm that drew it. */
  firm: string;
  firmLine: string;
  number: string;
  title: string;
  revision: string;
  /** As printed: "2026-10-14". */
  date: string;
  drawnBy: string;
  checkedBy: string;
  notes: readonly string[];
}

/** 17 × 11 in (ANSI B), landscape, in points. */
export const SHEET = { width: 1224, height: 792, margin: 28, titleWidth: 214 } as const;

export const ink = {
  line: '#1d2125',
  soft: '#5d646b',
  faint: '#a9afb4',
  paper: '#fbfaf6',
  concrete: '#dfddd6',
  cut: '#b3261e',
  water: '#2b6cb0',
} as const;

export const fonts = { regular: 'regular', bold: 'bold' } as const;

interface TextStyle {
  size?: number;
  bold?: boolean;
  color?: string;
  align?: 'left' | 'center' | 'right';
  /** Degrees clockwise around the point. */
  rotate?: number;
  /** Blanks the paper behind it, so that lines do not run through. */
  backed?: boolean;
}

/** One line of text; the point is its middle height at the left, centre or right end. */
export function label(doc: Pdf, text: string, [x, y]: Point, style: TextStyle = {}): void {
  const { size = 8, bold = false, color = ink.line, align = 'left', rotate = 0, backed = false } = style;
  doc.font(bold ? fonts.bold : fonts.regular).fontSize(size);
  const width = doc.widthOfString(text);
  const left = align === 'left' ? x : align === 'center' ? x - width / 2 : x - width;
  doc.save();
  if (rotate !== 0) doc.rotate(rotate, { origin: [x, y] });
  if (backed) doc.rect(left - 2, y - size * 0.62, width + 4, size * 1.2).fill(ink.paper);
  doc.fillColor(color).text(text, left, y - size * 0.58, { lineBreak: false });
  doc.restore();
}

interface Stroke {
  width?: number;
  color?: string;
  dash?: readonly number[];
}

/** A line through points. */
export function stroke(
  doc: Pdf,
  points: readonly Point[],
  { width = 0.7, color = ink.line, dash }: Stroke = {},
): void {
  const [first, ...rest] = points;
  if (first === undefined) return;
  doc.save().lineWidth(width).strokeColor(color);
  if (dash !== undefined) doc.dash(dash[0] ?? 1, { space: dash[1] ?? dash[0] ?? 1 });
  doc.moveTo(...first);
  for (const point of rest) doc.lineTo(...point);
  doc.stroke().restore();
}

/** Maps feet of the site to points of the sheet. */
export class View {
  constructor(
    private readonly origin: Point,
    readonly pointsPerFt: number,
  ) {}

  at(xFt: number, yFt: number): Point {
    return [this.origin[0] + xFt * this.pointsPerFt, this.origin[1] + yFt * this.pointsPerFt];
  }

  /** A length in points. */
  ft(lengthFt: number): number {
    return lengthFt * this.pointsPerFt;
  }

  /** The largest of the usual scales at which `widthFt` × `heightFt` fits the box; inches of paper per foot. */
  static fitting(
    [widthFt, heightFt]: readonly [number, number],
    box: { left: number; top: number; width: number; height: number },
  ): { view: View; scale: string } {
    const inchesPerFt = usualScales.find(
      ([inches]) => widthFt * inches * 72 <= box.width && heightFt * inches * 72 <= box.height,
    ) ?? [1 / 32, '1/32" = 1\'-0"'];
    const points = inchesPerFt[0] * 72;
    const left = box.left + (box.width - widthFt * points) / 2;
    const top = box.top + (box.height - heightFt * points) / 2;
    return { view: new View([left, top], points), scale: inchesPerFt[1] };
  }
}

const usualScales: readonly (readonly [number, string])[] = [
  [1, '1" = 1\'-0"'],
  [3 / 4, '3/4" = 1\'-0"'],
  [1 / 2, '1/2" = 1\'-0"'],
  [3 / 8, '3/8" = 1\'-0"'],
  [1 / 4, '1/4" = 1\'-0"'],
  [3 / 16, '3/16" = 1\'-0"'],
  [1 / 8, '1/8" = 1\'-0"'],
  [3 / 32, '3/32" = 1\'-0"'],
  [1 / 16, '1/16" = 1\'-0"'],
];
