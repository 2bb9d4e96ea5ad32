import { slurry, spoil } from '@kerfyard/common/cutting';
import { defineCalculator, numberField } from '../calculator.ts';
import { stepsOf } from '../evaluate.ts';

/** Water, slurry and spoil. Starts with common practice: 612 in-ft, 0.2-in kerf, 3 gpm, 91.8 min → 282 gal, 6 drums. */
export default defineCalculator({
  name: 'slurry',
  fields: {
    inchFeet: numberField('in-ft', 612),
    kerfIn: numberField('in', 0.2),
    gallonsPerMinute: numberField('gpm', 3),
    minutes: numberField('min', 91.8),
    cuFt: numberField('cu ft', 40),
    bulking: numberField('×', 1.5),
  },
  sections: [
    { name: 'sawing', fields: ['inchFeet', 'kerfIn', 'gallonsPerMinute', 'minutes'] },
    { name: 'spoil', fields: ['cuFt', 'bulking'] },
  ],
  cautions: ['slurry', 'slip'],
  compute: ({ cuFt, bulking, ...sawing }) => {
    const wet = slurry(sawing);
    const broken = spoil({ cuFt, ...(bulking === 1.5 ? {} : { bulking }) });
    const step = (...labels: string[]) => stepsOf(wet.working, ...labels);
    return {
      blocks: [
        {
          name: 'slurry',
          figures: [
            {
              name: 'slurryGal',
              value: wet.slurryGal,
              unit: 'gal',
              digits: 0,
              working: step('Water', 'Solids', 'Slurry'),
              isLead: true,
            },
            {
              name: 'drums',
              value: wet.drums,
              unit: '× 55 gal',
              working: step('Slurry', 'Drums'),
              isLead: true,
            },
            { name: 'waterGal', value: wet.waterGal, unit: 'gal', working: step('Water') },
            { name: 'solidsCuIn', value: wet.solidsCuIn, unit: 'cu in', digits: 0, working: step('Solids') },
            { name: 'weightLb', value: wet.weightLb, unit: 'lb', digits: 0, working: step('Weight') },
          ],
        },
        {
          name: 'spoil',
          figures: [
            {
              name: 'tons',
              value: broken.tons,
              unit: 'tons',
              digits: 2,
              working: stepsOf(broken.working, 'Tons'),
            },
            {
              name: 'bankCuYd',
              value: broken.bankCuYd,
              unit: 'cu yd',
              digits: 2,
              working: stepsOf(broken.working, 'In place'),
            },
            {
              name: 'looseCuYd',
              value: broken.looseCuYd,
              unit: 'cu yd',
              digits: 2,
              working: stepsOf(broken.working, 'In place', 'Loose'),
            },
          ],
        },
      ],
      cautions: [],
    };
  },
});
