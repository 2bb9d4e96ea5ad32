import type { Stripe } from 'stripe';
import { isLoopbackUrl } from '../config.ts';
import type { SeededWebhook } from '../config.ts';
import { newId, newSecret } from '../ids.ts';
import { pageOf } from '../lists.ts';
import { clearable, flag, mergeMetadata, metadata, pagingParams, params, text, textList } from '../params.ts';
import { PLATFORM } from '../records.ts';
import type { Kinds } from '../records.ts';
import { route } from '../router.ts';
import { API_VERSION } from '../work.ts';
import type { Work } from '../work.ts';

type EndpointRecord = Kinds['webhook_endpoint'];

/** The stand-in sends nothing beyond this machine. */
const localUrl = text.refine(isLoopbackUrl, 'a webhook of the local stand-in must stay on this machine');

const createParams = params({
  url: localUrl,
  enabled_events: textList.min(1),
  api_version: text.optional(),
  connect: flag.default(false),
  description: clearable.optional(),
  metadata: metadata.optional(),
});

interface EndpointInput {
  url: string;
  enabledEvents: string[];
  secret: string;
  connect: boolean;
  description?: string | null;
  metadata?: Record<string, string>;
  apiVersion?: string;
}

function createEndpoint(work: Work, input: EndpointInput): EndpointRecord {
  const api: Stripe.WebhookEndpoint = {
    id: newId('webhook_endpoint'),
    object: 'webhook_endpoint',
    api_version: input.apiVersion ?? API_VERSION,
    application: null,
    created: work.now(),
    description: input.description ?? null,
    enabled_events: input.enabledEvents,
    livemode: false,
    metadata: input.metadata ?? {},
    status: 'enabled',
    url: input.url,
  };
  const notes = { secret: input.secret, connect: input.connect };
  return work.put('webhook_endpoint', { id: api.id, owner: PLATFORM, api, notes });
}

/** Makes sure the endpoints named at the start exist, with the secrets given now. */
export function seedEndpoints(work: Work, seeds: readonly SeededWebhook[]): void {
  const existing = work.list('webhook_endpoint', PLATFORM);
  for (const seed of seeds) {
    const found = existing.find(({ api, notes }) => api.url === seed.url && notes.connect === seed.connect);
    if (!found) createEndpoint(work, { ...seed, enabledEvents: ['*'] });
    else if (found.notes.secret !== seed.secret)
      work.edit('webhook_endpoint', found.id).notes.secret = seed.secret;
  }
}

function requireEndpoint(work: Work, id: string): EndpointRecord {
  work.require('webhook_endpoint', id, PLATFORM, { noun: 'webhook endpoint' });
  return work.edit('webhook_endpoint', id);
}

export const webhookEndpointRoutes = [
  route(
    'POST /v1/webhook_endpoints',
    'WebhookEndpointCreateParams',
    createParams,
    ({ work, params: input }) => {
      const secret = newSecret('whsec');
      const endpoint = createEndpoint(work, {
        url: input.url,
        enabledEvents: input.enabled_events,
        secret,
        connect: input.connect,
        description: input.description || null,
        metadata: mergeMetadata({}, input.metadata),
        ...(input.api_version !== undefined && { apiVersion: input.api_version }),
      });
      // Only this answer ever shows the secret.
      return { ...endpoint.api, secret };
    },
  ),
  route('GET /v1/webhook_endpoints', 'WebhookEndpointListParams', pagingParams, ({ work, params: wanted }) =>
    pageOf(work, 'webhook_endpoint', { owner: PLATFORM, url: '/v1/webhook_endpoints', request: wanted }),
  ),
  route(
    'GET /v1/webhook_endpoints/:id',
    'WebhookEndpointRetrieveParams',
    params({}),
    ({ work, path }) => requireEndpoint(work, path['id']!).api,
  ),
  route(
    'POST /v1/webhook_endpoints/:id',
    'WebhookEndpointUpdateParams',
    params({
      url: localUrl.optional(),
      enabled_events: textList.min(1).optional(),
      disabled: flag.optional(),
      description: clearable.optional(),
      metadata: metadata.optional(),
    }),
    ({ work, path, params: change }) => {
      const { api } = requireEndpoint(work, path['id']!);
      if (change.url !== undefined) api.url = change.url;
      if (change.enabled_events !== undefined) api.enabled_events = change.enabled_events;
      if (change.disabled !== undefined) api.status = change.disabled ? 'disabled' : 'enabled';
      if (change.description !== undefined) api.description = change.description || null;
      api.metadata = mergeMetadata(api.metadata, change.metadata);
      return api;
    },
  ),
  route('DELETE /v1/webhook_endpoints/:id', 'WebhookEndpointDeleteParams', params({}), ({ work, path }) => {
    const { id } = requireEndpoint(work, path['id']!);
    work.remove('webhook_endpoint', id);
    return { id, object: 'webhook_endpoint', deleted: true };
  }),
];
