import { checkChoice, checkList, checkNumber, checkObject } from './check.ts';
import { CuttingInputError } from './input-error.ts';
import { bladeDiameterInRange, depthInRange } from './limits.ts';
import {
  bladeMounts,
  bladeReach,
  type BladeMount,
  type BladeReach,
  type BladeReachTable,
} from './tables/blade-reach.ts';
import { companyNumber, type WorkingSource } from './working.ts';
import { sourceOf } from './tables/provenance.ts';

/** A company's own reaches; a mount or diameter it leaves out keeps the common-practice value. */
export type CompanyReach = Partial<BladeReachTable>;

export interface BladeReachInput {
  readonly diameterIn: number;
  readonly mount: BladeMount;
  readonly companyReach?: CompanyReach | undefined;
}

/** A reach and whose number it is. */
export interface KnownReach {
  readonly reachIn: number;
  readonly source: WorkingSource;
}

/**
 * How deep a blade cuts, in inches, by diameter and mount; common practice unless the company gave its own.
 * @throws CuttingInputError also for a diameter that neither table holds
 */
export function bladeReachIn(input: BladeReachInput): number {
  return bladeReachWithSource(input).reachIn;
}

/** `bladeReachIn` together with whose number it is. */
export function bladeReachWithSource(input: BladeReachInput): KnownReach {
  const fields = checkObject(input, 'input');
  const diameterIn = checkNumber(fields.diameterIn, 'diameterIn', bladeDiameterInRange);
  const mount = checkChoice(fields.mount, 'mount', bladeMounts);
  const companyReach = checkCompanyReach(fields.companyReach);
  const known = findReach(diameterIn, mount, companyReach);
  if (known !== undefined) return known;
  const diameters = [...(companyReach[mount] ?? []), ...bladeReach.rows[mount]].map((row) => row.diameterIn);
  throw new CuttingInputError({
    field: 'diameterIn',
    allowed: `one of ${[...new Set(diameters)].sort((left, right) => left - right).join(', ')} in`,
    given: diameterIn,
  });
}

/** The reach of a blade, company's own first, or undefined where neither table holds its diameter. */
export function findReach(
  diameterIn: number,
  mount: BladeMount,
  companyReach: CompanyReach,
): KnownReach | undefined {
  const own = companyReach[mount]?.find((row) => row.diameterIn === diameterIn);
  if (own !== undefined) return { reachIn: own.reachIn, source: companyNumber };
  const common = bladeReach.rows[mount].find((row) => row.diameterIn === diameterIn);
  return common === undefined ? undefined : { reachIn: common.reachIn, source: sourceOf(bladeReach.source) };
}

/** The deepest reach on a mount over both tables. */
export function deepestReach(mount: BladeMount, companyReach: CompanyReach): KnownReach {
  const common = bladeReach.rows[mount].map((row) => row.diameterIn);
  const own = (companyReach[mount] ?? []).map((row) => row.diameterIn);
  return [...new Set([...own, ...common])]
    .map((diameterIn) => findReach(diameterIn, mount, companyReach))
    .filter((known) => known !== undefined)
    .reduce((deepest, known) => (known.reachIn > deepest.reachIn ? known : deepest));
}

/** Makes sure that a company's own reaches are lists of positive numbers; left out means none. */
export function checkCompanyReach(value: unknown): CompanyReach {
  if (value === undefined) return {};
  const mounts = checkObject(value, 'companyReach');
  const checked: Partial<Record<BladeMount, readonly BladeReach[]>> = {};
  for (const mount of bladeMounts) {
    if (mounts[mount] === undefined) continue;
    const path = `companyReach.${mount}`;
    checked[mount] = checkList(mounts[mount], path, 100).map((row, index) => {
      const fields = checkObject(row, `${path}[${index}]`);
      return {
        diameterIn: checkNumber(fields.diameterIn, `${path}[${index}].diameterIn`, bladeDiameterInRange),
        reachIn: checkNumber(fields.reachIn, `${path}[${index}].reachIn`, depthInRange),
      };
    });
  }
  return checked;
}

/**
 * Speed of a rim in surface feet per minute: π · Ø · rpm ÷ 12.
 * @throws CuttingInputError
 */
export function surfaceSpeedSfm(input: { readonly diameterIn: number; readonly rpm: number }): number {
  const fields = checkObject(input, 'input');
  const diameterIn = checkNumber(fields.diameterIn, 'diameterIn', bladeDiameterInRange);
  const rpm = checkNumber(fields.rpm, 'rpm', { above: 0, max: 100_000, unit: 'rpm' });
  return (Math.PI * diameterIn * rpm) / 12;
}

/**
 * Turns per minute that give a rim speed: 12 · SFM ÷ (π · Ø).
 * @throws CuttingInputError
 */
export function rpmForSurfaceSpeed(input: { readonly diameterIn: number; readonly sfm: number }): number {
  const fields = checkObject(input, 'input');
  const diameterIn = checkNumber(fields.diameterIn, 'diameterIn', bladeDiameterInRange);
  const sfm = checkNumber(fields.sfm, 'sfm', { above: 0, max: 100_000, unit: 'SFM' });
  return (12 * sfm) / (Math.PI * diameterIn);
}
