import type { Stripe } from 'stripe';
import { flag, listParams, params, text, textList } from '../params.ts';
import { pageOf } from '../lists.ts';
import type { Kinds } from '../records.ts';
import { route } from '../router.ts';
import type { Work } from '../work.ts';

/** Events can be listed for 30 days (docs.stripe.com/api/events). */
export const EVENT_LIFE_SECONDS = 30 * 86_400;

function undelivered(work: Work, eventId: string): number {
  return work.list('delivery', eventId).filter((one) => one.state === 'pending' || one.state === 'withheld')
    .length;
}

function presentEvent(work: Work, event: Kinds['event']): Stripe.Event {
  return { ...event.api, pending_webhooks: undelivered(work, event.id) } as Stripe.Event;
}

function isDelivered(work: Work, eventId: string): boolean {
  return work.list('delivery', eventId).every((one) => one.state === 'delivered');
}

export const eventRoutes = [
  route(
    'GET /v1/events',
    'EventListParams',
    listParams({ type: text.optional(), types: textList.optional(), delivery_success: flag.optional() }),
    ({ work, owner, params: wanted }) => {
      const page = pageOf(work, 'event', {
        owner,
        url: '/v1/events',
        request: wanted,
        matches: ({ id, api }) =>
          api.created > work.now() - EVENT_LIFE_SECONDS &&
          (wanted.type === undefined || matchesType(api.type, wanted.type)) &&
          (wanted.types === undefined || wanted.types.includes(api.type)) &&
          (wanted.delivery_success === undefined || isDelivered(work, id) === wanted.delivery_success),
      });
      return { ...page, data: page.data.map((api) => presentEvent(work, work.get('event', api.id)!)) };
    },
  ),
  route('GET /v1/events/:id', 'EventRetrieveParams', params({}), ({ work, owner, path }) =>
    presentEvent(work, work.require('event', path['id']!, owner, { noun: 'event' })),
  ),
];

/** A type by name, or a group such as `charge.*`. */
function matchesType(type: string, wanted: string): boolean {
  return wanted.endsWith('*') ? type.startsWith(wanted.slice(0, -1)) : type === wanted;
}
