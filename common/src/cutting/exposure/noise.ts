import { checkList, checkNumber, checkObject } from '../check.ts';
import { constructionNoise, generalIndustryNoise, nioshNoise, type NoiseDoseRule } from '../tables/noise.ts';
import { sourceOf } from '../tables/provenance.ts';
import { put, type WorkingInput, type WorkingStep } from '../working.ts';
import { hoursRange, levelDbaRange, maxExposures } from './ranges.ts';

/** `hours` are trigger hours: the time the tool is really running. */
export interface NoiseSpan {
  readonly dba: number;
  readonly hours: number;
}

export interface NoiseExposure {
  /** Σ T/L by Table D-2; null when a level over its top row has no allowed time at all. */
  readonly constructionSum: number | null;
  readonly constructionExceeded: boolean;
  readonly dosePct: number;
  /** Null when nothing counts towards the dose. */
  readonly twaDba: number | null;
  readonly nioshDosePct: number;
  readonly nioshTwaDba: number | null;
  readonly working: readonly WorkingStep[];
}

/**
 * Noise of one shift three ways: the construction sum of 29 CFR 1926.52 Table D-2 (a step table: a level between
 * rows takes the row above), the dose of 1910.95 Appendix A (5 dB, from 80 dBA) and NIOSH's (85 dBA, 3 dB).
 * @throws CuttingInputError with the span's place in `field`
 */
export function noiseExposure(spans: readonly NoiseSpan[]): NoiseExposure {
  const checked = checkList(spans, 'exposures', maxExposures).map(checkSpan);
  const constructionSum = sumConstruction(checked);
  const dosePct = doseOf(checked, generalIndustryNoise);
  const nioshDosePct = doseOf(checked, nioshNoise);
  const exposure = {
    constructionSum,
    constructionExceeded: constructionSum === null || constructionSum > 1,
    dosePct,
    twaDba: twaOf(dosePct, generalIndustryNoise),
    nioshDosePct,
    nioshTwaDba: twaOf(nioshDosePct, nioshNoise),
  };
  return { ...exposure, working: noiseWorking(checked, exposure) };
}

/**
 * Level of a small source at a distance in the open: L − 20·log10(D / reference), dBA.
 * @throws CuttingInputError
 */
export function levelAtDistanceDba(input: {
  readonly levelDba: number;
  readonly referenceFt: number;
  readonly distanceFt: number;
}): number {
  const fields = checkObject(input, 'input');
  const range = { above: 0, max: 100_000, unit: 'ft' };
  const levelDba = checkNumber(fields.levelDba, 'levelDba', levelDbaRange);
  const referenceFt = checkNumber(fields.referenceFt, 'referenceFt', range);
  const distanceFt = checkNumber(fields.distanceFt, 'distanceFt', range);
  return levelDba - 20 * Math.log10(distanceFt / referenceFt);
}

function checkSpan(span: unknown, index: number): NoiseSpan {
  const path = `exposures[${index}]`;
  const fields = checkObject(span, path);
  return {
    dba: checkNumber(fields.dba, `${path}.dba`, levelDbaRange),
    hours: checkNumber(fields.hours, `${path}.hours`, hoursRange),
  };
}

function sumConstruction(spans: readonly NoiseSpan[]): number | null {
  const lowestDba = constructionNoise.rows[0]?.dba ?? 0;
  let sum = 0;
  for (const { dba, hours } of spans) {
    if (dba < lowestDba || hours === 0) continue;
    const row = constructionNoise.rows.find((allowed) => dba <= allowed.dba);
    if (row === undefined) return null;
    sum += hours / row.hours;
  }
  return sum;
}

function doseOf(spans: readonly NoiseSpan[], rule: NoiseDoseRule): number {
  return spans
    .filter((span) => span.dba >= rule.thresholdDba)
    .reduce((dose, span) => dose + (100 * span.hours) / allowedHours(span.dba, rule), 0);
}

function allowedHours(dba: number, rule: NoiseDoseRule): number {
  return 8 / 2 ** ((dba - rule.criterionDba) / rule.exchangeDb);
}

function twaOf(dosePct: number, rule: NoiseDoseRule): number | null {
  return dosePct === 0 ? null : rule.twaSlope * Math.log10(dosePct / 100) + rule.criterionDba;
}

function noiseWorking(
  spans: readonly NoiseSpan[],
  exposure: Omit<NoiseExposure, 'working'>,
): readonly WorkingStep[] {
  const inputs: readonly WorkingInput[] = spans.map((span) => put(`${span.dba} dBA`, span.hours, 'h'));
  const doseStep = (label: string, dosePct: number, rule: NoiseDoseRule): WorkingStep => ({
    label,
    formula: `100 × Σ hours ÷ T, T = 8 ÷ 2^((L − ${rule.criterionDba}) ÷ ${rule.exchangeDb})`,
    inputs,
    value: dosePct,
    unit: '%',
    source: sourceOf(rule.source),
  });
  const twaStep = (
    label: string,
    dosePct: number,
    twaDba: number | null,
    rule: NoiseDoseRule,
  ): WorkingStep => ({
    label,
    formula: `${rule.twaSlope} × log10(D ÷ 100) + ${rule.criterionDba}`,
    inputs: [put('D', dosePct, '%')],
    value: twaDba ?? 'nothing counts',
    unit: 'dBA',
    source: sourceOf(rule.source),
  });
  return [
    {
      label: 'Construction sum',
      formula: 'Σ hours ÷ hours allowed at the level or the next one up; over 1 is exceeded',
      inputs,
      value: exposure.constructionSum ?? 'over the top row: exceeded at once',
      unit: '',
      source: sourceOf(constructionNoise.source),
    },
    doseStep('Dose, 5 dB exchange', exposure.dosePct, generalIndustryNoise),
    twaStep('Eight-hour average, 5 dB exchange', exposure.dosePct, exposure.twaDba, generalIndustryNoise),
    doseStep('Dose, 3 dB exchange', exposure.nioshDosePct, nioshNoise),
    twaStep('Eight-hour average, 3 dB exchange', exposure.nioshDosePct, exposure.nioshTwaDba, nioshNoise),
  ];
}
