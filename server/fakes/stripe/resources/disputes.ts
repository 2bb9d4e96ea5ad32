import type { Stripe } from 'stripe';
import { z } from 'zod';
import { invalidRequest } from '../errors.ts';
import { newId } from '../ids.ts';
import { pageOf } from '../lists.ts';
import { flag, listParams, mergeMetadata, metadata, params, text } from '../params.ts';
import type { Kinds } from '../records.ts';
import { route } from '../router.ts';
import { idOf } from '../work.ts';
import type { Work } from '../work.ts';
import { recordMovement } from './balance-transactions.ts';

type DisputeRecord = Kinds['dispute'];
type ChargeRecord = Kinds['charge'];

/** $15 a dispute (stripe.com/pricing). */
const DISPUTE_FEE_CENTS = 1500;
/** Days to answer. From memory; the real number depends on the card network. */
const EVIDENCE_DAYS = 9;
/** How long the other bank thinks before it decides by the evidence text. The stand-in's own choice. */
const DECISION_SECONDS = 3600;

const EVIDENCE_TEXTS = [
  'access_activity_log',
  'billing_address',
  'cancellation_policy_disclosure',
  'cancellation_rebuttal',
  'customer_email_address',
  'customer_name',
  'customer_purchase_ip',
  'duplicate_charge_explanation',
  'duplicate_charge_id',
  'product_description',
  'refund_policy_disclosure',
  'refund_refusal_explanation',
  'service_date',
  'shipping_address',
  'shipping_carrier',
  'shipping_date',
  'shipping_tracking_number',
  'uncategorized_text',
] as const;

const EVIDENCE_FILES = [
  'cancellation_policy',
  'customer_communication',
  'customer_signature',
  'duplicate_charge_documentation',
  'receipt',
  'refund_policy',
  'service_documentation',
  'shipping_documentation',
  'uncategorized_file',
] as const;

function noEvidence(): Stripe.Dispute.Evidence {
  const fields = [...EVIDENCE_TEXTS, ...EVIDENCE_FILES].map((field) => [field, null]);
  return { ...Object.fromEntries(fields), enhanced_evidence: {} } as Stripe.Dispute.Evidence;
}

function withdraw(work: Work, dispute: DisputeRecord, charge: ChargeRecord): void {
  const id = recordMovement(work, dispute.owner, {
    type: 'adjustment',
    amount: -dispute.api.amount,
    fee: DISPUTE_FEE_CENTS,
    source: dispute.id,
    sourceType: charge.notes.sourceType,
    description: `Chargeback withdrawal for ${charge.id}`,
  });
  dispute.api.balance_transactions.push(structuredClone(work.get('balance_transaction', id)!.api));
}

export interface DisputeInput {
  /** An inquiry asks first and moves no money. */
  isInquiry?: boolean;
  reason?: string;
}

/**
 * The payer's bank takes a payment back. Bank debits know no appeal: their dispute is lost as it comes
 * (docs.stripe.com/payments/ach-direct-debit#disputed-payments).
 */
export function openDispute(work: Work, chargeId: string, input: DisputeInput = {}): DisputeRecord {
  const charge = work.edit('charge', chargeId);
  if (charge.api.status !== 'succeeded' || charge.api.disputed) {
    throw invalidRequest(`Charge ${chargeId} cannot be disputed.`, { param: 'charge' });
  }
  const isBank = charge.notes.sourceType === 'bank_account';
  // A bank debit can be disputed in full although it was refunded: the payer is then credited twice (same document).
  const amountCents = isBank ? charge.api.amount_captured : charge.api.amount - charge.api.amount_refunded;
  if (amountCents === 0)
    throw invalidRequest(`Charge ${chargeId} has been refunded whole.`, { param: 'charge' });
  const isInquiry = (input.isInquiry ?? false) && !isBank;
  const api: Stripe.Dispute = {
    id: newId('dispute'),
    object: 'dispute',
    amount: amountCents,
    balance_transactions: [],
    charge: charge.id,
    created: work.now(),
    currency: 'usd',
    enhanced_eligibility_types: [],
    evidence: noEvidence(),
    evidence_details: {
      due_by: isBank ? null : work.now() + EVIDENCE_DAYS * 86_400,
      enhanced_eligibility: {},
      has_evidence: false,
      past_due: false,
      submission_count: 0,
      submission_method: 'not_submitted',
    },
    intended_submission_method: null,
    is_charge_refundable: isInquiry,
    livemode: false,
    metadata: {},
    payment_intent: charge.api.payment_intent,
    reason: input.reason ?? (isBank ? 'debit_not_authorized' : 'fraudulent'),
    status: isInquiry ? 'warning_needs_response' : isBank ? 'lost' : 'needs_response',
  };
  if (!isBank) {
    api.payment_method_details = {
      type: 'card',
      card: {
        brand: 'visa',
        case_type: isInquiry ? 'inquiry' : 'chargeback',
        network: 'visa',
        network_reason_code: '83',
      },
    };
  }
  const dispute = work.put('dispute', { id: api.id, owner: charge.owner, api, notes: {} });
  charge.api.disputed = true;
  if (!isInquiry) withdraw(work, dispute, charge);
  work.emit('charge.dispute.created', api, charge.owner);
  if (!isInquiry) work.emit('charge.dispute.funds_withdrawn', api, charge.owner);
  if (isBank) work.emit('charge.dispute.closed', api, charge.owner);
  work.emit('charge.updated', charge.api, charge.owner);
  return dispute;
}

/** Test cards and the test bank account that dispute by themselves do so right after the payment. */
export function openDisputeLater(work: Work, charge: ChargeRecord): void {
  const { behaviour } = charge.notes;
  if (behaviour.startsWith('dispute')) work.schedule('dispute', charge.id, work.now() + 1);
}

export function onDisputeDue(work: Work, chargeId: string): void {
  const charge = work.get('charge', chargeId);
  if (!charge || charge.api.disputed || charge.api.status !== 'succeeded') return;
  const { behaviour } = charge.notes;
  openDispute(work, chargeId, {
    isInquiry: behaviour === 'dispute_inquiry',
    ...(behaviour === 'dispute_not_received' && { reason: 'product_not_received' }),
  });
}

function isInquiry(dispute: DisputeRecord): boolean {
  return String(dispute.api.status).startsWith('warning_');
}

function isClosed(dispute: DisputeRecord): boolean {
  return ['won', 'lost', 'warning_closed'].includes(String(dispute.api.status));
}

/** Decides a dispute. Won: the amount comes back (the fee by a setting). An inquiry just closes, whoever was right. */
export function decideDispute(work: Work, disputeId: string, outcome: 'lost' | 'won'): void {
  const dispute = work.edit('dispute', disputeId);
  if (isClosed(dispute)) throw invalidRequest(`Dispute ${disputeId} is already closed.`);
  work.unschedule('dispute_decision', disputeId);
  const charge = work.edit('charge', idOf(dispute.api.charge));
  if (isInquiry(dispute)) {
    dispute.api.status = 'warning_closed';
    charge.api.disputed = false;
    return work.emit('charge.dispute.closed', dispute.api, dispute.owner);
  }
  dispute.api.status = outcome;
  dispute.api.is_charge_refundable = false;
  if (outcome === 'won') reinstate(work, dispute, charge);
  work.emit('charge.dispute.closed', dispute.api, dispute.owner);
  if (outcome === 'won') work.emit('charge.dispute.funds_reinstated', dispute.api, dispute.owner);
}

function reinstate(work: Work, dispute: DisputeRecord, charge: ChargeRecord): void {
  const returnedFee = work.settings().isDisputeFeeReturned ? -DISPUTE_FEE_CENTS : 0;
  const id = recordMovement(work, dispute.owner, {
    type: 'adjustment',
    amount: dispute.api.amount,
    fee: returnedFee,
    source: dispute.id,
    sourceType: charge.notes.sourceType,
    description: `Chargeback reversal for ${charge.id}`,
    reportingCategory: 'dispute_reversal',
  });
  dispute.api.balance_transactions.push(structuredClone(work.get('balance_transaction', id)!.api));
}

/** An inquiry becomes a dispute and now the money goes. */
export function escalateInquiry(work: Work, disputeId: string): void {
  const dispute = work.edit('dispute', disputeId);
  if (!isInquiry(dispute) || isClosed(dispute))
    throw invalidRequest(`Dispute ${disputeId} is no open inquiry.`);
  const charge = work.edit('charge', idOf(dispute.api.charge));
  dispute.api.status = 'needs_response';
  dispute.api.is_charge_refundable = false;
  if (dispute.api.payment_method_details?.card)
    dispute.api.payment_method_details.card.case_type = 'chargeback';
  withdraw(work, dispute, charge);
  work.emit('charge.dispute.updated', dispute.api, dispute.owner);
  work.emit('charge.dispute.funds_withdrawn', dispute.api, dispute.owner);
}

function submitEvidence(work: Work, dispute: DisputeRecord): void {
  const { api } = dispute;
  api.status = isInquiry(dispute) ? 'warning_under_review' : 'under_review';
  api.evidence_details.submission_count += 1;
  api.evidence_details.submission_method = 'manual';
  const said = api.evidence.uncategorized_text ?? '';
  if (said === 'winning_evidence' || said === 'losing_evidence') {
    work.schedule('dispute_decision', dispute.id, work.now() + DECISION_SECONDS);
  }
}

/** The evidence text of the test mode decides (docs.stripe.com/testing#evidence). */
export function onDisputeDecision(work: Work, disputeId: string): void {
  const dispute = work.get('dispute', disputeId);
  if (!dispute || isClosed(dispute)) return;
  decideDispute(
    work,
    disputeId,
    dispute.api.evidence.uncategorized_text === 'winning_evidence' ? 'won' : 'lost',
  );
}

const evidenceParams = z.strictObject(
  Object.fromEntries([...EVIDENCE_TEXTS, ...EVIDENCE_FILES].map((field) => [field, text.optional()])),
);

function requireDispute(work: Work, id: string, owner: string): DisputeRecord {
  work.require('dispute', id, owner, { noun: 'dispute' });
  return work.edit('dispute', id);
}

export const disputeRoutes = [
  route(
    'GET /v1/disputes',
    'DisputeListParams',
    listParams({ charge: text.optional(), payment_intent: text.optional() }),
    ({ work, owner, params: wanted }) =>
      pageOf(work, 'dispute', {
        owner,
        url: '/v1/disputes',
        request: wanted,
        matches: ({ api }) =>
          (wanted.charge === undefined || api.charge === wanted.charge) &&
          (wanted.payment_intent === undefined || api.payment_intent === wanted.payment_intent),
      }),
  ),
  route(
    'GET /v1/disputes/:id',
    'DisputeRetrieveParams',
    params({}),
    ({ work, owner, path }) => work.require('dispute', path['id']!, owner, { noun: 'dispute' }).api,
  ),
  route(
    'POST /v1/disputes/:id',
    'DisputeUpdateParams',
    params({
      evidence: evidenceParams.optional(),
      metadata: metadata.optional(),
      submit: flag.default(true),
    }),
    ({ work, owner, path, params: change }) => {
      const dispute = requireDispute(work, path['id']!, owner);
      if (isClosed(dispute)) throw invalidRequest(`Dispute ${dispute.id} is already closed.`);
      dispute.api.metadata = mergeMetadata(dispute.api.metadata, change.metadata);
      if (change.evidence) {
        Object.assign(dispute.api.evidence, change.evidence);
        dispute.api.evidence_details.has_evidence = true;
        if (change.submit) submitEvidence(work, dispute);
      }
      work.emit('charge.dispute.updated', dispute.api, owner);
      return dispute.api;
    },
  ),
  route('POST /v1/disputes/:id/close', 'DisputeCloseParams', params({}), ({ work, owner, path }) => {
    const dispute = requireDispute(work, path['id']!, owner);
    decideDispute(work, dispute.id, 'lost');
    return dispute.api;
  }),
];
