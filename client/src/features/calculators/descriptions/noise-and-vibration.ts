import {
  explain,
  handArmVibration,
  noiseExposure,
  vibrationNote,
  vibrationValues,
} from '@kerfyard/common/cutting';
import { defineCalculator, numberField, rowsField } from '../calculator.ts';
import { renamed, stepsOf } from '../evaluate.ts';

/**
 * Noise and hand-arm vibration of one shift, by trigger hours. Starts with 29 CFR 1926.52(d)(2)(iii), worked in the
 * rule (sum 0.9375), the HSE ready-reckoner (5 m/s² for 3 h, 150 points) and a city noise exhibit (92 dBA at 50 ft is
 * 86 at 100 ft).
 */
export default defineCalculator({
  name: 'noiseAndVibration',
  fields: {
    noise: rowsField({ dba: numberField('dBA', 90), hours: numberField('h', 1) }, [
      [110, 0.25],
      [100, 0.5],
      [90, 1.5],
    ]),
    vibration: rowsField({ mps2: numberField('m/s²', 5), hours: numberField('h', 1) }, [[5, 3]]),
    levelDba: numberField('dBA', 92),
    referenceFt: numberField('ft', 50),
    distanceFt: numberField('ft', 100),
  },
  sections: [
    { name: 'noise', fields: ['noise'] },
    { name: 'vibration', fields: ['vibration'] },
    { name: 'distance', fields: ['levelDba', 'referenceFt', 'distanceFt'] },
  ],
  cautions: ['hearing', 'vibration_watch'],
  compute: ({ noise, vibration, ...far }) => {
    const heard = renamed({ exposures: 'noise' }, () => noiseExposure(noise));
    const felt = renamed({ exposures: 'vibration' }, () => handArmVibration(vibration));
    const level = explain.levelAtDistanceDba(far);
    const step = (...labels: string[]) => stepsOf(heard.working, ...labels);
    const { actionMps2, limitMps2 } = vibrationValues.rows;
    return {
      blocks: [
        {
          name: 'noise',
          figures: [
            {
              name: 'constructionSum',
              value: heard.constructionSum ?? { word: 'noiseAndVibration.atOnce' },
              unit: '',
              digits: 4,
              working: step('Construction sum'),
              isLead: true,
              isOver: heard.constructionExceeded,
            },
            {
              name: 'dosePct',
              value: heard.dosePct,
              unit: '%',
              working: step('Dose, 5 dB exchange'),
              isOver: heard.dosePct > 100,
            },
            average('twaDba', heard.twaDba, step('Dose, 5 dB exchange', 'Eight-hour average, 5 dB exchange')),
            {
              name: 'nioshDosePct',
              value: heard.nioshDosePct,
              unit: '%',
              working: step('Dose, 3 dB exchange'),
              isOver: heard.nioshDosePct > 100,
            },
            average(
              'nioshTwaDba',
              heard.nioshTwaDba,
              step('Dose, 3 dB exchange', 'Eight-hour average, 3 dB exchange'),
            ),
          ],
        },
        {
          name: 'vibration',
          figures: [
            {
              name: 'points',
              value: felt.points,
              unit: 'points',
              working: stepsOf(felt.working, 'Points'),
              isLead: true,
              isOver: felt.aboveActionValue,
            },
            {
              name: 'a8',
              value: felt.a8,
              unit: 'm/s²',
              digits: 2,
              working: stepsOf(felt.working, 'Daily exposure A(8)'),
              isOver: felt.aboveActionValue,
            },
            { name: 'action', value: actionMps2, unit: 'm/s²' },
            { name: 'limit', value: limitMps2, unit: 'm/s²' },
          ],
        },
        {
          name: 'distance',
          figures: [
            { name: 'levelFarDba', value: Number(level.value), unit: 'dBA', working: [level], isLead: true },
          ],
        },
      ],
      cautions: [`${vibrationNote}.`],
      warnings: felt.aboveLimitValue ? ['vibration_limit'] : [],
    };
  },
});

function average(name: string, dba: number | null, working: ReturnType<typeof stepsOf>) {
  return {
    name,
    value: dba ?? { word: 'noiseAndVibration.nothing' },
    unit: dba === null ? '' : 'dBA',
    digits: 2,
    working,
  };
}
