import { checkChoice, checkList, checkNumber, checkObject } from '../check.ts';
import {
  silicaNotes,
  silicaShiftHours,
  silicaTable1,
  silicaTools,
  silicaUnlisted,
  type RespiratorApf,
  type SilicaTool,
} from '../tables/silica.ts';
import { sourceOf } from '../tables/provenance.ts';
import { put, type WorkingStep } from '../working.ts';
import { hoursRange, maxExposures } from './ranges.ts';

export const workPlaces = ['outdoors', 'indoors'] as const;
export type WorkPlace = (typeof workPlaces)[number];

/** `hours` are task hours, from first use to the end of clean-up, pauses included. */
export interface SilicaTask {
  readonly tool: SilicaTool;
  readonly place: WorkPlace;
  readonly hours: number;
}

export interface SilicaTaskControl {
  readonly tool: SilicaTool;
  /** Whether Table 1 names the tool. */
  readonly listed: boolean;
  readonly control: string;
  /** Least protection factor: 0 none needed, null where Table 1 does not cover the case. */
  readonly apf: RespiratorApf;
  readonly note: string;
}

export interface SilicaControls {
  /** Hours of all listed tasks together, which choose the column for each. */
  readonly combinedHours: number;
  readonly tasks: readonly SilicaTaskControl[];
  readonly working: readonly WorkingStep[];
}

/**
 * Dust control and least respirator for every task of one shift, by 29 CFR 1926.1153 Table 1. The hours of all
 * listed tasks together choose the column, (c)(3); exactly four hours is the up-to-four column.
 * @throws CuttingInputError with the task's place in `field`, as in `tasks[1].hours`
 */
export function silicaControls(tasks: readonly SilicaTask[]): SilicaControls {
  const checked = checkList(tasks, 'tasks', maxExposures).map(checkTask);
  const combinedHours = checked
    .filter((task) => silicaTable1[task.tool] !== undefined)
    .reduce((sum, task) => sum + task.hours, 0);
  const isOver = combinedHours > silicaShiftHours;
  return {
    combinedHours,
    tasks: checked.map((task) => controlTask(task, isOver)),
    working: [
      {
        label: 'Hours of listed tasks together',
        formula: 'sum of task hours; over 4 h every listed task takes its over-4-h column',
        inputs: checked.map((task) => put(task.tool, task.hours, 'h')),
        value: combinedHours,
        unit: 'h',
        source: { origin: 'published', document: '29 CFR 1926.1153', section: '(c)(3)', edition: '2016' },
      },
      ...checked.map((task) => taskStep(task, isOver)),
    ],
  };
}

function checkTask(task: unknown, index: number): SilicaTask {
  const path = `tasks[${index}]`;
  const fields = checkObject(task, path);
  return {
    tool: checkChoice(fields.tool, `${path}.tool`, silicaTools),
    place: checkChoice(fields.place, `${path}.place`, workPlaces),
    hours: checkNumber(fields.hours, `${path}.hours`, hoursRange),
  };
}

function controlTask({ tool, place }: SilicaTask, isOver: boolean): SilicaTaskControl {
  const row = silicaTable1[tool];
  if (row === undefined) {
    return { tool, listed: false, control: silicaUnlisted.control, apf: null, note: silicaUnlisted.note };
  }
  const apf = row[place][isOver ? 1 : 0];
  const indoorsNote = place === 'indoors' ? silicaNotes.indoors : '';
  const note = apf === null ? silicaNotes.notCovered : indoorsNote;
  return { tool, listed: true, control: row.control, apf, note };
}

function taskStep(task: SilicaTask, isOver: boolean): WorkingStep {
  const { apf } = controlTask(task, isOver);
  const source = silicaTable1[task.tool]?.source ?? silicaUnlisted.source;
  return {
    label: `Respirator, ${task.tool}`,
    formula: `${task.place}, ${isOver ? 'over 4 h' : 'up to 4 h'}`,
    inputs: [put('hours', task.hours, 'h')],
    value: apf ?? 'not covered',
    unit: 'APF',
    source: sourceOf(source),
  };
}
