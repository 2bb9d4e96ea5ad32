import { jointDepths } from '../cutting/joints.ts';
import { methodsFor, type MethodsInput } from '../cutting/methods.ts';
import { methods, type Method } from '../people/people.schema.ts';
import type { CutData } from './cut.schema.ts';
import type { Conditions } from './scope.schema.ts';

/** Site conditions that decide which machines may do a cut. */
export type CutPlace = Pick<Conditions, 'face' | 'below' | 'indoors' | 'enginesAllowed' | 'overcutsAllowed'>;

/**
 * The methods by which at least one cut of a list can be done here, in the order of the catalogue: what a crew's
 * own methods are matched against. Where no machine fits any cut every method stands, so that all may look and ask.
 */
export function methodsOfCuts(cuts: readonly CutData[], place: CutPlace): Method[] {
  const found = new Set(cuts.flatMap((cut) => methodsOfCut(cut, place)));
  return found.size === 0 ? [...methods] : methods.filter((method) => found.has(method));
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

function methodsOfCut(cut: CutData, place: CutPlace): Method[] {
  const able = methodsFor(methodQuestion(cut, place))
    .filter((verdict) => verdict.ok)
    .map((verdict) => verdict.method);
  const isCored = cut.kind === 'opening' && cut.corners === 'cored';
  // Pilot cores alone are no wire cut: they count only where the wire can be run.
  const hasPilots = cut.kind === 'wire' && cut.pilotCores > 0 && able.length > 0;
  return isCored || hasPilots ? [...able, 'core_drill'] : able;
}
