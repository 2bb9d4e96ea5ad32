import { methodsOfCutHere } from '@kerfyard/common/bids';
import {
  bladeReach,
  coringHours,
  CuttingInputError,
  productionRates,
  sawingHours,
  takeoffCut,
  type BladeMount,
  type CutTakeoff,
  type ProductionMethod,
  type SilicaTool,
} from '@kerfyard/common/cutting';
import type { Method } from '@kerfyard/common/people';
import { reachNeededIn, type Conditions, type CutLine } from '@kerfyard/common/scopes';

/** One cut of the sheet with what it comes to, and the method it is commonly done by here. */
export interface SheetCut {
  readonly line: CutLine;
  readonly takeoff: CutTakeoff;
  /** Null where no machine fits: the crew decides. */
  readonly method: Method | null;
}

/** Cuts of one method to one depth: one setting of the saw. */
export interface Setting {
  readonly marks: readonly string[];
  readonly method: Method;
  readonly depthIn: number;
}

/** How each cut is commonly done here: the first method that its conditions allow. */
export function sheetCuts(cuts: readonly CutLine[], conditions: Conditions): readonly SheetCut[] {
  return cuts.map((line) => ({
    line,
    takeoff: takeoffCut(line.cut),
    method: methodsOfCutHere(line.cut, conditions)[0] ?? null,
  }));
}

/** The settings of the saws, deepest first. Cores and stitched lines have no blade. */
export function settingsOf(cuts: readonly SheetCut[]): readonly Setting[] {
  const settings = new Map<string, Setting>();
  for (const { line, method } of cuts) {
    if (method === null || method === 'core_drill' || method === 'stitch_drill') continue;
    const depthIn = reachNeededIn(line.cut);
    const key = `${method}|${depthIn}`;
    const marks = [...(settings.get(key)?.marks ?? []), line.mark];
    settings.set(key, { marks, method, depthIn });
  }
  return [...settings.values()].sort((left, right) => right.depthIn - left.depthIn);
}

const mounts: Readonly<Partial<Record<Method, BladeMount>>> = {
  flat_saw: 'walk_behind',
  joint_saw: 'walk_behind',
  wall_saw: 'wall',
  hand_saw: 'hand',
};

/** The smallest blade on the method's mount that reaches a depth, both faces aside; null where none or no blade. */
export function bladeFor({ method, depthIn }: Setting): { mount: BladeMount; diameterIn: number } | null {
  const mount = mounts[method];
  if (mount === undefined) return null;
  const blade = bladeReach.rows[mount].find((row) => row.reachIn >= depthIn);
  return blade === undefined ? null : { mount, diameterIn: blade.diameterIn };
}

export const hasBladeTable = (method: Method): boolean => mounts[method] !== undefined;

/** The tool of silica Table 1 that stands for a method; some are not in the table, and it says so. */
export const silicaToolOf: Readonly<Record<Method, SilicaTool>> = {
  flat_saw: 'walk_behind_saw',
  joint_saw: 'walk_behind_saw',
  wall_saw: 'wall_saw',
  hand_saw: 'handheld_power_saw',
  ring_saw: 'ring_saw',
  chain_saw: 'chain_saw',
  wire_saw: 'wire_saw',
  core_drill: 'core_rig',
  stitch_drill: 'core_rig',
};

const shiftHours = 8;
const quarterHours = 4;

/**
 * Hours by tool to begin planning with: common-practice production of a slow job, up to the next quarter, at most one
 * shift. A tool without any figure starts at 0, which is a task not yet given time.
 */
export function hoursByTool(
  cuts: readonly SheetCut[],
  conditions: Conditions,
): ReadonlyMap<SilicaTool, number> {
  const hours = new Map<SilicaTool, number>();
  const add = (tool: SilicaTool, more: number) => hours.set(tool, (hours.get(tool) ?? 0) + more);
  for (const { takeoff, method } of cuts) {
    for (const { diameterIn, holes, coreInches } of takeoff.cores) {
      add(
        'core_rig',
        diameterIn === null ? 0 : drillingHours({ diameterIn, holes, depthIn: coreInches / holes }),
      );
    }
    if (method === null || method === 'core_drill' || method === 'stitch_drill') continue;
    add(silicaToolOf[method], cuttingHours(takeoff, productionOf(method, conditions)));
  }
  for (const [tool, sum] of hours) {
    hours.set(tool, Math.min(shiftHours, Math.ceil(sum * quarterHours) / quarterHours));
  }
  return hours;
}

function productionOf(
  method: Exclude<Method, 'core_drill' | 'stitch_drill'>,
  { indoors, enginesAllowed }: Conditions,
): ProductionMethod {
  return method === 'flat_saw' && (indoors || !enginesAllowed) ? 'flat_saw_electric' : method;
}

function cuttingHours(takeoff: CutTakeoff, method: ProductionMethod): number {
  const amounts = { 'in-ft': takeoff.inchFeet, 'sq ft': takeoff.sawSqFt, ft: takeoff.sawFt };
  return sawingHours({ method, quantity: amounts[productionRates.rows[method].unit] }).highHours;
}

/** Larger bits have no common feed: their time is the crew's to plan. */
function drillingHours(core: { diameterIn: number; holes: number; depthIn: number }): number {
  try {
    return coringHours(core).highHours;
  } catch (error) {
    if (error instanceof CuttingInputError && error.field === 'companyInchesPerMinute') return 0;
    throw error;
  }
}
