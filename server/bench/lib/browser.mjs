import { randomUUID } from 'node:crypto';
import { DEMO_PASSWORD, emailOf } from '../../dist/demo/seed/cast.js';

/** One demo person's browser as far as the API sees it: signed in, with the cookies at hand for sockets and load. */
export class Browser {
  constructor(url) {
    this.url = url;
    this.cookies = new Map();
  }

  /** Sign in as a person of the demo, by key. */
  static async of(key, url = process.env.BASE_URL) {
    const browser = new Browser(url);
    await browser.send('POST', '/api/auth/sign-in', { email: emailOf(key), password: DEMO_PASSWORD });
    return browser;
  }

  get cookie() {
    return [...this.cookies].map(([name, value]) => `${name}=${value}`).join('; ');
  }

  /** What the app's own pages send with a request. */
  headers(method) {
    const headers = { Cookie: this.cookie, 'Content-Type': 'application/json' };
    if (method !== 'GET') Object.assign(headers, { 'X-Kerfyard': '1', Origin: this.url });
    if (method === 'POST') headers['Idempotency-Key'] = randomUUID();
    return headers;
  }

  async send(method, path, body) {
    const init = { method, headers: this.headers(method) };
    if (body !== undefined) init.body = JSON.stringify(body);
    const response = await fetch(this.url + path, init);
    for (const line of response.headers.getSetCookie()) {
      const [, name, value] = /^([^=]+)=([^;]*)/.exec(line) ?? [];
      if (name !== undefined) this.cookies.set(name, value);
    }
    const text = await response.text();
    if (!response.ok) throw new Error(`${method} ${path} gave ${response.status}: ${text.slice(0, 500)}`);
    return text === '' ? undefined : JSON.parse(text);
  }
}
