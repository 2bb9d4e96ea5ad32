import type { Stripe } from 'stripe';
import type { BankBehaviour, CardBehaviour } from './test-values.ts';

/** Owner of what belongs to the platform's own account; everything else belongs to a connected account's id. */
export const PLATFORM = 'platform';

/** An object of the API together with what the stand-in must remember about it and never shows. */
export interface Stored<Api, Notes = Record<string, never>> {
  id: string;
  owner: string;
  api: Api;
  notes: Notes;
}

export type SourceType = 'bank_account' | 'card';

export interface AccountLinkNotes {
  account: string;
  type: string;
  returnUrl: string;
  refreshUrl: string;
  token: string;
  usedAt: number | null;
}

export interface SessionNotes {
  lineItems: Stripe.LineItem[];
  paymentIntentData: {
    description?: string;
    metadata?: Record<string, string>;
    transfer_group?: string;
    capture_method?: string;
  };
}

export interface ChargeNotes {
  sourceType: SourceType;
  paymentMethodId: string | null;
  behaviour: CardBehaviour | BankBehaviour;
  /** Transferred to connected accounts out of this charge, net of reversals. */
  transferredCents: number;
  isBypassingPending: boolean;
}

export interface RefundNotes {
  sourceType: SourceType;
  /** What will become of it once it is on its way. */
  outcome: 'fails' | 'succeeds';
}

export interface TransferNotes {
  sourceType: SourceType;
}

export interface EndpointNotes {
  secret: string;
  connect: boolean;
}

export type DeliveryState = 'delivered' | 'failed' | 'held' | 'pending' | 'withheld';

/** One event on its way to one endpoint. */
export interface Delivery {
  id: string;
  owner: string;
  eventId: string;
  endpointId: string;
  state: DeliveryState;
  attempts: number;
  nextAttemptAt: number;
  lastStatus: string | null;
  /** A second copy made by the "duplicate" fault. */
  isDuplicate: boolean;
}

/** A saved answer under an idempotency key. */
export interface SavedAnswer {
  id: string;
  owner: string;
  requestHash: string;
  requestId: string;
  status: number;
  body: string;
  createdAt: number;
}

/** Something that happens by itself at a time of the stand-in's clock. */
export interface Timer {
  id: string;
  owner: string;
  dueAt: number;
  action: string;
  subject: string;
}

export type FaultKind = '409' | '429' | '500' | 'delay' | 'drop_after' | 'drop_before';

/** A fault ordered for the next requests on a path. */
export interface Fault {
  id: string;
  owner: string;
  kind: FaultKind;
  method: string | null;
  path: string;
  remaining: number;
  delayMs: number;
  /** For 500: whether the effect happens although the answer says it did not. */
  hasEffect: boolean;
  /** Of every 100 matching requests, how many are hit. */
  percent: number;
}

/** How webhooks misbehave. */
export interface WebhookChaos {
  /** Extra copies of every event. */
  duplicates: number;
  /** Events are shuffled within this time. */
  reorderWithinMs: number;
  delayMs: number;
  isHolding: boolean;
  /** How many of the next deliveries carry a signature made with a wrong secret. */
  badSignatures: number;
  withholdPercent: number;
}

/** Everything about the stand-in that can be switched while it runs. */
export interface Settings {
  id: 'settings';
  owner: string;
  platformAccountId: string;
  clockOffsetMs: number;
  /** live: card money after two business days, bank debits after four; instant: both at once. */
  cardSettlement: 'instant' | 'live';
  bankDebits: 'instant' | 'live';
  /** Seconds from handing in onboarding details to an active account. */
  verificationSeconds: number;
  partialBankRefunds: 'allow' | 'refuse';
  isDisputeFeeReturned: boolean;
  /** Requests a second before 429 answers; 0 switches the limit off. */
  requestsPerSecond: number;
  chaos: WebhookChaos;
}

/** Every kind of record and its shape. */
export interface Kinds {
  account: Stored<Stripe.Account, { hasDetails: boolean }>;
  account_link: Stored<Stripe.AccountLink, AccountLinkNotes>;
  balance_transaction: Stored<Stripe.BalanceTransaction, { sourceType: SourceType; payoutId: string | null }>;
  bank_account: Stored<Stripe.BankAccount, { behaviour: BankBehaviour }>;
  charge: Stored<Stripe.Charge, ChargeNotes>;
  checkout_session: Stored<Stripe.Checkout.Session, SessionNotes>;
  customer: Stored<Stripe.Customer>;
  delivery: Delivery;
  dispute: Stored<Stripe.Dispute>;
  event: Stored<Stripe.Event>;
  fault: Fault;
  payment_intent: Stored<Stripe.PaymentIntent, { sessionId: string | null; returnUrl: string | null }>;
  payment_method: Stored<Stripe.PaymentMethod, { behaviour: CardBehaviour | BankBehaviour }>;
  payout: Stored<Stripe.Payout, { behaviour: BankBehaviour }>;
  refund: Stored<Stripe.Refund, RefundNotes>;
  saved_answer: SavedAnswer;
  settings: Settings;
  timer: Timer;
  topup: Stored<Stripe.Topup>;
  transfer: Stored<Stripe.Transfer, TransferNotes>;
  transfer_reversal: Stored<Stripe.TransferReversal>;
  webhook_endpoint: Stored<Stripe.WebhookEndpoint, EndpointNotes>;
}

export type Kind = keyof Kinds;
