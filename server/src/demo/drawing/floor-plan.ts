import {
  cutMark,
  dimension,
  gridLine,
  northArrow,
  scaleBar,
  table,
  textBlock,
  viewTitle,
} from './drafting.ts';
import { feetAndInches, inches } from './feet-and-inches.ts';
import { hatchConcrete, hatchLines } from './hatching.ts';
import { ink, label, stroke, View, type Pdf, type SheetData } from './sheet.ts';
import { drawSheet } from './draw-sheet.ts';

/** Feet from the plan's upper left corner. */
type Place = readonly [xFt: number, yFt: number];

export interface FloorPlanData {
  sheet: SheetData;
  view: string;
  sizeFt: readonly [width: number, depth: number];
  slab: { thicknessIn: number; text: string };
  grid: { across: readonly { name: string; xFt: number }[]; down: readonly { name: string; yFt: number }[] };
  walls: readonly { from: Place; to: Place; thicknessIn: number; kind: 'concrete' | 'partition' }[];
  columnsIn: number;
  rooms: readonly { name: string; at: Place }[];
  /** Rectangles cut out of the slab; `at` is the upper left corner. */
  openings: readonly { mark: string; at: Place; widthFt: number; lengthFt: number; use: string }[];
  cores: readonly { mark: string; at: Place; diameterIn: number; use: string }[];
  north: number;
}

/** A floor plan with what is to be cut located from the grid, and its schedule. */
export function drawFloorPlan(data: FloorPlanData): Promise<Buffer> {
  return drawSheet(data.sheet, (doc) => {
    const { view, scale } = View.fitting(data.sizeFt, { left: 96, top: 96, width: 850, height: 430 });
    drawGrid(doc, view, data);
    drawWalls(doc, view, data);
    data.rooms.forEach((room) =>
      label(doc, room.name, view.at(...room.at), { size: 8, color: ink.soft, align: 'center' }),
    );
    data.openings.forEach((opening) => drawOpening(doc, view, data, opening));
    data.cores.forEach((core) => drawCore(doc, view, data, core));
    viewTitle(doc, { number: '1', title: data.view, scale }, [60, 586]);
    scaleBar(doc, [330, 582], { pointsPerFt: view.pointsPerFt, stepFt: data.sizeFt[0] > 60 ? 5 : 2 });
    northArrow(doc, [940, 590], data.north);
    drawSchedule(doc, data);
  });
}

function drawGrid(doc: Pdf, view: View, { grid, sizeFt }: FloorPlanData): void {
  const [width, depth] = sizeFt;
  const top = view.at(0, 0)[1] - 48;
  const left = view.at(0, 0)[0] - 48;
  grid.across.forEach(({ name, xFt }) => gridLine(doc, name, [view.at(xFt, 0)[0], top], view.at(xFt, depth)));
  grid.down.forEach(({ name, yFt }) => gridLine(doc, name, [left, view.at(0, yFt)[1]], view.at(width, yFt)));
  grid.across.slice(1).forEach(({ xFt }, index) => {
    const before = grid.across[index]?.xFt ?? 0;
    const from = view.at(before, 0);
    const to = view.at(xFt, 0);
    dimension(doc, { from, to, offset: -24, lengthFt: xFt - before });
  });
  grid.down.slice(1).forEach(({ yFt }, index) => {
    const before = grid.down[index]?.yFt ?? 0;
    dimension(doc, { from: view.at(0, before), to: view.at(0, yFt), offset: 24, lengthFt: yFt - before });
  });
}

function drawWalls(doc: Pdf, view: View, { walls, grid, columnsIn }: FloorPlanData): void {
  walls.forEach((wall, index) => {
    const half = wall.thicknessIn / 24;
    const [x1, y1] = view.at(
      Math.min(wall.from[0], wall.to[0]) - half,
      Math.min(wall.from[1], wall.to[1]) - half,
    );
    const [x2, y2] = view.at(
      Math.max(wall.from[0], wall.to[0]) + half,
      Math.max(wall.from[1], wall.to[1]) + half,
    );
    const box = { x: x1, y: y1, width: x2 - x1, height: y2 - y1 };
    if (wall.kind === 'concrete') hatchConcrete(doc, box, 11 + index);
    else {
      doc.save().rect(x1, y1, box.width, box.height).fill(ink.paper).restore();
      hatchLines(doc, box, { gap: 3.5 });
    }
    doc
      .save()
      .lineWidth(wall.kind === 'concrete' ? 1.2 : 0.7)
      .rect(x1, y1, box.width, box.height)
      .stroke(ink.line)
      .restore();
  });
  if (columnsIn === 0) return;
  const side = view.ft(columnsIn / 12);
  grid.across.forEach(({ xFt }) =>
    grid.down.forEach(({ yFt }) => {
      const [x, y] = view.at(xFt, yFt);
      doc
        .save()
        .lineWidth(1)
        .rect(x - side / 2, y - side / 2, side, side)
        .fillAndStroke(ink.soft, ink.line)
        .restore();
    }),
  );
}

type Opening = FloorPlanData['openings'][number];

function drawOpening(doc: Pdf, view: View, data: FloorPlanData, opening: Opening): void {
  const [x, y] = opening.at;
  const corner = view.at(x, y);
  const far = view.at(x + opening.widthFt, y + opening.lengthFt);
  doc
    .save()
    .rect(corner[0], corner[1], far[0] - corner[0], far[1] - corner[1])
    .fill('#f7e4e1')
    .restore();
  stroke(doc, [corner, far], { width: 0.4, color: ink.cut });
  stroke(
    doc,
    [
      [far[0], corner[1]],
      [corner[0], far[1]],
    ],
    { width: 0.4, color: ink.cut },
  );
  doc.save().lineWidth(1.5).strokeColor(ink.cut).dash(6, { space: 2.5 });
  doc
    .rect(corner[0], corner[1], far[0] - corner[0], far[1] - corner[1])
    .stroke()
    .restore();
  dimension(doc, { from: corner, to: [far[0], corner[1]], offset: -12, lengthFt: opening.widthFt, size: 7 });
  dimension(doc, { from: [far[0], corner[1]], to: far, offset: -12, lengthFt: opening.lengthFt, size: 7 });
  locate(doc, view, data, { at: [x, y], below: far[1] + 16 });
  cutMark(doc, opening.mark, [far[0] + 40, far[1] + 22], [far[0], far[1]]);
}

/** From the nearest grid lines at the left and above to a corner or a centre. */
function locate(
  doc: Pdf,
  view: View,
  { grid }: FloorPlanData,
  { at: [x, y], below }: { at: Place; below: number },
): void {
  const across = nearestBefore(
    grid.across.map((line) => line.xFt),
    x,
  );
  const down = nearestBefore(
    grid.down.map((line) => line.yFt),
    y,
  );
  const row = below;
  dimension(doc, {
    from: [view.at(across, 0)[0], row],
    to: [view.at(x, 0)[0], row],
    offset: 0.01,
    lengthFt: x - across,
    size: 7,
  });
  const column = view.at(x, 0)[0] - 16;
  dimension(doc, {
    from: [column, view.at(0, down)[1]],
    to: [column, view.at(0, y)[1]],
    offset: 0.01,
    lengthFt: y - down,
    size: 7,
  });
}

function nearestBefore(lines: readonly number[], place: number): number {
  return Math.max(...lines.filter((line) => line < place - 0.01), Math.min(...lines));
}

type Core = FloorPlanData['cores'][number];

function drawCore(doc: Pdf, view: View, data: FloorPlanData, core: Core): void {
  const at = view.at(...core.at);
  const radius = Math.max(3, view.ft(core.diameterIn / 24));
  doc.save().lineWidth(1.3).circle(at[0], at[1], radius).fillAndStroke('#f7e4e1', ink.cut).restore();
  stroke(
    doc,
    [
      [at[0] - radius - 4, at[1]],
      [at[0] + radius + 4, at[1]],
    ],
    { width: 0.4, color: ink.cut },
  );
  stroke(
    doc,
    [
      [at[0], at[1] - radius - 4],
      [at[0], at[1] + radius + 4],
    ],
    { width: 0.4, color: ink.cut },
  );
  locate(doc, view, data, { at: core.at, below: at[1] + radius + 14 });
  cutMark(doc, core.mark, [at[0] + 26, at[1] - 24], [at[0] + radius * 0.7, at[1] - radius * 0.7]);
}

function drawSchedule(doc: Pdf, data: FloorPlanData): void {
  const thickness = inches(data.slab.thicknessIn);
  const openings = data.openings.map((o) => [
    o.mark,
    'Opening',
    `${feetAndInches(o.widthFt)} × ${feetAndInches(o.lengthFt)}`,
    thickness,
    o.use,
  ]);
  const cores = data.cores.map((c) => [c.mark, 'Core', `${inches(c.diameterIn)} dia.`, thickness, c.use]);
  table(doc, {
    title: 'SCHEDULE OF CUTS',
    at: [60, 618],
    columns: [
      { name: 'Mark', width: 46 },
      { name: 'Kind', width: 62 },
      { name: 'Size', width: 120 },
      { name: 'Slab', width: 50, align: 'right' },
      { name: 'For', width: 200 },
    ],
    rows: [...openings, ...cores].slice(0, 7),
  });
  textBlock(doc, { title: 'SLAB', text: data.slab.text, at: [570, 618], width: 380 });
}
