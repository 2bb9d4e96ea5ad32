import type { CompletionStatus } from '@kerfyard/common/completions';
import type { SovLineState } from '@kerfyard/common/subcontracts';

export interface SovFacts {
  setAside: ReadonlySet<string>;
  underWay: ReadonlySet<string>;
  released: ReadonlySet<string>;
  /** Lines that stand in a completion, with how far it is. */
  completions: ReadonlyMap<string, CompletionStatus>;
}

/** Where a line stands: the farthest thing that is true of it. */
export function sovLineState(lineId: string, facts: SovFacts): SovLineState {
  const completion = facts.completions.get(lineId);
  if (facts.released.has(lineId) || completion === 'released') return 'released';
  if (completion === 'accepted' || completion === 'submitted') return completion;
  if (facts.setAside.has(lineId)) return 'set_aside';
  return facts.underWay.has(lineId) ? 'setting_aside' : 'not_set_aside';
}
