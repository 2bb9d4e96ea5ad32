import { productionRates, takeoffCut, type CutTakeoff, type ProductionMethod } from '../cutting/index.ts';
import type { Method } from '../people/people.schema.ts';
import type { CutPlace } from '../scopes/methods-of-cuts.ts';
import type { CutLine } from '../scopes/cut.schema.ts';
import type { EstimateInput, JobEstimate } from './estimate.types.ts';

/** Sawing by one tool, over all cuts. */
export interface SawWork {
  tool: ProductionMethod;
  /** In the unit of the tool's production rate. */
  quantity: number;
  /** What its slurry and its blades are reckoned by. */
  inchFeet: number;
}

export interface CoreWork {
  diameterIn: number;
  depthIn: number;
  holes: number;
}

/** What a cut list comes to by tool, and what of it no tool is known for. */
export interface WorkOfCuts {
  saws: SawWork[];
  cores: CoreWork[];
  removedCuFt: number;
  byHand: { inchFeet: number; blocks: number; bars: number };
  notCounted: JobEstimate['notCounted'];
}

/**
 * Share a cut list out over the tools that do it.
 * @throws CuttingInputError for a cut that makes no sense
 */
export function workOfCuts({ cuts, place, methods }: EstimateInput): WorkOfCuts {
  const saws = new Map<ProductionMethod, SawWork>();
  const work: WorkOfCuts = {
    saws: [],
    cores: [],
    removedCuFt: 0,
    byHand: { inchFeet: 0, blocks: 0, bars: 0 },
    notCounted: [],
  };
  for (const line of cuts) {
    const takeoff = takeoffCut(line.cut);
    const method = methods.get(line.id);
    work.removedCuFt += takeoff.removedCuFt;
    addCores(work, line, takeoff);
    if (method === 'hand_saw') addByHand(work, line, takeoff);
    addSawing(work, saws, { line, takeoff, tool: toolOf(method, place), method });
  }
  work.saws = [...saws.values()];
  return work;
}

/** A walk-behind saw is electric where no engine may run. Drills are no saws. */
function toolOf(method: Method | undefined, place: CutPlace): ProductionMethod | undefined {
  if (method === 'core_drill' || method === 'stitch_drill') return undefined;
  const isElectric = place.indoors || !place.enginesAllowed;
  return method === 'flat_saw' && isElectric ? 'flat_saw_electric' : method;
}

function addCores(work: WorkOfCuts, line: CutLine, takeoff: CutTakeoff): void {
  for (const { diameterIn, holes, coreInches } of takeoff.cores) {
    if (diameterIn === null) work.notCounted.push({ mark: line.mark, reason: 'no_blade' });
    else work.cores.push({ diameterIn, holes, depthIn: coreInches / holes });
  }
}

function addByHand(work: WorkOfCuts, { cut }: CutLine, takeoff: CutTakeoff): void {
  if (cut.kind === 'block') work.byHand.blocks += cut.count;
  else if (cut.kind === 'bar') work.byHand.bars += cut.count;
  else work.byHand.inchFeet += takeoff.inchFeet;
}

interface Sawing {
  line: CutLine;
  takeoff: CutTakeoff;
  tool: ProductionMethod | undefined;
  method: Method | undefined;
}

function addSawing(
  work: WorkOfCuts,
  saws: Map<ProductionMethod, SawWork>,
  { line, takeoff, tool, method }: Sawing,
): void {
  const { kind } = line.cut;
  if (kind === 'core' || kind === 'stitch') return;
  if (method === undefined || tool === undefined) {
    work.notCounted.push({ mark: line.mark, reason: method === undefined ? 'no_method' : 'no_rate' });
    return;
  }
  const amounts = { 'in-ft': takeoff.inchFeet, 'sq ft': takeoff.sawSqFt, ft: takeoff.sawFt };
  const quantity = amounts[productionRates.rows[tool].unit];
  if (quantity === 0) {
    // Pipes and bars, and a lip that needs no cut: there is no common figure of pieces an hour.
    if (takeoff.pieceCuts > 0) work.notCounted.push({ mark: line.mark, reason: 'no_rate' });
    return;
  }
  const known = saws.get(tool) ?? { tool, quantity: 0, inchFeet: 0 };
  known.quantity += quantity;
  known.inchFeet += kind === 'wire' ? takeoff.sawSqFt * 12 : takeoff.inchFeet;
  saws.set(tool, known);
}
