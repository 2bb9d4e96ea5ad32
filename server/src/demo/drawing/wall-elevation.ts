import { cutMark, dimension, gridLine, sectionMark, table, textBlock, viewTitle } from './drafting.ts';
import { feetAndInches, inches } from './feet-and-inches.ts';
import { hatchConcrete, hatchEarth } from './hatching.ts';
import { ink, label, stroke, View, type Pdf, type SheetData } from './sheet.ts';
import { drawSheet } from './draw-sheet.ts';

/** Heights are feet above the floor. */
export interface WallElevationData {
  sheet: SheetData;
  view: string;
  lengthFt: number;
  heightFt: number;
  thicknessIn: number;
  /** As written on the wall. */
  construction: string;
  text: string;
  grid: readonly { name: string; xFt: number }[];
  doors: readonly { xFt: number; widthFt: number; heightFt: number; name: string }[];
  openings: readonly {
    mark: string;
    xFt: number;
    sillFt: number;
    widthFt: number;
    heightFt: number;
    use: string;
  }[];
  cores: readonly {
    mark: string;
    xFt: number;
    heightFt: number;
    diameterIn: number;
    count: number;
    use: string;
  }[];
}

/** A concrete wall seen from the front, with what is to be cut, and a section through it. */
export function drawWallElevation(data: WallElevationData): Promise<Buffer> {
  return drawSheet(data.sheet, (doc) => {
    const { view, scale } = View.fitting([data.lengthFt, data.heightFt], {
      left: 92,
      top: 110,
      width: 690,
      height: 340,
    });
    drawWall(doc, view, data);
    data.doors.forEach((door) => drawDoor(doc, view, data, door));
    data.openings.forEach((opening) => drawOpening(doc, view, data, opening));
    data.cores.forEach((core) => drawCores(doc, view, data, core));
    drawSection(doc, view, data);
    const floor = view.at(0, data.heightFt)[1];
    viewTitle(doc, { number: '1', title: data.view, scale }, [60, floor + 76]);
    viewTitle(doc, { number: 'B', title: 'SECTION', scale }, [800, floor + 76]);
    drawSchedule(doc, data, floor + 112);
  });
}

function drawWall(doc: Pdf, view: View, { lengthFt, heightFt, grid, construction }: WallElevationData): void {
  const [left, top] = view.at(0, 0);
  const [right, floor] = view.at(lengthFt, heightFt);
  doc
    .save()
    .rect(left, top, right - left, floor - top)
    .fill('#efeee8')
    .restore();
  // Form-tie cones and pour lines: what a cast wall shows.
  doc.save().fillColor(ink.faint);
  for (let x = 2; x < lengthFt; x += 4) {
    for (let y = 2; y < heightFt; y += 4) doc.circle(...view.at(x, y), 1).fill();
  }
  doc.restore();
  for (let y = 4; y < heightFt; y += 4)
    stroke(doc, [view.at(0, y), view.at(lengthFt, y)], { width: 0.25, color: ink.faint });
  doc
    .save()
    .lineWidth(1.3)
    .rect(left, top, right - left, floor - top)
    .stroke(ink.line)
    .restore();
  stroke(
    doc,
    [
      [left - 26, floor],
      [right + 26, floor],
    ],
    { width: 2.2 },
  );
  hatchEarth(doc, { x: left - 26, y: floor, width: right - left + 52, height: 12 });
  grid.forEach(({ name, xFt }) =>
    gridLine(doc, name, [view.at(xFt, 0)[0], top - 62], view.at(xFt, heightFt)),
  );
  grid.slice(1).forEach(({ xFt }, index) => {
    const before = grid[index]?.xFt ?? 0;
    dimension(doc, { from: view.at(before, 0), to: view.at(xFt, 0), offset: -36, lengthFt: xFt - before });
  });
  dimension(doc, { from: [left, top], to: [left, floor], offset: 34, lengthFt: heightFt });
  label(doc, construction, [left + 8, top + 12], { size: 7.5, color: ink.soft, backed: true });
  label(doc, 'T.O. SLAB', [left - 30, floor - 6], { size: 7, align: 'right', color: ink.soft });
}

function drawDoor(
  doc: Pdf,
  view: View,
  { heightFt }: WallElevationData,
  door: WallElevationData['doors'][number],
): void {
  const [x, y] = view.at(door.xFt, heightFt - door.heightFt);
  const width = view.ft(door.widthFt);
  const height = view.ft(door.heightFt);
  doc.save().lineWidth(1).rect(x, y, width, height).fillAndStroke(ink.paper, ink.line).restore();
  stroke(
    doc,
    [
      [x + width, y],
      [x, y + height / 2],
      [x + width, y + height],
    ],
    { width: 0.4, dash: [4, 3] },
  );
  label(doc, door.name, [x + width / 2, y - 8], { size: 7, align: 'center', color: ink.soft });
}

type Opening = WallElevationData['openings'][number];

function drawOpening(doc: Pdf, view: View, data: WallElevationData, opening: Opening): void {
  const top = data.heightFt - opening.sillFt - opening.heightFt;
  const [x1, y1] = view.at(opening.xFt, top);
  const [x2, y2] = view.at(opening.xFt + opening.widthFt, top + opening.heightFt);
  doc
    .save()
    .rect(x1, y1, x2 - x1, y2 - y1)
    .fill('#f7e4e1')
    .restore();
  stroke(
    doc,
    [
      [x1, y1],
      [x2, y2],
    ],
    { width: 0.4, color: ink.cut },
  );
  stroke(
    doc,
    [
      [x2, y1],
      [x1, y2],
    ],
    { width: 0.4, color: ink.cut },
  );
  doc
    .save()
    .lineWidth(1.6)
    .strokeColor(ink.cut)
    .dash(7, { space: 2.5 })
    .rect(x1, y1, x2 - x1, y2 - y1)
    .stroke()
    .restore();
  dimension(doc, { from: [x1, y1], to: [x2, y1], offset: -12, lengthFt: opening.widthFt });
  dimension(doc, { from: [x1, y1], to: [x1, y2], offset: 12, lengthFt: opening.heightFt });
  const floor = view.at(0, data.heightFt)[1];
  if (opening.sillFt > 0.01) {
    dimension(doc, { from: [x1, y2], to: [x1, floor], offset: 12, lengthFt: opening.sillFt, size: 7 });
  }
  const before = Math.max(
    0,
    ...data.grid.map((line) => line.xFt).filter((place) => place < opening.xFt - 0.01),
  );
  const row = floor + 12;
  dimension(doc, {
    from: [view.at(before, 0)[0], row],
    to: [x1, row],
    offset: 12,
    lengthFt: opening.xFt - before,
    size: 7,
  });
  cutMark(doc, opening.mark, [x2 + 26, y1 - 8], [x2, y1 + 6]);
}

type Cores = WallElevationData['cores'][number];

function drawCores(doc: Pdf, view: View, data: WallElevationData, core: Cores): void {
  const spacing = Math.max((core.diameterIn * 2) / 12, 1);
  const radius = Math.max(2.6, view.ft(core.diameterIn / 24));
  for (let n = 0; n < core.count; n += 1) {
    const [x, y] = view.at(core.xFt + n * spacing, data.heightFt - core.heightFt);
    doc.save().lineWidth(1.2).circle(x, y, radius).fillAndStroke('#f7e4e1', ink.cut).restore();
    stroke(
      doc,
      [
        [x - radius - 3, y],
        [x + radius + 3, y],
      ],
      { width: 0.35, color: ink.cut },
    );
    stroke(
      doc,
      [
        [x, y - radius - 3],
        [x, y + radius + 3],
      ],
      { width: 0.35, color: ink.cut },
    );
  }
  const [x, y] = view.at(core.xFt, data.heightFt - core.heightFt);
  cutMark(doc, core.mark, [x - 8, y - 30], [x, y - radius]);
  const floor = view.at(0, data.heightFt)[1];
  dimension(doc, { from: [x - 18, y], to: [x - 18, floor], offset: 0.01, lengthFt: core.heightFt, size: 7 });
}

function drawSection(doc: Pdf, view: View, data: WallElevationData): void {
  const [, top] = view.at(0, 0);
  const [right, floor] = view.at(data.lengthFt, data.heightFt);
  const width = Math.max(16, view.ft(data.thicknessIn / 12));
  const x = Math.max(850, right + 60);
  hatchConcrete(doc, { x, y: top, width, height: floor - top }, 31);
  hatchConcrete(doc, { x: x - 50, y: floor, width: width + 100, height: 12 }, 32);
  for (const bar of [x + 4, x + width - 4]) {
    stroke(
      doc,
      [
        [bar, top],
        [bar, floor],
      ],
      { width: 0.8, dash: [10, 2] },
    );
  }
  const [opening] = data.openings;
  if (opening !== undefined) {
    const y = view.at(0, data.heightFt - opening.sillFt - opening.heightFt)[1];
    const height = view.ft(opening.heightFt);
    doc
      .save()
      .rect(x - 1, y, width + 2, height)
      .fill(ink.paper)
      .restore();
    for (const edge of [y, y + height])
      stroke(
        doc,
        [
          [x - 8, edge],
          [x + width + 8, edge],
        ],
        { width: 1.6, color: ink.cut },
      );
    label(doc, opening.mark, [x + width / 2, y + height / 2], {
      size: 8,
      bold: true,
      color: ink.cut,
      align: 'center',
    });
    sectionMark(doc, {
      name: 'B',
      at: [view.at(opening.xFt + opening.widthFt * 0.5, 0)[0], top - 22],
      pointing: 1,
    });
  }
  doc
    .save()
    .lineWidth(1.2)
    .rect(x, top, width, floor - top)
    .stroke(ink.line)
    .restore();
  stroke(
    doc,
    [
      [x - 50, floor],
      [x + width + 50, floor],
    ],
    { width: 2 },
  );
  dimension(doc, { from: [x, top], to: [x + width, top], offset: -14, lengthFt: data.thicknessIn / 12 });
}

function drawSchedule(doc: Pdf, data: WallElevationData, top: number): void {
  const thickness = inches(data.thicknessIn);
  const openings = data.openings.map((o) => [
    o.mark,
    'Opening',
    `${feetAndInches(o.widthFt)} × ${feetAndInches(o.heightFt)}`,
    thickness,
    '1',
    o.use,
  ]);
  const cores = data.cores.map((c) => [
    c.mark,
    'Core',
    `${inches(c.diameterIn)} dia.`,
    thickness,
    String(c.count),
    c.use,
  ]);
  table(doc, {
    title: 'SCHEDULE OF CUTS',
    at: [60, top],
    columns: [
      { name: 'Mark', width: 46 },
      { name: 'Kind', width: 62 },
      { name: 'Size', width: 120 },
      { name: 'Wall', width: 56, align: 'right' },
      { name: 'No.', width: 36, align: 'right' },
      { name: 'For', width: 240 },
    ],
    rows: [...openings, ...cores],
  });
  textBlock(doc, { title: 'WALL', text: data.text, at: [640, top], width: 306 });
}
