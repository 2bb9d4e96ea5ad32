import { defineMachine } from '../state/index.ts';

/**
 * A scope: draft → open → due → awarded, or closed without award; withdrawn from open or due.
 * An award not signed in its days lapses back to due.
 */
export const scopeMachine = defineMachine({
  name: 'scope',
  initial: 'draft',
  moves: {
    draft: { publish: 'open', discard: 'discarded' },
    open: { come_due: 'due', withdraw: 'withdrawn' },
    due: { award: 'awarded', close: 'closed_without_award', withdraw: 'withdrawn' },
    awarded: { lapse: 'due' },
    closed_without_award: {},
    withdrawn: {},
    discarded: {},
  },
});
export type ScopeStatus = keyof typeof scopeMachine.moves;
export type ScopeAction = 'publish' | 'discard' | 'come_due' | 'withdraw' | 'award' | 'close' | 'lapse';
