import { Inject, Injectable, type OnApplicationBootstrap } from '@nestjs/common';
import { CONFIG, type Config } from '../platform/config/config.ts';
import { UnitOfWork } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { JobQueue } from '../platform/jobs/job-queue.ts';
import { STRIPE, type StripeClient } from '../platform/stripe/stripe-client.ts';
import {
  EVENT_BY_ID,
  EVENT_DONE,
  EVENT_PARKED,
  INSERT_EVENT,
  LAST_EVENT_CREATED,
} from './stripe-events.queries.ts';

/** What a handler needs of an event: never its payload's state, only which object to look at again. */
export interface ProviderEvent {
  id: string;
  type: string;
  objectId: string;
  account: string | null;
}

type EventHandler = (event: ProviderEvent) => Promise<void>;

/** The event's object is not ours to know yet (the reply that names it is still being recorded): park and try again. */
export class NotYet extends Error {}

/** Which of the two endpoints an event came in by; each has its own secret. */
export type Endpoint = 'account' | 'connect';

/**
 * The inbox: an event is verified on the raw body, stored once, answered at once, and handled by the job runner, which
 * reads the object again at the provider. Duplicates and any order are harmless.
 */
@Injectable()
export class StripeEvents implements OnApplicationBootstrap {
  private readonly handlers = new Map<string, EventHandler>();

  constructor(
    private readonly uow: UnitOfWork,
    private readonly jobs: JobQueue,
    @Inject(STRIPE) private readonly stripe: StripeClient,
    @Inject(CONFIG) private readonly config: Config,
  ) {}

  async onApplicationBootstrap(): Promise<void> {
    await this.jobs.work('stripe_event', ({ eventId }) => this.handle(eventId), 2);
  }

  on(types: string[], handler: EventHandler): void {
    for (const type of types) this.handlers.set(type, handler);
  }

  /**
   * Verify and store one delivery.
   * @throws AppError bad_signature; nothing is stored then
   */
  async receive(
    endpoint: Endpoint,
    rawBody: Buffer | undefined,
    signature: string | undefined,
  ): Promise<void> {
    const secret =
      endpoint === 'account' ? this.config.stripe.webhookSecret : this.config.stripe.connectWebhookSecret;
    const event = this.verify(rawBody, signature, secret);
    // An account's events name it; one that comes in by the other endpoint is somebody posing and is never stored.
    const isConnect = typeof event.account === 'string';
    if (isConnect !== (endpoint === 'connect')) return;
    await this.store(event);
  }

  /** Fetch what the webhook may have missed, from a little before the newest event known. */
  async poll(): Promise<void> {
    const row = await this.uow.row<{ created: Date | null }>(null, LAST_EVENT_CREATED);
    const overlapSeconds = 600;
    const since = row?.created == null ? 0 : Math.floor(row.created.getTime() / 1000) - overlapSeconds;
    for await (const event of this.stripe.events.list({ limit: 100, created: { gte: since } })) {
      if (event.account == null) await this.store(event);
    }
  }

  /** Handle one stored event; throws to be tried again. */
  async handle(eventId: string): Promise<void> {
    const row = await this.uow.row<{
      id: string;
      type: string;
      account: string | null;
      payload: { objectId: string };
      status: string;
    }>(null, EVENT_BY_ID, [eventId]);
    if (row === null || row.status === 'processed' || row.status === 'ignored') return;
    const handler = this.handlers.get(row.type);
    try {
      if (handler !== undefined) {
        await handler({ id: row.id, type: row.type, objectId: row.payload.objectId, account: row.account });
      }
      const status = handler === undefined ? 'ignored' : 'processed';
      await this.uow.run((tx) => this.uow.rows(tx, EVENT_DONE, [eventId, status]));
    } catch (error) {
      await this.uow.run((tx) => this.uow.rows(tx, EVENT_PARKED, [eventId, String(error).slice(0, 500)]));
      throw error;
    }
  }

  private verify(rawBody: Buffer | undefined, signature: string | undefined, secret: string) {
    if (rawBody === undefined || signature === undefined) throw new AppError('bad_signature');
    try {
      return this.stripe.webhooks.constructEvent(rawBody, signature, secret);
    } catch {
      throw new AppError('bad_signature');
    }
  }

  private async store(event: {
    id: string;
    type: string;
    account?: string | null;
    created: number;
    data: { object: object };
  }): Promise<void> {
    const objectId = (event.data.object as { id?: string }).id ?? '';
    await this.uow.run(async (tx) => {
      const stored = await this.uow.row(tx, INSERT_EVENT, [
        event.id,
        event.type,
        event.account ?? null,
        new Date(event.created * 1000),
        JSON.stringify({ objectId }),
      ]);
      if (stored !== null) await this.jobs.send(tx, 'stripe_event', { eventId: event.id });
    });
  }
}
