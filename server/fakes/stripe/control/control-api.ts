import type { IncomingMessage, ServerResponse } from 'node:http';
import { z } from 'zod';
import { readBody, sendJson } from '../../shared/http.ts';
import { StripeError } from '../errors.ts';
import { newSecret } from '../ids.ts';
import { PLATFORM } from '../records.ts';
import type { StandIn } from '../stand-in.ts';
import { OUTCOMES } from './outcomes.ts';
import { onboardParams, onboardWithoutBrowser, payParams, payWithoutBrowser } from './without-browser.ts';

const count = z.number().int().min(0);

const clockParams = z.strictObject({
  seconds: count.optional(),
  hours: count.optional(),
  days: count.optional(),
});

const faultParams = z.strictObject({
  kind: z.enum(['drop_before', 'drop_after', 'delay', '500', '429', '409']),
  /** A path such as /v1/transfers, or all below it with a * at the end. */
  path: z.string().startsWith('/v1'),
  method: z.enum(['GET', 'POST', 'DELETE']).optional(),
  count: count.min(1).default(1),
  delayMs: count.max(600_000).default(0),
  hasEffect: z.boolean().default(false),
  percent: count.min(1).max(100).default(100),
});

const settingsParams = z.strictObject({
  cardSettlement: z.enum(['instant', 'live']).optional(),
  bankDebits: z.enum(['instant', 'live']).optional(),
  verificationSeconds: count.optional(),
  partialBankRefunds: z.enum(['allow', 'refuse']).optional(),
  isDisputeFeeReturned: z.boolean().optional(),
  requestsPerSecond: count.optional(),
});

const chaosParams = z.strictObject({
  duplicates: count.max(10).optional(),
  reorderWithinMs: count.optional(),
  delayMs: count.optional(),
  isHolding: z.boolean().optional(),
  badSignatures: count.optional(),
  withholdPercent: count.max(100).optional(),
});

const outcomeParams = z.strictObject({
  action: z.enum(Object.keys(OUTCOMES) as [string, ...string[]]),
  id: z.string(),
  reason: z.string().optional(),
});

type Handler = (standIn: StandIn, body: unknown) => unknown;

function omitUndefined<T extends object>(value: T): Partial<T> {
  return Object.fromEntries(Object.entries(value).filter(([, item]) => item !== undefined)) as Partial<T>;
}

const advanceClock: Handler = (standIn, body) => {
  const { seconds = 0, hours = 0, days = 0 } = clockParams.parse(body);
  standIn.advance((seconds + hours * 3600 + days * 86_400) * 1000);
  return readClock(standIn, null);
};

const readClock: Handler = (standIn) => ({
  now: new Date(standIn.clock.now()).toISOString(),
  offsetSeconds: standIn.clock.offsetMs / 1000,
});

const addFault: Handler = (standIn, body) => {
  const { method, count: remaining, ...fault } = faultParams.parse(body);
  return standIn.transact((work) =>
    work.put('fault', {
      id: newSecret('fault'),
      owner: PLATFORM,
      method: method ?? null,
      remaining,
      ...fault,
    }),
  );
};

const clearFaults: Handler = (standIn) => {
  standIn.transact((work) => work.list('fault', PLATFORM).forEach((fault) => work.remove('fault', fault.id)));
  return { faults: [] };
};

const changeSettings: Handler = (standIn, body) => {
  const change = omitUndefined(settingsParams.parse(body));
  return standIn.transact((work) => Object.assign(work.edit('settings', 'settings'), change));
};

const changeChaos: Handler = (standIn, body) => {
  const change = omitUndefined(chaosParams.parse(body));
  const chaos = standIn.transact((work) => Object.assign(work.edit('settings', 'settings').chaos, change));
  standIn.dispatcher.pump();
  return chaos;
};

const pressOutcome: Handler = (standIn, body) => {
  const { action, id, reason } = outcomeParams.parse(body);
  standIn.transact((work) => OUTCOMES[action]!.run(work, id, reason));
  return { done: true };
};

const resendEvent: Handler = (standIn, body) => {
  const { event } = z.strictObject({ event: z.string() }).parse(body);
  const deliveries = standIn.transact((work) =>
    work.list('delivery', event).map(({ id }) => {
      const delivery = work.edit('delivery', id);
      delivery.state = 'pending';
      delivery.attempts = 0;
      delivery.nextAttemptAt = standIn.clock.now();
      return id;
    }),
  );
  standIn.dispatcher.enqueue(deliveries);
  return { resent: deliveries.length };
};

const resetState: Handler = (standIn) => {
  standIn.reset();
  return { done: true };
};

const HANDLERS: Record<string, Handler> = {
  'GET /_fake/health': () => ({ ok: true }),
  'GET /_fake/clock': readClock,
  'POST /_fake/clock/advance': advanceClock,
  'GET /_fake/faults': (standIn) => ({ faults: standIn.read().list('fault', PLATFORM).reverse() }),
  'POST /_fake/faults': addFault,
  'DELETE /_fake/faults': clearFaults,
  'GET /_fake/settings': (standIn) => standIn.read().settings(),
  'POST /_fake/settings': changeSettings,
  'POST /_fake/webhooks': changeChaos,
  'GET /_fake/webhooks/idle': (standIn) => ({ isIdle: standIn.dispatcher.isIdle() }),
  'POST /_fake/webhooks/resend': resendEvent,
  'POST /_fake/outcomes': pressOutcome,
  'POST /_fake/reset': resetState,
  'GET /_fake/requests': (standIn) => ({ requests: [...standIn.requestLog].reverse() }),
  'DELETE /_fake/requests': (standIn) => ({ requests: (standIn.requestLog.length = 0) }),
  'POST /_fake/pay': (standIn, body) => payWithoutBrowser(standIn, payParams.parse(body)),
  'POST /_fake/onboard': (standIn, body) => onboardWithoutBrowser(standIn, onboardParams.parse(body)),
};

/** Answers one request below /_fake. Bodies and answers are JSON; unknown fields are refused with 400. */
export async function handleControl(
  standIn: StandIn,
  request: IncomingMessage,
  response: ServerResponse,
): Promise<void> {
  const { pathname } = new URL(request.url ?? '/', 'http://localhost');
  const handler = HANDLERS[`${request.method ?? 'GET'} ${pathname}`];
  if (!handler) return sendJson(response, 404, { error: 'no such control', controls: Object.keys(HANDLERS) });
  try {
    const body = await readBody(request);
    standIn.runDueTimers();
    sendJson(response, 200, handler(standIn, body === '' ? {} : JSON.parse(body)));
  } catch (error) {
    if (error instanceof z.ZodError) return sendJson(response, 400, { error: z.prettifyError(error) });
    if (error instanceof SyntaxError) return sendJson(response, 400, { error: 'the body is not JSON' });
    if (error instanceof StripeError) return sendJson(response, error.status, { error: error.body });
    throw error;
  }
}
