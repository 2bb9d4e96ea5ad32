import type { Stripe } from 'stripe';
import { newId } from '../ids.ts';
import type { TestBank } from '../test-values.ts';
import { TEST_ROUTING_NUMBER } from '../test-values.ts';
import type { Work } from '../work.ts';
import { refreshRequirements, requireAccount } from './accounts.ts';
import type { AccountRecord } from './accounts.ts';
import { presentCapability } from './capabilities.ts';
import type { CapabilityName } from './capabilities.ts';

export interface OnboardingDetails {
  businessName: string;
  /** Left out: the person stopped before naming a bank account. */
  bank?: TestBank;
}

function bankOf(account: AccountRecord, bank: TestBank): Stripe.BankAccount {
  return {
    id: newId('bank_account'),
    object: 'bank_account',
    account: account.id,
    account_holder_name: account.api.company?.name ?? null,
    account_holder_type: 'company',
    account_type: null,
    available_payout_methods: ['standard'],
    bank_name: 'TEST BANK',
    country: 'US',
    currency: 'usd',
    default_for_currency: true,
    fingerprint: `bank${bank.accountNumber}`,
    last4: bank.accountNumber.slice(-4),
    metadata: {},
    routing_number: TEST_ROUTING_NUMBER,
    status: 'new',
  };
}

/** Makes a bank account the one that payouts go to, in place of the one before. */
export function setBankAccount(work: Work, account: AccountRecord, bank: TestBank): void {
  const api = bankOf(account, bank);
  const [former] = account.api.external_accounts!.data;
  account.api.external_accounts!.data = [api];
  work.put('bank_account', { id: api.id, owner: account.id, api, notes: { behaviour: bank.behaviour } });
  if (former) {
    work.remove('bank_account', former.id);
    work.emit('account.external_account.deleted', former, account.id);
  }
  work.emit('account.external_account.created', api, account.id);
}

function setCapabilities(
  work: Work,
  account: AccountRecord,
  status: 'active' | 'inactive' | 'pending',
): void {
  const capabilities = account.api.capabilities ?? {};
  for (const name of Object.keys(capabilities) as CapabilityName[]) {
    if (capabilities[name] === status) continue;
    capabilities[name] = status;
    work.emit('capability.updated', presentCapability(account, name), account.id);
  }
}

/** Takes in what the onboarding form said. With a bank account the details are complete and go to verification. */
export function submitOnboarding(work: Work, accountId: string, details: OnboardingDetails): void {
  const account = requireAccount(work, accountId);
  const { api } = account;
  api.company = { ...api.company, name: details.businessName };
  api.business_profile!.name ??= details.businessName;
  if (details.bank) {
    const wasActive = api.payouts_enabled;
    setBankAccount(work, account, details.bank);
    api.details_submitted = true;
    api.business_type ??= 'company';
    api.business_profile!.product_description ??= 'Concrete cutting';
    api.tos_acceptance = { date: work.now(), ip: '127.0.0.1', user_agent: null };
    if (!wasActive) {
      api.requirements!.pending_verification = ['company.verification.document'];
      work.schedule('verification', accountId, work.now() + work.settings().verificationSeconds);
    }
    refreshRequirements(account);
    if (!wasActive) setCapabilities(work, account, 'pending');
  } else {
    refreshRequirements(account);
  }
  work.emit('account.updated', api, accountId);
}

/** Verification went well: money may now be transferred and paid out. */
export function onVerification(work: Work, accountId: string): void {
  if (!work.get('account', accountId)) return;
  const account = requireAccount(work, accountId);
  account.api.requirements!.pending_verification = [];
  account.api.payouts_enabled = true;
  account.api.charges_enabled = account.api.capabilities?.card_payments !== undefined;
  refreshRequirements(account);
  setCapabilities(work, account, 'active');
  work.emit('account.updated', account.api, accountId);
}

/** The provider asks for something again and stops the account until it comes: onboarding has lapsed. */
export function restrictAccount(work: Work, accountId: string): void {
  const account = requireAccount(work, accountId);
  const { api } = account;
  work.unschedule('verification', accountId);
  api.payouts_enabled = false;
  api.charges_enabled = false;
  api.details_submitted = false;
  refreshRequirements(account);
  api.requirements!.past_due = [...(api.requirements!.currently_due ?? [])];
  setCapabilities(work, account, 'inactive');
  work.emit('account.updated', api, accountId);
}

/** The bank refused a payout: nothing more is sent there until it is replaced. */
export function markBankErrored(work: Work, accountId: string, bankId: string): void {
  if (!work.get('bank_account', bankId)) return;
  const account = requireAccount(work, accountId);
  const bank = work.edit('bank_account', bankId);
  bank.api.status = 'errored';
  account.api.external_accounts!.data = [structuredClone(bank.api)];
  account.api.payouts_enabled = false;
  refreshRequirements(account);
  work.emit('account.external_account.updated', bank.api, accountId);
  work.emit('account.updated', account.api, accountId);
}
