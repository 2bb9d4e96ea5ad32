import { methods, type Method } from '../people/people.schema.ts';
import type { CutData } from './cut.schema.ts';

/** What decides which machines may do a cut. */
export interface CutPlace {
  face: 'floor' | 'wall' | 'ceiling';
}

/** The deepest a hand-held saw commonly cuts from one face. Common practice, no source. */
const HAND_SAW_REACH_IN = 6;

/**
 * The methods by which one or more cuts of a list are commonly done: the words a crew's own methods are matched
 * against, in the order of the catalogue. Common practice, no source.
 */
export function methodsOfCuts(cuts: readonly CutData[], place: CutPlace): Method[] {
  const found = new Set(cuts.flatMap((cut) => methodsOfCut(cut, place)));
  return methods.filter((method) => found.has(method));
}

function methodsOfCut(cut: CutData, { face }: CutPlace): Method[] {
  if (cut.kind === 'core') return ['core_drill'];
  const depthIn = cut.kind === 'line' ? cut.depthIn : cut.thicknessIn;
  const saws: Method[] = [face === 'floor' ? 'flat_saw' : 'wall_saw'];
  if (depthIn <= HAND_SAW_REACH_IN) saws.push('hand_saw');
  if (cut.kind === 'opening' && cut.corners === 'cored') saws.push('core_drill');
  return saws;
}
