import { randomInt } from 'node:crypto';
import type { Stripe } from 'stripe';
import type { Clock } from './clock.ts';
import { resourceMissing } from './errors.ts';
import { newId } from './ids.ts';
import { PLATFORM } from './records.ts';
import type { Delivery, Kind, Kinds, Settings, SourceType } from './records.ts';
import { Transaction } from './store.ts';
import type { Store } from './store.ts';

export const API_VERSION = '2026-10-28.endive';

/** The call that causes a change; null for what happens by itself. */
export interface Cause {
  requestId: string | null;
  idempotencyKey: string | null;
}

/** What a resource works with: a transaction, the time, and the two things a change can set off. */
export class Work extends Transaction {
  /** Deliveries made on the way; the dispatcher takes them after the commit. */
  readonly newDeliveries: string[] = [];

  constructor(
    store: Store,
    private readonly clock: Clock,
    readonly origin: string,
    private readonly cause: Cause = { requestId: null, idempotencyKey: null },
  ) {
    super(store);
  }

  /** Seconds of the stand-in's clock. */
  now(): number {
    return this.clock.seconds();
  }

  settings(): Settings {
    const settings = this.get('settings', 'settings');
    if (!settings) throw new Error('the store has no settings');
    return settings;
  }

  /** The record if the owner has it; else the provider's 404, or 400 when the id came as a parameter. */
  require<K extends Kind>(
    kind: K,
    id: string,
    owner: string,
    options: { noun: string; param?: string },
  ): Kinds[K] {
    const record = this.get(kind, id);
    if (!record || record.owner !== owner) throw resourceMissing(options.noun, id, options.param);
    return record;
  }

  /** Plans what happens to `subject` at a time (seconds). Planning the same again replaces the time. */
  schedule(action: string, subject: string, atSeconds: number): void {
    const id = `${action}:${subject}`;
    this.put('timer', { id, owner: PLATFORM, action, subject, dueAt: atSeconds * 1000 });
  }

  unschedule(action: string, subject: string): void {
    this.remove('timer', `${action}:${subject}`);
  }

  /** Records an event about an object as it is now, and its deliveries. Account events go to the connect endpoints. */
  emit(type: string, object: object, owner: string, previous?: Record<string, unknown>): void {
    const event = {
      id: newId('event'),
      object: 'event',
      api_version: API_VERSION,
      created: this.now(),
      data: {
        object: structuredClone(object),
        ...(previous && { previous_attributes: structuredClone(previous) }),
      },
      livemode: false,
      pending_webhooks: 0,
      request: { id: this.cause.requestId, idempotency_key: this.cause.idempotencyKey },
      type,
      ...(owner !== PLATFORM && { account: owner }),
    };
    this.put('event', { id: event.id, owner, api: event as unknown as Stripe.Event, notes: {} });
    for (const endpoint of this.list('webhook_endpoint', PLATFORM)) {
      const { enabled_events: wanted, status } = endpoint.api;
      const isAddressed = endpoint.notes.connect === (owner !== PLATFORM);
      if (status === 'enabled' && isAddressed && (wanted.includes('*') || wanted.includes(type))) {
        this.addDeliveries(event.id, endpoint.id);
      }
    }
  }

  private addDeliveries(eventId: string, endpointId: string): void {
    const { chaos } = this.settings();
    const isWithheld = randomInt(100) < chaos.withholdPercent;
    for (let copy = 0; copy <= (isWithheld ? 0 : chaos.duplicates); copy += 1) {
      const shuffleMs = chaos.reorderWithinMs > 0 ? randomInt(chaos.reorderWithinMs) : 0;
      const delivery: Delivery = {
        id: `${eventId}.${endpointId}.${copy}`,
        owner: eventId,
        eventId,
        endpointId,
        state: isWithheld ? 'withheld' : 'pending',
        attempts: 0,
        nextAttemptAt: this.clock.now() + chaos.delayMs + shuffleMs,
        lastStatus: null,
        isDuplicate: copy > 0,
      };
      this.put('delivery', delivery);
      if (!isWithheld) this.newDeliveries.push(delivery.id);
    }
  }
}

/** The id in a field that may hold an id or a whole object. */
export function idOf(reference: string | { id: string } | null | undefined): string {
  if (!reference) throw new Error('a reference is missing');
  return typeof reference === 'string' ? reference : reference.id;
}

/** Balance side a payment method's money belongs to. */
export function sourceTypeOf(method: Stripe.PaymentMethod): SourceType {
  return method.type === 'us_bank_account' ? 'bank_account' : 'card';
}
