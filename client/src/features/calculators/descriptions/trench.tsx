import {
  burialLocations,
  conduitKinds,
  coverReferences,
  cutLimits,
  slopedTrench,
  tradeSizes,
  trenchPlan,
  trenchSoils,
  wiringMethods,
} from '@kerfyard/common/cutting';
import { TrenchSection } from '../../../components/trench-section.tsx';
import { choiceField, defineCalculator, numberField } from '../calculator.ts';
import { stepsOf } from '../evaluate.ts';

const { lengthFt, thicknessIn } = cutLimits.trench;
// A vertical cut deeper than this is sloped or shored; the engine's own rules say so in `excavation`.
const slopedFromFt = 5;
const slopedToFt = 20;

/** A trench through a slab for one conduit. Starts with NEC Table 300.5, worked: 2-in PVC under parking, 28.375 in. */
export default defineCalculator({
  name: 'trench',
  fields: {
    lengthFt: numberField('ft', 100, lengthFt),
    widthIn: numberField('in', 24),
    slabThicknessIn: numberField('in', 6, thicknessIn),
    location: choiceField(burialLocations, 'under_roads_parking'),
    wiring: choiceField(wiringMethods, 'nonmetallic'),
    coverFrom: choiceField(coverReferences, 'finished_surface'),
    conduitKind: choiceField(conduitKinds, 'pvc'),
    tradeSize: choiceField(tradeSizes, '2'),
    beddingIn: numberField('in', 2),
    soil: choiceField(trenchSoils, 'unclassified'),
    swellPct: numberField('%', 25),
    wastePct: numberField('%', 10),
  },
  sections: [
    { name: 'size', fields: ['lengthFt', 'widthIn', 'slabThicknessIn'] },
    { name: 'conduit', fields: ['location', 'wiring', 'coverFrom', 'conduitKind', 'tradeSize', 'beddingIn'] },
    { name: 'ground', fields: ['soil', 'swellPct', 'wastePct'] },
  ],
  cautions: ['embedded', 'locate', 'trench_edges'],
  compute: (values) => {
    const plan = trenchPlan(values);
    const step = (...labels: string[]) => stepsOf(plan.working, ...labels);
    const { excavation } = plan;
    const depthFt = plan.digDepthIn / 12;
    const slope =
      depthFt >= slopedFromFt && depthFt <= slopedToFt
        ? slopedTrench({ bottomWidthFt: values.widthIn / 12, depthFt, soil: values.soil })
        : null;
    return {
      blocks: [
        {
          figures: [
            {
              name: 'digDepthIn',
              value: plan.digDepthIn,
              unit: 'in',
              digits: 3,
              working: step('Cover', 'Conduit outside diameter', 'Depth to dig'),
              isLead: true,
            },
            { name: 'coverIn', value: plan.coverIn, unit: 'in', working: step('Cover') },
            {
              name: 'conduitIn',
              value: plan.conduitIn,
              unit: 'in',
              digits: 3,
              working: step('Conduit outside diameter'),
            },
          ],
        },
        {
          name: 'saw',
          figures: [
            { name: 'sawFt', value: plan.sawFt, unit: 'LF', working: step('Saw feet') },
            { name: 'inchFeet', value: plan.inchFeet, unit: 'in-ft', working: step('Saw feet', 'Inch-feet') },
          ],
        },
        {
          name: 'out',
          figures: [
            {
              name: 'concreteCuFt',
              value: plan.concreteCuFt,
              unit: 'cu ft',
              working: step('Concrete out'),
            },
            {
              name: 'concreteTons',
              value: plan.concreteTons,
              unit: 'tons',
              digits: 2,
              working: step('Concrete out', 'Weight out'),
            },
            {
              name: 'soilBankCuYd',
              value: plan.soilBankCuYd,
              unit: 'cu yd',
              digits: 2,
              working: step('Depth to dig', 'Soil, in the bank'),
            },
            {
              name: 'soilLooseCuYd',
              value: plan.soilLooseCuYd,
              unit: 'cu yd',
              digits: 2,
              working: step('Soil, in the bank', 'Soil, loose'),
            },
            {
              name: 'patchOrderCuYd',
              value: plan.patchOrderCuYd,
              unit: 'cu yd',
              digits: 2,
              working: step('Concrete out', 'Patch to order'),
            },
          ],
        },
        {
          name: 'excavation',
          figures: [
            {
              name: 'protectiveSystem',
              value: { word: `options.protectiveSystem.${excavation.protectiveSystem}` },
              unit: '',
              working: excavation.working,
              isWide: true,
              isOver: excavation.protectiveSystem.endsWith('required'),
            },
            { name: 'ladder', value: { word: excavation.ladderRequired ? 'yes' : 'no' }, unit: '' },
            { name: 'spoilSetbackFt', value: excavation.spoilSetbackFt, unit: 'ft' },
            { name: 'slopeRunPerRise', value: excavation.slopeRunPerRise, unit: 'to 1', digits: 2 },
            ...(slope === null
              ? []
              : [{ name: 'topWidthFt', value: slope.topWidthFt, unit: 'ft', working: slope.working }]),
          ],
        },
      ],
      cautions: plan.cautions,
    };
  },
  draw: (values) => <TrenchSection trench={values} />,
});
