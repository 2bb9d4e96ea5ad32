import type { FloorPlanData } from './floor-plan.ts';
import type { JointPlanData } from './joint-plan.ts';
import type { SheetData } from './sheet.ts';
import type { TrenchPlanData } from './trench-plan.ts';
import type { WallElevationData } from './wall-elevation.ts';

const usualNotes = [
  'Locate reinforcement, embedded lines and post-tensioning by scan before any cut. Stop if conditions differ.',
  'Cut lines are laid out by the general contractor and signed off before the saw starts.',
  'Do not overcut corners of openings unless the schedule says so. Core corners where square ones are asked for.',
  'Contain water and slurry. Keep both out of drains.',
  'Support pieces before the last cut. Rig by a qualified rigger.',
  'Work from figures, not by scaling this sheet.',
];

const sheet = (part: Omit<SheetData, 'notes'> & { notes?: readonly string[] }): SheetData => ({
  notes: usualNotes,
  ...part,
});

/** Level 2 of a hospital wing: shafts and sleeves through a suspended slab. */
export const hospitalFloorPlan: FloorPlanData = {
  sheet: sheet({
    project: 'Marrow Creek Hospital, West Wing Retrofit',
    address: '410 Orchard Hill Road, Columbus, Ohio 43215',
    firm: 'Ostrander & Vale, Architects',
    firmLine: '77 Tannery Row, Columbus, Ohio · Commission 2619',
    number: 'A-212',
    title: 'Level 2 Part Plan: Slab Openings',
    revision: 'B',
    date: '2026-10-14',
    drawnBy: 'TLM',
    checkedBy: 'RV',
  }),
  view: 'PART PLAN, LEVEL 2',
  sizeFt: [72, 44],
  slab: {
    thicknessIn: 8,
    text: 'Existing two-way slab, 8" thick, cast 1988, 4,000 psi, No. 5 bars at 12" each way top and bottom (record drawings; confirm by scan). Not post-tensioned. Level 1 below is occupied: protect and watch during every cut and core.',
  },
  grid: {
    across: [
      { name: 'C', xFt: 4 },
      { name: 'D', xFt: 26 },
      { name: 'E', xFt: 48 },
      { name: 'F', xFt: 68 },
    ],
    down: [
      { name: '3', yFt: 4 },
      { name: '4', yFt: 22 },
      { name: '5', yFt: 40 },
    ],
  },
  walls: [
    { from: [0, 2], to: [72, 2], thicknessIn: 12, kind: 'concrete' },
    { from: [0, 42], to: [72, 42], thicknessIn: 12, kind: 'concrete' },
    { from: [0.5, 2], to: [0.5, 42], thicknessIn: 12, kind: 'concrete' },
    { from: [71.5, 2], to: [71.5, 42], thicknessIn: 12, kind: 'concrete' },
    { from: [37, 2.5], to: [37, 17], thicknessIn: 5, kind: 'partition' },
    { from: [1, 17], to: [28, 17], thicknessIn: 5, kind: 'partition' },
    { from: [32, 17], to: [71, 17], thicknessIn: 5, kind: 'partition' },
    { from: [1, 26], to: [44, 26], thicknessIn: 5, kind: 'partition' },
    { from: [48, 26], to: [71, 26], thicknessIn: 5, kind: 'partition' },
    { from: [22, 26], to: [22, 41.5], thicknessIn: 5, kind: 'partition' },
    { from: [51, 26], to: [51, 41.5], thicknessIn: 5, kind: 'partition' },
  ],
  columnsIn: 20,
  rooms: [
    { name: 'IMAGING PREP 214', at: [22, 14.5] },
    { name: 'CLEAN UTILITY 216', at: [62, 14.5] },
    { name: 'CORRIDOR 200', at: [60, 21] },
    { name: 'EXAM 221', at: [8, 38] },
    { name: 'MECHANICAL 223', at: [43, 38] },
    { name: 'STAFF 225', at: [66, 38] },
  ],
  openings: [
    { mark: 'O1', at: [10, 7], widthFt: 4, lengthFt: 3, use: 'Supply duct riser' },
    { mark: 'O2', at: [41, 7], widthFt: 5, lengthFt: 3.5, use: 'Return duct riser' },
    { mark: 'O3', at: [28, 29.5], widthFt: 3, lengthFt: 3, use: 'Pipe shaft' },
  ],
  cores: [
    { mark: 'K1', at: [57, 31], diameterIn: 6, use: 'Sanitary, 2 holes' },
    { mark: 'K2', at: [12.5, 31], diameterIn: 4, use: 'Conduit, 4 holes' },
  ],
  north: -18,
};

/** A stair opening and floor sinks in an old mill's ground floor. */
export const millFloorPlan: FloorPlanData = {
  sheet: sheet({
    project: 'Lindqvist Mill, Building 3 Conversion',
    address: '18 Sluice Street, Dayton, Ohio 45402',
    firm: 'Pell Harbor Design Office',
    firmLine: '9 Lantern Court, Dayton, Ohio · Job 114-26',
    number: 'A-103',
    title: 'Ground Floor: New Stair and Floor Sinks',
    revision: 'A',
    date: '2026-11-03',
    drawnBy: 'JO',
    checkedBy: 'MP',
  }),
  view: 'GROUND FLOOR PLAN',
  sizeFt: [40, 26],
  slab: {
    thicknessIn: 6,
    text: 'Existing slab on ground, 6" thick, welded mesh at mid depth. Soil below. Power 480 V, three phase, at the panel on line 2; water at the hose bibb by the roll-up door.',
  },
  grid: {
    across: [
      { name: '1', xFt: 3 },
      { name: '2', xFt: 20 },
      { name: '3', xFt: 37 },
    ],
    down: [
      { name: 'A', yFt: 3 },
      { name: 'B', yFt: 23 },
    ],
  },
  walls: [
    { from: [1, 1], to: [39, 1], thicknessIn: 16, kind: 'concrete' },
    { from: [1, 25], to: [14, 25], thicknessIn: 16, kind: 'concrete' },
    { from: [26, 25], to: [39, 25], thicknessIn: 16, kind: 'concrete' },
    { from: [1, 1], to: [1, 25], thicknessIn: 16, kind: 'concrete' },
    { from: [39, 1], to: [39, 25], thicknessIn: 16, kind: 'concrete' },
  ],
  columnsIn: 14,
  rooms: [
    { name: 'BREW HALL 101', at: [29, 19] },
    { name: 'ROLL-UP DOOR', at: [20, 24.6] },
  ],
  openings: [
    { mark: 'O1', at: [7, 7], widthFt: 8, lengthFt: 3.5, use: 'Stair to cellar' },
    { mark: 'O2', at: [25, 8], widthFt: 3, lengthFt: 3, use: 'Floor sink' },
  ],
  cores: [{ mark: 'K1', at: [33, 13], diameterIn: 5, use: 'Drain, 3 holes' }],
  north: 25,
};

export const waterMainTrench: TrenchPlanData = {
  sheet: sheet({
    project: 'Quarry Lane Water Main Renewal',
    address: 'Quarry Lane, stations 0+10 to 1+20, Toledo, Ohio 43604',
    firm: 'Brightwater Civil Group',
    firmLine: '240 Ferry Landing, Toledo, Ohio · Project 26-088',
    number: 'C-05',
    title: 'Trench Sawing Plan and Section',
    revision: '1',
    date: '2026-09-28',
    drawnBy: 'HN',
    checkedBy: 'DK',
    notes: [
      'Call for a locate ticket and wait for all marks before sawing.',
      'Saw both sides full depth of asphalt and concrete before breaking. Do not overcut into pavement that stays.',
      'Keep one lane open from 7 to 9 and from 4 to 6. Flaggers by the general contractor.',
      'Vacuum slurry as it is made. Nothing goes to the inlets.',
      'Shore or slope as the competent person decides. Soil under a slab is not type A.',
      'Existing lines are shown from records and may be elsewhere.',
    ],
  }),
  view: 'TRENCH SAWING PLAN',
  street: 'QUARRY LANE',
  sizeFt: [130, 46],
  walkFt: 5,
  trench: { mark: 'T1', fromFt: 10, toFt: 120, offsetFt: 30, widthFt: 3 },
  laterals: [
    { mark: 'T2', atFt: 38, lengthFt: 14, widthFt: 2 },
    { mark: 'T3', atFt: 92, lengthFt: 14, widthFt: 2 },
  ],
  lines: [
    { name: 'EXIST. GAS 4"', offsetFt: 9 },
    { name: 'EXIST. SEWER 12"', offsetFt: 16 },
    { name: 'EXIST. WATER 6" (TO BE LEFT)', offsetFt: 36.5 },
  ],
  section: { asphaltIn: 2, concreteIn: 7, baseIn: 6, trenchDepthFt: 5, pipe: 'NEW 8" MAIN' },
  text: 'Asphalt overlay of 2006 on a 7" concrete base, mesh at mid depth (record). Sawn sides stay as the edge of the patch: keep them straight to 1/4" in 10 ft. Break, load and haul by the general contractor; sawing and slurry by the cutting contractor. Work hours 9:00 to 16:00.',
  north: 62,
};

export const warehouseJoints: JointPlanData = {
  sheet: sheet({
    project: 'Halvorsen Distribution Center, Phase 2',
    address: '2200 Grain Belt Parkway, Indianapolis, Indiana 46218',
    firm: 'Tull & Okafor Structural',
    firmLine: '31 Arsenal Yard, Indianapolis, Indiana · Job 4407',
    number: 'S-101',
    title: 'Slab on Ground: Joint Plan',
    revision: '2',
    date: '2026-11-09',
    drawnBy: 'AO',
    checkedBy: 'ST',
    notes: [
      'Early-entry or wet sawing, as soon as the edge does not ravel. The window opens hours after finishing, not the next day.',
      'Joints run straight through; no offsets at pour lines.',
      'Diamonds at columns are formed. Stop the saw at their points.',
      'Cure is not disturbed: wash slurry off while it is wet.',
      'Filler by others, not before 90 days.',
    ],
  }),
  view: 'JOINT PLAN, BAYS 1 TO 6',
  sizeFt: [250, 120],
  baysFt: { across: [50, 50, 50, 50, 50], down: [40, 40, 40] },
  panels: { across: 4, down: 3 },
  mark: 'J1',
  slabIn: 7,
  jointDepthIn: 1.75,
  jointWidthIn: 0.125,
  north: 0,
};

export const stationWall: WallElevationData = {
  sheet: sheet({
    project: 'Fenwick Street Station, Platform Access',
    address: '600 Fenwick Street, Cleveland, Ohio 44113',
    firm: 'Corwin Reyes Engineers',
    firmLine: '5 Viaduct Place, Cleveland, Ohio · Contract TX-31',
    number: 'S-305',
    title: 'Concourse Wall Elevation: New Openings',
    revision: 'C',
    date: '2026-10-30',
    drawnBy: 'LR',
    checkedBy: 'CC',
  }),
  view: 'CONCOURSE WALL, LOOKING EAST',
  lengthFt: 64,
  heightFt: 18,
  thicknessIn: 14,
  text: 'Existing cast wall between concourse and east vestibule, 14" thick, two mats. Saw from the concourse side; the vestibule stays closed from 22:00 to 05:00. Pieces leave by the freight door at line 11; its clear width is 7\'-0". Catch and pump slurry: the track drain below is not to be used.',
  construction: '14" CAST WALL, No. 6 AT 12" EACH WAY EACH FACE (RECORD)',
  grid: [
    { name: '8', xFt: 2 },
    { name: '9', xFt: 22 },
    { name: '10', xFt: 42 },
    { name: '11', xFt: 62 },
  ],
  doors: [{ xFt: 44, widthFt: 3.5, heightFt: 7, name: 'EXIST. 114A' }],
  openings: [
    { mark: 'W1', xFt: 9, sillFt: 0, widthFt: 8, heightFt: 9, use: 'Elevator lobby, double door' },
    { mark: 'W2', xFt: 29, sillFt: 4, widthFt: 6, heightFt: 5, use: 'Ticket window' },
  ],
  cores: [{ mark: 'K1', xFt: 55, heightFt: 13, diameterIn: 8, count: 4, use: 'Smoke exhaust sleeves' }],
};
