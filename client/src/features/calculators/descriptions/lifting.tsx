import { cutLimits, explain, removalLimits, slingTension } from '@kerfyard/common/cutting';
import { defineCalculator, numberField, switchField } from '../calculator.ts';
import { SlingPicture } from '../components/sling-picture.tsx';

const limits = cutLimits.opening;

/** Weight of a piece and the pull in its slings. Starts with a search-and-rescue manual's slab: 8 × 8 ft, 6 in, 4,800 lb. */
export default defineCalculator({
  name: 'lifting',
  fields: {
    lengthFt: numberField('ft', 8, limits.lengthFt),
    widthFt: numberField('ft', 8, limits.widthFt),
    thicknessIn: numberField('in', 6, limits.thicknessIn),
    densityPcf: numberField('pcf', 150, removalLimits.densityPcf),
    allowancePct: numberField('%', 10, removalLimits.allowancePct),
    legs: numberField('', 2),
    angleDeg: numberField('°', 60),
    equalized: switchField(false),
  },
  sections: [
    { name: 'piece', fields: ['lengthFt', 'widthFt', 'thicknessIn', 'densityPcf', 'allowancePct'] },
    { name: 'slings', fields: ['legs', 'angleDeg', 'equalized'] },
  ],
  cautions: ['qualified_rigger', 'falling_pieces', 'first_pull'],
  compute: ({ legs, angleDeg, equalized, allowancePct, densityPcf, ...size }) => {
    const weight = explain.slabWeightLb({ ...size, ...(densityPcf === 150 ? {} : { densityPcf }) });
    const weightLb = Number(weight.value);
    const loadLb = weightLb * (1 + allowancePct / 100);
    const load = {
      label: 'Load at the first pull',
      formula: 'weight × (1 + allowance)',
      inputs: [
        { name: 'weight', value: weightLb, unit: 'lb' },
        { name: 'allowance', value: allowancePct, unit: '%' },
      ],
      value: loadLb,
      unit: 'lb',
      source: { origin: 'common practice' },
    } as const;
    const tension = slingTension({ loadLb, legs, angleDeg, equalized });
    return {
      blocks: [
        {
          name: 'piece',
          figures: [
            { name: 'weightLb', value: weightLb, unit: 'lb', digits: 0, working: [weight], isLead: true },
            { name: 'loadLb', value: loadLb, unit: 'lb', digits: 0, working: [weight, load] },
          ],
        },
        {
          name: 'slings',
          figures: [
            {
              name: 'perLegLb',
              value: tension.perLegLb,
              unit: 'lb',
              digits: 0,
              working: [weight, load, ...tension.working],
              isLead: true,
              isOver: tension.belowMinimumAngle,
            },
            {
              name: 'factor',
              value: tension.factor,
              unit: '×',
              digits: 3,
              working: [
                {
                  label: 'Angle factor',
                  formula: '1 ÷ sin θ',
                  inputs: [{ name: 'θ', value: angleDeg, unit: '°' }],
                  value: tension.factor,
                  unit: '',
                  source: tension.working[0]?.source ?? { origin: 'arithmetic' },
                },
              ],
            },
          ],
        },
      ],
      cautions: [],
      warnings: tension.belowMinimumAngle ? ['flat_slings'] : [],
    };
  },
  draw: ({ legs, angleDeg, lengthFt, thicknessIn }) => (
    <SlingPicture legs={legs} angleDeg={angleDeg} lengthFt={lengthFt} thicknessIn={thicknessIn} />
  ),
});
