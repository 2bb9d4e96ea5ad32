import {
  cornerChoices,
  cornerTreatments,
  cutLimits,
  openingSides,
  removalLimits,
  slabWeightLb,
  takeoffCut,
  type OpeningCut,
} from '@kerfyard/common/cutting';
import { CutSketch } from '../../../components/cut-sketch.tsx';
import {
  choiceField,
  defineCalculator,
  numberField,
  optionalNumber,
  setField,
  type ResultBlock,
  type ValuesOf,
} from '../calculator.ts';
import { OvercutPicture } from '../components/overcut-picture.tsx';
import { stepsOf } from '../evaluate.ts';

const limits = cutLimits.opening;

const fields = {
  lengthFt: numberField('ft', 4, limits.lengthFt),
  widthFt: numberField('ft', 8, limits.widthFt),
  thicknessIn: numberField('in', 8, limits.thicknessIn),
  uncutSides: setField(openingSides),
  count: numberField('', 1, limits.count),
  corners: choiceField(cornerTreatments, 'overcut'),
  bladeDiameterIn: numberField('in', 24, limits.bladeDiameterIn),
  passThroughIn: numberField('in', 1, limits.passThroughIn),
  maxPieceLb: numberField('lb', 1000, removalLimits.maxPieceLb),
  allowancePct: numberField('%', 10, removalLimits.allowancePct),
  maxSideFt: optionalNumber('ft', null, removalLimits.maxSideFt),
  maxShortSideFt: optionalNumber('ft', null, removalLimits.maxShortSideFt),
  densityPcf: numberField('pcf', 150, removalLimits.densityPcf),
};

type Values = ValuesOf<typeof fields>;

function cutOf(values: Values): OpeningCut {
  const { maxPieceLb, allowancePct, maxSideFt, maxShortSideFt, densityPcf, ...opening } = values;
  return {
    kind: 'opening',
    ...opening,
    uncutSides: [...values.uncutSides],
    removal: { maxPieceLb, allowancePct, maxSideFt, maxShortSideFt, densityPcf },
  };
}

/**
 * An opening: its sawing, its pieces, and the three ways to treat its corners. Starts with common practice: an 8-in
 * wall by a 24-in blade 1 in through overcuts 6.8 in; 4 × 8 ft to 1,000 lb with 10 % takes 12 LF of cross cut.
 */
export default defineCalculator({
  name: 'opening',
  fields,
  sections: [
    { name: 'size', fields: ['lengthFt', 'widthFt', 'thicknessIn', 'count', 'uncutSides'] },
    { name: 'blade', fields: ['corners', 'bladeDiameterIn', 'passThroughIn'] },
    {
      name: 'pieces',
      fields: ['maxPieceLb', 'allowancePct', 'maxSideFt', 'maxShortSideFt', 'densityPcf'],
    },
  ],
  cautions: ['structure', 'embedded', 'falling_pieces', 'open_edges'],
  compute: (values) => {
    const takeoff = takeoffCut(cutOf(values));
    const step = (...labels: string[]) => stepsOf(takeoff.working, ...labels);
    const { pieces } = takeoff;
    const corners = cornerChoices({ ...values, uncutSides: [...values.uncutSides] });
    return {
      blocks: [
        {
          figures: [
            {
              name: 'overcutIn',
              value: corners.overcutIn,
              unit: 'in',
              working: corners.working.slice(0, 1),
              isLead: true,
            },
            { name: 'sawFt', value: takeoff.sawFt, unit: 'LF', working: step('Saw feet') },
            {
              name: 'inchFeet',
              value: takeoff.inchFeet,
              unit: 'in-ft',
              working: step('Saw feet', 'Inch-feet'),
            },
          ],
        },
        {
          name: 'pieces',
          figures: [
            {
              name: 'pieces',
              value: pieces?.count ?? 1,
              unit: '',
              working: step('Cross cuts of one'),
              isLead: true,
            },
            {
              name: 'pieceSize',
              value: `${inFeet(pieces?.lengthFt ?? values.lengthFt)} × ${inFeet(pieces?.widthFt ?? values.widthFt)}`,
              unit: 'ft',
            },
            {
              name: 'pieceLb',
              value: pieces?.weightLb ?? 0,
              unit: 'lb',
              digits: 0,
              working: [...step('Cross cuts of one'), pieceStep(values, pieces?.count ?? 1)],
            },
            { name: 'crossCutFt', value: takeoff.crossCutFt, unit: 'LF', working: step('Cross cuts of one') },
            {
              name: 'removedLb',
              value: takeoff.removedLb,
              unit: 'lb',
              digits: 0,
              working: takeoff.working.filter((item) => item.unit === 'lb'),
            },
          ],
        },
        ...corners.choices.map((choice): ResultBlock => ({
          ...cornerBlock(choice, corners.working),
          isWay: true,
          isChosen: choice.corners === values.corners,
        })),
      ],
      cautions: takeoff.cautions,
    };
  },
  draw: (values) => (
    <>
      <CutSketch cuts={[cutOf(values)]} />
      <OvercutPicture {...values} />
    </>
  ),
});

function cornerBlock(
  choice: ReturnType<typeof cornerChoices>['choices'][number],
  working: ReturnType<typeof cornerChoices>['working'],
): ResultBlock {
  const option = { group: 'corners', value: choice.corners };
  if (choice.corners === 'overcut') {
    return { option, figures: [{ name: 'overcutFt', value: choice.overcutFt, unit: 'LF', working }] };
  }
  if (choice.corners === 'square') {
    return {
      option,
      figures: [{ name: 'squareFinishFt', value: choice.squareFinishFt, unit: 'LF', working }],
    };
  }
  return {
    option,
    figures: [
      { name: 'coreHoles', value: choice.coreHoles, unit: '' },
      {
        name: 'coreDiameterIn',
        value: choice.coreDiameterIn,
        unit: 'in',
        working: [
          ...working.slice(0, 1),
          {
            label: 'Corner core',
            formula: '2 × overcut, inside the corner, tangent to both lines',
            inputs: [{ name: 'overcut', value: choice.coreDiameterIn / 2, unit: 'in' }],
            value: choice.coreDiameterIn,
            unit: 'in',
            source: { origin: 'arithmetic' },
          },
        ],
      },
      { name: 'coreInches', value: choice.coreInches, unit: 'core-in' },
    ],
  };
}

function pieceStep(values: Values, pieces: number) {
  const { lengthFt, widthFt, thicknessIn, densityPcf, allowancePct } = values;
  const slabLb = slabWeightLb({ lengthFt, widthFt, thicknessIn, densityPcf });
  return {
    label: 'Weight to lift, each piece',
    formula: 'weight of the whole × (1 + allowance) ÷ pieces',
    inputs: [
      { name: 'whole', value: slabLb, unit: 'lb' },
      { name: 'allowance', value: allowancePct, unit: '%' },
      { name: 'pieces', value: pieces, unit: '' },
    ],
    value: (slabLb * (1 + allowancePct / 100)) / pieces,
    unit: 'lb',
    source: { origin: 'arithmetic' },
  } as const;
}

function inFeet(value: number): string {
  return String(Math.round(value * 100) / 100);
}
