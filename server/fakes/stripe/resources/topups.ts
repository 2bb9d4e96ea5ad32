import type { Stripe } from 'stripe';
import { z } from 'zod';
import { addBusinessDays } from '../clock.ts';
import { invalidRequest } from '../errors.ts';
import { newId } from '../ids.ts';
import { pageOf } from '../lists.ts';
import { cents, clearable, currency, listParams, mergeMetadata, metadata, params, text } from '../params.ts';
import type { Kinds } from '../records.ts';
import { route } from '../router.ts';
import type { Work } from '../work.ts';
import { recordMovement } from './balance-transactions.ts';

type TopupRecord = Kinds['topup'];

const TOPUP_BUSINESS_DAYS = 1;

const createParams = params({
  amount: cents,
  currency,
  description: text.optional(),
  metadata: metadata.optional(),
  statement_descriptor: text.max(15).optional(),
  transfer_group: text.optional(),
});

/** Ends a top-up that is on its way from the platform's bank. */
export function settleTopup(work: Work, topupId: string, outcome: 'fails' | 'succeeds'): void {
  const topup = work.edit('topup', topupId);
  if (topup.api.status !== 'pending') return;
  work.unschedule('topup_arrival', topupId);
  if (outcome === 'fails') {
    topup.api.status = 'failed';
    topup.api.failure_code = 'insufficient_funds';
    topup.api.failure_message = 'The bank account has insufficient funds.';
    return work.emit('topup.failed', topup.api, topup.owner);
  }
  topup.api.status = 'succeeded';
  topup.api.balance_transaction = recordMovement(work, topup.owner, {
    type: 'topup',
    amount: topup.api.amount,
    source: topup.id,
    sourceType: 'card',
    description: topup.api.description,
  });
  work.emit('topup.succeeded', topup.api, topup.owner);
}

function requireTopup(work: Work, id: string, owner: string): TopupRecord {
  work.require('topup', id, owner, { noun: 'topup' });
  return work.edit('topup', id);
}

export const topupRoutes = [
  route('POST /v1/topups', 'TopupCreateParams', createParams, ({ work, owner, params: input }) => {
    const isInstant = work.settings().bankDebits === 'instant';
    const arrival = isInstant ? work.now() : addBusinessDays(work.now(), TOPUP_BUSINESS_DAYS);
    const api: Stripe.Topup = {
      id: newId('topup'),
      object: 'topup',
      amount: input.amount,
      balance_transaction: null,
      created: work.now(),
      currency: 'usd',
      description: input.description ?? null,
      expected_availability_date: arrival,
      failure_code: null,
      failure_message: null,
      initiated_by: 'user',
      livemode: false,
      metadata: mergeMetadata({}, input.metadata),
      source: null,
      statement_descriptor: input.statement_descriptor ?? null,
      status: 'pending',
      transfer_group: input.transfer_group ?? null,
    };
    work.put('topup', { id: api.id, owner, api, notes: {} });
    work.schedule('topup_arrival', api.id, arrival);
    work.emit('topup.created', api, owner);
    return api;
  }),
  route(
    'GET /v1/topups',
    'TopupListParams',
    listParams({ status: z.enum(['canceled', 'failed', 'pending', 'succeeded']).optional() }),
    ({ work, owner, params: wanted }) =>
      pageOf(work, 'topup', {
        owner,
        url: '/v1/topups',
        request: wanted,
        matches: ({ api }) => wanted.status === undefined || api.status === wanted.status,
      }),
  ),
  route(
    'GET /v1/topups/:id',
    'TopupRetrieveParams',
    params({}),
    ({ work, owner, path }) => work.require('topup', path['id']!, owner, { noun: 'topup' }).api,
  ),
  route(
    'POST /v1/topups/:id',
    'TopupUpdateParams',
    params({ description: clearable.optional(), metadata: metadata.optional() }),
    ({ work, owner, path, params: change }) => {
      const { api } = requireTopup(work, path['id']!, owner);
      if (change.description !== undefined) api.description = change.description || null;
      api.metadata = mergeMetadata(api.metadata, change.metadata);
      return api;
    },
  ),
  route('POST /v1/topups/:id/cancel', 'TopupCancelParams', params({}), ({ work, owner, path }) => {
    const topup = requireTopup(work, path['id']!, owner);
    if (topup.api.status !== 'pending') throw invalidRequest(`Topup ${topup.id} can no longer be canceled.`);
    work.unschedule('topup_arrival', topup.id);
    topup.api.status = 'canceled';
    work.emit('topup.canceled', topup.api, owner);
    return topup.api;
  }),
];
