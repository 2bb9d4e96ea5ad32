import { mkdtempSync, rmSync } from 'node:fs';
import { createServer } from 'node:http';
import type { IncomingHttpHeaders, Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import Stripe from 'stripe';
import { startPaymentStandIn } from '../server.ts';
import type { RunningStandIn } from '../server.ts';

export const SECRET_KEY = 'sk_test_stand_in_0001';
export const PLATFORM_SECRET = 'whsec_platform';
export const CONNECT_SECRET = 'whsec_connect';

export interface ReceivedWebhook {
  path: string;
  headers: IncomingHttpHeaders;
  rawBody: string;
  event: Stripe.Event;
}

/** An app's webhook side: keeps what arrives and answers with `status`. */
export class WebhookReceiver {
  readonly received: ReceivedWebhook[] = [];
  status = 200;
  private readonly server: Server;

  constructor() {
    this.server = createServer((request, response) => {
      const chunks: Buffer[] = [];
      request.on('data', (chunk: Buffer) => chunks.push(chunk));
      request.on('end', () => {
        const rawBody = Buffer.concat(chunks).toString('utf8');
        const event = JSON.parse(rawBody) as Stripe.Event;
        this.received.push({ path: request.url ?? '', headers: request.headers, rawBody, event });
        response.writeHead(this.status).end();
      });
    });
  }

  async listen(): Promise<string> {
    await new Promise<void>((resolve) => this.server.listen(0, '127.0.0.1', resolve));
    return `http://127.0.0.1:${(this.server.address() as AddressInfo).port}`;
  }

  types(path: string): string[] {
    return this.received.filter((one) => one.path === path).map((one) => one.event.type);
  }

  async close(): Promise<void> {
    this.server.closeAllConnections();
    await new Promise((resolve) => this.server.close(resolve));
  }
}

export interface Standing {
  available: number;
  pending: number;
}

/** A stand-in on a free port with its own folder, an SDK pointed at it and an app that listens to its webhooks. */
export class Harness {
  readonly receiver = new WebhookReceiver();
  readonly dataDir = mkdtempSync(join(tmpdir(), 'payment-stand-in-'));
  stripe!: Stripe;
  url = '';
  private standIn: RunningStandIn | null = null;
  private appUrl = '';

  async start(): Promise<this> {
    this.appUrl = await this.receiver.listen();
    await this.startStandIn();
    return this;
  }

  async startStandIn(): Promise<void> {
    this.standIn = await startPaymentStandIn({
      host: 'localhost',
      port: 0,
      dataDir: this.dataDir,
      secretKey: SECRET_KEY,
      webhooks: [
        { url: `${this.appUrl}/platform`, secret: PLATFORM_SECRET, connect: false },
        { url: `${this.appUrl}/connect`, secret: CONNECT_SECRET, connect: true },
      ],
    });
    this.url = this.standIn.url;
    this.stripe = this.sdk();
  }

  /** A client of the real SDK. Retries are off unless asked for, so that each answer is seen. */
  sdk(options: { maxNetworkRetries?: number; apiKey?: string; timeout?: number } = {}): Stripe {
    const { apiKey = SECRET_KEY, maxNetworkRetries = 0, ...rest } = options;
    const { hostname: host, port } = new URL(this.url);
    return new Stripe(apiKey, {
      host,
      port: Number(port),
      protocol: 'http',
      maxNetworkRetries,
      telemetry: false,
      ...rest,
    });
  }

  /** Hands every answer that the SDK gets from now on to `onAnswer`. */
  captureAnswers(onAnswer: (request: string, body: Record<string, unknown>) => void): void {
    const capturing: typeof fetch = async (input, init) => {
      const response = await fetch(input, init);
      const body = (await response.clone().json()) as Record<string, unknown>;
      onAnswer(`${init?.method ?? 'GET'} ${String(input)}`, body);
      return response;
    };
    const { hostname: host, port } = new URL(this.url);
    this.stripe = new Stripe(SECRET_KEY, {
      host,
      port: Number(port),
      protocol: 'http',
      maxNetworkRetries: 0,
      telemetry: false,
      httpClient: Stripe.createFetchHttpClient(capturing),
    });
  }

  async stopStandIn(): Promise<void> {
    await this.standIn?.close();
    this.standIn = null;
  }

  async stop(): Promise<void> {
    await this.stopStandIn();
    await this.receiver.close();
    rmSync(this.dataDir, { recursive: true, force: true });
  }

  /** Sends a raw request below /v1, for what the SDK would not send. */
  async raw(method: string, path: string, options: { form?: string; headers?: Record<string, string> } = {}) {
    const response = await fetch(`${this.url}${path}`, {
      method,
      headers: {
        Authorization: `Bearer ${SECRET_KEY}`,
        'Content-Type': 'application/x-www-form-urlencoded',
        ...options.headers,
      },
      ...(options.form !== undefined && { body: options.form }),
    });
    return {
      status: response.status,
      headers: response.headers,
      body: (await response.json()) as Record<string, unknown>,
    };
  }

  /** Calls the control API. Throws when it refuses. */
  async control<T = unknown>(method: 'DELETE' | 'GET' | 'POST', path: string, body?: object): Promise<T> {
    const response = await fetch(`${this.url}/_fake/${path}`, {
      method,
      ...(body && { body: JSON.stringify(body) }),
    });
    const answer = (await response.json()) as T;
    if (!response.ok) throw new Error(`${path}: ${response.status} ${JSON.stringify(answer)}`);
    return answer;
  }

  async advance(step: { seconds?: number; hours?: number; days?: number }): Promise<void> {
    await this.control('POST', 'clock/advance', step);
  }

  async outcome(action: string, id: string, reason?: string): Promise<void> {
    await this.control('POST', 'outcomes', { action, id, ...(reason && { reason }) });
  }

  /** Sends a hosted page's form; does not follow its redirect. */
  async submit(url: string, values: Record<string, string>) {
    const response = await fetch(url, {
      method: 'POST',
      redirect: 'manual',
      body: new URLSearchParams(values),
    });
    return {
      status: response.status,
      location: response.headers.get('location'),
      page: await response.text(),
    };
  }

  /** A connected account that can be paid. */
  async onboardedAccount(
    options: { bankAccountNumber?: string; manualPayouts?: boolean } = {},
  ): Promise<Stripe.Account> {
    const account = await this.stripe.accounts.create({
      type: 'express',
      country: 'US',
      capabilities: { transfers: { requested: true } },
      ...(options.manualPayouts !== false && { settings: { payouts: { schedule: { interval: 'manual' } } } }),
    });
    const { bankAccountNumber } = options;
    await this.control('POST', 'onboard', {
      account: account.id,
      businessName: 'Quarry Lane Cutting',
      ...(bankAccountNumber && { bankAccountNumber }),
    });
    return this.stripe.accounts.retrieve(account.id);
  }

  /** A payment by card token that has gone through; returns its charge. */
  async paidCharge(
    amount: number,
    token = 'pm_card_visa',
    extra: Partial<Stripe.PaymentIntentCreateParams> = {},
  ): Promise<Stripe.Charge> {
    const intent = await this.stripe.paymentIntents.create({
      amount,
      currency: 'usd',
      allowed_payment_method_types: [token.startsWith('pm_usBankAccount') ? 'us_bank_account' : 'card'],
      payment_method: token,
      confirm: true,
      expand: ['latest_charge'],
      ...extra,
    });
    return intent.latest_charge as Stripe.Charge;
  }

  /** A Checkout Session for one job. */
  async session(
    extra: Partial<Stripe.Checkout.SessionCreateParams> = {},
    amount = 1_029_900,
  ): Promise<Stripe.Checkout.Session> {
    return this.stripe.checkout.sessions.create({
      mode: 'payment',
      line_items: [
        {
          quantity: 1,
          price_data: {
            currency: 'usd',
            unit_amount: amount,
            product_data: { name: 'Set aside for one job' },
          },
        },
      ],
      success_url: 'http://127.0.0.1:4000/done?session={CHECKOUT_SESSION_ID}',
      cancel_url: 'http://127.0.0.1:4000/canceled',
      allowed_payment_method_types: ['card', 'us_bank_account'],
      ...extra,
    });
  }

  /** Available and pending cents, of the platform or a connected account. */
  async standing(account?: string): Promise<Standing> {
    const options = account ? { stripeAccount: account } : undefined;
    const { available, pending } = await this.stripe.balance.retrieve({}, options);
    const sum = (parts: Stripe.Balance.Available[]) => parts.reduce((total, part) => total + part.amount, 0);
    return { available: sum(available), pending: sum(pending) };
  }

  /** All balance transactions, newest first. */
  async movements(account?: string): Promise<Stripe.BalanceTransaction[]> {
    const options = account ? { stripeAccount: account } : undefined;
    const list = this.stripe.balanceTransactions.list({ limit: 100 }, options);
    return list.autoPagingToArray({ limit: 10_000 });
  }

  /** the balance is the sum of the movements, side by side, and each movement adds up in itself. */
  async expectBooksToAgree(account?: string): Promise<void> {
    const all = await this.movements(account);
    const sum = (status: string) =>
      all.filter((one) => one.status === status).reduce((total, one) => total + one.net, 0);
    expect(await this.standing(account)).toEqual({ available: sum('available'), pending: sum('pending') });
    expect(all.filter((one) => one.net !== one.amount - one.fee)).toEqual([]);
    const feesOf = (one: Stripe.BalanceTransaction) =>
      one.fee_details.reduce((total, fee) => total + fee.amount, 0);
    expect(all.filter((one) => feesOf(one) !== one.fee)).toEqual([]);
  }

  /** Moves the clock to the next Monday (or stays on one), so that business days are known. */
  async startOnMonday(): Promise<void> {
    const { now } = await this.control<{ now: string }>('GET', 'clock');
    await this.advance({ days: (8 - new Date(now).getUTCDay()) % 7 });
  }

  /** Waits until a condition holds. Throws after `limitMs`. */
  async until(isTrue: () => boolean | Promise<boolean>, what: string, limitMs = 15_000): Promise<void> {
    const end = Date.now() + limitMs;
    while (!(await isTrue())) {
      if (Date.now() > end) throw new Error(`not within ${limitMs} ms: ${what}`);
      await sleep(20);
    }
  }

  /** Waits until an event of a type about an object (or any) has arrived. */
  async webhook(path: 'connect' | 'platform', type: string, objectId?: string): Promise<ReceivedWebhook> {
    const find = () =>
      this.receiver.received.find(
        (one) =>
          one.path === `/${path}` &&
          one.event.type === type &&
          (objectId === undefined || (one.event.data.object as { id?: string }).id === objectId),
      );
    await this.until(() => find() !== undefined, `${type} at ${path}`);
    return find()!;
  }
}

/** The error a promise rejects with. Throws when it does not. */
export async function rejection(promise: Promise<unknown>): Promise<Stripe.errors.StripeError> {
  try {
    await promise;
  } catch (error) {
    return error as Stripe.errors.StripeError;
  }
  throw new Error('expected a refusal');
}
