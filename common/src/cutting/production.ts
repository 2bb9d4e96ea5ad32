import { checkChoice, checkNumber, checkNumberOr, checkObject } from './check.ts';
import { CuttingInputError } from './input-error.ts';
import { coreDiameterInRange, depthInRange } from './limits.ts';
import { wholeUp } from './rounding.ts';
import {
  coreSetUpMinutes,
  coringRates,
  productionMethods,
  productionRates,
  type ProductionMethod,
} from './tables/common-practice.ts';
import { sourceOf } from './tables/provenance.ts';
import { companyNumber, put, type WorkingStep } from './working.ts';

/** Hours between a quick and a slow job; the same number twice where the company gave its own rate. */
export interface ProductionHours {
  readonly lowHours: number;
  readonly highHours: number;
  readonly working: readonly WorkingStep[];
}

const quantityRange = { min: 0, max: 100_000_000, unit: '' } as const;
const rateRange = { above: 0, max: 100_000, unit: 'an hour' } as const;
const holesRange = { min: 0, max: 1_000_000, integer: true, unit: 'holes' } as const;

/**
 * Hours of sawing for a quantity in the method's own unit: inch-feet, square feet for wire, feet for joints.
 * Common practice unless the company gave its rate.
 * @throws CuttingInputError
 */
export function sawingHours(input: {
  readonly method: ProductionMethod;
  readonly quantity: number;
  readonly companyPerHour?: number | undefined;
}): ProductionHours {
  const fields = checkObject(input, 'input');
  const method = checkChoice(fields.method, 'method', productionMethods);
  const quantity = checkNumber(fields.quantity, 'quantity', quantityRange);
  const companyPerHour = checkNumberOr(fields.companyPerHour, 'companyPerHour', rateRange, undefined);
  const { unit, lowPerHour, highPerHour } = productionRates.rows[method];
  const source = companyPerHour === undefined ? sourceOf(productionRates.source) : companyNumber;
  const hoursStep = (label: string, perHour: number): WorkingStep => ({
    label,
    formula: 'quantity ÷ rate',
    inputs: [put('quantity', quantity, unit), put('rate', perHour, `${unit} an hour`)],
    value: quantity / perHour,
    unit: 'h',
    source,
  });
  const low = hoursStep('Sawing hours at best', companyPerHour ?? highPerHour);
  const high = hoursStep('Sawing hours at worst', companyPerHour ?? lowPerHour);
  return { lowHours: Number(low.value), highHours: Number(high.value), working: [low, high] };
}

/**
 * Hours of coring: drilling by bit diameter, and setting up for each hole. Common practice to 12 in unless the
 * company gave its own numbers.
 * @throws CuttingInputError also for a larger bit without the company's feed
 */
export function coringHours(input: {
  readonly holes: number;
  readonly diameterIn: number;
  readonly depthIn: number;
  readonly companyInchesPerMinute?: number | undefined;
  readonly companySetUpMinutes?: number | undefined;
}): ProductionHours {
  const fields = checkObject(input, 'input');
  const holes = checkNumber(fields.holes, 'holes', holesRange);
  const diameterIn = checkNumber(fields.diameterIn, 'diameterIn', coreDiameterInRange);
  const depthIn = checkNumber(fields.depthIn, 'depthIn', depthInRange);
  const companyFeed = checkNumberOr(
    fields.companyInchesPerMinute,
    'companyInchesPerMinute',
    { above: 0, max: 60, unit: 'in a minute' },
    undefined,
  );
  const companySetUp = checkNumberOr(
    fields.companySetUpMinutes,
    'companySetUpMinutes',
    { min: 0, max: 1_440, unit: 'min' },
    undefined,
  );
  const inchesPerMinute = companyFeed ?? commonFeed(diameterIn);
  const isCompany = companyFeed !== undefined && companySetUp !== undefined;
  const hoursStep = (label: string, setUpMinutes: number): WorkingStep => ({
    label,
    formula: 'holes × (depth ÷ feed + set-up) ÷ 60',
    inputs: [
      put('holes', holes, ''),
      put('depth', depthIn, 'in'),
      put(
        'feed',
        inchesPerMinute,
        companyFeed === undefined ? 'in a minute, common practice' : 'in a minute, company',
      ),
      put('set-up', setUpMinutes, companySetUp === undefined ? 'min, common practice' : 'min, company'),
    ],
    value: (holes * (depthIn / inchesPerMinute + setUpMinutes)) / 60,
    unit: 'h',
    source: isCompany ? companyNumber : sourceOf(coringRates.source),
  });
  const low = hoursStep('Coring hours at best', companySetUp ?? coreSetUpMinutes.rows.low);
  const high = hoursStep('Coring hours at worst', companySetUp ?? coreSetUpMinutes.rows.high);
  return { lowHours: Number(low.value), highHours: Number(high.value), working: [low, high] };
}

/**
 * Blades or bits a job wears out, in cents: quantity ÷ life × price, up to the next cent. Life and price are the
 * company's own; no common figure is trusted.
 * @throws CuttingInputError
 */
export function toolWear(input: {
  readonly quantity: number;
  /** In the unit of `quantity`. */
  readonly quantityPerTool: number;
  readonly toolCents: number;
}): { readonly tools: number; readonly cents: number; readonly working: readonly WorkingStep[] } {
  const fields = checkObject(input, 'input');
  const quantity = checkNumber(fields.quantity, 'quantity', quantityRange);
  const quantityPerTool = checkNumber(fields.quantityPerTool, 'quantityPerTool', {
    above: 0,
    max: 100_000_000,
    unit: '',
  });
  const toolCents = checkNumber(fields.toolCents, 'toolCents', {
    min: 0,
    max: 100_000_000,
    integer: true,
    unit: 'cents',
  });
  const tools = quantity / quantityPerTool;
  const cents = wholeUp(tools * toolCents);
  return {
    tools,
    cents,
    working: [
      {
        label: 'Blade or bit wear',
        formula: 'quantity ÷ life × price, up to the next cent',
        inputs: [
          put('quantity', quantity, ''),
          put('life', quantityPerTool, 'per blade or bit'),
          put('price', toolCents, 'cents'),
        ],
        value: cents,
        unit: 'cents',
        source: companyNumber,
      },
    ],
  };
}

function commonFeed(diameterIn: number): number {
  const rate = coringRates.rows.find((row) => diameterIn <= row.upToDiameterIn);
  if (rate !== undefined) return rate.inchesPerMinute;
  const largestIn = Math.max(...coringRates.rows.map((row) => row.upToDiameterIn));
  throw new CuttingInputError({
    field: 'companyInchesPerMinute',
    allowed: `given for a bit over ${largestIn} in: no common figure`,
    given: undefined,
  });
}
