import type { SubcontractView } from '@kerfyard/common/subcontracts';
import { expect, it } from 'vitest';
import { nextOf, type Next } from './next-step.ts';

const line = (state: string) => ({ id: state, state, amountCents: 100_000 });

function at(change: object): SubcontractView {
  const work = {
    status: 'active',
    side: 'gc',
    signatures: [],
    sov: [line('set_aside')],
    visits: [],
    completions: [],
    releases: [],
    payoutsReady: true,
  };
  return { ...work, ...change } as unknown as SubcontractView;
}

const visit = (status: string) => ({ status, sovLineIds: ['set_aside'] });

const cases: [string, object, Next | null][] = [
  ['unsigned by us', { status: 'awaiting_signatures' }, { step: 'sign', isOurs: true }],
  [
    'signed by us only',
    { status: 'awaiting_signatures', signatures: [{ side: 'gc' }] },
    { step: 'sign', isOurs: false },
  ],
  ['no money set aside', { sov: [line('not_set_aside')] }, { step: 'setAside', isOurs: true }],
  [
    'no money and no visit, as the crew',
    { side: 'crew', sov: [line('not_set_aside')] },
    { step: 'propose', isOurs: true },
  ],
  [
    'a confirmed visit without money, as the crew',
    { side: 'crew', sov: [line('not_set_aside')], visits: [visit('confirmed')] },
    { step: 'setAside', isOurs: false },
  ],
  ['money and no visit', {}, { step: 'propose', isOurs: false }],
  ['money and no visit, as the crew', { side: 'crew' }, { step: 'propose', isOurs: true }],
  ['windows on offer', { visits: [visit('proposed')] }, { step: 'confirm', isOurs: true }],
  ['a confirmed visit', { visits: [visit('confirmed')], side: 'crew' }, { step: 'start', isOurs: true }],
  ['a crew on site', { visits: [visit('on_site')] }, { step: 'finish', isOurs: false }],
  ['cut, not yet told', { visits: [visit('finished')], side: 'crew' }, { step: 'complete', isOurs: true }],
  [
    'told, whatever else is planned',
    { visits: [visit('confirmed')], completions: [{ status: 'submitted' }] },
    { step: 'accept', isOurs: true },
  ],
  ['accepted', { side: 'crew', completions: [{ status: 'accepted' }] }, { step: 'release', isOurs: false }],
  ['a visit finished whose lines are paid', { sov: [line('released')], visits: [visit('finished')] }, null],
  ['completed', { status: 'completed' }, null],
  [
    'completed, the crew not set up to be paid',
    { status: 'completed', side: 'crew', payoutsReady: false, releases: [{ status: 'blocked' }] },
    { step: 'payouts', isOurs: true },
  ],
  [
    'the same, as the general contractor',
    { status: 'completed', payoutsReady: false, releases: [{ status: 'blocked' }] },
    null,
  ],
  ['lapsed', { status: 'lapsed' }, null],
];

it.each(cases)('knows the next step: %s', (_, change, next) => {
  expect(nextOf(at(change))).toEqual(next);
});
