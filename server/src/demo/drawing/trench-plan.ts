import {
  cutMark,
  dimension,
  northArrow,
  scaleBar,
  sectionMark,
  table,
  textBlock,
  viewTitle,
} from './drafting.ts';
import { feetAndInches, inches } from './feet-and-inches.ts';
import { hatchConcrete, hatchEarth, hatchLines, repeatable } from './hatching.ts';
import { ink, label, stroke, View, type Pdf, type Point, type SheetData } from './sheet.ts';
import { drawSheet } from './draw-sheet.ts';

export interface TrenchPlanData {
  sheet: SheetData;
  view: string;
  street: string;
  /** Along the street and between the walks' outer edges. */
  sizeFt: readonly [length: number, width: number];
  walkFt: number;
  trench: { mark: string; fromFt: number; toFt: number; offsetFt: number; widthFt: number };
  /** Side trenches across to the walk: services. */
  laterals: readonly { mark: string; atFt: number; lengthFt: number; widthFt: number }[];
  lines: readonly { name: string; offsetFt: number }[];
  section: { asphaltIn: number; concreteIn: number; baseIn: number; trenchDepthFt: number; pipe: string };
  text: string;
  north: number;
}

/** A street with a trench to be sawn, what lies beside it, and a section through it. */
export function drawTrenchPlan(data: TrenchPlanData): Promise<Buffer> {
  return drawSheet(data.sheet, (doc) => {
    const { view, scale } = View.fitting(data.sizeFt, { left: 70, top: 70, width: 880, height: 330 });
    drawStreet(doc, view, data);
    drawExisting(doc, view, data);
    drawTrench(doc, view, data);
    const bottom = view.at(0, data.sizeFt[1])[1];
    viewTitle(doc, { number: '1', title: data.view, scale }, [60, bottom + 44]);
    scaleBar(doc, [340, bottom + 40], { pointsPerFt: view.pointsPerFt, stepFt: 10 });
    northArrow(doc, [930, bottom + 46], data.north);
    drawSection(doc, data, bottom + 96);
    drawSchedule(doc, data, bottom + 96);
  });
}

function drawStreet(doc: Pdf, view: View, { sizeFt: [length, width], walkFt, street }: TrenchPlanData): void {
  const [left, top] = view.at(0, 0);
  const [right, bottom] = view.at(length, width);
  const walk = view.ft(walkFt);
  doc
    .save()
    .rect(left, top + walk, right - left, bottom - top - walk * 2)
    .fill('#efeee9')
    .restore();
  for (const edge of [top, bottom - walk]) {
    doc
      .save()
      .rect(left, edge, right - left, walk)
      .fill('#e3e1d9')
      .restore();
    for (let x = 5; x < length; x += 5) {
      stroke(
        doc,
        [
          [view.at(x, 0)[0], edge],
          [view.at(x, 0)[0], edge + walk],
        ],
        { width: 0.3, color: ink.faint },
      );
    }
  }
  for (const y of [top, top + walk, bottom - walk, bottom])
    stroke(
      doc,
      [
        [left, y],
        [right, y],
      ],
      { width: 1.1 },
    );
  for (const y of [top + walk + 4, bottom - walk - 4])
    stroke(
      doc,
      [
        [left, y],
        [right, y],
      ],
      { width: 0.5 },
    );
  const middle = view.at(0, width / 2)[1];
  stroke(
    doc,
    [
      [left, middle],
      [right, middle],
    ],
    { width: 0.8, dash: [16, 8], color: ink.faint },
  );
  label(doc, street, [left + (right - left) * 0.84, middle], {
    size: 15,
    bold: true,
    color: ink.soft,
    align: 'center',
    backed: true,
  });
  label(doc, 'SIDEWALK', [left + 60, top + walk / 2], { size: 7.5, color: ink.soft, backed: true });
  label(doc, 'SIDEWALK', [left + 60, bottom - walk / 2], { size: 7.5, color: ink.soft, backed: true });
  breakLine(doc, left, top - 10, bottom + 10);
  breakLine(doc, right, top - 10, bottom + 10);
  for (let station = 0; station <= length; station += 20) {
    const [x] = view.at(station, 0);
    stroke(
      doc,
      [
        [x, top - 4],
        [x, top - 12],
      ],
      { width: 0.8 },
    );
    label(doc, `${Math.floor(station / 100)}+${String(station % 100).padStart(2, '0')}`, [x, top - 20], {
      size: 7,
      align: 'center',
      color: ink.soft,
    });
  }
}

/** The street goes on beyond the sheet. */
function breakLine(doc: Pdf, x: number, top: number, bottom: number): void {
  const middle = (top + bottom) / 2;
  const zigzag: Point[] = [
    [x, top],
    [x, middle - 8],
    [x - 5, middle - 3],
    [x + 5, middle + 3],
    [x, middle + 8],
    [x, bottom],
  ];
  stroke(doc, zigzag, { width: 0.8 });
}

function drawExisting(doc: Pdf, view: View, { lines, sizeFt: [length] }: TrenchPlanData): void {
  lines.forEach(({ name, offsetFt }, index) => {
    const y = view.at(0, offsetFt)[1];
    stroke(doc, [view.at(0, offsetFt), view.at(length, offsetFt)], {
      width: 0.8,
      color: ink.water,
      dash: [9, 4],
    });
    label(doc, name, [view.at(length * (0.16 + 0.3 * (index % 3)), 0)[0], y], {
      size: 7,
      color: ink.water,
      backed: true,
    });
  });
}

function drawTrench(doc: Pdf, view: View, data: TrenchPlanData): void {
  const { trench, laterals, sizeFt, walkFt } = data;
  const [x1, y1] = view.at(trench.fromFt, trench.offsetFt);
  const [x2, y2] = view.at(trench.toFt, trench.offsetFt + trench.widthFt);
  cutBox(doc, { x: x1, y: y1, width: x2 - x1, height: y2 - y1 });
  dimension(doc, { from: [x1, y2], to: [x2, y2], offset: 36, lengthFt: trench.toFt - trench.fromFt });
  dimension(doc, { from: [x2, y1], to: [x2, y2], offset: -16, lengthFt: trench.widthFt });
  const kerb = view.at(0, sizeFt[1] - walkFt)[1];
  const measured = x1 - 18;
  dimension(doc, {
    from: [measured, y2],
    to: [measured, kerb],
    offset: 0.01,
    lengthFt: sizeFt[1] - walkFt - trench.offsetFt - trench.widthFt,
    size: 7,
  });
  cutMark(doc, trench.mark, [x1 + (x2 - x1) * 0.56, y1 - 30], [x1 + (x2 - x1) * 0.53, y1]);
  laterals.forEach((lateral) => {
    const [x, y] = view.at(lateral.atFt, trench.offsetFt - lateral.lengthFt);
    const box = { x, y, width: view.ft(lateral.widthFt), height: view.ft(lateral.lengthFt) };
    cutBox(doc, box);
    dimension(doc, { from: [x, y], to: [x, y1], offset: 14, lengthFt: lateral.lengthFt, size: 7 });
    cutMark(doc, lateral.mark, [x + box.width + 28, y + 14], [x + box.width, y + 14]);
  });
  const cut = x1 + (x2 - x1) * 0.36;
  sectionMark(doc, { name: 'A', at: [cut, y1 - 32], pointing: 1 });
  stroke(
    doc,
    [
      [cut, y1 - 12],
      [cut, y2 + 12],
    ],
    { width: 0.9, dash: [8, 3] },
  );
}

function cutBox(doc: Pdf, box: { x: number; y: number; width: number; height: number }): void {
  doc.save().rect(box.x, box.y, box.width, box.height).fill('#f7e4e1').restore();
  hatchLines(doc, box, { gap: 6, color: '#dfa39c' });
  doc.save().lineWidth(1.4).rect(box.x, box.y, box.width, box.height).stroke(ink.cut).restore();
}

function drawSection(doc: Pdf, { section, trench }: TrenchPlanData, top: number): void {
  const scale = 30;
  const centre = 232;
  const half = (trench.widthFt * scale) / 2;
  const layers = [
    { name: `${inches(section.asphaltIn)} asphalt`, thickIn: section.asphaltIn, fill: '#55585b' },
    { name: `${inches(section.concreteIn)} concrete base`, thickIn: section.concreteIn, fill: ink.concrete },
    { name: `${inches(section.baseIn)} aggregate`, thickIn: section.baseIn, fill: '#e9e2cf' },
  ];
  let y = top;
  layers.forEach((layer, index) => {
    const height = (layer.thickIn / 12) * scale * 1.6;
    for (const [x, width] of [
      [centre - half - 130, 130],
      [centre + half, 130],
    ] as const) {
      drawLayer(doc, { x, y, width, height }, { ...layer, index });
    }
    stroke(
      doc,
      [
        [centre + half + 70, y + height / 2],
        [centre + half + 150, y + height / 2],
      ],
      { width: 0.5 },
    );
    label(doc, layer.name, [centre + half + 154, y + height / 2], { size: 7.5 });
    y += height;
  });
  const sawn = top + ((section.asphaltIn + section.concreteIn) / 12) * scale * 1.6;
  const floor = top + section.trenchDepthFt * scale * 1.05;
  hatchEarth(doc, { x: centre - half - 130, y, width: 130, height: floor - y + 16 });
  hatchEarth(doc, { x: centre + half, y, width: 130, height: floor - y + 16 });
  hatchEarth(doc, { x: centre - half, y: floor, width: half * 2, height: 16 });
  for (const x of [centre - half, centre + half]) {
    stroke(
      doc,
      [
        [x, top - 10],
        [x, sawn],
      ],
      { width: 2, color: ink.cut },
    );
    stroke(
      doc,
      [
        [x, sawn],
        [x, y],
      ],
      { width: 1 },
    );
    stroke(
      doc,
      [
        [x, y],
        [x, floor],
      ],
      { width: 1 },
    );
  }
  stroke(
    doc,
    [
      [centre - half, floor],
      [centre + half, floor],
    ],
    { width: 1 },
  );
  doc
    .save()
    .lineWidth(1.2)
    .circle(centre, floor - 16, 11)
    .stroke(ink.line)
    .restore();
  label(doc, section.pipe, [centre, floor - 36], { size: 7, align: 'center' });
  label(doc, 'SAW FULL DEPTH, BOTH SIDES', [centre, top - 24], {
    size: 7.5,
    bold: true,
    color: ink.cut,
    align: 'center',
  });
  dimension(doc, {
    from: [centre - half, floor + 16],
    to: [centre + half, floor + 16],
    offset: 12,
    lengthFt: trench.widthFt,
  });
  dimension(doc, {
    from: [centre - half - 130, top],
    to: [centre - half - 130, floor],
    offset: 14,
    lengthFt: section.trenchDepthFt,
  });
  viewTitle(doc, { number: 'A', title: 'SECTION THROUGH TRENCH', scale: 'NONE' }, [
    60,
    Math.min(738, floor + 58),
  ]);
}

interface Layer {
  fill: string;
  index: number;
}

function drawLayer(
  doc: Pdf,
  box: { x: number; y: number; width: number; height: number },
  { fill, index }: Layer,
): void {
  if (index === 1) hatchConcrete(doc, box, 5);
  else {
    doc.save().rect(box.x, box.y, box.width, box.height).fill(fill).restore();
    if (index === 2) aggregate(doc, box);
  }
  doc.save().lineWidth(0.8).rect(box.x, box.y, box.width, box.height).stroke(ink.line).restore();
}

function aggregate(doc: Pdf, box: { x: number; y: number; width: number; height: number }): void {
  const next = repeatable(9);
  doc.save().rect(box.x, box.y, box.width, box.height).clip().lineWidth(0.4).strokeColor(ink.soft);
  for (let n = 0; n < (box.width * box.height) / 22; n += 1) {
    doc.circle(box.x + next() * box.width, box.y + next() * box.height, 1 + next() * 1.6).stroke();
  }
  doc.restore();
}

function drawSchedule(doc: Pdf, { trench, laterals, section, text }: TrenchPlanData, top: number): void {
  const depth = inches(section.asphaltIn + section.concreteIn);
  const row = (mark: string, lengthFt: number, widthFt: number, note: string) => [
    mark,
    feetAndInches(lengthFt),
    feetAndInches(widthFt),
    depth,
    note,
  ];
  table(doc, {
    title: 'SCHEDULE OF CUTS',
    at: [520, top - 30],
    columns: [
      { name: 'Mark', width: 46 },
      { name: 'Length', width: 70, align: 'right' },
      { name: 'Width', width: 60, align: 'right' },
      { name: 'Depth', width: 60, align: 'right' },
      { name: 'Note', width: 190 },
    ],
    rows: [
      row(trench.mark, trench.toFt - trench.fromFt, trench.widthFt, 'Main, both sides and both ends'),
      ...laterals.map((l) => row(l.mark, l.lengthFt, l.widthFt, 'Service, both sides and far end')),
    ],
  });
  textBlock(doc, { title: 'PAVEMENT', text, at: [520, top + 88], width: 426 });
}
