import { jointDepths } from '../cutting/joints.ts';
import { methodsFor, type MethodVerdict, type MethodsInput } from '../cutting/methods.ts';
import { methods, type Method } from '../people/people.schema.ts';
import type { CutData } from './cut.schema.ts';
import type { Conditions } from './scope.schema.ts';

/** Site conditions that decide which machines may do a cut. */
export type CutPlace = Pick<Conditions, 'face' | 'below' | 'indoors' | 'enginesAllowed' | 'overcutsAllowed'>;

/** A sentence of the engine with the places in the list of the cuts it is said of. */
export interface SaidOfCuts {
  readonly text: string;
  readonly cuts: readonly number[];
}

/** What one method can do of a cut list here. */
export interface MethodFit {
  readonly method: Method;
  /** Places in the list of the cuts it can do; none where it does not fit. */
  readonly fits: readonly number[];
  /** Why not the others. */
  readonly reasons: readonly SaidOfCuts[];
  /** What to mind with those it can do. */
  readonly cautions: readonly SaidOfCuts[];
}

/**
 * The methods by which at least one cut of a list can be done here, in the order of the catalogue: what a crew's
 * own methods are matched against. Where no machine fits any cut every method stands, so that all may look and ask.
 */
export function methodsOfCuts(cuts: readonly CutData[], place: CutPlace): Method[] {
  const found = methodFits(cuts.map((cut) => methodVerdicts(cut, place)))
    .filter(({ fits }) => fits.length > 0)
    .map(({ method }) => method);
  return found.length === 0 ? [...methods] : found;
}

/** Every method with what it can do of a list, from the verdicts on each of its cuts, in the order of the catalogue. */
export function methodFits(verdictsOfCuts: readonly (readonly MethodVerdict[])[]): MethodFit[] {
  return methods.map((method) => {
    const fits: number[] = [];
    const reasons = new Map<string, number[]>();
    const cautions = new Map<string, number[]>();
    for (const [place, verdicts] of verdictsOfCuts.entries()) {
      const verdict = verdicts.find((one) => one.method === method);
      if (verdict === undefined) continue;
      if (verdict.ok) fits.push(place);
      for (const text of verdict.reasons) note(reasons, text, place);
      for (const text of verdict.cautions) note(cautions, text, place);
    }
    return { method, fits, reasons: saidOf(reasons), cautions: saidOf(cautions) };
  });
}

function note(said: Map<string, number[]>, text: string, place: number): void {
  const places = said.get(text);
  if (places === undefined) said.set(text, [place]);
  else places.push(place);
}

function saidOf(said: ReadonlyMap<string, readonly number[]>): SaidOfCuts[] {
  return [...said].map(([text, cuts]) => ({ text, cuts }));
}

/** What the engine is asked about one cut here. */
export function methodQuestion(cut: CutData, place: CutPlace): MethodsInput {
  return {
    work: cut.kind,
    depthIn: reachNeededIn(cut),
    diameterIn: cut.kind === 'core' ? cut.diameterIn : undefined,
    face: place.face,
    indoors: place.indoors,
    enginesAllowed: place.enginesAllowed,
    // Cored and square-finished corners end the cut before a blade would run past.
    overcutsAllowed: place.overcutsAllowed || (cut.kind === 'opening' && cut.corners !== 'overcut'),
    // Units cut one by one are turned over in the hand, and a pipe is cut from all around.
    bothFacesReachable:
      place.below === 'occupied' ||
      place.below === 'unoccupied' ||
      cut.kind === 'block' ||
      cut.kind === 'pipe' ||
      cut.kind === 'bar',
  };
}

/**
 * How deep a machine must reach for a cut, inches. A ramp longer than a blade reaches is taken off in strips, so of
 * a lip its height counts (common practice, no source).
 */
export function reachNeededIn(cut: CutData): number {
  switch (cut.kind) {
    case 'trench':
    case 'opening':
      return cut.thicknessIn;
    case 'joints':
      return jointDepths(cut.thicknessIn).depthIn;
    case 'curb':
    case 'lip':
      return cut.heightIn;
    case 'pipe':
      return cut.outsideDiameterIn;
    case 'bar':
      return cut.diameterIn;
    default:
      return cut.depthIn;
  }
}

/** The engine's verdict on every method for one cut, and the core drill where the cut has cores of its own. */
export function methodVerdicts(cut: CutData, place: CutPlace): readonly MethodVerdict[] {
  const verdicts = methodsFor(methodQuestion(cut, place));
  const isCored = cut.kind === 'opening' && cut.corners === 'cored';
  // Pilot cores alone are no wire cut: they count only where the wire can be run.
  const hasPilots = cut.kind === 'wire' && cut.pilotCores > 0 && verdicts.some(({ ok }) => ok);
  if (!isCored && !hasPilots) return verdicts;
  const caution = isCored ? 'For the corner cores only.' : 'For the pilot cores only.';
  return verdicts.map((verdict) =>
    verdict.method === 'core_drill' ? { ...verdict, ok: true, reasons: [], cautions: [caution] } : verdict,
  );
}
