import { timingSafeEqual } from 'node:crypto';
import type { IncomingMessage, ServerResponse } from 'node:http';
import { readBody } from '../shared/http.ts';
import { errorAnswer, invalidRequest, StripeError, unauthorized } from './errors.ts';
import { expandAnswer } from './expand.ts';
import { takeFault } from './faults.ts';
import { decodeForm } from './form-encoding.ts';
import type { FormValue } from './form-encoding.ts';
import { findSavedAnswer, hashRequest, keyInUse, savedAnswerId } from './idempotency.ts';
import { newId } from './ids.ts';
import { parseParams } from './params.ts';
import type { Fault } from './records.ts';
import { PLATFORM } from './records.ts';
import { accountInvalid } from './resources/accounts.ts';
import { findRoute } from './router.ts';
import type { Match } from './router.ts';
import { API_ROUTES } from './routes.ts';
import type { StandIn } from './stand-in.ts';
import { API_VERSION } from './work.ts';
import type { Work } from './work.ts';

interface Answer {
  status: number;
  body: string;
  isReplay: boolean;
  originalRequestId?: string;
  headers?: Record<string, string>;
}

/** One request on its way through. */
interface Exchange {
  method: string;
  path: string;
  params: Record<string, FormValue>;
  owner: string;
  requestId: string;
  /** Only POST takes keys. */
  idempotencyKey: string | null;
  fault: Fault | null;
}

class DroppedConnection extends Error {}

/** The API side of the stand-in. */
export class ApiHandler {
  private readonly keysInFlight = new Set<string>();
  private requestTimes: number[] = [];

  constructor(private readonly standIn: StandIn) {}

  /** Answers one request below /v1, or cuts the connection when a fault says so. */
  async handle(request: IncomingMessage, response: ServerResponse): Promise<void> {
    const url = new URL(request.url ?? '/', 'http://localhost');
    const exchange: Exchange = {
      method: request.method ?? 'GET',
      path: url.pathname,
      params: {},
      owner: PLATFORM,
      requestId: newId('request'),
      idempotencyKey: null,
      fault: null,
    };
    const answer = await this.answerSafely(request, url, exchange);
    if (answer) this.send(response, exchange, answer);
    else request.socket.destroy();
    this.log(exchange, answer);
  }

  private async answerSafely(request: IncomingMessage, url: URL, exchange: Exchange): Promise<Answer | null> {
    try {
      const body = await readBody(request);
      const encoded = exchange.method === 'POST' ? body : url.search.slice(1);
      exchange.params = decodeForm(encoded);
      return await this.answer(request, exchange);
    } catch (error) {
      if (error instanceof DroppedConnection) return null;
      if (error instanceof StripeError) return toAnswer(error);
      console.error(`payment stand-in: ${exchange.method} ${exchange.path}:`, error);
      return toAnswer(
        new StripeError(500, { type: 'api_error', message: 'The stand-in failed: see its output.' }),
      );
    }
  }

  /** Key, limiter and parameters are checked before the idempotency layer, which therefore never stores them. */
  private async answer(request: IncomingMessage, exchange: Exchange): Promise<Answer> {
    this.authenticate(request);
    exchange.owner = this.ownerOf(request);
    this.standIn.runDueTimers();
    const limited = this.limit();
    if (limited) return limited;
    const match = findRoute(API_ROUTES, exchange.method, exchange.path);
    if (!match) throw unrecognized(exchange);
    exchange.fault = this.standIn.transact((work) => takeFault(work, exchange.method, exchange.path));
    const refused = refuseByFault(exchange.fault);
    if (refused) return refused;
    parseParams(match.route.schema, exchange.params);
    const key = request.headers['idempotency-key'];
    if (exchange.method !== 'POST' || typeof key !== 'string' || key === '') {
      await sleepFor(exchange.fault);
      return this.finish(exchange, this.run(match, exchange, null));
    }
    exchange.idempotencyKey = key;
    return this.answerOnce(match, exchange, key);
  }

  private async answerOnce(match: Match, exchange: Exchange, key: string): Promise<Answer> {
    const savedId = savedAnswerId(exchange.owner, key);
    if (this.keysInFlight.has(savedId)) throw keyInUse(key);
    const hash = hashRequest(exchange.method, exchange.path, exchange.params);
    const saved = findSavedAnswer(this.standIn.read(), savedId, hash);
    if (saved) {
      const { status, body, requestId } = saved;
      return this.finish(exchange, { status, body, isReplay: true, originalRequestId: requestId });
    }
    this.keysInFlight.add(savedId);
    try {
      await sleepFor(exchange.fault);
      return this.finish(exchange, this.run(match, exchange, { savedId, hash }));
    } finally {
      this.keysInFlight.delete(savedId);
    }
  }

  /** Does the work; the answer is saved in the same commit as its effects, so a crash keeps both or neither. */
  private run(match: Match, exchange: Exchange, key: { savedId: string; hash: string } | null): Answer {
    const { fault, requestId } = exchange;
    const cause = { requestId, idempotencyKey: exchange.idempotencyKey };
    const save = (answer: Answer): Answer => {
      if (key) this.save(exchange, key, answer);
      return answer;
    };
    if (fault?.kind === '500' && !fault.hasEffect) return save(serverError());
    try {
      return this.standIn.transact((work) => {
        const answer = this.perform(work, match, exchange);
        if (key) work.put('saved_answer', toSaved(exchange, key, answer, work.now()));
        return answer;
      }, cause);
    } catch (error) {
      if (error instanceof StripeError) return save(toAnswer(error));
      throw error;
    }
  }

  /** The call itself. An error whose effects stay is an answer like any other; all others undo what was done. */
  private perform(work: Work, match: Match, exchange: Exchange): Answer {
    const params = parseParams(match.route.schema, exchange.params) as { expand?: string[] };
    try {
      const { owner } = exchange;
      const result = match.route.run({ work, owner, params: params as never, path: match.path });
      const body = JSON.stringify(expandAnswer(work, result, params.expand), null, 2);
      return exchange.fault?.kind === '500' ? serverError() : { status: 200, body, isReplay: false };
    } catch (error) {
      if (error instanceof StripeError && error.keepsEffects) return toAnswer(error);
      throw error;
    }
  }

  private save(exchange: Exchange, key: { savedId: string; hash: string }, answer: Answer): void {
    this.standIn.transact((work) => work.put('saved_answer', toSaved(exchange, key, answer, work.now())));
  }

  private finish(exchange: Exchange, answer: Answer): Answer {
    if (exchange.fault?.kind === 'drop_after') throw new DroppedConnection();
    return answer;
  }

  private authenticate(request: IncomingMessage): void {
    const header = request.headers.authorization ?? '';
    const given = header.startsWith('Basic ')
      ? (Buffer.from(header.slice(6), 'base64').toString('utf8').split(':')[0] ?? '')
      : header.replace(/^Bearer /, '');
    if (given === '') {
      throw unauthorized(
        "You did not provide an API key. You need to provide your API key in the Authorization header, using Bearer auth (e.g. 'Authorization: Bearer YOUR_SECRET_KEY').",
      );
    }
    if (!isSame(given, this.standIn.config.secretKey)) {
      throw unauthorized(`Invalid API Key provided: ${given.slice(0, 8)}****${given.slice(-4)}`);
    }
  }

  private ownerOf(request: IncomingMessage): string {
    const header = request.headers['stripe-account'];
    if (typeof header !== 'string' || header === '') return PLATFORM;
    const work = this.standIn.read();
    if (header === work.settings().platformAccountId) return PLATFORM;
    if (work.get('account', header)?.owner !== PLATFORM) throw accountInvalid(header);
    return header;
  }

  /** 429 beyond the number of requests a second that the settings allow (docs.stripe.com/rate-limits). */
  private limit(): Answer | null {
    const { requestsPerSecond } = this.standIn.read().settings();
    if (requestsPerSecond === 0) return null;
    const now = Date.now();
    this.requestTimes = this.requestTimes.filter((at) => at > now - 1000);
    if (this.requestTimes.length >= requestsPerSecond) return rateLimited();
    this.requestTimes.push(now);
    return null;
  }

  private send(response: ServerResponse, exchange: Exchange, answer: Answer): void {
    const { idempotencyKey } = exchange;
    response.writeHead(answer.status, {
      'Content-Type': 'application/json',
      'Request-Id': exchange.requestId,
      'Stripe-Version': API_VERSION,
      ...(idempotencyKey !== null && { 'Idempotency-Key': idempotencyKey }),
      ...(answer.isReplay && {
        'Idempotent-Replayed': 'true',
        'Original-Request': answer.originalRequestId ?? '',
      }),
      ...answer.headers,
    });
    response.end(answer.body);
  }

  private log(exchange: Exchange, answer: Answer | null): void {
    this.standIn.logRequest({
      at: new Date(this.standIn.clock.now()).toISOString(),
      requestId: exchange.requestId,
      method: exchange.method,
      path: exchange.path,
      account: exchange.owner,
      idempotencyKey: exchange.idempotencyKey,
      status: answer?.status ?? null,
      isReplay: answer?.isReplay ?? false,
      fault: exchange.fault?.kind ?? null,
      params: exchange.params,
    });
  }
}

function toAnswer(error: StripeError): Answer {
  return { status: error.status, body: JSON.stringify(errorAnswer(error), null, 2), isReplay: false };
}

function toSaved(exchange: Exchange, key: { savedId: string; hash: string }, answer: Answer, now: number) {
  return {
    id: key.savedId,
    owner: exchange.owner,
    requestHash: key.hash,
    requestId: exchange.requestId,
    status: answer.status,
    body: answer.body,
    createdAt: now,
  };
}

function serverError(): Answer {
  return toAnswer(
    new StripeError(500, {
      type: 'api_error',
      message: 'Sorry! There was an error while talking to one of our backends. Please contact support.',
    }),
  );
}

function rateLimited(): Answer {
  const error = new StripeError(429, {
    type: 'invalid_request_error',
    code: 'rate_limit',
    message: 'Request rate limit exceeded.',
  });
  return { ...toAnswer(error), headers: { 'Stripe-Rate-Limited-Reason': 'global-rate' } };
}

function unrecognized(exchange: Exchange): StripeError {
  const { body } = invalidRequest(
    `Unrecognized request URL (${exchange.method}: ${exchange.path}). Either it does not exist or this stand-in does not play it.`,
  );
  return new StripeError(404, body);
}

/** Faults that answer before anything is looked at, and so leave nothing behind. */
function refuseByFault(fault: Fault | null): Answer | null {
  if (fault?.kind === 'drop_before') throw new DroppedConnection();
  if (fault?.kind === '429') return rateLimited();
  if (fault?.kind !== '409') return null;
  return toAnswer(
    new StripeError(409, {
      type: 'invalid_request_error',
      code: 'lock_timeout',
      message: 'This object cannot be accessed right now because another request is accessing it.',
    }),
  );
}

async function sleepFor(fault: Fault | null): Promise<void> {
  if (fault && fault.delayMs > 0) await new Promise((resolve) => setTimeout(resolve, fault.delayMs));
}

function isSame(left: string, right: string): boolean {
  const [a, b] = [Buffer.from(left), Buffer.from(right)];
  return a.length === b.length && timingSafeEqual(a, b);
}
