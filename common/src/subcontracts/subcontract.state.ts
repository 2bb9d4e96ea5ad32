import { defineMachine } from '../state/index.ts';

export const subcontractMachine = defineMachine({
  name: 'subcontract',
  initial: 'awaiting_signatures',
  moves: {
    awaiting_signatures: { sign_all: 'active', lapse: 'lapsed' },
    active: { complete: 'completed' },
    completed: {},
    lapsed: {},
  },
});
export type SubcontractStatus = keyof typeof subcontractMachine.moves;

/** Calendar days in which both sides sign before an award lapses. */
export const SIGNING_DAYS = 7;
