import { describe, expect, it } from 'vitest';
import { completionMachine } from '../completions/completion.state.ts';
import { fundingMachine, operationMachine, releaseMachine } from '../payments/payment.state.ts';
import { scopeMachine } from '../scopes/scope.state.ts';
import { subcontractMachine } from '../subcontracts/subcontract.state.ts';
import { visitMachine } from '../visits/visit.state.ts';
import { defineMachine, nextState, type Machine } from './index.ts';

/** Every move there is, as `state -action-> state`. A pair of state and action that is not here must lead nowhere. */
const legalMoves: [Machine<string, string>, string[]][] = [
  [
    scopeMachine,
    [
      'draft -publish-> open',
      'draft -discard-> discarded',
      'open -come_due-> due',
      'open -withdraw-> withdrawn',
      'due -award-> awarded',
      'due -close-> closed_without_award',
      'due -withdraw-> withdrawn',
      'awarded -lapse-> due',
    ],
  ],
  [
    subcontractMachine,
    [
      'awaiting_signatures -sign_all-> active',
      'awaiting_signatures -lapse-> lapsed',
      'active -complete-> completed',
    ],
  ],
  [
    visitMachine,
    [
      'proposed -confirm-> confirmed',
      'proposed -cancel-> cancelled',
      'confirmed -start-> on_site',
      'confirmed -cancel-> cancelled',
      'on_site -finish-> finished',
    ],
  ],
  [
    completionMachine,
    ['submitted -accept-> accepted', 'submitted -withdraw-> withdrawn', 'accepted -release-> released'],
  ],
  [
    fundingMachine,
    [
      'requested -open-> awaiting_payment',
      'requested -refuse-> failed',
      'requested -expire-> expired',
      'awaiting_payment -process-> processing',
      'awaiting_payment -succeed-> succeeded',
      'awaiting_payment -fail-> failed',
      'awaiting_payment -expire-> expired',
      'processing -succeed-> succeeded',
      'processing -fail-> failed',
    ],
  ],
  [releaseMachine, ['posted -transfer-> transferred', 'posted -block-> blocked', 'blocked -retry-> posted']],
  [
    operationMachine,
    [
      'requested -succeed-> succeeded',
      'requested -refuse-> refused',
      'requested -lose-> unknown',
      'unknown -succeed-> succeeded',
      'unknown -refuse-> refused',
    ],
  ],
];

describe('D-06 the order of steps', () => {
  it.each(legalMoves.map(([machine, moves]) => [machine.name, machine, moves] as const))(
    'of a %s is this, and no other move leads anywhere',
    (_, machine, moves) => {
      const actions = new Set(machine.states.flatMap((state) => Object.keys(machine.moves[state] ?? {})));
      const found = machine.states.flatMap((from) =>
        [...actions].flatMap((action) => {
          const to = nextState(machine, from, action);
          return to === undefined ? [] : [`${from} -${action}-> ${to}`];
        }),
      );
      expect(found.sort()).toEqual([...moves].sort());
      expect(machine.initial).toBe(machine.states[0]);
    },
  );
});

describe('a table of moves', () => {
  it('is refused at start when a move leads to a state that is none', () => {
    // @ts-expect-error -- the type refuses it too; the check at start is for tables that come from elsewhere
    expect(() => defineMachine({ name: 'door', initial: 'shut', moves: { shut: { open: 'ajar' } } })).toThrow(
      'door: unknown state "ajar"',
    );
  });

  it('is refused at start when a state cannot be reached', () => {
    const moves = { shut: { open: 'open' }, open: {}, locked: { unlock: 'shut' } };
    expect(() => defineMachine({ name: 'door', initial: 'shut', moves })).toThrow(
      'door: cannot reach locked',
    );
  });
});
