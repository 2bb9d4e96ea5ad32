import {
  batteryPacks,
  commonKerfIn,
  coringHours,
  crewHours,
  CuttingInputError,
  explain,
  productionRates,
  sawingHours,
  slurry,
  spoil,
  toolWear,
  waterGallonsPerMinute,
  workPerBatteryPack,
  type ProductionMethod,
  type WorkingSource,
  type WorkingStep,
} from '../cutting/index.ts';
import { sourceOf } from '../cutting/tables/provenance.ts';
import type { RateCard } from '../people/rate-card.schema.ts';
import type { EstimatedFigure, EstimateInput, JobEstimate, Spread, ToolHours } from './estimate.types.ts';
import { put, step, sumSpread } from './steps.ts';
import { workOfCuts, type CoreWork, type SawWork, type WorkOfCuts } from './work-of-cuts.ts';

const company: WorkingSource = { origin: 'company' };
const drumGal = 55;

/**
 * What a job takes the crew: hours, wear, water, slurry, spoil, power and cost. The crew's own numbers go before
 * common practice, and every figure says whose it used.
 * @throws CuttingInputError for hours, loads or a machine out of range, and for a cut that makes no sense
 */
export function estimateJob(input: EstimateInput): JobEstimate {
  const work = workOfCuts(input);
  const saws = work.saws.map((one) => sawTool(one, input.card));
  const cores = coreTools(work, input.card);
  const tools = [...saws.map(({ hours }) => hours), ...cores.map(({ hours }) => hours)];
  const hours = allHours(input, tools);
  const wear = wearOf(work, input.card);
  const crewCents = crewCost(hours, input.card);
  return {
    tools,
    hours,
    crewCents,
    ...wear,
    costCents: allCosts(crewCents, wear),
    ...waterOf([...saws, ...cores]),
    spoil: spoilOf(work.removedCuFt, input.load),
    batteryPacks: packsOf(work, input),
    generatorKw: generatorOf(input),
    notCounted: work.notCounted,
  };
}

/** A tool with what its water runs on: minutes of cutting, and the kerf it makes. */
interface ToolAtWork {
  hours: ToolHours;
  water: 'flat' | 'wall' | 'hand' | 'core';
  runLow: number;
  runHigh: number;
  inchFeet: number;
}

// The table of water names four tools; the others drink about as the one beside them.
const waterOfTool: Readonly<Record<ProductionMethod, ToolAtWork['water']>> = {
  flat_saw: 'flat',
  flat_saw_electric: 'flat',
  joint_saw: 'flat',
  wall_saw: 'wall',
  ring_saw: 'wall',
  chain_saw: 'wall',
  wire_saw: 'wall',
  hand_saw: 'hand',
};

function sawTool({ tool, quantity, inchFeet }: SawWork, card: RateCard | null): ToolAtWork {
  const companyPerHour = card?.production.perHour[tool] ?? undefined;
  const { lowHours, highHours, working } = sawingHours({ method: tool, quantity, companyPerHour });
  const { unit } = productionRates.rows[tool];
  return {
    hours: { tool, quantity, unit, low: lowHours, high: highHours, working: oncePerValue(working) },
    water: waterOfTool[tool],
    runLow: lowHours * 60,
    runHigh: highHours * 60,
    inchFeet,
  };
}

/** Equal at best and at worst, one step is enough. */
function oncePerValue(working: ToolHours['working']): ToolHours['working'] {
  const [best, worst] = working;
  return best !== undefined && best.value === worst?.value ? [best] : working;
}

/** Cores of the same diameter and depth together; those without any feed are put on the list of what is not counted. */
function coreTools(work: WorkOfCuts, card: RateCard | null): ToolAtWork[] {
  return work.cores.flatMap((core) => {
    try {
      return [coreTool(core, card)];
    } catch (error) {
      if (!(error instanceof CuttingInputError) || error.field !== 'companyInchesPerMinute') throw error;
      work.notCounted.push({ mark: `Ø ${core.diameterIn} in`, reason: 'no_feed' });
      return [];
    }
  });
}

function coreTool({ holes, diameterIn, depthIn }: CoreWork, card: RateCard | null): ToolAtWork {
  const companyInchesPerMinute = feedOf(diameterIn, card);
  const companySetUpMinutes = card?.production.coreSetUpMinutes ?? undefined;
  const run = { holes, diameterIn, depthIn, companyInchesPerMinute };
  // Where one of the two is the crew's and the other common practice, the engine's step names the latter.
  const ownSteps = [
    ...ownStep('Feed', companyInchesPerMinute, 'in a minute'),
    ...ownStep('Set-up', companySetUpMinutes, 'min'),
  ];
  const whole = coringHours({ ...run, companySetUpMinutes });
  const drilling = coringHours({ ...run, companySetUpMinutes: 0 });
  return {
    hours: {
      tool: 'core',
      quantity: holes,
      unit: `× Ø ${diameterIn} in`,
      low: whole.lowHours,
      high: whole.highHours,
      working: [...ownSteps, ...oncePerValue(whole.working)],
    },
    water: 'core',
    runLow: drilling.lowHours * 60,
    runHigh: drilling.highHours * 60,
    // A core's kerf is a ring: its circumference is the length of the cut.
    inchFeet: ((Math.PI * diameterIn) / 12) * depthIn * holes,
  };
}

/** A number off the crew's card as a step of its own, so that it is seen whose it is. */
function ownStep(label: string, value: number | undefined, unit: string): WorkingStep[] {
  return value === undefined ? [] : [step(label, 'from your rate card', [], [value, unit], company)];
}

/** The crew's own feed for a bit: that of the narrowest band that holds it. */
function feedOf(diameterIn: number, card: RateCard | null): number | undefined {
  const fitting = (card?.production.coreFeeds ?? []).filter(
    ({ upToIn }) => diameterIn <= (upToIn ?? Infinity),
  );
  return fitting.sort((a, b) => (a.upToIn ?? Infinity) - (b.upToIn ?? Infinity))[0]?.inchesPerMinute;
}

function allHours({ hours }: EstimateInput, tools: readonly ToolHours[]): Spread {
  const [low, high] = (['low', 'high'] as const).map((side) =>
    crewHours({ ...hours, sawingHours: tools.reduce((sum, tool) => sum + tool[side], 0) }),
  );
  if (low === undefined || high === undefined) throw new Error('two sides');
  const sides =
    low.hours === high.hours
      ? low.working
      : [
          ...low.working.map((one) => ({ ...one, label: `${one.label}, at best` })),
          ...high.working.map((one) => ({ ...one, label: `${one.label}, at worst` })),
        ];
  return { low: low.hours, high: high.hours, working: [...tools.flatMap((tool) => tool.working), ...sides] };
}

function wearOf(work: WorkOfCuts, card: RateCard | null): Pick<JobEstimate, 'bladeCents' | 'bitCents'> {
  const inchFeet = work.saws.reduce(
    (sum, { tool, inchFeet: own }) => sum + (tool === 'wire_saw' ? 0 : own),
    0,
  );
  const coreInches = work.cores.reduce((sum, { depthIn, holes }) => sum + depthIn * holes, 0);
  return {
    bladeCents: wear('Blades', { quantity: inchFeet, unit: 'in-ft', rate: card?.costs.bladeRate ?? null }),
    bitCents: wear('Bits', { quantity: coreInches, unit: 'core-in', rate: card?.costs.bitRate ?? null }),
  };
}

/** A cost for one unit is a tool that lasts a hundred units at a hundred times that. */
function wear(
  label: string,
  { quantity, unit, rate }: { quantity: number; unit: string; rate: number | null },
): EstimatedFigure | null {
  if (rate === null || quantity === 0) return null;
  const { cents } = toolWear({ quantity, quantityPerTool: 100, toolCents: rate });
  const inputs = [put('quantity', quantity, unit), put('cost', rate / 100, `cents per ${unit}`)];
  return {
    value: cents,
    working: [step(label, 'quantity × cost, up to the next cent', inputs, [cents, 'cents'], company)],
  };
}

function crewCost(hours: Spread, card: RateCard | null): Spread | null {
  const rate = card?.costs.crewHourCents ?? null;
  if (rate === null) return null;
  const cost = (side: 'low' | 'high') => Math.round(hours[side] * rate);
  const costStep = (side: 'low' | 'high', label: string) =>
    step(
      label,
      'hours × cost of the crew',
      [put('hours', hours[side], 'h'), put('cost', rate, 'cents per h')],
      [cost(side), 'cents'],
      company,
    );
  const working =
    hours.low === hours.high
      ? [costStep('low', 'Crew')]
      : [costStep('low', 'Crew, at best'), costStep('high', 'Crew, at worst')];
  // With the hours' own steps, so that it shows whose pace they rest on.
  return { low: cost('low'), high: cost('high'), working: [...hours.working, ...working] };
}

function allCosts(crew: Spread | null, { bladeCents, bitCents }: ReturnType<typeof wearOf>): Spread | null {
  const parts = [
    ...(crew === null ? [] : [{ name: 'crew', low: crew.low, high: crew.high }]),
    ...(bladeCents === null ? [] : [{ name: 'blades', low: bladeCents.value, high: bladeCents.value }]),
    ...(bitCents === null ? [] : [{ name: 'bits', low: bitCents.value, high: bitCents.value }]),
  ];
  if (parts.length === 0) return null;
  const sum = sumSpread('Your cost', 'cents', parts);
  const before = [crew, bladeCents, bitCents].flatMap((part) => part?.working ?? []);
  return { ...sum, working: [...before, ...sum.working] };
}

function waterOf(tools: readonly ToolAtWork[]): Pick<JobEstimate, 'waterGal' | 'drums' | 'slurryLb'> {
  const runs = tools.map((tool) => ({
    name: nameOf(tool.hours),
    low: run(tool, 'runLow'),
    high: run(tool, 'runHigh'),
  }));
  const spread = (label: string, unit: string, quantity: 'waterGal' | 'slurryGal' | 'weightLb') =>
    sumSpread(
      label,
      unit,
      runs.map(({ name, low, high }) => ({ name, low: low[quantity], high: high[quantity] })),
    );
  const water = spread('Water', 'gal', 'waterGal');
  const slurryGal = spread('Slurry', 'gal', 'slurryGal');
  const working = [...runs.flatMap(({ name, high }) => namedSteps(name, high.working)), ...water.working];
  const drums = (gal: number) => Math.ceil(gal / drumGal - 1e-9);
  const [low, high] = [drums(slurryGal.low), drums(slurryGal.high)];
  const drumStep = (label: string, gal: number) =>
    step(label, '⌈slurry ÷ 55⌉', [put('slurry', gal, 'gal')], [drums(gal), 'drums']);
  return {
    waterGal: { ...water, working },
    slurryLb: spread('Weight of the slurry', 'lb', 'weightLb'),
    drums: {
      low,
      high,
      working: [
        ...slurryGal.working,
        ...(low === high
          ? [drumStep('Drums', slurryGal.high)]
          : [drumStep('Drums, at best', slurryGal.low), drumStep('Drums, at worst', slurryGal.high)]),
      ],
    },
  };
}

function run(
  { inchFeet, water, ...tool }: ToolAtWork,
  side: 'runLow' | 'runHigh',
): ReturnType<typeof slurry> {
  return slurry({
    inchFeet,
    kerfIn: commonKerfIn.rows,
    gallonsPerMinute: waterGallonsPerMinute.rows[water],
    minutes: tool[side],
  });
}

/** The steps down to water and solids of one tool, its flow and kerf being common practice. */
function namedSteps(name: string, working: ReturnType<typeof slurry>['working']): ToolHours['working'] {
  return working.slice(0, 2).map((one) => ({
    ...one,
    label: `${one.label}, ${name}`,
    source: sourceOf(waterGallonsPerMinute.source),
  }));
}

const toolNames: Readonly<Record<ToolHours['tool'], string>> = {
  flat_saw: 'flat saw',
  flat_saw_electric: 'electric flat saw',
  wall_saw: 'wall saw',
  hand_saw: 'hand saw',
  ring_saw: 'ring saw',
  chain_saw: 'chain saw',
  wire_saw: 'wire saw',
  joint_saw: 'joint saw',
  core: 'cores',
};

function nameOf({ tool, unit }: ToolHours): string {
  return tool === 'core' ? `${toolNames.core} ${unit.replace('× ', '')}` : toolNames[tool];
}

function spoilOf(cuFt: number, load: EstimateInput['load']): JobEstimate['spoil'] {
  if (cuFt === 0) return null;
  const { tons, looseCuYd, working } = spoil({ cuFt });
  if (!(load.tons > 0) || !(load.cuYd > 0)) {
    throw new CuttingInputError({ field: 'load', allowed: 'more than nothing in a load', given: load });
  }
  const loads = Math.ceil(Math.max(tons / load.tons, looseCuYd / load.cuYd) - 1e-9);
  const loadStep = step(
    'Loads',
    '⌈max(tons ÷ tons a load, loose ÷ cu yd a load)⌉',
    [
      put('tons', tons, 'tons'),
      put('tons a load', load.tons, 'tons'),
      put('loose', looseCuYd, 'cu yd'),
      put('cu yd a load', load.cuYd, 'cu yd'),
    ],
    [loads, 'loads'],
  );
  return {
    tons: { value: tons, working: working.slice(0, 1) },
    looseCuYd: { value: looseCuYd, working: working.slice(1) },
    loads: { value: loads, working: [...working, loadStep] },
  };
}

function packsOf({ byHand }: WorkOfCuts, { place }: EstimateInput): EstimatedFigure | null {
  if (place.enginesAllowed && !place.indoors) return null;
  const per = workPerBatteryPack.rows;
  const inputs = [
    { inchFeet: byHand.inchFeet, inchFeetPerPack: per.inchFeet },
    { units: byHand.blocks, unitsPerPack: per.blocks },
    { units: byHand.bars, unitsPerPack: per.bars },
  ].filter((one) => Object.values(one)[0] !== 0);
  if (inputs.length === 0) return null;
  const source = sourceOf(workPerBatteryPack.source);
  return {
    value: inputs.reduce((sum, one) => sum + batteryPacks(one), 0),
    working: inputs.map((one) => ({ ...explain.batteryPacks(one), source })),
  };
}

function generatorOf({ generator }: EstimateInput): EstimatedFigure | null {
  if (generator === null) return null;
  const kw = explain.generatorKw(generator);
  return { value: Number(kw.value), working: [kw] };
}
