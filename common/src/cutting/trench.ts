import { checkChoice, checkNumber, checkNumberOr, checkObject } from './check.ts';
import { conduitOutsideDiameterIn, minimumCoverIn } from './cover.ts';
import { excavationRules, type ExcavationRules } from './excavation.ts';
import { densityPcfRange, lengthFtRange, thicknessInRange } from './limits.ts';
import { wholeUp } from './rounding.ts';
import {
  conduitKinds,
  conduitOutsideDiameters,
  tradeSizes,
  type ConduitKind,
  type TradeSize,
} from './tables/conduit.ts';
import {
  burialLocations,
  coverNote,
  minimumCover,
  slabExtensionNote,
  wiringMethods,
  type BurialLocation,
  type WiringMethod,
} from './tables/cover.ts';
import { disturbedSoilNote } from './tables/excavation.ts';
import { sourceOf } from './tables/provenance.ts';
import { reinforcedConcretePcf } from './tables/unit-weights.ts';
import { arithmetic, commonPractice, put, type WorkingStep } from './working.ts';

export const coverReferences = ['finished_surface', 'underside_of_slab'] as const;
export type CoverReference = (typeof coverReferences)[number];

/** Soil under a slab is previously disturbed: type A and rock are not offered. */
export const trenchSoils = ['B', 'C', 'unclassified'] as const;
export type TrenchSoil = (typeof trenchSoils)[number];

export interface TrenchPlanInput {
  readonly lengthFt: number;
  readonly widthIn: number;
  readonly slabThicknessIn: number;
  readonly location: BurialLocation;
  readonly wiring: WiringMethod;
  readonly conduitKind: ConduitKind;
  readonly tradeSize: TradeSize;
  readonly beddingIn: number;
  readonly swellPct: number;
  readonly wastePct?: number | undefined;
  readonly densityPcf?: number | undefined;
  readonly coverFrom?: CoverReference | undefined;
  readonly soil?: TrenchSoil | undefined;
}

export interface TrenchPlan {
  readonly coverIn: number;
  /** From the finished surface to the bottom of the bedding. */
  readonly digDepthIn: number;
  readonly soilDepthIn: number;
  readonly sawFt: number;
  readonly inchFeet: number;
  readonly concreteCuFt: number;
  readonly concreteTons: number;
  readonly soilBankCuYd: number;
  readonly soilLooseCuYd: number;
  readonly patchCuYd: number;
  /** With waste, up to the next quarter yard. */
  readonly patchOrderCuYd: number;
  /** Outside diameter of the conduit. */
  readonly conduitIn: number;
  readonly excavation: ExcavationRules;
  readonly cautions: readonly string[];
  readonly working: readonly WorkingStep[];
}

interface CheckedTrench {
  readonly lengthFt: number;
  readonly widthIn: number;
  readonly slabThicknessIn: number;
  readonly location: BurialLocation;
  readonly wiring: WiringMethod;
  readonly conduitKind: ConduitKind;
  readonly tradeSize: TradeSize;
  readonly beddingIn: number;
  readonly swellPct: number;
  readonly wastePct: number;
  readonly densityPcf: number;
  readonly coverFrom: CoverReference;
  readonly soil: TrenchSoil;
}

const quarterYardsPerYard = 4;
const cuFtPerCuYd = 27;

/**
 * A trench through a slab for one conduit: how deep to dig, what to saw, what comes out and what goes back. Depth
 * from the finished surface, as the code defines cover: max(cover, slab) + outside diameter + bedding; from the
 * slab's underside, the cautious habit of many crews: slab + cover + outside diameter + bedding. Saw feet are two
 * sides and two ends, no cross cuts.
 * @throws CuttingInputError
 */
export function trenchPlan(input: TrenchPlanInput): TrenchPlan {
  const trench = checkTrench(checkObject(input, 'input'));
  const { lengthFt, widthIn, slabThicknessIn, beddingIn } = trench;
  // Wiring laid in conduit is in a raceway, which the two low-power columns and buildings ask about.
  const coverIn = minimumCoverIn({ location: trench.location, wiring: trench.wiring, inRaceway: true });
  const conduitIn = conduitOutsideDiameterIn({ kind: trench.conduitKind, tradeSize: trench.tradeSize });
  const overConduitIn =
    trench.coverFrom === 'finished_surface' ? Math.max(coverIn, slabThicknessIn) : slabThicknessIn + coverIn;
  const digDepthIn = overConduitIn + conduitIn + beddingIn;
  const soilDepthIn = digDepthIn - slabThicknessIn;
  const planSqFt = (lengthFt * widthIn) / 12;
  const concreteCuFt = (planSqFt * slabThicknessIn) / 12;
  const soilBankCuYd = (planSqFt * soilDepthIn) / 12 / cuFtPerCuYd;
  const sawFt = 2 * lengthFt + (2 * widthIn) / 12;
  const patchCuYd = concreteCuFt / cuFtPerCuYd;
  const plan = {
    coverIn,
    conduitIn,
    digDepthIn,
    soilDepthIn,
    sawFt,
    inchFeet: sawFt * slabThicknessIn,
    concreteCuFt,
    concreteTons: (concreteCuFt * trench.densityPcf) / 2_000,
    soilBankCuYd,
    soilLooseCuYd: soilBankCuYd * (1 + trench.swellPct / 100),
    patchCuYd,
    patchOrderCuYd: orderCuYd(patchCuYd, trench.wastePct),
    excavation: excavationRules({ depthFt: digDepthIn / 12, soil: trench.soil }),
    cautions: trenchCautions(trench.location),
  };
  return { ...plan, working: trenchWorking(plan, trench) };
}

/**
 * Concrete to order in cubic yards: the volume and its waste, up to the next quarter yard.
 * @throws CuttingInputError
 */
export function concreteOrderCuYd(input: { readonly cuYd: number; readonly wastePct: number }): number {
  const fields = checkObject(input, 'input');
  const cuYd = checkNumber(fields.cuYd, 'cuYd', { above: 0, max: 1_000_000, unit: 'cu yd' });
  return orderCuYd(cuYd, checkNumber(fields.wastePct, 'wastePct', wasteRange));
}

function orderCuYd(cuYd: number, wastePct: number): number {
  return wholeUp(cuYd * (1 + wastePct / 100) * quarterYardsPerYard) / quarterYardsPerYard;
}

const wasteRange = { min: 0, max: 100, unit: '%' } as const;

function checkTrench(fields: Readonly<Record<string, unknown>>): CheckedTrench {
  return {
    lengthFt: checkNumber(fields.lengthFt, 'lengthFt', lengthFtRange),
    widthIn: checkNumber(fields.widthIn, 'widthIn', { above: 0, max: 1_200, unit: 'in' }),
    slabThicknessIn: checkNumber(fields.slabThicknessIn, 'slabThicknessIn', thicknessInRange),
    location: checkChoice(fields.location, 'location', burialLocations),
    wiring: checkChoice(fields.wiring, 'wiring', wiringMethods),
    conduitKind: checkChoice(fields.conduitKind, 'conduitKind', conduitKinds),
    tradeSize: checkChoice(fields.tradeSize, 'tradeSize', tradeSizes),
    beddingIn: checkNumber(fields.beddingIn, 'beddingIn', { min: 0, max: 120, unit: 'in' }),
    swellPct: checkNumber(fields.swellPct, 'swellPct', { min: 0, max: 200, unit: '%' }),
    wastePct: checkNumberOr(fields.wastePct, 'wastePct', wasteRange, 10),
    densityPcf: checkNumberOr(fields.densityPcf, 'densityPcf', densityPcfRange, reinforcedConcretePcf),
    coverFrom:
      fields.coverFrom === undefined
        ? 'finished_surface'
        : checkChoice(fields.coverFrom, 'coverFrom', coverReferences),
    soil: fields.soil === undefined ? 'unclassified' : checkChoice(fields.soil, 'soil', trenchSoils),
  };
}

function trenchCautions(location: BurialLocation): readonly string[] {
  const slabNote = location === 'under_4in_slab_no_vehicles' ? [slabExtensionNote] : [];
  return [coverNote, ...slabNote, disturbedSoilNote];
}

function trenchWorking(plan: Omit<TrenchPlan, 'working'>, trench: CheckedTrench): readonly WorkingStep[] {
  return [...depthSteps(plan, trench), ...quantitySteps(plan, trench), ...plan.excavation.working];
}

function depthSteps(plan: Omit<TrenchPlan, 'working'>, trench: CheckedTrench): readonly WorkingStep[] {
  const isFromSurface = trench.coverFrom === 'finished_surface';
  return [
    {
      label: 'Cover',
      formula: 'table, by location and wiring, in a raceway',
      inputs: [put('location', trench.location, ''), put('wiring', trench.wiring, '')],
      value: plan.coverIn,
      unit: 'in',
      source: sourceOf(minimumCover.source),
    },
    {
      label: 'Conduit outside diameter',
      formula: 'table, by kind and trade size',
      inputs: [put('kind', trench.conduitKind, ''), put('trade size', trench.tradeSize, 'in')],
      value: plan.conduitIn,
      unit: 'in',
      source: sourceOf(conduitOutsideDiameters[trench.conduitKind].source),
    },
    {
      label: 'Depth to dig',
      formula: isFromSurface ? 'max(cover, slab) + conduit + bedding' : 'slab + cover + conduit + bedding',
      inputs: [
        put('cover', plan.coverIn, 'in'),
        put('slab', trench.slabThicknessIn, 'in'),
        put('conduit', plan.conduitIn, 'in'),
        put('bedding', trench.beddingIn, 'in'),
      ],
      value: plan.digDepthIn,
      unit: 'in',
      source: isFromSurface ? sourceOf(minimumCover.source) : commonPractice,
    },
  ];
}

function quantitySteps(plan: Omit<TrenchPlan, 'working'>, trench: CheckedTrench): readonly WorkingStep[] {
  const length = put('L', trench.lengthFt, 'ft');
  const width = put('W', trench.widthIn, 'in');
  const slab = put('slab', trench.slabThicknessIn, 'in');
  const concrete = put('concrete', plan.concreteCuFt, 'cu ft');
  const step = (
    label: string,
    formula: string,
    inputs: WorkingStep['inputs'],
    [value, unit]: readonly [number, string],
  ): WorkingStep => ({ label, formula, inputs, value, unit, source: arithmetic });
  return [
    step('Saw feet', '2 × L + 2 × W ÷ 12', [length, width], [plan.sawFt, 'ft']),
    step('Inch-feet', 'saw feet × slab', [put('saw feet', plan.sawFt, 'ft'), slab], [plan.inchFeet, 'in-ft']),
    step('Concrete out', 'L × W × slab ÷ 144', [length, width, slab], [plan.concreteCuFt, 'cu ft']),
    step(
      'Weight out',
      'concrete × density ÷ 2,000',
      [concrete, put('density', trench.densityPcf, 'pcf')],
      [plan.concreteTons, 'tons'],
    ),
    step(
      'Soil, in the bank',
      'L × W × (depth − slab) ÷ 144 ÷ 27',
      [length, width, put('depth', plan.digDepthIn, 'in'), slab],
      [plan.soilBankCuYd, 'cu yd'],
    ),
    step(
      'Soil, loose',
      'bank × (1 + swell)',
      [put('bank', plan.soilBankCuYd, 'cu yd'), put('swell', trench.swellPct, '%')],
      [plan.soilLooseCuYd, 'cu yd'],
    ),
    step(
      'Patch to order',
      'concrete ÷ 27 × (1 + waste), up to the next ¼ cu yd',
      [concrete, put('waste', trench.wastePct, '%')],
      [plan.patchOrderCuYd, 'cu yd'],
    ),
  ];
}
