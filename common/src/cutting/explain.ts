import { bladeReachWithSource, rpmForSurfaceSpeed, surfaceSpeedSfm } from './blades.ts';
import { conduitOutsideDiameterIn, minimumCoverIn } from './cover.ts';
import { earliestDigDate } from './dig-date.ts';
import { levelAtDistanceDba } from './exposure/noise.ts';
import { inchFeet } from './inch-feet.ts';
import { sawsForWindow } from './joints.ts';
import { lipTreatment } from './lip.ts';
import { cornerCoreDiameterIn, overcutIn } from './overcut.ts';
import { batteryPacks, generatorKw } from './power.ts';
import { conduitOutsideDiameters } from './tables/conduit.ts';
import { minimumCover } from './tables/cover.ts';
import { lipRules } from './tables/lip.ts';
import { sourceOf } from './tables/provenance.ts';
import { reinforcedConcretePcf, reinforcedConcreteSource } from './tables/unit-weights.ts';
import { coreWeightLb, slabWeightLb } from './weights.ts';
import { arithmetic, put, type WorkingInput, type WorkingSource, type WorkingStep } from './working.ts';

type Input<Calculate extends (input: never) => unknown> = Parameters<Calculate>[0];

const concreteSource = sourceOf(reinforcedConcreteSource);

/**
 * The working of the functions that return a bare number or date, under the same names: one step each, so that a
 * screen can open those figures too. Each calculates by its function and throws what it throws.
 */
export const explain = {
  inchFeet: (input: Input<typeof inchFeet>): WorkingStep =>
    step('Inch-feet', 'L × D', [put('L', input.lengthFt, 'ft'), put('D', input.depthIn, 'in')], {
      value: inchFeet(input),
      unit: 'in-ft',
    }),

  overcutIn: (input: Input<typeof overcutIn>): WorkingStep =>
    step(
      'Overcut at one cut end',
      '√(2R(T + e) − (T + e)²) − √(2Re − e²), R = Ø ÷ 2',
      [
        put('Ø', input.bladeDiameterIn, 'in'),
        put('T', input.thicknessIn, 'in'),
        put('e', input.passThroughIn, 'in'),
      ],
      { value: overcutIn(input), unit: 'in' },
    ),

  cornerCoreDiameterIn: (input: Input<typeof cornerCoreDiameterIn>): WorkingStep =>
    step(
      'Corner core',
      'inside the corner 2 × overcut; centred on it 1 ×',
      [put('overcut', input.overcutIn, 'in'), put('placement', input.placement ?? 'inside', '')],
      { value: cornerCoreDiameterIn(input), unit: 'in' },
    ),

  coreWeightLb: (input: Input<typeof coreWeightLb>): WorkingStep =>
    step(
      'Weight of the core',
      'π ÷ 4 × Ø² × L ÷ 1,728 × density',
      [put('Ø', input.diameterIn, 'in'), put('L', input.lengthIn, 'in'), density(input.densityPcf)],
      { value: coreWeightLb(input), unit: 'lb' },
      input.densityPcf === undefined ? concreteSource : arithmetic,
    ),

  slabWeightLb: (input: Input<typeof slabWeightLb>): WorkingStep =>
    step(
      'Weight of the slab',
      'L × W × T ÷ 12 × density',
      [
        put('L', input.lengthFt, 'ft'),
        put('W', input.widthFt, 'ft'),
        put('T', input.thicknessIn, 'in'),
        density(input.densityPcf),
      ],
      { value: slabWeightLb(input), unit: 'lb' },
      input.densityPcf === undefined ? concreteSource : arithmetic,
    ),

  bladeReachIn: (input: Input<typeof bladeReachWithSource>): WorkingStep => {
    const { reachIn, source } = bladeReachWithSource(input);
    return step(
      'Reach of the blade',
      'table, by diameter and mount',
      [put('Ø', input.diameterIn, 'in'), put('mount', input.mount, '')],
      { value: reachIn, unit: 'in' },
      source,
    );
  },

  surfaceSpeedSfm: (input: Input<typeof surfaceSpeedSfm>): WorkingStep =>
    step('Rim speed', 'π × Ø × rpm ÷ 12', [put('Ø', input.diameterIn, 'in'), put('rpm', input.rpm, 'rpm')], {
      value: surfaceSpeedSfm(input),
      unit: 'SFM',
    }),

  rpmForSurfaceSpeed: (input: Input<typeof rpmForSurfaceSpeed>): WorkingStep =>
    step(
      'Turns for a rim speed',
      '12 × SFM ÷ (π × Ø)',
      [put('Ø', input.diameterIn, 'in'), put('SFM', input.sfm, 'SFM')],
      { value: rpmForSurfaceSpeed(input), unit: 'rpm' },
    ),

  levelAtDistanceDba: (input: Input<typeof levelAtDistanceDba>): WorkingStep =>
    step(
      'Level at a distance',
      'L − 20 × log10(D ÷ reference)',
      [
        put('L', input.levelDba, 'dBA'),
        put('D', input.distanceFt, 'ft'),
        put('reference', input.referenceFt, 'ft'),
      ],
      { value: levelAtDistanceDba(input), unit: 'dBA' },
    ),

  minimumCoverIn: (input: Input<typeof minimumCoverIn>): WorkingStep =>
    step(
      'Cover',
      'table, by location and wiring',
      [
        put('location', input.location, ''),
        put('wiring', input.wiring, ''),
        put('in a raceway', input.inRaceway === true ? 'yes' : 'no', ''),
      ],
      { value: minimumCoverIn(input), unit: 'in' },
      sourceOf(minimumCover.source),
    ),

  conduitOutsideDiameterIn: (input: Input<typeof conduitOutsideDiameterIn>): WorkingStep => {
    const value = conduitOutsideDiameterIn(input);
    return step(
      'Conduit outside diameter',
      'table, by kind and trade size',
      [put('kind', input.kind, ''), put('trade size', input.tradeSize, 'in')],
      { value, unit: 'in' },
      sourceOf(conduitOutsideDiameters[input.kind].source),
    );
  },

  sawsForWindow: (input: Input<typeof sawsForWindow>): WorkingStep =>
    step(
      'Saws for the window',
      '⌈feet ÷ (feet an hour × hours)⌉',
      [
        put('feet', input.sawFt, 'ft'),
        put('feet an hour', input.feetPerHour, 'ft/h'),
        put('hours', input.windowHours, 'h'),
      ],
      { value: sawsForWindow(input), unit: 'saws' },
    ),

  lipTreatment: (input: Input<typeof lipTreatment>): WorkingStep => {
    const { treatment, cutLengthIn } = lipTreatment(input);
    return step(
      'Length of the cut',
      'none to ¼ in; to ½ in a bevel, 2 × height; above a ramp, run × height',
      [
        put('height', input.heightIn, 'in'),
        put('run', input.runPerRise ?? lipRules.rows.rampRunPerRise, 'to 1'),
        put('treatment', treatment, ''),
      ],
      { value: cutLengthIn, unit: 'in' },
      sourceOf(lipRules.source),
    );
  },

  batteryPacks: (input: Input<typeof batteryPacks>): WorkingStep => {
    const value = batteryPacks(input);
    const inputs =
      'units' in input
        ? [put('work', input.units, 'units'), put('work per pack', input.unitsPerPack, 'units')]
        : [put('work', input.inchFeet, 'in-ft'), put('work per pack', input.inchFeetPerPack, 'in-ft')];
    return step('Battery packs', '⌈work ÷ work per pack⌉', inputs, { value, unit: 'packs' });
  },

  generatorKw: (input: Input<typeof generatorKw>): WorkingStep =>
    step(
      'Generator',
      'max(running ÷ load fraction, running × start factor); running = V × A (× √3) × power factor ÷ 1,000',
      [
        put('V', input.volts, 'V'),
        put('A', input.amps, 'A'),
        put('phases', input.phases, ''),
        put('power factor', input.powerFactor ?? 1, ''),
        put('load fraction', input.loadFraction ?? 0.8, ''),
        put('start factor', input.startFactor ?? 1, ''),
      ],
      { value: generatorKw(input), unit: 'kW' },
    ),

  earliestDigDate: (input: Input<typeof earliestDigDate>): WorkingStep =>
    step(
      'Earliest date to dig',
      'the day after the last full business day; the day of notice is not counted',
      [put('notice', input.notifiedOn, ''), put('full business days', input.fullBusinessDays, 'days')],
      { value: earliestDigDate(input), unit: '' },
    ),
} as const;

function density(densityPcf: number | undefined): WorkingInput {
  return put('density', densityPcf ?? reinforcedConcretePcf, 'pcf');
}

function step(
  label: string,
  formula: string,
  inputs: readonly WorkingInput[],
  result: { readonly value: number | string; readonly unit: string },
  source: WorkingSource = arithmetic,
): WorkingStep {
  return { label, formula, inputs, ...result, source };
}
