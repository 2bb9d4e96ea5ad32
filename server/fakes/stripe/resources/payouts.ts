import type { Stripe } from 'stripe';
import { z } from 'zod';
import { addBusinessDays } from '../clock.ts';
import { balanceInsufficient, invalidRequest } from '../errors.ts';
import { newId } from '../ids.ts';
import { pageOf } from '../lists.ts';
import { cents, currency, listParams, mergeMetadata, metadata, params, text } from '../params.ts';
import { PLATFORM } from '../records.ts';
import type { Kinds, SourceType } from '../records.ts';
import { route } from '../router.ts';
import { BANK_FAILURES } from '../test-values.ts';
import type { BankBehaviour } from '../test-values.ts';
import { idOf } from '../work.ts';
import type { Work } from '../work.ts';
import { availableCents, standingOf } from './balance.ts';
import { recordMovement } from './balance-transactions.ts';
import { markBankErrored } from './onboarding.ts';

type PayoutRecord = Kinds['payout'];

const IN_TRANSIT_BUSINESS_DAYS = 1;
const ARRIVAL_BUSINESS_DAYS = 2;

interface PayoutInput {
  amountCents: number;
  sourceType: SourceType;
  isAutomatic: boolean;
  method: 'instant' | 'standard';
  description?: string | undefined;
  metadata: Record<string, string>;
  statementDescriptor?: string | undefined;
}

/** The bank account payouts go to. The platform's own always works. */
function destinationOf(work: Work, owner: string): { id: string | null; behaviour: BankBehaviour } | null {
  if (owner === PLATFORM) return { id: null, behaviour: 'success' };
  const bank = work.list('bank_account', owner)[0];
  if (!bank || bank.api.status === 'errored') return null;
  return { id: bank.id, behaviour: bank.notes.behaviour };
}

function blankPayout(work: Work, input: PayoutInput): Stripe.Payout {
  const isInstant = input.method === 'instant';
  return {
    id: newId('payout'),
    object: 'payout',
    amount: input.amountCents,
    application_fee: null,
    application_fee_amount: null,
    arrival_date: isInstant ? work.now() : addBusinessDays(work.now(), ARRIVAL_BUSINESS_DAYS),
    automatic: input.isAutomatic,
    balance_transaction: null,
    created: work.now(),
    currency: 'usd',
    description: input.description ?? (input.isAutomatic ? 'STRIPE PAYOUT' : null),
    destination: null,
    failure_balance_transaction: null,
    failure_code: null,
    failure_message: null,
    livemode: false,
    metadata: input.metadata,
    method: input.method,
    original_payout: null,
    payout_method: null,
    reconciliation_status: input.isAutomatic ? 'completed' : 'not_applicable',
    reversed_by: null,
    source_type: input.sourceType,
    statement_descriptor: input.statementDescriptor ?? null,
    status: 'pending',
    trace_id: null,
    type: 'bank_account',
  };
}

function createPayout(work: Work, owner: string, input: PayoutInput): PayoutRecord {
  const account = work.get('account', owner);
  if (account && !account.api.payouts_enabled) {
    throw invalidRequest('Payouts are not enabled for this account: it has requirements that are due.', {
      code: 'payouts_not_allowed',
    });
  }
  const destination = destinationOf(work, owner);
  if (!destination) {
    throw invalidRequest("Sorry, you don't have any external accounts in that currency (usd).");
  }
  if (availableCents(work, owner, input.sourceType) < input.amountCents) {
    throw balanceInsufficient('You have insufficient funds in your Stripe account for this transfer.');
  }
  const api = blankPayout(work, input);
  api.destination = destination.id;
  api.balance_transaction = recordMovement(work, owner, {
    type: 'payout',
    amount: -input.amountCents,
    source: api.id,
    sourceType: input.sourceType,
    description: api.description,
  });
  const payout = work.put('payout', { id: api.id, owner, api, notes: { behaviour: destination.behaviour } });
  work.emit('payout.created', api, owner);
  if (input.method === 'instant') work.schedule('payout_arrival', api.id, work.now() + 1);
  else {
    work.schedule('payout_departure', api.id, addBusinessDays(work.now(), IN_TRANSIT_BUSINESS_DAYS));
    work.schedule('payout_arrival', api.id, api.arrival_date);
  }
  return payout;
}

/** The payout has left for the bank and can no longer be canceled. */
export function departPayout(work: Work, payoutId: string): void {
  const payout = work.edit('payout', payoutId);
  if (payout.api.status !== 'pending') return;
  payout.api.status = 'in_transit';
  payout.api.trace_id = { status: 'pending', value: null };
  work.unschedule('payout_departure', payoutId);
  work.emit('payout.updated', payout.api, payout.owner);
}

/**
 * Ends a payout. It may fail up to days after it was `paid`; its money then comes back and the bank account is not
 * used again (docs.stripe.com/payouts#payout-failures).
 */
export function settlePayout(work: Work, payoutId: string, outcome: BankBehaviour): void {
  const payout = work.edit('payout', payoutId);
  const isFailure = outcome in BANK_FAILURES;
  const status = String(payout.api.status);
  if (!['pending', 'in_transit', ...(isFailure ? ['paid'] : [])].includes(status)) return;
  departPayout(work, payoutId);
  work.unschedule('payout_arrival', payoutId);
  if (!isFailure) {
    payout.api.status = 'paid';
    payout.api.trace_id = { status: 'supported', value: `TRACE${payoutId.slice(-8)}` };
    work.emit('payout.paid', payout.api, payout.owner);
    return;
  }
  payout.api.status = 'failed';
  payout.api.failure_code = outcome;
  payout.api.failure_message = BANK_FAILURES[outcome as keyof typeof BANK_FAILURES];
  payout.api.failure_balance_transaction = giveBack(work, payout, 'payout_failure');
  work.emit('payout.failed', payout.api, payout.owner);
  if (payout.api.destination) markBankErrored(work, payout.owner, idOf(payout.api.destination));
}

function giveBack(work: Work, payout: PayoutRecord, type: 'payout_cancel' | 'payout_failure'): string {
  return recordMovement(work, payout.owner, {
    type,
    amount: payout.api.amount,
    source: payout.id,
    sourceType: payout.api.source_type === 'bank_account' ? 'bank_account' : 'card',
  });
}

export function onPayoutArrival(work: Work, payoutId: string): void {
  const payout = work.get('payout', payoutId);
  if (payout) settlePayout(work, payoutId, payout.notes.behaviour);
}

/** Once a day: every account on a daily schedule pays out what it has. */
export function payOutScheduledAccounts(work: Work): void {
  for (const account of work.list('account', PLATFORM)) {
    if (account.api.settings?.payouts?.schedule.interval !== 'daily' || !account.api.payouts_enabled)
      continue;
    const { available } = standingOf(work, account.id);
    for (const sourceType of ['card', 'bank_account'] as const) {
      if (available[sourceType] > 0) payOutAll(work, account.id, sourceType, available[sourceType]);
    }
  }
}

function payOutAll(work: Work, owner: string, sourceType: SourceType, amountCents: number): void {
  const covered = work
    .list('balance_transaction', owner)
    .filter(
      ({ api, notes }) =>
        notes.payoutId === null && notes.sourceType === sourceType && api.available_on <= work.now(),
    );
  const input: PayoutInput = { amountCents, sourceType, isAutomatic: true, method: 'standard', metadata: {} };
  const payout = createPayout(work, owner, input);
  for (const { id } of covered) work.edit('balance_transaction', id).notes.payoutId = payout.id;
  const own = work.edit('balance_transaction', idOf(payout.api.balance_transaction));
  own.notes.payoutId = payout.id;
}

function requirePayout(work: Work, id: string, owner: string): PayoutRecord {
  work.require('payout', id, owner, { noun: 'payout' });
  return work.edit('payout', id);
}

const createParams = params({
  amount: cents,
  currency,
  description: text.optional(),
  metadata: metadata.optional(),
  method: z.enum(['instant', 'standard']).default('standard'),
  source_type: z.enum(['bank_account', 'card']).default('card'),
  statement_descriptor: text.max(22).optional(),
});

const cancel = route(
  'POST /v1/payouts/:id/cancel',
  'PayoutCancelParams',
  params({}),
  ({ work, owner, path }) => {
    const payout = requirePayout(work, path['id']!, owner);
    if (payout.api.status !== 'pending' || payout.api.automatic) {
      throw invalidRequest(`Payout ${payout.id} can no longer be canceled.`);
    }
    work.unschedule('payout_departure', payout.id);
    work.unschedule('payout_arrival', payout.id);
    payout.api.status = 'canceled';
    giveBack(work, payout, 'payout_cancel');
    work.emit('payout.canceled', payout.api, owner);
    return payout.api;
  },
);

/** A paid payout is fetched back from the bank as a payout of the negative amount. */
const reverse = route(
  'POST /v1/payouts/:id/reverse',
  'PayoutReverseParams',
  params({ metadata: metadata.optional() }),
  ({ work, owner, path, params: input }) => {
    const original = requirePayout(work, path['id']!, owner);
    if (original.api.status !== 'paid' || original.api.reversed_by || original.api.original_payout) {
      throw invalidRequest(`Payout ${original.id} cannot be reversed.`);
    }
    const sourceType = original.api.source_type === 'bank_account' ? 'bank_account' : 'card';
    const api = blankPayout(work, {
      amountCents: -original.api.amount,
      sourceType,
      isAutomatic: false,
      method: 'standard',
      metadata: mergeMetadata({}, input.metadata),
    });
    api.destination = original.api.destination;
    api.original_payout = original.id;
    api.balance_transaction = recordMovement(work, owner, {
      type: 'payout',
      amount: original.api.amount,
      source: api.id,
      sourceType,
      availableOn: api.arrival_date,
    });
    original.api.reversed_by = api.id;
    work.put('payout', { id: api.id, owner, api, notes: { behaviour: 'success' } });
    work.schedule('payout_arrival', api.id, api.arrival_date);
    work.emit('payout.created', api, owner);
    work.emit('payout.updated', original.api, owner);
    return api;
  },
);

export const payoutRoutes = [
  route('POST /v1/payouts', 'PayoutCreateParams', createParams, ({ work, owner, params: input }) => {
    const payout = createPayout(work, owner, {
      amountCents: input.amount,
      sourceType: input.source_type,
      isAutomatic: false,
      method: input.method,
      description: input.description,
      metadata: mergeMetadata({}, input.metadata),
      statementDescriptor: input.statement_descriptor,
    });
    work.edit('balance_transaction', idOf(payout.api.balance_transaction)).notes.payoutId = payout.id;
    return payout.api;
  }),
  route(
    'GET /v1/payouts',
    'PayoutListParams',
    listParams({ status: text.optional(), destination: text.optional() }),
    ({ work, owner, params: wanted }) =>
      pageOf(work, 'payout', {
        owner,
        url: '/v1/payouts',
        request: wanted,
        matches: ({ api }) =>
          (wanted.status === undefined || api.status === wanted.status) &&
          (wanted.destination === undefined || api.destination === wanted.destination),
      }),
  ),
  route(
    'GET /v1/payouts/:id',
    'PayoutRetrieveParams',
    params({}),
    ({ work, owner, path }) => work.require('payout', path['id']!, owner, { noun: 'payout' }).api,
  ),
  route(
    'POST /v1/payouts/:id',
    'PayoutUpdateParams',
    params({ metadata: metadata.optional() }),
    ({ work, owner, path, params: change }) => {
      const { api } = requirePayout(work, path['id']!, owner);
      api.metadata = mergeMetadata(api.metadata ?? {}, change.metadata);
      work.emit('payout.updated', api, owner);
      return api;
    },
  ),
  cancel,
  reverse,
];
