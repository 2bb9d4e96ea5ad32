import type { Stripe } from 'stripe';
import { z } from 'zod';
import { newSecret } from '../ids.ts';
import { params, text } from '../params.ts';
import { PLATFORM } from '../records.ts';
import { route } from '../router.ts';
import { requireAccount } from './accounts.ts';

/** The provider's own sample has `expires_at − created` = 300 s (docs.stripe.com/api/account_links). */
const LINK_LIFE_SECONDS = 300;

const createParams = params({
  account: text,
  type: z.enum(['account_onboarding', 'account_update']),
  refresh_url: text,
  return_url: text,
  collect: z.enum(['currently_due', 'eventually_due']).optional(),
  collection_options: z
    .strictObject({
      fields: z.enum(['currently_due', 'eventually_due']).optional(),
      future_requirements: z.enum(['include', 'omit']).optional(),
    })
    .optional(),
});

export const accountLinkRoutes = [
  route('POST /v1/account_links', 'AccountLinkCreateParams', createParams, ({ work, params: input }) => {
    const account = requireAccount(work, input.account, 'account');
    const id = newSecret('alink');
    const api: Stripe.AccountLink = {
      object: 'account_link',
      created: work.now(),
      expires_at: work.now() + LINK_LIFE_SECONDS,
      url: `${work.origin}/onboard/${account.id}/${id}`,
    };
    work.put('account_link', {
      id,
      owner: PLATFORM,
      api,
      notes: {
        account: account.id,
        type: input.type,
        returnUrl: input.return_url,
        refreshUrl: input.refresh_url,
        token: newSecret('visit'),
        usedAt: null,
      },
    });
    return api;
  }),
];
