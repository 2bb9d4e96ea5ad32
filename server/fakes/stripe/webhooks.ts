import { createHmac } from 'node:crypto';
import { request as httpRequest } from 'node:http';
import { request as httpsRequest } from 'node:https';
import type { Clock } from './clock.ts';
import type { Delivery } from './records.ts';
import type { Work } from './work.ts';

/** Seconds to wait after each failed attempt, about three days in all; then the delivery is given up. */
const RETRY_AFTER_SECONDS = [2, 10, 60, 600, 3600, 10_800, 21_600, 43_200, 86_400, 86_400];
const ATTEMPT_TIMEOUT_MS = 10_000;
const MAX_IN_FLIGHT = 8;

/** `t=…,v1=…` over the raw body (docs.stripe.com/webhooks/signature). `unixSeconds` is the machine's own time. */
export function signatureHeader(rawBody: string, secret: string, unixSeconds: number): string {
  const signature = createHmac('sha256', secret).update(`${unixSeconds}.${rawBody}`).digest('hex');
  return `t=${unixSeconds},v1=${signature}`;
}

interface Attempt {
  delivery: Delivery;
  url: string;
  rawBody: string;
  secret: string;
}

/** Posts one event; resolves with the status, or with the reason there was none. */
async function post(attempt: Attempt): Promise<{ isDelivered: boolean; status: string }> {
  const send = attempt.url.startsWith('https:') ? httpsRequest : httpRequest;
  return new Promise((resolve) => {
    const request = send(
      attempt.url,
      {
        method: 'POST',
        timeout: ATTEMPT_TIMEOUT_MS,
        agent: false,
        headers: {
          'Content-Type': 'application/json; charset=utf-8',
          'Content-Length': Buffer.byteLength(attempt.rawBody),
          'User-Agent': 'Stripe/1.0 (local stand-in)',
          'Stripe-Signature': signatureHeader(attempt.rawBody, attempt.secret, Math.floor(Date.now() / 1000)),
        },
      },
      (response) => {
        response.resume();
        const status = response.statusCode ?? 0;
        resolve({ isDelivered: status >= 200 && status < 300, status: String(status) });
      },
    );
    request.on('timeout', () => request.destroy(new Error('timeout')));
    request.on('error', (error: NodeJS.ErrnoException) =>
      resolve({ isDelivered: false, status: error.code ?? error.message }),
    );
    request.end(attempt.rawBody);
  });
}

/** Sends due deliveries, a few at a time, and plans the next attempt of those that fail. */
export class WebhookDispatcher {
  private readonly open = new Set<string>();
  private readonly inFlight = new Set<string>();
  private wakeUp: NodeJS.Timeout | null = null;
  private isClosed = false;

  constructor(
    private readonly clock: Clock,
    private readonly transact: <T>(work: (work: Work) => T) => T,
  ) {}

  /** Takes up what an earlier run of the program left undelivered. */
  resume(): void {
    const left = this.transact((work) =>
      work.list('delivery', null).filter((one) => one.state === 'pending'),
    );
    this.enqueue(left.reverse().map((delivery) => delivery.id));
  }

  enqueue(deliveryIds: readonly string[]): void {
    for (const id of deliveryIds) this.open.add(id);
    this.pump();
  }

  /** Forgets all deliveries; attempts already under way end without a trace. */
  clear(): void {
    this.open.clear();
  }

  close(): void {
    this.isClosed = true;
    if (this.wakeUp) clearTimeout(this.wakeUp);
  }

  /** Whether every delivery has been made or given up. */
  isIdle(): boolean {
    return this.open.size === 0;
  }

  /** Sends what is due and sleeps until the next one is. */
  pump(): void {
    if (this.isClosed) return;
    if (this.wakeUp) clearTimeout(this.wakeUp);
    this.wakeUp = null;
    let nextAt = Infinity;
    this.transact((work) => {
      if (work.settings().chaos.isHolding) return;
      for (const id of this.open) {
        if (this.inFlight.size >= MAX_IN_FLIGHT) return;
        if (this.inFlight.has(id)) continue;
        const delivery = work.get('delivery', id);
        if (!delivery || delivery.state !== 'pending') this.open.delete(id);
        else if (delivery.nextAttemptAt > this.clock.now()) nextAt = Math.min(nextAt, delivery.nextAttemptAt);
        else this.start(work, delivery);
      }
    });
    if (nextAt < Infinity) {
      const waitMs = Math.min(Math.max(nextAt - this.clock.now(), 1), 3_600_000);
      this.wakeUp = setTimeout(() => this.pump(), waitMs);
      this.wakeUp.unref();
    }
  }

  private start(work: Work, delivery: Delivery): void {
    const event = work.get('event', delivery.eventId);
    const endpoint = work.get('webhook_endpoint', delivery.endpointId);
    if (!event || !endpoint || endpoint.api.status !== 'enabled') {
      work.edit('delivery', delivery.id).state = 'failed';
      this.open.delete(delivery.id);
      return;
    }
    let { secret } = endpoint.notes;
    const { chaos } = work.settings();
    if (chaos.badSignatures > 0) {
      work.edit('settings', 'settings').chaos.badSignatures -= 1;
      secret = 'whsec_not_the_secret';
    }
    this.inFlight.add(delivery.id);
    const rawBody = JSON.stringify({ ...event.api, pending_webhooks: 1 }, null, 2);
    void post({ delivery, url: endpoint.api.url, rawBody, secret }).then((result) => {
      this.inFlight.delete(delivery.id);
      if (!this.isClosed) this.finish(delivery.id, result);
      this.pump();
    });
  }

  private finish(deliveryId: string, result: { isDelivered: boolean; status: string }): void {
    this.transact((work) => {
      if (!work.get('delivery', deliveryId)) return;
      const delivery = work.edit('delivery', deliveryId);
      delivery.attempts += 1;
      delivery.lastStatus = result.status;
      const waitSeconds = RETRY_AFTER_SECONDS[delivery.attempts - 1];
      if (result.isDelivered) delivery.state = 'delivered';
      else if (waitSeconds === undefined) delivery.state = 'failed';
      else delivery.nextAttemptAt = this.clock.now() + waitSeconds * 1000;
      if (delivery.state !== 'pending') this.open.delete(deliveryId);
    });
  }
}
