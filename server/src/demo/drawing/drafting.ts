import { feetAndInches } from './feet-and-inches.ts';
import { fonts, ink, label, stroke, type Pdf, type Point } from './sheet.ts';

const toward = ([ax, ay]: Point, [bx, by]: Point, distance: number): Point => {
  const length = Math.hypot(bx - ax, by - ay) || 1;
  return [ax + ((bx - ax) / length) * distance, ay + ((by - ay) / length) * distance];
};

interface Dimension {
  from: Point;
  to: Point;
  /** How far the dimension line stands off, in points: positive is to the right of the way from `from` to `to`. */
  offset: number;
  /** In feet; written as feet and inches unless `text` says otherwise. */
  lengthFt: number;
  text?: string;
  size?: number;
}

/** A dimension with extension lines and oblique ticks, as drawings of buildings have them. */
export function dimension(doc: Pdf, { from, to, offset, lengthFt, text, size = 7.5 }: Dimension): void {
  const length = Math.hypot(to[0] - from[0], to[1] - from[1]) || 1;
  const across: Point = [-(to[1] - from[1]) / length, (to[0] - from[0]) / length];
  const shift = ([x, y]: Point, by: number): Point => [x + across[0] * by, y + across[1] * by];
  const sign = Math.sign(offset);
  const [a, b] = [shift(from, offset), shift(to, offset)];
  for (const [point, end] of [
    [from, a],
    [to, b],
  ] as const) {
    stroke(doc, [toward(point, end, 3), shift(end, sign * 4)], { width: 0.35, color: ink.soft });
    stroke(
      doc,
      [
        [end[0] - 3, end[1] + 3],
        [end[0] + 3, end[1] - 3],
      ],
      { width: 1 },
    );
  }
  stroke(doc, [toward(a, b, -4), toward(b, a, -4)], { width: 0.45 });
  writeAlong(doc, { a, b, text: text ?? feetAndInches(lengthFt), size });
}

function writeAlong(
  doc: Pdf,
  { a, b, text, size }: { a: Point; b: Point; text: string; size: number },
): void {
  const middle: Point = [(a[0] + b[0]) / 2, (a[1] + b[1]) / 2];
  const degrees = (Math.atan2(b[1] - a[1], b[0] - a[0]) * 180) / Math.PI;
  const upright = degrees > 90 || degrees <= -90 ? degrees + 180 : degrees;
  const normalized = upright >= 89.9 ? upright - 180 : upright;
  const radians = ((normalized - 90) * Math.PI) / 180;
  const raised: Point = [
    middle[0] + Math.cos(radians) * size * 0.75,
    middle[1] + Math.sin(radians) * size * 0.75,
  ];
  label(doc, text, raised, { size, align: 'center', rotate: normalized, backed: true });
}

/** A mark of the cut list in a hexagon, with a leader to what it names. */
export function cutMark(doc: Pdf, mark: string, at: Point, to?: Point): void {
  const radius = 11;
  if (to !== undefined) {
    stroke(doc, [toward(at, to, radius), to], { width: 0.6, color: ink.cut });
    doc.save().circle(to[0], to[1], 1.6).fill(ink.cut).restore();
  }
  const corners = Array.from({ length: 6 }, (_, corner): [number, number] => [
    at[0] + radius * Math.cos((corner * Math.PI) / 3),
    at[1] + radius * Math.sin((corner * Math.PI) / 3),
  ]);
  doc
    .save()
    .lineWidth(1)
    .polygon(...corners)
    .fillAndStroke(ink.paper, ink.cut)
    .restore();
  label(doc, mark, at, { size: 8, bold: true, color: ink.cut, align: 'center' });
}

/** A line of the building's grid with its bubble at the start. */
export function gridLine(doc: Pdf, name: string, from: Point, to: Point): void {
  doc.save().lineWidth(0.45).strokeColor(ink.faint).dash(14, { space: 3 });
  doc
    .moveTo(...toward(from, to, 11))
    .lineTo(...to)
    .stroke()
    .restore();
  doc.save().lineWidth(0.9).circle(from[0], from[1], 11).fillAndStroke(ink.paper, ink.line).restore();
  label(doc, name, from, { size: 9, bold: true, align: 'center' });
}

/** The name of a view under a heavy line, with its scale: `1  PART PLAN, LEVEL 2`. */
export function viewTitle(
  doc: Pdf,
  view: { number: string; title: string; scale: string },
  [x, y]: Point,
): void {
  doc
    .save()
    .lineWidth(1)
    .circle(x + 12, y, 12)
    .stroke(ink.line)
    .restore();
  label(doc, view.number, [x + 12, y], { size: 11, bold: true, align: 'center' });
  label(doc, view.title, [x + 32, y - 6], { size: 11, bold: true });
  const width = doc.widthOfString(view.title) + 12;
  stroke(
    doc,
    [
      [x + 24, y + 2],
      [x + 30 + width, y + 2],
    ],
    { width: 1.4 },
  );
  label(doc, `SCALE: ${view.scale}`, [x + 32, y + 10], { size: 7, color: ink.soft });
}

export function northArrow(doc: Pdf, [x, y]: Point, degrees: number): void {
  doc.save().rotate(degrees, { origin: [x, y] });
  doc.lineWidth(0.9).circle(x, y, 14).stroke(ink.line);
  doc.polygon([x, y - 14], [x - 5, y + 9], [x, y + 4]).fill(ink.line);
  doc
    .lineWidth(0.8)
    .polygon([x, y - 14], [x + 5, y + 9], [x, y + 4])
    .stroke(ink.line);
  doc.restore();
  const radians = ((degrees - 90) * Math.PI) / 180;
  label(doc, 'N', [x + Math.cos(radians) * 22, y + Math.sin(radians) * 22], {
    size: 9,
    bold: true,
    align: 'center',
  });
}

/** A bar of alternating blocks with feet written under it. */
export function scaleBar(
  doc: Pdf,
  [x, y]: Point,
  { pointsPerFt, stepFt }: { pointsPerFt: number; stepFt: number },
): void {
  const step = stepFt * pointsPerFt;
  for (let n = 0; n < 4; n += 1) {
    doc
      .save()
      .lineWidth(0.6)
      .rect(x + n * step, y, step, 4);
    doc.fillAndStroke(n % 2 === 0 ? ink.line : ink.paper, ink.line).restore();
  }
  for (let n = 0; n <= 4; n += 1) {
    label(doc, n === 4 ? `${n * stepFt} ft` : String(n * stepFt), [x + n * step, y + 11], {
      size: 6.5,
      align: 'center',
    });
  }
}

/** A cut through the building: an arrow in a circle naming the section and the sheet. */
export function sectionMark(
  doc: Pdf,
  { name, at, pointing }: { name: string; at: Point; pointing: 1 | -1 },
): void {
  const [x, y] = at;
  doc
    .save()
    .polygon([x - 13, y], [x + 13, y], [x, y + pointing * 20])
    .fill(ink.line)
    .restore();
  doc.save().lineWidth(0.9).circle(x, y, 10).fillAndStroke(ink.paper, ink.line).restore();
  label(doc, name, at, { size: 9, bold: true, align: 'center' });
}

interface Table {
  title: string;
  at: Point;
  columns: readonly { name: string; width: number; align?: 'left' | 'right' }[];
  rows: readonly (readonly string[])[];
}

/** A schedule. Returns the height it took. */
export function table(doc: Pdf, { title, at: [x, y], columns, rows }: Table): number {
  const width = columns.reduce((sum, column) => sum + column.width, 0);
  const row = 16;
  label(doc, title, [x, y + 6], { size: 10, bold: true });
  const top = y + 18;
  doc.save().rect(x, top, width, row).fill('#ecebe4').restore();
  const height = row * (rows.length + 1);
  doc.save().lineWidth(1).rect(x, top, width, height).stroke(ink.line).restore();
  rows.forEach((_, index) =>
    stroke(
      doc,
      [
        [x, top + row * (index + 1)],
        [x + width, top + row * (index + 1)],
      ],
      { width: 0.4 },
    ),
  );
  let left = x;
  columns.forEach((column, index) => {
    if (index > 0)
      stroke(
        doc,
        [
          [left, top],
          [left, top + height],
        ],
        { width: 0.4 },
      );
    const place = (line: number): Point => [
      column.align === 'right' ? left + column.width - 6 : left + 6,
      top + row * (line + 0.5),
    ];
    label(doc, column.name, place(0), { size: 7.5, bold: true, align: column.align ?? 'left' });
    rows.forEach((cells, line) =>
      label(doc, cells[index] ?? '', place(line + 1), { size: 7.5, align: column.align ?? 'left' }),
    );
    left += column.width;
  });
  return 18 + height;
}

/** A heading with a paragraph under it. */
export function textBlock(doc: Pdf, block: { title: string; text: string; at: Point; width: number }): void {
  const [x, y] = block.at;
  label(doc, block.title, [x, y + 6], { size: 10, bold: true });
  doc.font(fonts.regular).fontSize(8).fillColor(ink.line);
  doc.text(block.text, x, y + 20, { width: block.width, lineGap: 2 });
}
