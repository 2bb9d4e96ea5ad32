import { checkCompanyReach, deepestReach, type CompanyReach } from './blades.ts';
import { checkBoolean, checkChoice, checkNumber, checkNumberOr, checkObject } from './check.ts';
import { coreDiameterInRange, depthInRange } from './limits.ts';
import type { BladeMount } from './tables/blade-reach.ts';
import {
  cuttingMethods,
  electricFlatSaw,
  largestCoreIn,
  methodRules,
  workFaces,
  type CuttingMethod,
  type MethodRule,
  type WorkFace,
} from './tables/methods.ts';
import { cutKinds, type CutKind } from './types.ts';

export interface MethodsInput {
  /** The kind of cut. */
  readonly work: CutKind;
  readonly depthIn: number;
  /** Of a core. */
  readonly diameterIn?: number | undefined;
  readonly face: WorkFace;
  readonly indoors: boolean;
  readonly enginesAllowed: boolean;
  readonly overcutsAllowed: boolean;
  readonly bothFacesReachable: boolean;
  /** Narrowest doorway on the way in. */
  readonly doorwayIn?: number | undefined;
  readonly floorLimitPsf?: number | undefined;
  /** The company's own blade reaches, in place of common practice. */
  readonly companyReach?: CompanyReach | undefined;
}

export interface MethodVerdict {
  readonly method: CuttingMethod;
  readonly ok: boolean;
  /** Why not; empty exactly when `ok`. */
  readonly reasons: readonly string[];
  readonly cautions: readonly string[];
}

interface CheckedMethods extends Omit<
  MethodsInput,
  'companyReach' | 'diameterIn' | 'doorwayIn' | 'floorLimitPsf'
> {
  readonly diameterIn: number | undefined;
  readonly doorwayIn: number | undefined;
  readonly floorLimitPsf: number | undefined;
  readonly companyReach: CompanyReach;
}

const mountOf: Readonly<Partial<Record<CuttingMethod, BladeMount>>> = {
  flat_saw: 'walk_behind',
  wall_saw: 'wall',
  hand_saw: 'hand',
};

/** Kinds of cut with corners a round blade would run past. */
const cornered: ReadonlySet<CutKind> = new Set(['opening', 'trench']);

/** A wire saw takes hours to set up; below this a saw is quicker. Common practice. */
const thinForWireIn = 12;

/**
 * Every method with yes or no, the reasons of each no and the cautions of each yes. Depths are common practice
 * or the company's own reaches; the operator at the wall decides.
 * @throws CuttingInputError
 */
export function methodsFor(input: MethodsInput): readonly MethodVerdict[] {
  const job = checkMethods(checkObject(input, 'input'));
  return cuttingMethods.map((method) => judge(method, job));
}

function checkMethods(fields: Readonly<Record<string, unknown>>): CheckedMethods {
  return {
    work: checkChoice(fields.work, 'work', cutKinds),
    depthIn: checkNumber(fields.depthIn, 'depthIn', depthInRange),
    diameterIn: checkNumberOr(fields.diameterIn, 'diameterIn', coreDiameterInRange, undefined),
    face: checkChoice(fields.face, 'face', workFaces),
    indoors: checkBoolean(fields.indoors, 'indoors'),
    enginesAllowed: checkBoolean(fields.enginesAllowed, 'enginesAllowed'),
    overcutsAllowed: checkBoolean(fields.overcutsAllowed, 'overcutsAllowed'),
    bothFacesReachable: checkBoolean(fields.bothFacesReachable, 'bothFacesReachable'),
    doorwayIn: checkNumberOr(fields.doorwayIn, 'doorwayIn', { above: 0, max: 1_200, unit: 'in' }, undefined),
    floorLimitPsf: checkNumberOr(
      fields.floorLimitPsf,
      'floorLimitPsf',
      { above: 0, max: 100_000, unit: 'psf' },
      undefined,
    ),
    companyReach: checkCompanyReach(fields.companyReach),
  };
}

function judge(method: CuttingMethod, job: CheckedMethods): MethodVerdict {
  const rule = methodRules.rows[method];
  if (!rule.works.includes(job.work)) {
    return { method, ok: false, reasons: ['Not a tool for this kind of cut.'], cautions: [] };
  }
  const reasons = [
    ...faceReasons(rule, job),
    ...depthReasons(method, rule, job),
    ...accessReasons(method, rule, job),
    ...cornerReasons(rule, job),
  ];
  const ok = reasons.length === 0;
  return { method, ok, reasons, cautions: ok ? cautionsFor(method, rule, job) : [] };
}

function faceReasons(rule: MethodRule, job: CheckedMethods): readonly string[] {
  const reasons: string[] = [];
  if (!rule.faces.includes(job.face)) reasons.push(`Works on a ${rule.faces.join(' or ')} only.`);
  if (rule.needsBothFaces && !job.bothFacesReachable) {
    reasons.push('The wire must loop behind the cut: the far face must be reachable.');
  }
  return reasons;
}

function depthReasons(method: CuttingMethod, rule: MethodRule, job: CheckedMethods): readonly string[] {
  const reasons: string[] = [];
  const reachIn = reachFromOneFace(method, rule, job);
  const canDouble = rule.doublesFromBothFaces && job.bothFacesReachable;
  if (reachIn !== null && job.depthIn > reachIn * (canDouble ? 2 : 1)) {
    reasons.push(
      canDouble
        ? `Reaches ${reachIn} in from each face; the cut is ${job.depthIn} in.`
        : `Reaches ${reachIn} in; the cut is ${job.depthIn} in.`,
    );
  }
  if (method === 'core_drill' && (job.diameterIn ?? 0) > largestCoreIn.rows) {
    reasons.push(`Barrels are made to about ${largestCoreIn.rows} in: stitch drill the circle.`);
  }
  return reasons;
}

function reachFromOneFace(method: CuttingMethod, rule: MethodRule, job: CheckedMethods): number | null {
  const mount = mountOf[method];
  const reachIn = mount === undefined ? rule.maxDepthIn : deepestReach(mount, job.companyReach).reachIn;
  const isElectric = method === 'flat_saw' && mayRunNoEngine(job);
  return isElectric && reachIn !== null ? Math.min(reachIn, electricFlatSaw.rows.maxDepthIn) : reachIn;
}

function mayRunNoEngine(job: CheckedMethods): boolean {
  return job.indoors || !job.enginesAllowed;
}

function accessReasons(method: CuttingMethod, rule: MethodRule, job: CheckedMethods): readonly string[] {
  const reasons: string[] = [];
  if (rule.minDoorwayIn !== null && job.doorwayIn !== undefined && job.doorwayIn < rule.minDoorwayIn) {
    reasons.push(`Needs a doorway of about ${rule.minDoorwayIn} in; this one is ${job.doorwayIn} in.`);
  }
  const loadPsf =
    method === 'flat_saw' && mayRunNoEngine(job) ? electricFlatSaw.rows.floorLoadPsf : rule.floorLoadPsf;
  if (loadPsf !== null && job.floorLimitPsf !== undefined && job.floorLimitPsf < loadPsf) {
    reasons.push(`Loads the floor with about ${loadPsf} psf; the limit is ${job.floorLimitPsf} psf.`);
  }
  return reasons;
}

function cornerReasons(rule: MethodRule, job: CheckedMethods): readonly string[] {
  if (job.overcutsAllowed || !rule.runsPastCorners || !cornered.has(job.work)) return [];
  return [
    'A round blade runs past the corners and overcuts are not allowed: only with cored or square-finished corners.',
  ];
}

function cautionsFor(method: CuttingMethod, rule: MethodRule, job: CheckedMethods): readonly string[] {
  const reachIn = reachFromOneFace(method, rule, job);
  const cautions: string[] = [];
  if (mayRunNoEngine(job))
    cautions.push('No engines here: electric, hydraulic with the pack outside, or battery.');
  if (reachIn !== null && job.depthIn > reachIn)
    cautions.push('Only by cutting from both faces; the lines must meet.');
  if (rule.runsPastCorners && cornered.has(job.work)) cautions.push('The kerf runs past every corner.');
  if (job.face === 'ceiling') cautions.push('Overhead work: rated anchors, and nobody below.');
  if (method === 'hand_saw' || method === 'chain_saw' || method === 'ring_saw')
    cautions.push('Kickback: two hands, sure footing, guard down.');
  if (method === 'wire_saw') {
    cautions.push('A broken wire whips: keep people out of its plane.');
    if (job.depthIn < thinForWireIn)
      cautions.push('Thin for a wire saw: setting up takes longer than another saw would cut.');
  }
  if (method === 'stitch_drill') cautions.push('Leaves a scalloped face and webs to chip.');
  if (method === 'core_drill' && job.face === 'floor')
    cautions.push('The core may fall: watch and protect below.');
  return cautions;
}
