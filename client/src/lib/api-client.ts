import { errorFromBody, isApiError, offlineError, type ApiError } from './api-error.ts';
import { deviceMs, syncClock } from './clock.ts';
import { confirmGate, proofAskedBy } from './confirm-gate.ts';
import { sessionGate } from './session-gate.ts';
import { readStored, writeStored } from './storage.ts';

/** The only place of the client that calls `fetch` (uploads need progress and use lib/upload.ts on top of this). */
type Method = 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE';
type QueryValue = string | number | boolean | null | undefined | readonly string[];

export interface RequestOptions {
  query?: Record<string, QueryValue>;
  signal?: AbortSignal;
  /** A UUIDv7 made when the form opened (`useFormId`): the same press sent twice creates one thing. */
  idempotencyKey?: string;
  /** `ask` (the default) asks to sign in again in place; `throw` hands the 401 on. */
  whenSignedOut?: 'ask' | 'throw';
}

/** Marks a request as sent by this app: other sites cannot set a header without our consent. */
export const CSRF_HEADER = 'X-Kerfyard';

/** Requests in JSON; each resolves with the body (`undefined` on 204) or rejects with an `ApiError`. */
export const api = {
  get: <T>(path: string, options?: RequestOptions) => request<T>('GET', path, undefined, options),
  post: <T>(path: string, body?: unknown, options?: RequestOptions) =>
    request<T>('POST', path, body, options),
  put: <T>(path: string, body?: unknown, options?: RequestOptions) => request<T>('PUT', path, body, options),
  patch: <T>(path: string, body?: unknown, options?: RequestOptions) =>
    request<T>('PATCH', path, body, options),
  delete: <T>(path: string, options?: RequestOptions) => request<T>('DELETE', path, undefined, options),
};

function request<T>(method: Method, path: string, body: unknown, options: RequestOptions = {}): Promise<T> {
  const attempt = () => withSession(() => send<T>(method, path, body, options), options.whenSignedOut);
  return method === 'GET' ? attempt() : withConfirmation(attempt);
}

/** A sensitive act may ask who one still is: in place, and then the same request goes on. */
async function withConfirmation<T>(attempt: () => Promise<T>): Promise<T> {
  try {
    return await attempt();
  } catch (error) {
    const proof = proofAskedBy(error);
    if (proof === null) throw error;
    await confirmGate.ask(proof).catch(() => Promise.reject(error as ApiError));
    return attempt();
  }
}

/**
 * Run a request; on a 401 refresh the session once and run it again; when that fails too, ask to sign in again over
 * the page and run it again. Nothing typed is lost, because nothing on the page changes.
 */
export async function withSession<T>(
  attempt: () => Promise<T>,
  whenSignedOut: 'ask' | 'throw' = 'ask',
): Promise<T> {
  const startedAt = deviceMs();
  try {
    return await attempt();
  } catch (error) {
    if (!isApiError(error, 'unauthenticated')) throw error;
    const again = await afterRefresh(attempt, startedAt, error);
    if (again.done) return again.value;
    // Someone never signed in on this page has nothing to lose here: the route sends them to the sign-in page.
    if (whenSignedOut === 'throw' || sessionGate.known() === null) throw error;
    await sessionGate.ask().catch(() => Promise.reject(error as ApiError));
    return attempt();
  }
}

type Again<T> = { done: true; value: T } | { done: false };

async function afterRefresh<T>(
  attempt: () => Promise<T>,
  startedAt: number,
  original: ApiError,
): Promise<Again<T>> {
  if (!(await refreshSession(startedAt, original))) return { done: false };
  try {
    return { done: true, value: await attempt() };
  } catch (error) {
    if (isApiError(error, 'unauthenticated')) return { done: false };
    throw error;
  }
}

const REFRESHED_AT = 'kerfyard.refreshed-at';
let refreshing: Promise<boolean> | null = null;

/**
 * Rotate the session's cookies: one flight per tab (the shared promise) and one across tabs (a web lock; a tab that
 * waited for the lock finds the newer time in storage and does not rotate again).
 * @param since the time the failed request began; a refresh after it counts
 */
export function refreshSession(since: number = deviceMs(), original?: ApiError): Promise<boolean> {
  refreshing ??= locked(async () => {
    if (Number(readStored('localStorage', REFRESHED_AT)) > since) return true;
    try {
      await send('POST', '/api/auth/refresh', undefined, {});
      writeStored('localStorage', REFRESHED_AT, String(deviceMs()));
      return true;
    } catch (error) {
      // Only a clear "no" ends the session; a lost line or a busy server says nothing about it.
      if (isApiError(error) && (error.status === 401 || error.status === 403)) return false;
      throw original ?? error;
    }
  }).finally(() => {
    refreshing = null;
  });
  return refreshing;
}

function locked<T>(work: () => Promise<T>): Promise<T> {
  // Not every browser mode offers web locks (they need a secure context); the server's grace period covers the rest.
  const { locks } = navigator as { locks?: LockManager | null };
  if (locks === undefined || locks === null) return work();
  return locks.request('kerfyard.refresh', work) as Promise<T>;
}

async function send<T>(method: Method, path: string, body: unknown, options: RequestOptions): Promise<T> {
  const headers = new Headers({ Accept: 'application/json' });
  if (method !== 'GET') headers.set(CSRF_HEADER, '1');
  if (body !== undefined) headers.set('Content-Type', 'application/json');
  if (options.idempotencyKey !== undefined) headers.set('Idempotency-Key', options.idempotencyKey);
  const init: RequestInit = { method, headers, credentials: 'same-origin' };
  if (body !== undefined) init.body = JSON.stringify(body);
  if (options.signal !== undefined) init.signal = options.signal;

  const response = await fetch(withQuery(path, options.query), init).catch((error: unknown) => {
    if (error instanceof DOMException && error.name === 'AbortError') throw error;
    throw offlineError();
  });
  syncClock(response.headers.get('Date'));
  const answer = await readBody(response);
  if (!response.ok) throw errorFromBody(response.status, answer);
  return answer as T;
}

async function readBody(response: Response): Promise<unknown> {
  const text = await response.text().catch(() => {
    throw offlineError();
  });
  if (text === '') return undefined;
  try {
    return JSON.parse(text) as unknown;
  } catch {
    return undefined;
  }
}

function withQuery(path: string, query: RequestOptions['query']): string {
  if (query === undefined) return path;
  const parameters = new URLSearchParams();
  for (const [name, value] of Object.entries(query)) {
    if (value === undefined || value === null || value === '') continue;
    for (const item of Array.isArray(value) ? value : [value]) parameters.append(name, String(item));
  }
  const text = parameters.toString();
  return text === '' ? path : `${path}?${text}`;
}
