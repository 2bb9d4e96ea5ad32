import type { Stripe } from 'stripe';
import { balanceInsufficient, invalidRequest } from '../errors.ts';
import { newId } from '../ids.ts';
import { pageOf, wholeList } from '../lists.ts';
import { cents, currency, listParams, mergeMetadata, metadata, params, text } from '../params.ts';
import type { Kinds, SourceType } from '../records.ts';
import { z } from 'zod';
import { route } from '../router.ts';
import { idOf } from '../work.ts';
import type { Work } from '../work.ts';
import { requireAccount } from './accounts.ts';
import { availableCents } from './balance.ts';
import { availableOnOf, recordMovement } from './balance-transactions.ts';
import { blankCharge } from './charges.ts';

type TransferRecord = Kinds['transfer'];
type ChargeRecord = Kinds['charge'];

const createParams = params({
  amount: cents.optional(),
  currency,
  destination: text,
  description: text.optional(),
  metadata: metadata.optional(),
  source_transaction: text.optional(),
  source_type: z.enum(['bank_account', 'card']).optional(),
  transfer_group: text.optional(),
});

type CreateInput = z.output<typeof createParams>;

/** Where a transfer's money comes from: a charge, or the available balance of one side. */
interface Funding {
  charge: ChargeRecord | null;
  sourceType: SourceType;
  amountCents: number;
  availableOn: number;
}

function dollars(amountCents: number): string {
  return `$${(amountCents / 100).toFixed(2)}`;
}

function fundingFromCharge(work: Work, owner: string, chargeId: string, wanted: number | undefined): Funding {
  work.require('charge', chargeId, owner, { noun: 'charge', param: 'source_transaction' });
  const charge = work.edit('charge', chargeId);
  const { api, notes } = charge;
  if (api.status === 'failed' || !api.captured || api.balance_transaction === null) {
    throw invalidRequest(
      `The charge ${api.id} cannot be used as a source of a transfer: it has not succeeded.`,
      {
        param: 'source_transaction',
      },
    );
  }
  const left = api.amount - api.amount_refunded - notes.transferredCents;
  const amountCents = wanted ?? left;
  if (amountCents < 1 || amountCents > left) {
    throw invalidRequest(
      `Transfers using this transaction as a source must not exceed the source amount of ${dollars(api.amount - api.amount_refunded)}. (There is already a total of ${dollars(notes.transferredCents)} in transfers using this as a source.)`,
      { param: 'source_transaction' },
    );
  }
  const availableOn = availableOnOf(work, idOf(api.balance_transaction));
  const isSettled = availableOn <= work.now();
  if (isSettled) assertCovered(work, owner, notes.sourceType, amountCents);
  return { charge, sourceType: notes.sourceType, amountCents, availableOn };
}

function assertCovered(work: Work, owner: string, side: SourceType, amountCents: number): void {
  if (availableCents(work, owner, side) >= amountCents) return;
  throw balanceInsufficient(
    'You have insufficient available funds in your Stripe account. Try adding funds directly to your available balance by creating Charges using the 4000000000000077 test card. See: https://stripe.com/docs/testing#available-balance',
  );
}

function fundingOf(work: Work, owner: string, input: CreateInput): Funding {
  if (input.source_transaction !== undefined) {
    return fundingFromCharge(work, owner, input.source_transaction, input.amount);
  }
  if (input.amount === undefined) {
    throw invalidRequest('Missing required param: amount.', { code: 'parameter_missing', param: 'amount' });
  }
  const sourceType = input.source_type ?? 'card';
  assertCovered(work, owner, sourceType, input.amount);
  return { charge: null, sourceType, amountCents: input.amount, availableOn: work.now() };
}

/** The payment that appears on the connected account, with its own balance transaction. */
function receive(work: Work, accountId: string, transferId: string, funding: Funding): string {
  const id = newId('bank_charge');
  const charge: Stripe.Charge = {
    ...blankCharge(id, work.now(), funding.amountCents),
    amount_captured: funding.amountCents,
    captured: true,
    paid: true,
    source_transfer: transferId,
    status: 'succeeded',
  };
  charge.balance_transaction = recordMovement(work, accountId, {
    type: 'payment',
    amount: funding.amountCents,
    source: id,
    sourceType: funding.sourceType,
    availableOn: funding.availableOn,
  });
  work.put('charge', {
    id,
    owner: accountId,
    api: charge,
    notes: {
      sourceType: funding.sourceType,
      paymentMethodId: null,
      behaviour: 'success',
      transferredCents: 0,
      isBypassingPending: false,
    },
  });
  return id;
}

/** A charge's group goes to its transfers; without one both get `group_` and the payment's id. */
function groupOf(funding: Funding, wanted: string | undefined): string | null {
  const { charge } = funding;
  if (!charge) return wanted ?? null;
  const own = charge.api.transfer_group;
  if (own !== null && wanted !== undefined && wanted !== own) {
    throw invalidRequest(
      `The transfer_group of the source transaction (${own}) does not match the one provided (${wanted}).`,
      { param: 'transfer_group' },
    );
  }
  charge.api.transfer_group =
    own ?? wanted ?? `group_${charge.api.payment_intent ? idOf(charge.api.payment_intent) : charge.id}`;
  return charge.api.transfer_group;
}

function createTransfer(work: Work, owner: string, input: CreateInput): TransferRecord {
  const destination = requireAccount(work, input.destination, 'destination');
  if (destination.api.capabilities?.transfers !== 'active') {
    throw invalidRequest(
      'Your destination account needs to have at least one of the following capabilities enabled: transfers, crypto_transfers, legacy_payments',
      { code: 'insufficient_capabilities_for_transfer' },
    );
  }
  const funding = fundingOf(work, owner, input);
  const id = newId('transfer');
  const transferGroup = groupOf(funding, input.transfer_group);
  const api: Stripe.Transfer = {
    id,
    object: 'transfer',
    amount: funding.amountCents,
    amount_reversed: 0,
    balance_transaction: recordMovement(work, owner, {
      type: 'transfer',
      amount: -funding.amountCents,
      source: id,
      sourceType: funding.sourceType,
      availableOn: funding.availableOn,
      description: input.description ?? null,
    }),
    created: work.now(),
    currency: 'usd',
    description: input.description ?? null,
    destination: destination.id,
    destination_payment: receive(work, destination.id, id, funding),
    livemode: false,
    metadata: mergeMetadata({}, input.metadata),
    reversals: wholeList(`/v1/transfers/${id}/reversals`, []),
    reversed: false,
    source_transaction: funding.charge?.id ?? null,
    source_type: funding.sourceType,
    transfer_group: transferGroup,
  };
  if (funding.charge) funding.charge.notes.transferredCents += funding.amountCents;
  const transfer = work.put('transfer', { id, owner, api, notes: { sourceType: funding.sourceType } });
  work.emit('transfer.created', api, owner);
  return transfer;
}

export function requireTransfer(work: Work, id: string, owner: string): TransferRecord {
  work.require('transfer', id, owner, { noun: 'transfer' });
  return work.edit('transfer', id);
}

export const transferRoutes = [
  route(
    'POST /v1/transfers',
    'TransferCreateParams',
    createParams,
    ({ work, owner, params: input }) => createTransfer(work, owner, input).api,
  ),
  route(
    'GET /v1/transfers',
    'TransferListParams',
    listParams({ destination: text.optional(), transfer_group: text.optional() }),
    ({ work, owner, params: wanted }) =>
      pageOf(work, 'transfer', {
        owner,
        url: '/v1/transfers',
        request: wanted,
        matches: ({ api }) =>
          (wanted.destination === undefined || api.destination === wanted.destination) &&
          (wanted.transfer_group === undefined || api.transfer_group === wanted.transfer_group),
      }),
  ),
  route(
    'GET /v1/transfers/:id',
    'TransferRetrieveParams',
    params({}),
    ({ work, owner, path }) => work.require('transfer', path['id']!, owner, { noun: 'transfer' }).api,
  ),
  route(
    'POST /v1/transfers/:id',
    'TransferUpdateParams',
    params({ description: text.optional(), metadata: metadata.optional() }),
    ({ work, owner, path, params: change }) => {
      const { api } = requireTransfer(work, path['id']!, owner);
      if (change.description !== undefined) api.description = change.description;
      api.metadata = mergeMetadata(api.metadata, change.metadata);
      work.emit('transfer.updated', api, owner);
      return api;
    },
  ),
];
