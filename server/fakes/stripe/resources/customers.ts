import type { Stripe } from 'stripe';
import type { z } from 'zod';
import { newId } from '../ids.ts';
import { pageOf } from '../lists.ts';
import { address, clearable, listParams, mergeMetadata, metadata, params, text } from '../params.ts';
import { route } from '../router.ts';
import type { Kinds } from '../records.ts';
import type { Work } from '../work.ts';

const fields = {
  address: address.optional(),
  description: clearable.optional(),
  email: clearable.optional(),
  metadata: metadata.optional(),
  name: clearable.optional(),
  phone: clearable.optional(),
};

const writeParams = params(fields);

const NO_ADDRESS: Stripe.Address = {
  city: null,
  country: null,
  line1: null,
  line2: null,
  postal_code: null,
  state: null,
};

function apply(api: Stripe.Customer, input: z.output<typeof writeParams>): void {
  const { address: given, metadata: change, description, email, name, phone } = input;
  if (given) api.address = { ...NO_ADDRESS, ...given };
  if (description !== undefined) api.description = description || null;
  if (email !== undefined) api.email = email || null;
  if (name !== undefined) api.name = name || null;
  if (phone !== undefined) api.phone = phone || null;
  api.metadata = mergeMetadata(api.metadata, change);
}

function requireCustomer(work: Work, id: string, owner: string): Kinds['customer'] {
  work.require('customer', id, owner, { noun: 'customer' });
  return work.edit('customer', id);
}

export const customerRoutes = [
  route('POST /v1/customers', 'CustomerCreateParams', writeParams, ({ work, owner, params: input }) => {
    const api: Stripe.Customer = {
      id: newId('customer'),
      object: 'customer',
      address: null,
      balance: 0,
      created: work.now(),
      currency: null,
      default_source: null,
      delinquent: false,
      description: null,
      discount: null,
      email: null,
      invoice_prefix: newId('customer').slice(-8).toUpperCase(),
      invoice_settings: {
        custom_fields: null,
        default_payment_method: null,
        footer: null,
        rendering_options: null,
      },
      livemode: false,
      metadata: {},
      name: null,
      next_invoice_sequence: 1,
      phone: null,
      preferred_locales: [],
      shipping: null,
      tax_exempt: 'none',
      test_clock: null,
    };
    apply(api, input);
    work.put('customer', { id: api.id, owner, api, notes: {} });
    work.emit('customer.created', api, owner);
    return api;
  }),
  route(
    'GET /v1/customers',
    'CustomerListParams',
    listParams({ email: text.optional() }),
    ({ work, owner, params: wanted }) =>
      pageOf(work, 'customer', {
        owner,
        url: '/v1/customers',
        request: wanted,
        matches: ({ api }) => wanted.email === undefined || api.email === wanted.email,
      }),
  ),
  route(
    'GET /v1/customers/:id',
    'CustomerRetrieveParams',
    params({}),
    ({ work, owner, path }) => requireCustomer(work, path['id']!, owner).api,
  ),
  route(
    'POST /v1/customers/:id',
    'CustomerUpdateParams',
    writeParams,
    ({ work, owner, path, params: change }) => {
      const { api } = requireCustomer(work, path['id']!, owner);
      apply(api, change);
      work.emit('customer.updated', api, owner);
      return api;
    },
  ),
  route('DELETE /v1/customers/:id', 'CustomerDeleteParams', params({}), ({ work, owner, path }) => {
    const { id, api } = requireCustomer(work, path['id']!, owner);
    work.remove('customer', id);
    work.emit('customer.deleted', api, owner);
    return { id, object: 'customer', deleted: true };
  }),
];
