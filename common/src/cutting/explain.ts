import { bladeReachWithSource, rpmForSurfaceSpeed, surfaceSpeedSfm } from './blades.ts';
import { conduitOutsideDiameterIn, minimumCoverIn } from './cover.ts';
import { earliestDigDate } from './dig-date.ts';
import { levelAtDistanceDba } from './exposure/noise.ts';
import { inchFeet } from './inch-feet.ts';
import { sawsForWindow } from './joints.ts';
import { lipTreatment } from './lip.ts';
import { cornerCoreDiameterIn, overcutIn, overcutStep } from './overcut.ts';
import { batteryPacks, generatorKw } from './power.ts';
import { conduitOutsideDiameters } from './tables/conduit.ts';
import { minimumCover } from './tables/cover.ts';
import { lipRules } from './tables/lip.ts';
import { sourceOf } from './tables/provenance.ts';
import { reinforcedConcretePcf, reinforcedConcreteSource } from './tables/unit-weights.ts';
import { coreWeightLb, slabWeightLb } from './weights.ts';
import { arithmetic, put, type WorkingInput, type WorkingSource, type WorkingStep } from './working.ts';

/** All of a step but its value; arithmetic unless it names another source. */
interface StepWords {
  readonly label: string;
  readonly formula: string;
  readonly inputs: readonly WorkingInput[];
  readonly unit: string;
  readonly source?: WorkingSource;
}

/** Calculates first, so that bad input throws what the function throws, and then puts it in words. */
function explained<Input>(
  calculate: (input: Input) => number | string,
  describe: (input: Input) => StepWords,
): (input: Input) => WorkingStep {
  return (input) => {
    const value = calculate(input);
    return { source: arithmetic, ...describe(input), value };
  };
}

/**
 * The working of the functions that return a bare number or date, under the same names: one step each, so that a
 * screen can open those figures too.
 */
export const explain = {
  inchFeet: explained(inchFeet, ({ lengthFt, depthIn }) => ({
    label: 'Inch-feet',
    formula: 'L × D',
    inputs: [put('L', lengthFt, 'ft'), put('D', depthIn, 'in')],
    unit: 'in-ft',
  })),

  overcutIn: explained(overcutIn, (input) => overcutStep(input)),

  cornerCoreDiameterIn: explained(cornerCoreDiameterIn, (input) => ({
    label: 'Corner core',
    formula: 'inside the corner 2 × overcut; centred on it 1 ×',
    inputs: [put('overcut', input.overcutIn, 'in'), put('placement', input.placement ?? 'inside', '')],
    unit: 'in',
  })),

  coreWeightLb: explained(coreWeightLb, ({ diameterIn, lengthIn, densityPcf }) => ({
    label: 'Weight of the core',
    formula: 'π ÷ 4 × Ø² × L ÷ 1,728 × density',
    inputs: [put('Ø', diameterIn, 'in'), put('L', lengthIn, 'in'), density(densityPcf)],
    unit: 'lb',
    source: densitySource(densityPcf),
  })),

  slabWeightLb: explained(slabWeightLb, ({ lengthFt, widthFt, thicknessIn, densityPcf }) => ({
    label: 'Weight of the slab',
    formula: 'L × W × T ÷ 12 × density',
    inputs: [
      put('L', lengthFt, 'ft'),
      put('W', widthFt, 'ft'),
      put('T', thicknessIn, 'in'),
      density(densityPcf),
    ],
    unit: 'lb',
    source: densitySource(densityPcf),
  })),

  bladeReachIn: explained(
    (input: Parameters<typeof bladeReachWithSource>[0]) => bladeReachWithSource(input).reachIn,
    (input) => ({
      label: 'Reach of the blade',
      formula: 'table, by diameter and mount',
      inputs: [put('Ø', input.diameterIn, 'in'), put('mount', input.mount, '')],
      unit: 'in',
      source: bladeReachWithSource(input).source,
    }),
  ),

  surfaceSpeedSfm: explained(surfaceSpeedSfm, ({ diameterIn, rpm }) => ({
    label: 'Rim speed',
    formula: 'π × Ø × rpm ÷ 12',
    inputs: [put('Ø', diameterIn, 'in'), put('rpm', rpm, 'rpm')],
    unit: 'SFM',
  })),

  rpmForSurfaceSpeed: explained(rpmForSurfaceSpeed, ({ diameterIn, sfm }) => ({
    label: 'Turns for a rim speed',
    formula: '12 × SFM ÷ (π × Ø)',
    inputs: [put('Ø', diameterIn, 'in'), put('SFM', sfm, 'SFM')],
    unit: 'rpm',
  })),

  levelAtDistanceDba: explained(levelAtDistanceDba, ({ levelDba, referenceFt, distanceFt }) => ({
    label: 'Level at a distance',
    formula: 'L − 20 × log10(D ÷ reference)',
    inputs: [put('L', levelDba, 'dBA'), put('D', distanceFt, 'ft'), put('reference', referenceFt, 'ft')],
    unit: 'dBA',
  })),

  minimumCoverIn: explained(minimumCoverIn, ({ location, wiring, inRaceway = false }) => ({
    label: 'Cover',
    formula: 'table, by location and wiring',
    inputs: [
      put('location', location, ''),
      put('wiring', wiring, ''),
      put('in a raceway', inRaceway ? 'yes' : 'no', ''),
    ],
    unit: 'in',
    source: sourceOf(minimumCover.source),
  })),

  conduitOutsideDiameterIn: explained(conduitOutsideDiameterIn, ({ kind, tradeSize }) => ({
    label: 'Conduit outside diameter',
    formula: 'table, by kind and trade size',
    inputs: [put('kind', kind, ''), put('trade size', tradeSize, 'in')],
    unit: 'in',
    source: sourceOf(conduitOutsideDiameters[kind].source),
  })),

  sawsForWindow: explained(sawsForWindow, ({ sawFt, feetPerHour, windowHours }) => ({
    label: 'Saws for the window',
    formula: '⌈feet ÷ (feet an hour × hours)⌉',
    inputs: [
      put('feet', sawFt, 'ft'),
      put('feet an hour', feetPerHour, 'ft/h'),
      put('hours', windowHours, 'h'),
    ],
    unit: 'saws',
  })),

  lipTreatment: explained(
    (input: Parameters<typeof lipTreatment>[0]) => lipTreatment(input).cutLengthIn,
    (input) => ({
      label: 'Length of the cut',
      formula: 'none to ¼ in; to ½ in a bevel, 2 × height; above a ramp, run × height',
      inputs: [
        put('height', input.heightIn, 'in'),
        put('run', input.runPerRise ?? lipRules.rows.rampRunPerRise, 'to 1'),
        put('treatment', lipTreatment(input).treatment, ''),
      ],
      unit: 'in',
      source: sourceOf(lipRules.source),
    }),
  ),

  batteryPacks: explained(batteryPacks, (input) => ({
    label: 'Battery packs',
    formula: '⌈work ÷ work per pack⌉',
    inputs:
      'units' in input
        ? [put('work', input.units, 'units'), put('work per pack', input.unitsPerPack, 'units')]
        : [put('work', input.inchFeet, 'in-ft'), put('work per pack', input.inchFeetPerPack, 'in-ft')],
    unit: 'packs',
  })),

  generatorKw: explained(generatorKw, (input) => ({
    label: 'Generator',
    formula:
      'max(running ÷ load fraction, running × start factor); running = V × A (× √3) × power factor ÷ 1,000',
    inputs: [
      put('V', input.volts, 'V'),
      put('A', input.amps, 'A'),
      put('phases', input.phases, ''),
      put('power factor', input.powerFactor ?? 1, ''),
      put('load fraction', input.loadFraction ?? 0.8, ''),
      put('start factor', input.startFactor ?? 1, ''),
    ],
    unit: 'kW',
  })),

  earliestDigDate: explained(earliestDigDate, ({ notifiedOn, fullBusinessDays }) => ({
    label: 'Earliest date to dig',
    formula: 'the day after the last full business day; the day of notice is not counted',
    inputs: [put('notice', notifiedOn, ''), put('full business days', fullBusinessDays, 'days')],
    unit: '',
  })),
} as const;

function density(densityPcf: number | undefined): WorkingInput {
  return put('density', densityPcf ?? reinforcedConcretePcf, 'pcf');
}

function densitySource(densityPcf: number | undefined): WorkingSource {
  return densityPcf === undefined ? sourceOf(reinforcedConcreteSource) : arithmetic;
}
