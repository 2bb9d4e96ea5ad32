import {
  coringHours,
  cutLimits,
  explain,
  removalLimits,
  slurry,
  takeoffCut,
  waterGallonsPerMinute,
  type CoreCut,
} from '@kerfyard/common/cutting';
import { CutSketch } from '../../../components/cut-sketch.tsx';
import { defineCalculator, numberField, optionalNumber } from '../calculator.ts';
import { stepsOf } from '../evaluate.ts';

const limits = cutLimits.core;

const cutOf = (values: { diameterIn: number; depthIn: number; count: number }): CoreCut => ({
  kind: 'core',
  diameterIn: values.diameterIn,
  depthIn: values.depthIn,
  count: values.count,
});

/** Cores: weight of each, core-inches, hours. Starts with common practice: 12 in, 10 in long, 98 lb. */
export default defineCalculator({
  name: 'cores',
  fields: {
    diameterIn: numberField('in', 12, limits.diameterIn),
    depthIn: numberField('in', 10, limits.depthIn),
    count: numberField('', 1, limits.count),
    densityPcf: numberField('pcf', 150, removalLimits.densityPcf),
    companyInchesPerMinute: optionalNumber('in/min', null),
    companySetUpMinutes: optionalNumber('min', null),
  },
  sections: [
    { name: 'size', fields: ['diameterIn', 'depthIn', 'count', 'densityPcf'] },
    { name: 'pace', fields: ['companyInchesPerMinute', 'companySetUpMinutes'] },
  ],
  cautions: ['structure', 'embedded', 'falling_cores', 'wet_electrics'],
  compute: (values) => {
    const takeoff = takeoffCut(cutOf(values));
    const weight = explain.coreWeightLb({
      diameterIn: values.diameterIn,
      lengthIn: values.depthIn,
      // 150 unless another is typed: then the table is the source, not the visitor.
      ...(values.densityPcf === 150 ? {} : { densityPcf: values.densityPcf }),
    });
    const hours = coringHours({ ...values, holes: values.count });
    const water = slurry({
      inchFeet: 0,
      kerfIn: 1,
      gallonsPerMinute: waterGallonsPerMinute.rows.core,
      minutes: hours.highHours * 60,
    });
    return {
      blocks: [
        {
          figures: [
            {
              name: 'coreLb',
              value: Number(weight.value),
              unit: 'lb',
              digits: 0,
              working: [weight],
              isLead: true,
            },
            {
              name: 'allLb',
              value: Number(weight.value) * values.count,
              unit: 'lb',
              digits: 0,
              working: [
                weight,
                {
                  label: 'All cores',
                  formula: 'weight of one × count',
                  inputs: [
                    { name: 'weight of one', value: weight.value, unit: 'lb' },
                    { name: 'count', value: values.count, unit: '' },
                  ],
                  value: Number(weight.value) * values.count,
                  unit: 'lb',
                  source: { origin: 'arithmetic' },
                },
              ],
            },
            {
              name: 'coreInches',
              value: takeoff.coreInches,
              unit: 'core-in',
              working: stepsOf(takeoff.working, 'Core-inches in all'),
            },
          ],
        },
        {
          name: 'hours',
          figures: [
            {
              name: 'lowHours',
              value: hours.lowHours,
              unit: 'h',
              digits: 2,
              working: hours.working.slice(0, 1),
            },
            {
              name: 'highHours',
              value: hours.highHours,
              unit: 'h',
              digits: 2,
              working: hours.working.slice(1),
            },
            {
              name: 'waterGal',
              value: water.waterGal,
              unit: 'gal',
              digits: 0,
              working: stepsOf(water.working, 'Water').map((step) => ({
                ...step,
                source: { origin: 'common practice' as const },
              })),
            },
          ],
        },
      ],
      cautions: takeoff.cautions,
    };
  },
  draw: (values) => <CutSketch cuts={[cutOf(values)]} />,
});
