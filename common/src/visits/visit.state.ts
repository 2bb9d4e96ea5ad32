import { defineMachine } from '../state/index.ts';

export const visitMachine = defineMachine({
  name: 'visit',
  initial: 'proposed',
  moves: {
    proposed: { confirm: 'confirmed', cancel: 'cancelled' },
    confirmed: { start: 'on_site', cancel: 'cancelled' },
    on_site: { finish: 'finished' },
    finished: {},
    cancelled: {},
  },
});
export type VisitStatus = keyof typeof visitMachine.moves;

/** In these states a visit holds its crew and truck; the database forbids two such windows to overlap. */
export const bookedVisitStates: readonly VisitStatus[] = ['confirmed', 'on_site', 'finished'];
