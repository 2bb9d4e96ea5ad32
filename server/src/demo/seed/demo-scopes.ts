import {
  prefillResponsibilities,
  type CutInput,
  type CutKind,
  type PrefillInput,
  type ScopeDraft,
  type Site,
} from '@kerfyard/common/scopes';
import { newId } from '../../platform/ids/ids.ts';
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
} from '../drawing/index.ts';
import type { DemoPhotoName } from '../photos/index.ts';

type Conditions = ScopeDraft['conditions'] & Pick<PrefillInput, 'indoors' | 'face' | 'below'>;

/** A place of the demo and what is cut there; several scopes may take the same place and other cuts. */
export interface DemoScope {
  title: string;
  summary: string;
  site: Site;
  cuts: readonly (readonly [mark: string, cut: CutInput, note?: string])[];
  conditions: Conditions;
  drawing: { name: string; draw: () => Promise<Buffer> };
  photos: readonly (readonly [DemoPhotoName, string])[];
}

const site = (
  zip: string,
  city: string,
  lat: number,
  lon: number,
  rest: Pick<Site, 'name' | 'address' | 'contact'>,
  state = 'OH',
): Site => ({
  ...rest,
  city,
  state,
  zip,
  lat,
  lon,
  timeZone: state === 'IN' ? 'America/Indiana/Indianapolis' : 'America/New_York',
});

const conditions = (part: Partial<Conditions>): Conditions => ({
  element: 'slab_on_grade',
  face: 'floor',
  indoors: true,
  floor: 'Ground',
  steel: 'mesh',
  postTension: 'proved_none',
  below: 'soil',
  enginesAllowed: false,
  overcutsAllowed: true,
  workHours: '7:00 to 15:30, weekdays',
  access: '',
  ...part,
});

const hospitalSite = site('43215', 'Columbus', 39.9671, -83.0044, {
  name: 'Marrow Creek Hospital, West Wing',
  address: '410 Orchard Hill Road',
  contact: 'Otis Varga, superintendent, gate 4',
});
const hospitalConditions = conditions({
  element: 'suspended_slab',
  floor: 'Level 2',
  steel: 'light_bar',
  below: 'occupied',
  overcutsAllowed: false,
  workHours: '19:00 to 05:00; quiet by ward agreement',
  access: 'Freight elevator 8 by 10 ft, 6,000 lb; doors 42 in.',
});

export const hospital: DemoScope = {
  title: 'Level 2 duct risers and sleeves, occupied wing',
  summary:
    'Three openings and six cores through an 8-inch suspended slab above an occupied ward. Night work, cored corners, pieces out by freight elevator.',
  site: hospitalSite,
  cuts: [
    ['O1', opening(4, 3, 8, 'cored', 1, 250), 'Supply duct riser'],
    ['O2', opening(5, 3.5, 8, 'cored', 1, 250), 'Return duct riser'],
    ['O3', opening(3, 3, 8, 'cored', 1, 250), 'Pipe shaft'],
    ['K1', { kind: 'core', diameterIn: 6, depthIn: 8, count: 2 }, 'Sanitary'],
    ['K2', { kind: 'core', diameterIn: 4, depthIn: 8, count: 4 }, 'Conduit'],
  ],
  conditions: hospitalConditions,
  drawing: { name: 'A-212 Level 2 slab openings.pdf', draw: () => drawFloorPlan(hospitalFloorPlan) },
  photos: [
    ['slab_with_layout', 'Layout of O1 in chalk'],
    ['access_path', 'Way from the freight elevator'],
    ['water_and_power', 'Hose bibb and panel'],
  ],
};

export const hospitalSleeves: DemoScope = {
  ...hospital,
  title: 'Conduit sleeves, level 2',
  summary: 'Four sleeves only, while the ceiling below is open.',
  cuts: [['K2', { kind: 'core', diameterIn: 4, depthIn: 8, count: 4 }, 'Conduit']],
};

export const mill: DemoScope = {
  title: 'Brew hall stair opening and floor sinks',
  summary: 'Slab on ground in a mill under conversion: a stair opening, two sink pockets and three drains.',
  site: site('45402', 'Dayton', 39.7563, -84.1895, {
    name: 'Lindqvist Mill, Building 3',
    address: '18 Sluice Street',
    contact: 'Wren Castellane, at the roll-up door',
  }),
  cuts: [
    ['O1', opening(8, 3.5, 6, 'overcut', 1, 900), 'Stair to cellar'],
    ['O2', opening(3, 3, 6, 'overcut', 2, 900), 'Floor sinks'],
    ['K1', { kind: 'core', diameterIn: 5, depthIn: 6, count: 3 }, 'Drains'],
  ],
  conditions: conditions({ access: 'Roll-up door 12 ft, level slab; skid steer may enter.' }),
  drawing: { name: 'A-101 Ground floor.pdf', draw: () => drawFloorPlan(millFloorPlan) },
  photos: [
    ['slab_with_layout', 'Stair opening marked'],
    ['access_path', 'From the roll-up door'],
    ['water_and_power', 'Water and 480 V at line 2'],
  ],
};

export const trench: DemoScope = {
  title: 'Quarry Lane water main, 110 ft of trench',
  summary:
    'Saw both sides through asphalt and a 7-inch concrete base; two laterals. Breaking and hauling by us.',
  site: site('43604', 'Toledo', 41.6515, -83.5427, {
    name: 'Quarry Lane, stations 0+10 to 1+20',
    address: 'Quarry Lane',
    contact: 'Ruben Oyelaran, site office on the corner',
  }),
  cuts: [
    ['T1', { kind: 'trench', lengthFt: 110, widthFt: 3, thicknessIn: 9, count: 1 }, 'Main'],
    ['T2', { kind: 'trench', lengthFt: 14, widthFt: 2, thicknessIn: 9, count: 2 }, 'Laterals'],
  ],
  conditions: conditions({
    element: 'pavement',
    indoors: false,
    floor: '',
    enginesAllowed: true,
    workHours: '9:00 to 16:00, one lane open',
    access: 'Street, closed on one side.',
  }),
  drawing: { name: 'C-05 Trench sawing plan.pdf', draw: () => drawTrenchPlan(waterMainTrench) },
  photos: [
    ['trench_marked_on_pavement', 'Trench line at station 0+40'],
    ['trench_sawn', 'How the first bay looked when sawn'],
  ],
};

export const warehouse: DemoScope = {
  title: 'Contraction joints, bays 1 to 6',
  summary: 'Joints in a 7-inch slab on ground, sawn the night of each pour. Six pours, one a week.',
  site: site(
    '46218',
    'Indianapolis',
    39.8069,
    -86.1014,
    {
      name: 'Halvorsen Distribution Center',
      address: '2200 Grain Belt Parkway',
      contact: 'Pour foreman, dock 14',
    },
    'IN',
  ),
  cuts: [
    ['J1', { kind: 'line', lengthFt: 120, depthIn: 1.75, count: 19 }, 'Across the bays'],
    ['J2', { kind: 'line', lengthFt: 250, depthIn: 1.75, count: 8 }, 'Along the bays'],
  ],
  conditions: conditions({
    steel: 'none',
    enginesAllowed: true,
    workHours: 'By the pour: window of 4 to 12 h after finishing, nights',
    access: 'Dock doors 14 ft.',
  }),
  drawing: { name: 'S-101 Joint plan.pdf', draw: () => drawJointPlan(warehouseJoints) },
  photos: [['sawn_joints', 'Joints of phase 1']],
};

export const station: DemoScope = {
  title: 'Concourse wall: elevator lobby and ticket window',
  summary: 'Two openings through a 14-inch wall with two mats, and four sleeves. Night possession only.',
  site: site('44113', 'Cleveland', 41.4822, -81.6998, {
    name: 'Fenwick Street Station',
    address: '600 Fenwick Street',
    contact: 'Delphine Marsh, station office',
  }),
  cuts: [
    ['W1', { ...opening(8, 9, 14, 'square', 1, 2000), uncutSides: ['bottom'] }, 'Elevator lobby'],
    ['W2', opening(6, 5, 14, 'square', 1, 2000), 'Ticket window'],
    ['K1', { kind: 'core', diameterIn: 8, depthIn: 14, count: 4 }, 'Smoke exhaust sleeves'],
  ],
  conditions: conditions({
    element: 'wall',
    face: 'wall',
    floor: 'Concourse',
    steel: 'heavy_bar',
    below: 'unoccupied',
    overcutsAllowed: false,
    workHours: '22:00 to 05:00',
    access: 'Freight door at line 11, 7 ft clear.',
  }),
  drawing: { name: 'S-305 Concourse wall.pdf', draw: () => drawWallElevation(stationWall) },
  photos: [
    ['wall_with_marked_opening', 'W1 marked, concourse side'],
    ['access_path', 'Way to the freight door'],
  ],
};

function opening(
  lengthFt: number,
  widthFt: number,
  thicknessIn: number,
  corners: 'overcut' | 'cored' | 'square',
  count: number,
  maxPieceLb: number,
): Extract<CutInput, { kind: 'opening' }> {
  return {
    kind: 'opening',
    lengthFt,
    widthFt,
    thicknessIn,
    corners,
    count,
    removal: { densityPcf: 150, allowancePct: 10, maxPieceLb },
  };
}

export interface DraftOptions {
  mode: 'sealed' | 'ranked';
  dueAt: Date;
  workFrom: Date;
  retainageBasisPoints?: number;
}

const DAY_MS = 86_400_000;
const isoDate = (date: Date): string => date.toISOString().slice(0, 10);

/** The draft as the form would hold it: the sheet prefilled as the form prefills it. */
export function draftOf(scope: DemoScope, options: DraftOptions): ScopeDraft {
  const kinds = [...new Set(scope.cuts.map(([, cut]) => cut.kind))] as CutKind[];
  return {
    title: scope.title,
    summary: scope.summary,
    site: { ...scope.site },
    cuts: scope.cuts.map(([mark, cut, note = '']) => ({
      id: newId(),
      mark,
      note,
      cut: { ...cut } as ScopeDraft['cuts'][number]['cut'],
    })),
    conditions: scope.conditions,
    responsibilities: prefillResponsibilities({ kinds, ...scope.conditions }).map((row) => ({ ...row })),
    terms: {
      priceForm: 'either',
      retainageBasisPoints: options.retainageBasisPoints ?? 0,
      standbyFreeMinutes: 30,
      answerDays: 7,
      bidValidDays: 30,
      workFrom: isoDate(options.workFrom),
      workTo: isoDate(new Date(options.workFrom.getTime() + 21 * DAY_MS)),
      wages: 'open_shop',
      notes: '',
    },
    bidding: { mode: options.mode, dueAt: options.dueAt.toISOString() },
  };
}
