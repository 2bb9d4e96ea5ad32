import type { StripeClient } from '../platform/stripe/stripe-client.ts';

export interface ProviderCharge {
  id: string;
  cents: number;
  netCents: number;
  isAvailable: boolean;
  refundedCents: number;
  subcontractId: string;
}

export interface ProviderTransfer {
  id: string;
  cents: number;
  reversedCents: number;
  account: string;
  chargeId: string | null;
  operationId: string;
}

export interface ProviderBalance {
  pendingCents: number;
  availableCents: number;
}

/** What the provider itself says of our money, object by object. */
export interface ProviderState {
  balance: ProviderBalance;
  charges: ProviderCharge[];
  transfers: ProviderTransfer[];
  disputeIds: string[];
}

const sum = (parts: { amount: number; currency: string }[]): number =>
  parts.filter((part) => part.currency === 'usd').reduce((total, part) => total + part.amount, 0);

/** What the provider holds for us, or for a connected account, in US cents. @throws the SDK’s errors */
export async function readBalance(stripe: StripeClient, account?: string): Promise<ProviderBalance> {
  const balance = await stripe.balance.retrieve({}, account === undefined ? {} : { stripeAccount: account });
  return { pendingCents: sum(balance.pending), availableCents: sum(balance.available) };
}

/** What a connected account has had from us: its balance, and what went on to its bank. */
export async function readCrewMoney(stripe: StripeClient, account: string): Promise<number> {
  const { pendingCents, availableCents } = await readBalance(stripe, account);
  let paidOut = 0;
  for await (const payout of stripe.payouts.list({ limit: 100 }, { stripeAccount: account })) {
    if (payout.status !== 'failed' && payout.status !== 'canceled') paidOut += payout.amount;
  }
  return pendingCents + availableCents + paidOut;
}

/** Everything, page by page; the balance last. */
export async function readProvider(stripe: StripeClient): Promise<ProviderState> {
  const charges = await readCharges(stripe);
  const transfers: ProviderTransfer[] = [];
  for await (const transfer of stripe.transfers.list({ limit: 100 })) {
    transfers.push({
      id: transfer.id,
      cents: transfer.amount,
      reversedCents: transfer.amount_reversed,
      account: idOf(transfer.destination) ?? '',
      chargeId: idOf(transfer.source_transaction),
      operationId: transfer.metadata.operation_id ?? '',
    });
  }
  const disputeIds: string[] = [];
  for await (const dispute of stripe.disputes.list({ limit: 100 })) disputeIds.push(dispute.id);
  return { charges, transfers, disputeIds, balance: await readBalance(stripe) };
}

async function readCharges(stripe: StripeClient): Promise<ProviderCharge[]> {
  const charges: ProviderCharge[] = [];
  const expand = ['data.balance_transaction'];
  for await (const charge of stripe.charges.list({ limit: 100, expand })) {
    const transaction = charge.balance_transaction as { net: number; status: string } | null;
    if (!charge.paid || transaction === null) continue;
    charges.push({
      id: charge.id,
      cents: charge.amount,
      netCents: transaction.net,
      isAvailable: transaction.status === 'available',
      refundedCents: charge.amount_refunded,
      subcontractId: charge.transfer_group ?? '',
    });
  }
  return charges;
}

function idOf(value: string | { id: string } | null | undefined): string | null {
  return typeof value === 'string' ? value : (value?.id ?? null);
}
