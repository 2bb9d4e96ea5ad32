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
