import { cutLimits, explain, jointPlan, jointRules } from '@kerfyard/common/cutting';
import { JointSketch } from '../../../components/joint-sketch.tsx';
import { choiceField, defineCalculator, numberField, numberList } from '../calculator.ts';
import { stepsOf } from '../evaluate.ts';

const limits = cutLimits.joints;

/** Contraction joints in a slab. Starts with joint arithmetic: 120 × 80 ft, 6 in, factor 30 → 1,160 LF. */
export default defineCalculator({
  name: 'joints',
  fields: {
    lengthFt: numberField('ft', 120, limits.lengthFt),
    widthFt: numberField('ft', 80, limits.widthFt),
    thicknessIn: numberField('in', 6, limits.thicknessIn),
    spacingFactor: numberField('×', 30, limits.spacingFactor),
    capFt: numberField('ft', 15, limits.capFt),
    maxAspect: numberField('to 1', 1.5),
    baysAlongLengthFt: numberList('ft'),
    baysAlongWidthFt: numberList('ft'),
    entry: choiceField(['conventional', 'earlyEntry'], 'conventional'),
    feetPerHour: numberField('ft/h', 290),
    windowHours: numberField('h', 4),
  },
  sections: [
    { name: 'slab', fields: ['lengthFt', 'widthFt', 'thicknessIn'] },
    {
      name: 'spacing',
      fields: ['spacingFactor', 'capFt', 'maxAspect', 'baysAlongLengthFt', 'baysAlongWidthFt'],
    },
    { name: 'window', fields: ['entry', 'feetPerHour', 'windowHours'] },
  ],
  cautions: ['joint_timing', 'embedded'],
  compute: ({ entry, feetPerHour, windowHours, ...slab }) => {
    const plan = jointPlan(slab);
    const step = (...labels: string[]) => stepsOf(plan.working, ...labels);
    const saws = explain.sawsForWindow({ sawFt: plan.sawFt, feetPerHour, windowHours });
    const usual = jointRules.windowHours[entry];
    const isEarly = entry === 'earlyEntry';
    const depthIn = isEarly ? plan.earlyEntryDepthIn : plan.depthIn;
    return {
      blocks: [
        {
          figures: [
            { name: 'sawFt', value: plan.sawFt, unit: 'LF', working: step('Interior joints'), isLead: true },
            {
              name: 'depthIn',
              value: depthIn ?? { word: 'joints.tooThick' },
              unit: depthIn === null ? '' : 'in',
              digits: 2,
              working: isEarly ? [] : step('Joint depth'),
            },
            {
              name: 'maxSpacingFt',
              value: plan.maxSpacingFt,
              unit: 'ft',
              working: step('Widest spacing'),
            },
          ],
        },
        {
          name: 'panels',
          figures: [
            {
              name: 'panels',
              value: `${plan.panelsAlongLength} × ${plan.panelsAlongWidth}`,
              unit: '',
              working: step('Interior joints'),
            },
            {
              name: 'panelSize',
              value: `${shortFeet(plan.panelLengthFt)} × ${shortFeet(plan.panelWidthFt)}`,
              unit: 'ft',
            },
            { name: 'aspect', value: plan.aspect, unit: 'to 1', digits: 2 },
          ],
        },
        {
          name: 'window',
          figures: [
            {
              name: 'saws',
              value: Number(saws.value),
              unit: '',
              working: [...step('Interior joints'), saws],
            },
            { name: 'usualWindow', value: `${usual.min}–${usual.max}`, unit: 'h' },
          ],
        },
      ],
      cautions: [],
      warnings: windowHours > usual.max ? ['window_long'] : [],
    };
  },
  draw: ({ entry: _entry, feetPerHour: _feetPerHour, windowHours: _windowHours, ...slab }) => (
    <JointSketch slab={slab} />
  ),
});

function shortFeet(value: number): string {
  return String(Math.round(value * 100) / 100);
}
