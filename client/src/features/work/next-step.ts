import type { SubcontractView } from '@kerfyard/common/subcontracts';

/** What one side can do now. */
export type Step =
  | 'sign'
  | 'setAside'
  | 'propose'
  | 'confirm'
  | 'start'
  | 'finish'
  | 'complete'
  | 'accept'
  | 'release'
  | 'payouts';

export interface Next {
  step: Step;
  /** Whether it is for the reader's side, or the other side is waited for. */
  isOurs: boolean;
}

const doneBy: Record<Step, SubcontractView['side'] | 'either'> = {
  sign: 'either',
  setAside: 'gc',
  propose: 'crew',
  confirm: 'gc',
  start: 'crew',
  finish: 'crew',
  complete: 'crew',
  accept: 'gc',
  release: 'gc',
  payouts: 'crew',
};

/** The next move of a subcontract, the latest stage first; null when nothing is to be done. */
export function nextOf(subcontract: SubcontractView): Next | null {
  const { status, side, signatures } = subcontract;
  if (status === 'awaiting_signatures') {
    return { step: 'sign', isOurs: !signatures.some((signature) => signature.side === side) };
  }
  if (lacksPayouts(subcontract)) return { step: 'payouts', isOurs: true };
  if (status !== 'active') return null;
  const step = activeStep(subcontract);
  return step === null ? null : { step, isOurs: doneBy[step] === side };
}

/** Released money waits for the crew's account at the provider: nobody's business but the crew's. */
function lacksPayouts({ side, payoutsReady, releases }: SubcontractView): boolean {
  return side === 'crew' && !payoutsReady && releases.some((release) => release.status === 'blocked');
}

function activeStep({ side, sov, visits, completions }: SubcontractView): Step | null {
  const hasCompletion = (status: string) => completions.some((completion) => completion.status === status);
  if (hasCompletion('accepted')) return 'release';
  if (hasCompletion('submitted')) return 'accept';
  const hasVisit = (status: string) => visits.some((visit) => visit.status === status);
  if (hasVisit('on_site')) return 'finish';
  const open = new Set(sov.filter((line) => line.state === 'set_aside').map((line) => line.id));
  const isCut = visits.some(
    (visit) => visit.status === 'finished' && visit.sovLineIds.some((id) => open.has(id)),
  );
  if (isCut) return 'complete';
  // Someone waits for an answer.
  if (hasVisit('proposed')) return 'confirm';
  const isPlanned = hasVisit('confirmed');
  const lacksMoney = sov.some((line) => line.state === 'not_set_aside' && line.amountCents > 0);
  // A crew need not wait for the money to offer windows; only the visit's start does.
  if (lacksMoney && (side === 'gc' || isPlanned)) return 'setAside';
  if (isPlanned) return 'start';
  return sov.every((line) => line.state === 'released') ? null : 'propose';
}
