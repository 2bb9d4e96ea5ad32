import {
  CuttingInputError,
  beyondKinds,
  bladeMounts,
  cutLimits,
  depthSection,
  explain,
  passPlan,
  sectionElements,
  usualRimSpeedLimitSfm,
  type DepthSectionInput,
} from '@kerfyard/common/cutting';
import { DepthSection } from '../../../components/depth-section.tsx';
import {
  choiceField,
  defineCalculator,
  numberField,
  optionalNumber,
  rowsField,
  type ValuesOf,
} from '../calculator.ts';

const embeddedLines = ['conduit', 'water_pipe', 'tendon', 'heating_tube', 'duct', 'other'] as const;
const lineNames: Record<(typeof embeddedLines)[number], string> = {
  conduit: 'Conduit',
  water_pipe: 'Water pipe',
  tendon: 'Post-tension tendon',
  heating_tube: 'Heating tube',
  duct: 'Duct',
  other: 'Other line',
};

const fields = {
  element: choiceField(sectionElements, 'slab'),
  thicknessIn: numberField('in', 6, cutLimits.opening.thicknessIn),
  beyond: choiceField(beyondKinds, 'unknown'),
  mats: rowsField(
    {
      coverIn: numberField('in', 2),
      barDiameterIn: numberField('in', 0.5),
      spacingIn: numberField('in', 12),
    },
    [[2, 0.5, 12]],
    { minRows: 0 },
  ),
  embedded: rowsField(
    {
      name: choiceField(embeddedLines, 'conduit'),
      depthIn: numberField('in', 4),
      diameterIn: numberField('in', 1),
    },
    [],
    { minRows: 0 },
  ),
  depthIn: numberField('in', 3.25, cutLimits.line.depthIn),
  scoreIn: numberField('in', 0.5),
  maxPassIn: numberField('in', 1.25),
  diameterIn: numberField('in', 9, cutLimits.opening.bladeDiameterIn),
  mount: choiceField(bladeMounts, 'hand'),
  rpm: optionalNumber('rpm', 6500),
};

type Values = ValuesOf<typeof fields>;

/**
 * Passes, blade reach, and what the cut meets. Starts with common practice: a 9-in blade held by hand cuts to 3¼ in
 * and gets there in four passes; at 6,500 rpm its rim runs at 15,315 SFM.
 */
export default defineCalculator({
  name: 'passes',
  fields,
  sections: [
    { name: 'cut', fields: ['depthIn', 'scoreIn', 'maxPassIn'] },
    { name: 'blade', fields: ['diameterIn', 'mount', 'rpm'] },
    { name: 'element', fields: ['element', 'thicknessIn', 'beyond', 'mats', 'embedded'] },
  ],
  cautions: ['structure', 'embedded', 'kickback', 'blade_rating'],
  compute: (values) => {
    const { depthIn, scoreIn, maxPassIn, diameterIn, mount, rpm } = values;
    const plan = passPlan({ depthIn, scoreIn, maxPassIn });
    // What the drawing would refuse is refused here, where it stands beside its field.
    depthSection(sectionOf(values));
    const reach = explain.bladeReachIn({ diameterIn, mount });
    const reachIn = Number(reach.value);
    const speed = rpm === undefined ? null : explain.surfaceSpeedSfm({ diameterIn, rpm });
    const isFast = speed !== null && Number(speed.value) > usualRimSpeedLimitSfm.rows;
    return {
      blocks: [
        {
          figures: [
            { name: 'passes', value: plan.depthsIn.length, unit: '', working: plan.working, isLead: true },
            {
              name: 'depths',
              value: depthsInWords(plan.depthsIn),
              unit: 'in',
              working: plan.working,
              isWide: true,
            },
          ],
        },
        {
          name: 'blade',
          figures: [
            {
              name: 'reachIn',
              value: reachIn,
              unit: 'in',
              digits: 3,
              working: [reach],
              isLead: true,
              isOver: depthIn > reachIn,
            },
            ...(speed === null
              ? []
              : [
                  {
                    name: 'rimSpeedSfm',
                    value: Number(speed.value),
                    unit: 'SFM',
                    digits: 0,
                    working: [speed],
                    isOver: isFast,
                  },
                ]),
          ],
        },
      ],
      cautions: [],
      warnings: [
        ...(depthIn > reachIn ? ['past_reach'] : []),
        ...(values.beyond === 'unknown' ? ['below_unknown'] : []),
        ...(values.embedded.some((line) => line.name === 'tendon') ? ['tendon'] : []),
      ],
    };
  },
  draw: (values) => <DepthSection section={sectionOf(values)} />,
});

/** The most passes that a section can still show. */
const maxPasses = 100;

/** The section the engine draws. */
function sectionOf(values: Values): DepthSectionInput {
  const { element, thicknessIn, beyond, mats, embedded, depthIn, scoreIn, maxPassIn } = values;
  const { depthsIn } = passPlan({ depthIn, scoreIn, maxPassIn });
  if (depthsIn.length > maxPasses) {
    throw new CuttingInputError({
      field: 'maxPassIn',
      allowed: `deep enough to need at most ${maxPasses} passes`,
      given: maxPassIn,
    });
  }
  return {
    element,
    thicknessIn,
    beyond,
    mats,
    embedded: embedded.map((line) => ({ ...line, name: lineNames[line.name] })),
    passDepthsIn: depthsIn,
  };
}

const shownDepths = 8;

function depthsInWords(depthsIn: readonly number[]): string {
  const short = (depth: number) => String(Math.round(depth * 100) / 100);
  if (depthsIn.length <= shownDepths) return depthsIn.map(short).join(', ');
  const last = depthsIn.at(-1) ?? 0;
  return `${depthsIn
    .slice(0, shownDepths - 1)
    .map(short)
    .join(', ')} … ${short(last)}`;
}
