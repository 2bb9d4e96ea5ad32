import type { GeneratorInput } from '@kerfyard/common/cutting';
import type { EstimateInput } from '@kerfyard/common/estimates';
import { readTail } from '../../lib/draft-tail.ts';

type Typed = number | string | null;

/** Hours beside the cutting, in the order a day has them. */
export const hourFields = [
  'travelHours',
  'orientationHours',
  'setUpHours',
  'moveHours',
  'breakingHours',
  'loadingHours',
  'cleaningHours',
] as const;
export const machineFields = ['volts', 'amps', 'phases'] as const;

/** What a crew says of a job beside its bid; kept in this tab only. */
export interface EstimateValues {
  hours: Record<(typeof hourFields)[number], Typed>;
  load: { tons: Typed; cuYd: Typed };
  machine: Record<(typeof machineFields)[number], Typed>;
}

// Common practice, no source: half an hour each to be let in, to set up and to clean up; a ten-ton truck.
const usualHours = 0.5;
const usualLoad = { tons: 10, cuYd: 10 };
// Common practice, no source: loaded trucks on streets and highways mixed.
const milesPerHour = 40;

/** Before anything is typed: there and back from the yard, by the quarter hour, and the usual rest. */
export function usualEstimate(distanceMi: number | null): EstimateValues {
  const travelHours = distanceMi === null ? 0 : Math.round(((2 * distanceMi) / milesPerHour) * 4) / 4;
  return {
    hours: {
      travelHours,
      orientationHours: usualHours,
      setUpHours: usualHours,
      moveHours: 0,
      breakingHours: 0,
      loadingHours: 0,
      cleaningHours: usualHours,
    },
    load: usualLoad,
    machine: { volts: null, amps: null, phases: 3 },
  };
}

export const tailOf = (scopeId: string) => `estimate.${scopeId}`;

/** What this tab has kept, over the usual. */
export function startEstimate(scopeId: string, distanceMi: number | null): EstimateValues {
  const usual = usualEstimate(distanceMi);
  const kept = readTail(tailOf(scopeId)) as Partial<EstimateValues> | null | undefined;
  if (kept === null || typeof kept !== 'object') return usual;
  return {
    hours: { ...usual.hours, ...kept.hours },
    load: { ...usual.load, ...kept.load },
    machine: { ...usual.machine, ...kept.machine },
  };
}

/** As the engine takes it; what is no number stays what it is, for the engine to refuse by name. */
export function toEstimate({
  hours,
  load,
  machine,
}: EstimateValues): Pick<EstimateInput, 'hours' | 'load' | 'generator'> {
  const entries = hourFields.map((field) => [field, hours[field] ?? 0]);
  const isMachine = machine.volts !== null && machine.amps !== null;
  return {
    hours: Object.fromEntries(entries) as EstimateInput['hours'],
    load: load as EstimateInput['load'],
    generator: isMachine ? (machine as unknown as GeneratorInput) : null,
  };
}
