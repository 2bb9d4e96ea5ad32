import { mkdirSync, mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { ErrorBody } from '@kerfyard/common/errors';
import { makeCuttingContractor, signUpBody, uniqueEmail, type Company } from './builders/people.ts';
import { Client } from './client.ts';
import { closeDatabase } from './database.ts';
import { openLine } from './live.ts';
import { openProxy } from './proxy.ts';
import { startSecondServer } from './second-server.ts';
import { waitFor } from './wait.ts';

let crew: Company;

beforeAll(async () => {
  crew = await makeCuttingContractor();
});
afterAll(closeDatabase);

describe('D-28, D-29 how often', () => {
  it('limits what one person changes, with Retry-After, and nobody else at the same address', async () => {
    const server = await startSecondServer({ RATE_LIMIT_FACTOR: '1' });
    try {
      const [busy, other] = [await makeCuttingContractor(), await makeCuttingContractor()];
      const at = (company: Company) => {
        const client = new Client(server.url);
        client.setCookie('access', company.owner.client.cookie('access') ?? '');
        return client;
      };
      const client = at(busy);
      const answers = [];
      // More than two minutes' worth, so that one of their windows is full whenever they turn.
      for (let batch = 0; batch < 25; batch += 1) {
        const sent = Array.from({ length: 20 }, () => client.put('/api/company', {}));
        answers.push(...(await Promise.all(sent)));
      }
      const refused = answers.filter(({ status }) => status === 429);
      expect(answers.filter(({ status }) => status === 422).length).toBeLessThanOrEqual(480);
      expect(refused.length).toBeGreaterThan(0);
      for (const { headers } of refused) expect(Number(headers['retry-after'])).toBeGreaterThan(0);
      expect((await client.get('/api/company')).status).toBe(200);
      expect((await at(other).put('/api/company', {})).status).toBe(422);
    } finally {
      await server.stop();
    }
  }, 40_000);
});

describe('D-26 faults', () => {
  it('answer with the request’s id and nothing of the inside', async () => {
    const database = await openProxy(process.env.TEST_PG_URL ?? '');
    const server = await startSecondServer({ DATABASE_URL: database.url });
    try {
      const port = new URL(server.url).port;
      const cookie = crew.owner.client.cookieHeader.replace(/kerfyard-\d+-/g, `kerfyard-${port}-`);
      const ask = (path: string) => fetch(`${server.url}${path}`, { headers: { Cookie: cookie } });
      expect((await ask('/api/company')).status).toBe(200);
      database.close();
      expect((await ask('/api/health')).status).toBe(503);
      for (const path of ['/api/company', '/api/auth/me']) {
        const answer = await ask(path);
        const text = await answer.text();
        const { error } = JSON.parse(text) as ErrorBody;
        expect([path, answer.status, error.code]).toEqual([path, 500, 'internal']);
        expect(Object.keys(error).sort()).toEqual(['code', 'message', 'requestId']);
        expect(text).not.toMatch(/ECONN|connect|column|SELECT|\.ts|\.js|node_modules|sequelize|127\.0/i);
        await waitFor(() => server.output().includes(error.requestId));
      }
    } finally {
      server.signal('SIGKILL');
      await server.exited;
    }
  });

  it('D-27 no log holds a cookie, a token, a password or an address', async () => {
    const body = signUpBody('general_contractor', uniqueEmail());
    await new Client().post('/api/auth/sign-up', body);
    const folder = process.env.TEST_LOGS_DIR ?? '';
    const logs = readdirSync(folder)
      .map((name) => readFileSync(join(folder, name), 'utf8'))
      .join('\n');
    expect(logs).toContain('/api/auth/sign-up');
    for (const secret of [
      body.password,
      body.email,
      crew.owner.client.cookie('access') ?? '',
      crew.owner.client.cookie('refresh') ?? '',
    ]) {
      expect(logs).not.toContain(secret);
    }
    expect(logs).not.toMatch(/__Host-kerfyard|eyJ[A-Za-z0-9_-]{10,}/);
  });

  it('a stopping server says it is not ready while it still answers, then ends by itself', async () => {
    const stopping = await startSecondServer({ DRAIN_MS: '1500' });
    const client = new Client(stopping.url);
    client.setCookie('access', crew.owner.client.cookie('access') ?? '');
    const line = await openLine(client);
    stopping.signal('SIGTERM');
    const signalledAt = Date.now();
    await new Promise((resolve) => setTimeout(resolve, 300));
    const health = await fetch(`${stopping.url}/api/health`);
    expect([health.status, await health.json()]).toEqual([503, { status: 'stopping' }]);
    expect((await fetch(`${stopping.url}/api/auth/me`)).status).toBe(401);
    expect(await stopping.exited).toBe(0);
    // Its open socket does not hold it back.
    expect(line.socket.connected).toBe(false);
    expect(Date.now() - signalledAt).toBeLessThan(8_000);
    line.close();
  });
});

describe('pages', () => {
  it('serves the client: its page for any page address, its files, nothing hidden or missing (D-30)', async () => {
    const folder = mkdtempSync(join(tmpdir(), 'kerfyard-client-'));
    mkdirSync(join(folder, 'assets'));
    const page = '<!doctype html><div id="root"></div>';
    const files = {
      'index.html': page,
      'assets/app-1a2b.js': 'export {}',
      'icon.svg': '<svg/>',
      '.env': 'SECRET=1',
    };
    for (const [name, text] of Object.entries(files)) writeFileSync(join(folder, name), text);
    const server = await startSecondServer({ CLIENT_DIST: folder });
    const ask = async (path: string, init: RequestInit = {}) => {
      const answer = await fetch(`${server.url}${path}`, { headers: { Accept: 'text/html' }, ...init });
      return { status: answer.status, cache: answer.headers.get('cache-control'), body: await answer.text() };
    };
    try {
      for (const path of ['/', '/scopes', '/verify?token=x', '/open-scopes/anything', '/index.html']) {
        expect([path, await ask(path)]).toEqual([path, { status: 200, cache: 'no-cache', body: page }]);
      }
      expect(await ask('/assets/app-1a2b.js')).toMatchObject({
        status: 200,
        cache: 'public, max-age=31536000, immutable',
      });
      expect(await ask('/icon.svg')).toMatchObject({ status: 200, cache: 'no-cache' });
      const nothing = [
        '/.env',
        '/.git/config',
        '/_fake/x.js',
        '/assets/none.js',
        '/%2e%2e/package.json',
        '/..%2f..%2fpackage.json',
        '/api',
        '/api/',
        '/api/docs',
        '/api/docs-json',
        '/socket.io/x',
      ];
      for (const path of nothing) {
        const { status, body } = await ask(path);
        expect([path, status >= 400 && status < 500, body.includes('root')]).toEqual([path, true, false]);
      }
      expect((await ask('/scopes', { method: 'POST' })).status).toBe(403);
    } finally {
      await server.stop();
      rmSync(folder, { recursive: true });
    }
  });
});
