import { methodsFor } from '../cutting/methods.ts';
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

function methodsOfCut(cut: CutData, place: CutPlace): Method[] {
  const verdicts = methodsFor({
    work: cut.kind,
    depthIn: cut.kind === 'trench' || cut.kind === 'opening' ? cut.thicknessIn : cut.depthIn,
    diameterIn: cut.kind === 'core' ? cut.diameterIn : undefined,
    face: place.face,
    indoors: place.indoors,
    enginesAllowed: place.enginesAllowed,
    // Cored and square-finished corners end the cut before a blade would run past.
    overcutsAllowed: place.overcutsAllowed || (cut.kind === 'opening' && cut.corners !== 'overcut'),
    bothFacesReachable: place.below === 'occupied' || place.below === 'unoccupied',
  });
  const able = verdicts.filter((verdict) => verdict.ok).map((verdict) => verdict.method);
  return cut.kind === 'opening' && cut.corners === 'cored' ? [...able, 'core_drill'] : able;
}
