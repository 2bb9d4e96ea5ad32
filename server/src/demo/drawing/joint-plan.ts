import { dimension, gridLine, northArrow, scaleBar, table, viewTitle } from './drafting.ts';
import { feetAndInches, inches } from './feet-and-inches.ts';
import { hatchConcrete, hatchEarth } from './hatching.ts';
import { ink, label, stroke, View, type Pdf, type SheetData } from './sheet.ts';
import { drawSheet } from './draw-sheet.ts';

export interface JointPlanData {
  sheet: SheetData;
  view: string;
  sizeFt: readonly [width: number, depth: number];
  /** Distances between columns, from the left and from the top. */
  baysFt: { across: readonly number[]; down: readonly number[] };
  /** How many panels each bay is cut into, each way. */
  panels: { across: number; down: number };
  mark: string;
  slabIn: number;
  jointDepthIn: number;
  jointWidthIn: number;
  north: number;
}

/** A slab on ground with its contraction joints, and a joint in section. */
export function drawJointPlan(data: JointPlanData): Promise<Buffer> {
  return drawSheet(data.sheet, (doc) => {
    const { view, scale } = View.fitting(data.sizeFt, { left: 110, top: 92, width: 820, height: 420 });
    drawSlab(doc, view, data);
    const lengths = drawJoints(doc, view, data);
    drawColumns(doc, view, data);
    viewTitle(doc, { number: '1', title: data.view, scale }, [60, 580]);
    scaleBar(doc, [350, 576], { pointsPerFt: view.pointsPerFt, stepFt: 20 });
    northArrow(doc, [930, 584], data.north);
    drawDetail(doc, data);
    drawSchedule(doc, data, lengths);
  });
}

/** 0 and the places of the columns' lines. */
function lines(bays: readonly number[]): number[] {
  return bays.reduce((places, bay) => [...places, (places.at(-1) ?? 0) + bay], [0]);
}

/** Where joints run: on the columns' lines within the slab and evenly between them. */
function joints(bays: readonly number[], panels: number): number[] {
  const edges = lines(bays);
  const all = bays.flatMap((bay, index) =>
    Array.from({ length: panels }, (_, n) => (edges[index] ?? 0) + (bay * (n + 1)) / panels),
  );
  return all.slice(0, -1);
}

function drawSlab(doc: Pdf, view: View, { sizeFt: [width, depth], baysFt }: JointPlanData): void {
  const [left, top] = view.at(0, 0);
  doc
    .save()
    .lineWidth(2)
    .rect(left, top, view.ft(width), view.ft(depth))
    .fillAndStroke('#f0efea', ink.line)
    .restore();
  const across = lines(baysFt.across);
  const down = lines(baysFt.down);
  across.forEach((x, index) =>
    gridLine(doc, String(index + 1), [view.at(x, 0)[0], top - 46], [view.at(x, 0)[0], top]),
  );
  down.forEach((y, index) => {
    const name = String.fromCharCode(65 + index);
    gridLine(doc, name, [left - 46, view.at(0, y)[1]], [left, view.at(0, y)[1]]);
  });
  across.slice(1).forEach((x, index) => {
    const before = across[index] ?? 0;
    dimension(doc, { from: view.at(before, 0), to: view.at(x, 0), offset: -22, lengthFt: x - before });
  });
  down.slice(1).forEach((y, index) => {
    const before = down[index] ?? 0;
    dimension(doc, { from: view.at(0, before), to: view.at(0, y), offset: 22, lengthFt: y - before });
  });
}

function drawJoints(doc: Pdf, view: View, data: JointPlanData): { across: number; down: number } {
  const [width, depth] = data.sizeFt;
  const xs = joints(data.baysFt.across, data.panels.across);
  const ys = joints(data.baysFt.down, data.panels.down);
  xs.forEach((x) =>
    stroke(doc, [view.at(x, 0), view.at(x, depth)], { width: 0.9, color: ink.cut, dash: [7, 2] }),
  );
  ys.forEach((y) =>
    stroke(doc, [view.at(0, y), view.at(width, y)], { width: 0.9, color: ink.cut, dash: [7, 2] }),
  );
  const [first, second] = xs;
  if (first !== undefined && second !== undefined) {
    const row = view.at(0, depth)[1];
    dimension(doc, {
      from: [view.at(0, 0)[0], row],
      to: [view.at(first, 0)[0], row],
      offset: 18,
      lengthFt: first,
      size: 7,
    });
    dimension(doc, {
      from: [view.at(first, 0)[0], row],
      to: [view.at(second, 0)[0], row],
      offset: 18,
      lengthFt: second - first,
      size: 7,
    });
    label(doc, 'typ.', [view.at(second, 0)[0] + 8, row + 18], { size: 7 });
  }
  const at = view.at((xs[1] ?? 0) + 1, (ys[0] ?? 0) / 2);
  label(doc, `${data.mark}  SAWCUT CONTRACTION JOINT, TYP.`, [at[0], at[1]], {
    size: 7.5,
    color: ink.cut,
    backed: true,
  });
  return { across: xs.length * depth, down: ys.length * width };
}

/** Columns stand in isolation diamonds that are formed, not sawn. */
function drawColumns(doc: Pdf, view: View, { baysFt }: JointPlanData): void {
  for (const x of lines(baysFt.across)) {
    for (const y of lines(baysFt.down)) {
      const [cx, cy] = view.at(x, y);
      const reach = view.ft(2);
      doc.save().lineWidth(0.8);
      doc
        .polygon([cx, cy - reach], [cx + reach, cy], [cx, cy + reach], [cx - reach, cy])
        .fillAndStroke(ink.paper, ink.line);
      const half = Math.max(2, view.ft(0.6));
      doc
        .rect(cx - half, cy - half, half * 2, half * 2)
        .fill(ink.line)
        .restore();
    }
  }
}

function drawDetail(doc: Pdf, { slabIn, jointDepthIn, jointWidthIn }: JointPlanData): void {
  const box = { x: 70, y: 624, width: 260, height: 70 };
  const depth = (jointDepthIn / slabIn) * box.height;
  const centre = box.x + box.width / 2;
  hatchConcrete(doc, box, 21);
  hatchEarth(doc, { ...box, y: box.y + box.height, height: 14 });
  doc.save().lineWidth(1.2).rect(box.x, box.y, box.width, box.height).stroke(ink.line).restore();
  doc
    .save()
    .rect(centre - 3, box.y - 1, 6, depth)
    .fill(ink.paper)
    .restore();
  doc
    .save()
    .lineWidth(1.4)
    .strokeColor(ink.cut)
    .moveTo(centre - 3, box.y)
    .lineTo(centre - 3, box.y + depth);
  doc
    .lineTo(centre + 3, box.y + depth)
    .lineTo(centre + 3, box.y)
    .stroke()
    .restore();
  stroke(
    doc,
    [
      [centre, box.y + depth],
      [centre + 2, box.y + depth + 14],
      [centre - 3, box.y + depth + 26],
      [centre, box.y + box.height],
    ],
    {
      width: 0.7,
    },
  );
  const tip = box.y + depth * 0.6;
  stroke(
    doc,
    [
      [centre + 4, tip],
      [centre + 44, tip],
    ],
    { width: 0.5 },
  );
  label(doc, `${inches(jointDepthIn)} deep`, [centre + 48, tip], { size: 7.5, backed: true });
  label(doc, `${widthText(jointWidthIn)} wide`, [centre, box.y - 12], { size: 7.5, align: 'center' });
  dimension(doc, {
    from: [box.x + box.width, box.y],
    to: [box.x + box.width, box.y + box.height],
    offset: -16,
    lengthFt: slabIn / 12,
  });
  viewTitle(doc, { number: '2', title: 'CONTRACTION JOINT', scale: 'NONE' }, [60, 734]);
}

const widthText = (widthIn: number): string => (widthIn === 0.125 ? '1/8"' : inches(widthIn));

function drawSchedule(
  doc: Pdf,
  data: JointPlanData,
  { across, down }: { across: number; down: number },
): void {
  const row = (direction: string, lengthFt: number) => [
    data.mark,
    direction,
    `${Math.round(lengthFt).toLocaleString('en-US')} LF`,
    feetAndInches(data.jointDepthIn / 12),
    widthText(data.jointWidthIn),
  ];
  table(doc, {
    title: 'SCHEDULE OF JOINTS',
    at: [440, 612],
    columns: [
      { name: 'Mark', width: 46 },
      { name: 'Direction', width: 120 },
      { name: 'Length', width: 90, align: 'right' },
      { name: 'Depth', width: 70, align: 'right' },
      { name: 'Width', width: 60, align: 'right' },
    ],
    rows: [row('North to south', across), row('East to west', down), row('Total', across + down)],
  });
  label(doc, 'Saw as soon as the edge does not ravel; finish a pour the same day.', [440, 706], {
    size: 7.5,
  });
  label(doc, 'Lengths are measured through the diamonds at columns.', [440, 718], { size: 7.5 });
}
