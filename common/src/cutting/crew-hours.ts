import { checkNumber, checkObject } from './check.ts';
import { arithmetic, put, type WorkingStep } from './working.ts';

const shares = [
  ['travelHours', 'travel'],
  ['orientationHours', 'orientation'],
  ['setUpHours', 'set-up'],
  ['sawingHours', 'sawing'],
  ['moveHours', 'moves'],
  ['breakingHours', 'breaking'],
  ['loadingHours', 'loading'],
  ['cleaningHours', 'cleaning'],
] as const;

export type CrewHoursInput = Readonly<Record<(typeof shares)[number][0], number>>;

export interface CrewHours {
  readonly hours: number;
  readonly working: readonly WorkingStep[];
}

/**
 * Hours of one crew on one job, portal to portal: the sum of its shares.
 * @throws CuttingInputError
 */
export function crewHours(input: CrewHoursInput): CrewHours {
  const fields = checkObject(input, 'input');
  const inputs = shares.map(([field, name]) =>
    put(name, checkNumber(fields[field], field, { min: 0, max: 10_000, unit: 'h' }), 'h'),
  );
  const hours = shares.reduce((sum, [field]) => sum + input[field], 0);
  return {
    hours,
    working: [
      {
        label: 'Crew hours',
        formula: 'travel + orientation + set-up + sawing + moves + breaking + loading + cleaning',
        inputs,
        value: hours,
        unit: 'h',
        source: arithmetic,
      },
    ],
  };
}
