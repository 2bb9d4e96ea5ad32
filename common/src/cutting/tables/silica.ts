import type { Provenance } from './provenance.ts';

export const silicaTools = [
  'stationary_masonry_saw',
  'handheld_power_saw',
  'walk_behind_saw',
  'drivable_saw',
  'core_rig',
  'hand_drill',
  'dowel_rig',
  'jackhammer',
  'mortar_grinder',
  'wet_grinder',
  'shrouded_grinder',
  'floor_grinder',
  'demolition_machine',
  'wall_saw',
  'wire_saw',
  'chain_saw',
  'ring_saw',
] as const;
export type SilicaTool = (typeof silicaTools)[number];

/** Assigned protection factor of the least respirator: 0 for none needed, null for a case the row does not cover. */
export type RespiratorApf = 0 | 10 | 25 | null;

/** One row of Table 1: the four respirator columns, up to and over four hours, and the control it presumes. */
export interface SilicaRow {
  readonly outdoors: readonly [upTo4Hours: RespiratorApf, over4Hours: RespiratorApf];
  readonly indoors: readonly [upTo4Hours: RespiratorApf, over4Hours: RespiratorApf];
  readonly control: string;
  readonly source: Provenance;
}

function table1(certainty: Provenance['certainty'] = 'published'): Provenance {
  return { document: '29 CFR 1926.1153', section: 'Table 1', edition: '2016', certainty };
}

const waterToBlade = 'Integrated water feed, continuously to the blade.';
const dustCollector = 'dust collector with a 99 % filter and filter cleaning';
const grinderShroud =
  'Shroud and dust collector, 25 cfm per inch of wheel, 99 % filter, cyclone or filter cleaning.';

/** Tools the table names. Those of `silicaTools` not here are not in Table 1. */
export const silicaTable1: Readonly<Partial<Record<SilicaTool, SilicaRow>>> = {
  stationary_masonry_saw: { outdoors: [0, 0], indoors: [0, 0], control: waterToBlade, source: table1() },
  handheld_power_saw: { outdoors: [0, 10], indoors: [10, 10], control: waterToBlade, source: table1() },
  walk_behind_saw: { outdoors: [0, 0], indoors: [10, 10], control: waterToBlade, source: table1() },
  drivable_saw: {
    outdoors: [0, 0],
    indoors: [null, null],
    control: `${waterToBlade} Outdoors only.`,
    source: table1(),
  },
  core_rig: {
    outdoors: [0, 0],
    indoors: [0, 0],
    control: 'Integrated water feed to the cutting surface.',
    source: table1(),
  },
  hand_drill: {
    outdoors: [0, 0],
    indoors: [0, 0],
    control: `Shroud or cowling and ${dustCollector}; HEPA vacuum when cleaning holes.`,
    source: table1(),
  },
  dowel_rig: {
    outdoors: [10, 10],
    indoors: [null, null],
    control: `Shroud around the bit and ${dustCollector}; HEPA vacuum when cleaning holes. Outdoors only.`,
    source: table1(),
  },
  jackhammer: {
    outdoors: [0, 10],
    indoors: [10, 10],
    control: `Water stream or spray at the point of impact, or shroud and ${dustCollector}.`,
    source: table1(),
  },
  mortar_grinder: { outdoors: [10, 25], indoors: [10, 25], control: grinderShroud, source: table1() },
  wet_grinder: {
    outdoors: [0, 0],
    indoors: [null, null],
    control: 'Integrated water feed, continuously to the grinding surface. Outdoors only.',
    source: table1('from memory'),
  },
  shrouded_grinder: { outdoors: [0, 0], indoors: [0, 10], control: grinderShroud, source: table1() },
  floor_grinder: {
    outdoors: [0, 0],
    indoors: [0, 0],
    control:
      "Integrated water feed to the cutting surface, or the maker's dust collection; HEPA vacuum for loose dust between passes indoors.",
    source: table1(),
  },
  demolition_machine: {
    outdoors: [0, 0],
    indoors: [0, 0],
    control: 'Operator in an enclosed, filtered cab; water or suppressant where others work near.',
    source: table1('from memory'),
  },
};

export const silicaUnlisted = {
  note: 'not in Table 1: 1926.1153(d), air or objective data',
  control: 'Water to the cut, and exposure assessed by the employer.',
  source: { document: '29 CFR 1926.1153', section: '(d)', edition: '2016', certainty: 'published' },
} as const;

export const silicaNotes = {
  notCovered: 'not covered by its Table 1 row here: 1926.1153(d), air or objective data',
  indoors: 'Indoors or enclosed: exhaust as needed to keep visible dust down, (c)(2)(i).',
} as const;

/** (c)(3): over this many hours of listed tasks together, every one takes its over-four-hours column. */
export const silicaShiftHours = 4;
