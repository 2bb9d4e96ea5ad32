import { defineMachine } from '../state/index.ts';

/** A completion: the crew says what was cut; the general contractor accepts; accepted money is released. */
export const completionMachine = defineMachine({
  name: 'completion',
  initial: 'submitted',
  moves: {
    submitted: { accept: 'accepted', withdraw: 'withdrawn' },
    accepted: { release: 'released' },
    released: {},
    withdrawn: {},
  },
});
export type CompletionStatus = keyof typeof completionMachine.moves;
