import { silicaControls, silicaTools, workPlaces, type SilicaTaskControl } from '@kerfyard/common/cutting';
import { choiceField, defineCalculator, numberField, rowsField, type ResultBlock } from '../calculator.ts';
import { stepsOf } from '../evaluate.ts';

/**
 * Silica by Table 1. Starts with the case of 29 CFR 1926.1153(c)(3): a handheld saw 2 h and a jackhammer 2.5 h
 * outdoors, APF 10 each.
 */
export default defineCalculator({
  name: 'dust',
  fields: {
    tasks: rowsField(
      {
        tool: choiceField(silicaTools, 'handheld_power_saw'),
        place: choiceField(workPlaces, 'outdoors'),
        hours: numberField('h', 1),
      },
      [
        ['handheld_power_saw', 'outdoors', 2],
        ['jackhammer', 'outdoors', 2.5],
      ],
    ),
  },
  sections: [{ name: 'tasks', fields: ['tasks'] }],
  cautions: ['silica_deputy', 'housekeeping'],
  compute: ({ tasks }) => {
    const shift = silicaControls(tasks);
    const combined = stepsOf(shift.working, 'Hours of listed tasks together');
    return {
      blocks: [
        {
          figures: [
            {
              name: 'combinedHours',
              value: shift.combinedHours,
              unit: 'h',
              digits: 2,
              working: combined,
              isLead: true,
            },
          ],
        },
        ...shift.tasks.map((task, index): ResultBlock => ({
          option: { group: 'tool', value: task.tool },
          text: [task.control, ...(task.note === '' ? [] : [sentence(task.note)])],
          figures: [
            {
              name: 'respirator',
              value: respirator(task),
              unit: '',
              working: [...combined, ...shift.working.slice(index + 1, index + 2)],
              isOver: task.apf === null,
            },
          ],
        })),
      ],
      cautions: [],
    };
  },
});

function respirator({ apf }: SilicaTaskControl): string | { word: string } {
  if (apf === null) return { word: 'dust.notCovered' };
  return apf === 0 ? { word: 'dust.none' } : `APF ${apf}`;
}

function sentence(text: string): string {
  const first = text.charAt(0).toUpperCase() + text.slice(1);
  return first.endsWith('.') ? first : `${first}.`;
}
