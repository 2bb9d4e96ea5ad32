import { randomUUID } from 'node:crypto';
import request, { type Response } from 'supertest';

type Method = 'get' | 'post' | 'put' | 'patch' | 'delete';

export interface SendOptions {
  headers?: Record<string, string>;
  /** Sent with every POST; a fresh one unless given. Null sends none. */
  idempotencyKey?: string | null;
  query?: Record<string, string | number | string[]>;
}

/** Where the app under test listens (set by global-setup.mjs). */
export const baseUrl = (): string => {
  const url = process.env.BASE_URL;
  if (url === undefined) throw new Error('BASE_URL is not set: run by jest with its global setup');
  return url;
};

/**
 * One browser, as far as the API sees it: keeps cookies by hand (agents do not return Secure cookies over http) and
 * sends what the app's own pages send.
 */
export class Client {
  readonly cookies = new Map<string, string>();

  constructor(readonly url: string = baseUrl()) {}

  get = (path: string, options?: SendOptions) => this.send('get', path, undefined, options);
  post = (path: string, body?: object, options?: SendOptions) => this.send('post', path, body, options);
  put = (path: string, body?: object, options?: SendOptions) => this.send('put', path, body, options);
  patch = (path: string, body?: object, options?: SendOptions) => this.send('patch', path, body, options);
  delete = (path: string, options?: SendOptions) => this.send('delete', path, undefined, options);

  /** A request with this browser's cookies and headers, not yet sent: for uploads (`.attach`) and raw bodies. */
  prepare(method: Method, path: string, options: SendOptions = {}) {
    const sending = request(this.url)[method](path).set(this.headers(options));
    if (method !== 'get') sending.set({ 'X-Kerfyard': '1', Origin: this.url });
    if (method === 'post' && options.idempotencyKey !== null) {
      sending.set('Idempotency-Key', options.idempotencyKey ?? randomUUID());
    }
    if (options.query !== undefined) sending.query(options.query);
    return sending.set(options.headers ?? {});
  }

  async send(method: Method, path: string, body?: object, options?: SendOptions): Promise<Response> {
    const sending = this.prepare(method, path, options);
    const response = await (body === undefined ? sending : sending.send(body));
    this.keepCookies(response);
    return response;
  }

  get cookieHeader(): string {
    return [...this.cookies].map(([name, value]) => `${name}=${value}`).join('; ');
  }

  /** The same browser's other tab: same cookies now, kept apart from here on. */
  tab(): Client {
    const other = new Client(this.url);
    for (const [name, value] of this.cookies) other.cookies.set(name, value);
    return other;
  }

  cookie(kind: 'access' | 'refresh'): string | undefined {
    return this.cookies.get(this.cookieName(kind));
  }

  setCookie(kind: 'access' | 'refresh', value: string): void {
    this.cookies.set(this.cookieName(kind), value);
  }

  cookieName(kind: 'access' | 'refresh'): string {
    return `__Host-kerfyard-${new URL(this.url).port}-${kind}`;
  }

  keepCookies(response: Pick<Response, 'headers'>): void {
    const set = (response.headers as Record<string, unknown>)['set-cookie'];
    for (const line of Array.isArray(set) ? (set as string[]) : []) {
      const [, name, value] = /^([^=]+)=([^;]*)/.exec(line) ?? [];
      if (name === undefined) continue;
      if (value === undefined || value === '') this.cookies.delete(name);
      else this.cookies.set(name, value);
    }
  }

  private headers(options: SendOptions): Record<string, string> {
    const cookie = options.headers?.Cookie ?? this.cookieHeader;
    return cookie === '' ? {} : { Cookie: cookie };
  }
}
