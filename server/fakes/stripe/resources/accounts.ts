import type { Stripe } from 'stripe';
import { z } from 'zod';
import { invalidRequest, StripeError } from '../errors.ts';
import { newId } from '../ids.ts';
import { pageOf, wholeList } from '../lists.ts';
import {
  address,
  clearable,
  currency,
  flag,
  integer,
  listParams,
  mergeMetadata,
  metadata,
  params,
  text,
} from '../params.ts';
import { PLATFORM } from '../records.ts';
import type { Kinds } from '../records.ts';
import { route } from '../router.ts';
import type { Work } from '../work.ts';
import { standingOf } from './balance.ts';
import { presentCapability } from './capabilities.ts';
import type { CapabilityName } from './capabilities.ts';

export type AccountRecord = Kinds['account'];

/** What onboarding must bring before anything may be paid out. */
const ONBOARDING_FIELDS = [
  'business_profile.product_description',
  'business_type',
  'company.name',
  'external_account',
  'tos_acceptance.date',
  'tos_acceptance.ip',
];

const capability = z.strictObject({ requested: flag.optional() }).optional();

const shared = {
  business_profile: z
    .strictObject({
      mcc: text.optional(),
      name: clearable.optional(),
      product_description: clearable.optional(),
      support_email: clearable.optional(),
      support_phone: clearable.optional(),
      url: clearable.optional(),
    })
    .optional(),
  business_type: z.enum(['company', 'government_entity', 'individual', 'non_profit']).optional(),
  capabilities: z.strictObject({ card_payments: capability, transfers: capability }).optional(),
  company: z
    .strictObject({ address: address.optional(), name: clearable.optional(), phone: clearable.optional() })
    .optional(),
  default_currency: currency.optional(),
  email: text.optional(),
  metadata: metadata.optional(),
  settings: z
    .strictObject({
      payouts: z
        .strictObject({
          debit_negative_balances: flag.optional(),
          schedule: z
            .strictObject({
              delay_days: z
                .union([z.literal('minimum'), integer.pipe(z.number().min(2).max(730))])
                .optional(),
              interval: z.enum(['daily', 'manual']).optional(),
            })
            .optional(),
          statement_descriptor: clearable.optional(),
        })
        .optional(),
    })
    .optional(),
};

const createParams = params({
  ...shared,
  type: z.enum(['custom', 'express', 'standard']).optional(),
  controller: z
    .strictObject({
      fees: z.strictObject({ payer: z.enum(['account', 'application']) }).optional(),
      losses: z.strictObject({ payments: z.enum(['application', 'stripe']) }).optional(),
      requirement_collection: z.enum(['application', 'stripe']).optional(),
      stripe_dashboard: z.strictObject({ type: z.enum(['express', 'full', 'none']) }).optional(),
    })
    .optional(),
  country: z.literal('US').optional(),
});

const updateParams = params(shared);

type SharedInput = z.output<typeof updateParams>;

function blankAccount(id: string, created: number): Stripe.Account {
  return {
    id,
    object: 'account',
    business_profile: {
      annual_revenue: null,
      estimated_worker_count: null,
      mcc: null,
      minority_owned_business_designation: null,
      name: null,
      product_description: null,
      specified_commercial_transactions_act_url: null,
      support_address: null,
      support_email: null,
      support_phone: null,
      support_url: null,
      url: null,
    },
    business_type: null,
    capabilities: {},
    charges_enabled: false,
    controller: {
      fees: { payer: 'application' },
      is_controller: true,
      losses: { payments: 'application' },
      requirement_collection: 'stripe',
      stripe_dashboard: { type: 'express' },
      type: 'application',
    },
    country: 'US',
    created,
    default_currency: 'usd',
    details_submitted: false,
    email: null,
    external_accounts: wholeList(`/v1/accounts/${id}/external_accounts`, []),
    future_requirements: noRequirements(),
    metadata: {},
    payouts_enabled: false,
    requirements: noRequirements(),
    settings: {
      branding: { icon: null, logo: null, primary_color: null, secondary_color: null },
      card_payments: {
        decline_on: { avs_failure: false, cvc_failure: false },
        statement_descriptor_prefix: null,
        statement_descriptor_prefix_kana: null,
        statement_descriptor_prefix_kanji: null,
      },
      dashboard: { display_name: null, timezone: 'Etc/UTC' },
      payments: {
        statement_descriptor: null,
        statement_descriptor_kana: null,
        statement_descriptor_kanji: null,
        statement_descriptor_prefix_kana: null,
        statement_descriptor_prefix_kanji: null,
      },
      payouts: {
        debit_negative_balances: true,
        schedule: { delay_days: 2, interval: 'daily' },
        statement_descriptor: null,
      },
    },
    tos_acceptance: { date: null, ip: null, user_agent: null },
    type: 'express',
  };
}

function noRequirements(): Stripe.Account.Requirements {
  return {
    alternatives: [],
    current_deadline: null,
    currently_due: [],
    disabled_reason: null,
    errors: [],
    eventually_due: [],
    past_due: [],
    pending_verification: [],
  };
}

/** The platform's own account, made once: ready for everything, paid out only by hand. */
export function createPlatformAccount(work: Work): AccountRecord {
  const api: Stripe.Account = {
    ...blankAccount(newId('account'), work.now()),
    charges_enabled: true,
    payouts_enabled: true,
    details_submitted: true,
    capabilities: { card_payments: 'active', transfers: 'active', us_bank_account_ach_payments: 'active' },
    controller: { type: 'account' },
    type: 'standard',
  };
  api.settings!.payouts!.schedule = { delay_days: 2, interval: 'manual' };
  return work.put('account', { id: api.id, owner: 'itself', api, notes: { hasDetails: true } });
}

function applyInput(api: Stripe.Account, input: SharedInput): void {
  for (const [field, value] of Object.entries(input.business_profile ?? {})) {
    Object.assign(api.business_profile!, { [field]: value || null });
  }
  if (input.company) applyCompany(api, input.company);
  if (input.business_type !== undefined) api.business_type = input.business_type;
  if (input.email !== undefined) api.email = input.email;
  if (input.default_currency !== undefined) api.default_currency = input.default_currency;
  api.metadata = mergeMetadata(api.metadata ?? {}, input.metadata);
  if (input.settings?.payouts) applyPayoutSettings(api, input.settings.payouts);
}

function applyCompany(api: Stripe.Account, company: NonNullable<SharedInput['company']>): void {
  api.company ??= {};
  if (company.name !== undefined) api.company.name = company.name || null;
  if (company.phone !== undefined) api.company.phone = company.phone || null;
  if (company.address) api.company.address = { ...emptyAddress(), ...company.address };
}

type PayoutSettings = NonNullable<NonNullable<SharedInput['settings']>['payouts']>;

function applyPayoutSettings(api: Stripe.Account, change: PayoutSettings): void {
  const current = api.settings!.payouts!;
  const { debit_negative_balances: isDebiting, statement_descriptor: descriptor, schedule } = change;
  if (isDebiting !== undefined) current.debit_negative_balances = isDebiting;
  if (descriptor !== undefined) current.statement_descriptor = descriptor || null;
  if (schedule?.interval !== undefined) current.schedule.interval = schedule.interval;
  if (schedule?.delay_days === undefined) return;
  current.schedule.delay_days = schedule.delay_days === 'minimum' ? 2 : schedule.delay_days;
}

function emptyAddress(): Stripe.Address {
  return { city: null, country: null, line1: null, line2: null, postal_code: null, state: null };
}

function requestCapabilities(work: Work, account: AccountRecord, wanted: SharedInput['capabilities']): void {
  for (const [name, { requested } = {}] of Object.entries(wanted ?? {})) {
    const current = account.api.capabilities?.[name as CapabilityName];
    if (requested === undefined || (current !== undefined) === requested) continue;
    const capabilities = account.api.capabilities ?? {};
    if (requested) capabilities[name as CapabilityName] = account.api.payouts_enabled ? 'active' : 'inactive';
    else delete capabilities[name as CapabilityName];
    account.api.capabilities = capabilities;
    work.emit('capability.updated', presentCapability(account, name as CapabilityName), account.id);
  }
}

/** Asks again for whatever onboarding has not brought yet. */
export function refreshRequirements(account: AccountRecord): void {
  const { api } = account;
  const due = ONBOARDING_FIELDS.filter((field) => {
    if (field === 'external_account') return !hasUsableBank(api);
    if (field === 'company.name') return !api.company?.name;
    return !api.details_submitted;
  });
  const requirements = api.requirements!;
  requirements.currently_due = due;
  requirements.eventually_due = [...due];
  requirements.past_due = api.details_submitted ? [...due] : [];
  const isVerifying = (requirements.pending_verification ?? []).length > 0;
  if (due.length > 0) requirements.disabled_reason = 'requirements.past_due';
  else requirements.disabled_reason = isVerifying ? 'requirements.pending_verification' : null;
}

function hasUsableBank(api: Stripe.Account): boolean {
  return (api.external_accounts?.data ?? []).some(
    (bank) => bank.object === 'bank_account' && bank.status !== 'errored',
  );
}

export function requireAccount(work: Work, id: string, param?: string): AccountRecord {
  const account = work.get('account', id);
  if (account && account.owner === PLATFORM) return work.edit('account', id);
  // The provider answers 403 for a path with a foreign account, 400 for a parameter.
  if (param !== undefined)
    throw invalidRequest(`No such account: '${id}'`, { code: 'resource_missing', param });
  throw accountInvalid(id);
}

/** 403 for an account this key may not act for. */
export function accountInvalid(id: string): StripeError {
  return new StripeError(403, {
    type: 'invalid_request_error',
    code: 'account_invalid',
    message: `The provided key does not have access to account '${id}' (or that account does not exist). Application access may have been revoked.`,
  });
}

const create = route('POST /v1/accounts', 'AccountCreateParams', createParams, ({ work, params: input }) => {
  if (input.type !== undefined && input.controller !== undefined) {
    throw invalidRequest(
      'You may not provide the `type` parameter and `controller` parameters simultaneously.',
      {
        param: 'controller',
      },
    );
  }
  const api = blankAccount(newId('account'), work.now());
  if (input.type !== undefined) api.type = input.type;
  if (input.controller) {
    const dashboard = input.controller.stripe_dashboard?.type ?? 'full';
    api.type = dashboard === 'express' ? 'express' : 'none';
    Object.assign(api.controller!, input.controller);
  }
  applyInput(api, input);
  const account = work.put('account', { id: api.id, owner: PLATFORM, api, notes: { hasDetails: false } });
  requestCapabilities(work, account, input.capabilities);
  refreshRequirements(account);
  work.emit('account.updated', api, api.id);
  return api;
});

const update = route(
  'POST /v1/accounts/:id',
  'AccountUpdateParams',
  updateParams,
  ({ work, path, params: change }) => {
    const account = requireAccount(work, path['id']!);
    applyInput(account.api, change);
    requestCapabilities(work, account, change.capabilities);
    refreshRequirements(account);
    work.emit('account.updated', account.api, account.id);
    return account.api;
  },
);

const remove = route('DELETE /v1/accounts/:id', 'AccountDeleteParams', params({}), ({ work, path }) => {
  const account = requireAccount(work, path['id']!);
  const { available, pending } = standingOf(work, account.id);
  if (available.card + available.bank_account + pending.card + pending.bank_account !== 0) {
    throw invalidRequest('This account cannot be deleted because it has a balance that is not zero.');
  }
  work.remove('account', account.id);
  return { id: account.id, object: 'account', deleted: true };
});

export const accountRoutes = [
  create,
  route('GET /v1/accounts', 'AccountListParams', listParams({}), ({ work, params: wanted }) =>
    pageOf(work, 'account', { owner: PLATFORM, url: '/v1/accounts', request: wanted }),
  ),
  route('GET /v1/account', 'AccountRetrieveCurrentParams', params({}), ({ work, owner }) => {
    const id = owner === PLATFORM ? work.settings().platformAccountId : owner;
    return work.edit('account', id).api;
  }),
  route('GET /v1/accounts/:id', 'AccountRetrieveParams', params({}), ({ work, path }) => {
    if (path['id'] === work.settings().platformAccountId) return work.edit('account', path['id']).api;
    return requireAccount(work, path['id']!).api;
  }),
  update,
  remove,
];
