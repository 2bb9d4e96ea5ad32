import { z } from 'zod';
import { textSchema } from '../api/index.ts';
import type { CutKind } from './cut.schema.ts';

/** Every item that two trades each think the other one has. None may go out blank. */
export const responsibilityItems = [
  'scan',
  'layout',
  'locate_ticket',
  'engineer_approval',
  'hazard_survey',
  'shoring',
  'utilities_off',
  'alarm_and_sprinkler',
  'water',
  'power',
  'ventilation',
  'lift_and_rigging',
  'dust_containment',
  'watch_below',
  'cut',
  'break',
  'load',
  'haul',
  'tip',
  'slurry',
  'cover_openings',
  'overcut_fill',
  'patch',
  'firestop',
  'traffic',
  'permits',
] as const;
export type ResponsibilityItem = (typeof responsibilityItems)[number];

/** Who has it: the general contractor, the crew, someone named, or nobody since the job does not need it. */
export const responsibilityHolders = ['gc', 'crew', 'other', 'not_needed'] as const;
export type ResponsibilityHolder = (typeof responsibilityHolders)[number];

export const responsibilitySchema = z
  .strictObject({
    item: z.enum(responsibilityItems),
    by: z.enum(responsibilityHolders),
    name: textSchema(80, 0).default(''),
  })
  .refine((row) => row.by !== 'other' || row.name.length > 0, { path: ['name'], message: 'Name who has it' });
export type Responsibility = z.output<typeof responsibilitySchema>;

/** The whole sheet: each item exactly once. */
export const responsibilitySheetSchema = z.array(responsibilitySchema).check((context) => {
  const seen = new Set(context.value.map((row) => row.item));
  const blank = responsibilityItems.filter((item) => !seen.has(item));
  if (blank.length > 0 || context.value.length !== responsibilityItems.length) {
    context.issues.push({
      code: 'custom',
      input: context.value,
      path: [],
      message: blank.length > 0 ? `Still blank: ${blank.join(', ')}` : 'Each item once',
    });
  }
});

/** What decides the usual holder of each item. */
export interface PrefillInput {
  kinds: readonly CutKind[];
  indoors: boolean;
  face: 'floor' | 'wall' | 'ceiling';
  below: 'soil' | 'occupied' | 'unoccupied' | 'unknown';
}

/**
 * The sheet as a careful office would begin it; every line can be changed.
 * Source: common practice, no source (who usually has what on cutting subcontracts).
 */
export function prefillResponsibilities(input: PrefillInput): Responsibility[] {
  const pieces = input.kinds.some((kind) => kind === 'trench' || kind === 'opening');
  const onSoil = input.face === 'floor' && input.below === 'soil';
  const suspended = input.face !== 'floor' || !onSoil;
  const gcIf = (isNeeded: boolean): ResponsibilityHolder => (isNeeded ? 'gc' : 'not_needed');
  const hasOpening = input.kinds.includes('opening');
  const holders: Record<ResponsibilityItem, ResponsibilityHolder> = {
    scan: 'gc',
    layout: 'gc',
    locate_ticket: gcIf(onSoil),
    engineer_approval: gcIf(suspended),
    hazard_survey: 'gc',
    shoring: gcIf(suspended && pieces),
    utilities_off: 'gc',
    alarm_and_sprinkler: gcIf(input.indoors),
    water: 'gc',
    power: 'gc',
    ventilation: gcIf(input.indoors),
    lift_and_rigging: gcIf(suspended && pieces),
    dust_containment: input.indoors ? 'crew' : 'not_needed',
    watch_below: gcIf(suspended),
    cut: 'crew',
    break: gcIf(pieces),
    load: gcIf(pieces),
    haul: gcIf(pieces),
    tip: gcIf(pieces),
    slurry: 'crew',
    cover_openings: gcIf(hasOpening || suspended),
    overcut_fill: gcIf(hasOpening),
    patch: 'gc',
    firestop: gcIf(suspended),
    traffic: gcIf(!input.indoors),
    permits: 'gc',
  };
  return responsibilityItems.map((item) => ({ item, by: holders[item], name: '' }));
}

/** "9 ours, 4 crew, the rest not needed", as counts. */
export function countResponsibilities(
  sheet: readonly Responsibility[],
): Record<ResponsibilityHolder, number> {
  const counts = { gc: 0, crew: 0, other: 0, not_needed: 0 };
  for (const row of sheet) counts[row.by] += 1;
  return counts;
}
