import type { BidAnswer } from '@kerfyard/common/bids';
import type { Conditions, Responsibility, ResponsibilityItem, Terms } from '@kerfyard/common/scopes';

export const elementWords: Record<Conditions['element'], string> = {
  slab_on_grade: 'Slab on grade',
  suspended_slab: 'Suspended slab',
  slab_on_deck: 'Slab on metal deck',
  wall: 'Concrete wall',
  masonry_wall: 'Masonry wall',
  footing: 'Footing',
  pavement: 'Pavement',
  other: 'Other',
};

export const steelWords: Record<Conditions['steel'], string> = {
  none: 'none',
  mesh: 'mesh',
  light_bar: 'light bar',
  heavy_bar: 'heavy bar',
  unknown: 'not known',
};

export const postTensionWords: Record<Conditions['postTension'], string> = {
  proved_none: 'proved that there is none',
  present: 'PRESENT',
  unknown: 'not known: treat as present until proved otherwise',
};

export const belowWords: Record<Conditions['below'], string> = {
  soil: 'soil',
  occupied: 'occupied space',
  unoccupied: 'unoccupied space',
  unknown: 'not known: treat as occupied until proved otherwise',
};

export const wageWords: Record<Terms['wages'], string> = {
  open_shop: 'open shop',
  prevailing: 'prevailing wages',
  union: 'union',
};

export const itemWords: Record<ResponsibilityItem, string> = {
  scan: 'Scan for embedded lines and steel',
  layout: 'Layout',
  locate_ticket: 'Locate ticket',
  engineer_approval: 'Engineer’s approval',
  hazard_survey: 'Demolition and hazardous-material survey',
  shoring: 'Shoring',
  utilities_off: 'Utilities off',
  alarm_and_sprinkler: 'Alarm and sprinkler',
  water: 'Water',
  power: 'Power',
  ventilation: 'Ventilation',
  lift_and_rigging: 'Lift and rigging',
  dust_containment: 'Dust containment',
  watch_below: 'Watch and protect below',
  cut: 'Cut',
  break: 'Break',
  load: 'Load',
  haul: 'Haul',
  tip: 'Tip',
  slurry: 'Slurry',
  cover_openings: 'Cover openings',
  overcut_fill: 'Overcut fill',
  patch: 'Patch',
  firestop: 'Firestop',
  traffic: 'Traffic',
  permits: 'Permits',
};

export const answerWords: Record<BidAnswer['answer'], string> = {
  included: 'in the price',
  excluded: 'not in the price',
};

/** Who has one item, in words: a company's name, a person's, or that nobody needs it. */
export function holderWords(row: Responsibility, companies: { gc: string; crew: string }): string {
  if (row.by === 'not_needed') return 'not needed here';
  if (row.by === 'other') return row.name;
  return row.name === '' ? companies[row.by] : `${companies[row.by]} (${row.name})`;
}

/** Shown where the work can hurt; deference comes first. */
export const cautions: readonly string[] = [
  'This paper is for planning and payment. The engineer of record, the authority having jurisdiction, the manufacturers and each employer’s competent person govern; local codes and licensed practice decide. Stop work where conditions differ from what is written here.',
  'Structure: no bar, tendon or beam is cut until the engineer has said so. Post-tensioned concrete is never cut unproven: a struck tendon can kill.',
  'Embedded lines: treat every line as live until it is proved dead at the wall; a scan shows what it can see and no more.',
  'Falling pieces and cores: keep people out from below and from the drop zone, rig by a qualified rigger, and cover or guard each opening at once.',
  'Air: no combustion engines indoors, in pits or in garages. Keep respirable silica down with continuous water or shroud and vacuum.',
  'Slurry is caustic: collect it and keep it out of drains. Mind wet electrics, noise, vibration, kickback and wire whip.',
];
