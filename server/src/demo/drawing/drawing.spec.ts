import { readPdfText } from '../../../test/pdf-text.ts';
import { inspectPdf } from '../../files/pdf-inspection.ts';
import {
  drawFloorPlan,
  drawJointPlan,
  drawTrenchPlan,
  drawWallElevation,
  hospitalFloorPlan,
  millFloorPlan,
  stationWall,
  warehouseJoints,
  waterMainTrench,
} from './index.ts';
import { feetAndInches, inches } from './feet-and-inches.ts';

const sheets = {
  'A-212': () => drawFloorPlan(hospitalFloorPlan),
  'A-103': () => drawFloorPlan(millFloorPlan),
  'C-05': () => drawTrenchPlan(waterMainTrench),
  'S-101': () => drawJointPlan(warehouseJoints),
  'S-305': () => drawWallElevation(stationWall),
};

describe('lengths as drawings write them', () => {
  it.each([
    [12.5, `12'-6"`],
    [3, `3'-0"`],
    [0.75, `9"`],
    [1.75 / 12, `1 3/4"`],
    [0.25 / 12, `1/4"`],
    [11.999, `12'-0"`],
  ])('%d ft is %s', (lengthFt, text) => expect(feetAndInches(lengthFt)).toBe(text));

  it('writes inches as mixed numbers', () => {
    expect([inches(8), inches(7.5), inches(14)]).toEqual(['8"', '7 1/2"', '14"']);
  });
});

describe.each(Object.entries(sheets))('sheet %s', (number, draw) => {
  it('is one plain page that an upload takes, with its number as text', async () => {
    const bytes = await draw();
    expect(await inspectPdf(bytes, 200)).toEqual({ ok: true, pages: 1 });
    expect((await readPdfText(bytes)).join()).toContain(number);
  });
});

it('writes every cut of a plan with its size as text', async () => {
  const [text] = await readPdfText(await drawFloorPlan(hospitalFloorPlan));
  for (const { mark, widthFt, lengthFt } of hospitalFloorPlan.openings) {
    expect(text).toContain(mark);
    expect(text).toContain(`${feetAndInches(widthFt)} × ${feetAndInches(lengthFt)}`);
  }
  expect(text).toContain('6" dia.');
});

it('adds up the joints it draws', async () => {
  // 5 bays of 4 panels: 19 joints of 120 ft; 3 bays of 3 panels: 8 joints of 250 ft.
  const [text] = await readPdfText(await drawJointPlan(warehouseJoints));
  for (const length of ['2,280 LF', '2,000 LF', '4,280 LF']) expect(text).toContain(length);
});
