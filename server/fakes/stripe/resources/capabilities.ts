import type { Stripe } from 'stripe';
import { resourceMissing } from '../errors.ts';
import { wholeList } from '../lists.ts';
import { params } from '../params.ts';
import { PLATFORM } from '../records.ts';
import type { Kinds } from '../records.ts';
import { route } from '../router.ts';
import type { Work } from '../work.ts';

export type CapabilityName = 'card_payments' | 'transfers';

/** A capability as an object of its own, made from what the account says of it. */
export function presentCapability(account: Kinds['account'], name: CapabilityName): Stripe.Capability {
  const status = account.api.capabilities?.[name];
  const requirements = account.api.requirements!;
  const isPending = (requirements.pending_verification ?? []).length > 0;
  const due = requirements.currently_due ?? [];
  return {
    id: name,
    object: 'capability',
    account: account.id,
    future_requirements: { ...blankRequirements() },
    requested: status !== undefined,
    requested_at: status === undefined ? null : (account.api.created ?? 0),
    requirements: {
      ...blankRequirements(),
      currently_due: [...due],
      eventually_due: [...due],
      past_due: [...(requirements.past_due ?? [])],
      pending_verification: [...(requirements.pending_verification ?? [])],
      disabled_reason: due.length > 0 ? 'requirements.fields_needed' : isPending ? 'pending.review' : null,
    },
    status: status ?? 'unrequested',
  };
}

function blankRequirements(): Stripe.Capability.Requirements {
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

function requireConnected(work: Work, id: string): Kinds['account'] {
  return work.require('account', id, PLATFORM, { noun: 'account' });
}

export const capabilityRoutes = [
  route(
    'GET /v1/accounts/:id/capabilities',
    'AccountListCapabilitiesParams',
    params({}),
    ({ work, path }) => {
      const account = requireConnected(work, path['id']!);
      const names = Object.keys(account.api.capabilities ?? {}) as CapabilityName[];
      return wholeList(
        `/v1/accounts/${account.id}/capabilities`,
        names.map((name) => presentCapability(account, name)),
      );
    },
  ),
  route(
    'GET /v1/accounts/:id/capabilities/:capability',
    'AccountRetrieveCapabilityParams',
    params({}),
    ({ work, path }) => {
      const account = requireConnected(work, path['id']!);
      const name = path['capability']!;
      if (name !== 'card_payments' && name !== 'transfers') throw resourceMissing('capability', name);
      return presentCapability(account, name);
    },
  ),
];
