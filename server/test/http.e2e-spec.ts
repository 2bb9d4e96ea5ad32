import { randomUUID } from 'node:crypto';
import { request as httpRequest, type IncomingHttpHeaders } from 'node:http';
import { makeCuttingContractor, type Company } from './builders/people.ts';
import { baseUrl, Client } from './client.ts';
import { closeDatabase, sql } from './database.ts';
import { readRouteTable, routeName, type Route } from './route-table.ts';
import { startSecondServer } from './second-server.ts';

let crew: Company;
let routes: Route[];

beforeAll(async () => {
  crew = await makeCuttingContractor();
  ({ routes } = await readRouteTable());
});
afterAll(closeDatabase);

const isWebhook = (route: Route) => route.path.startsWith('/api/payments/webhooks/');
const concrete = (path: string) => path.replace(/:\w+/g, () => randomUUID());
const changes = () => routes.filter((route) => route.method !== 'get' && !isWebhook(route));

interface RawAnswer {
  status: number;
  headers: IncomingHttpHeaders;
  body: string;
}

/** A request with exactly these headers: no library adds any. */
function raw(method: string, path: string, headers: Record<string, string>, body = ''): Promise<RawAnswer> {
  return new Promise((resolve, reject) => {
    const sending = httpRequest(`${baseUrl()}${path}`, { method, headers }, (response) => {
      let text = '';
      response.on('data', (chunk: Buffer) => (text += chunk.toString()));
      response.on('end', () =>
        resolve({ status: response.statusCode ?? 0, headers: response.headers, body: text }),
      );
    });
    sending.on('error', reject);
    sending.end(body);
  });
}

describe('D-13 changes come from our own pages', () => {
  const attempts = (origin: string): Record<string, Record<string, string>> => ({
    'no header of ours': { Origin: origin },
    'no origin': { 'X-Kerfyard': '1' },
    'a foreign origin': { 'X-Kerfyard': '1', Origin: 'https://evil.example' },
    'an origin that begins like ours': { 'X-Kerfyard': '1', Origin: `${origin}.evil.example` },
    'the null origin': { 'X-Kerfyard': '1', Origin: 'null' },
    'another port of this host': { 'X-Kerfyard': '1', Origin: 'http://127.0.0.1:1' },
    'a same-site fetch without origin': { 'X-Kerfyard': '1', 'Sec-Fetch-Site': 'same-site' },
  });

  it('refuses every change of every route that another site could send', async () => {
    const { cookieHeader } = crew.owner.client;
    expect(changes().length).toBeGreaterThan(10);
    for (const route of changes()) {
      for (const [name, headers] of Object.entries(attempts(baseUrl()))) {
        const answer = await raw(route.method.toUpperCase(), concrete(route.path), {
          ...headers,
          Cookie: cookieHeader,
        });
        expect([routeName(route), name, answer.status]).toEqual([routeName(route), name, 403]);
        expect(answer.body).toContain('not_from_here');
      }
    }
  });

  it('refuses a form and a text body even with our header; takes a same-origin fetch without Origin', async () => {
    const ours = { 'X-Kerfyard': '1', Origin: baseUrl(), Cookie: crew.owner.client.cookieHeader };
    const body = JSON.stringify({ id: randomUUID(), name: 'Crew 9' });
    for (const type of ['text/plain', 'application/x-www-form-urlencoded', 'application/xml', '']) {
      const headers = type === '' ? ours : { ...ours, 'Content-Type': type };
      const answer = await raw(
        'POST',
        '/api/company/crews',
        { ...headers, 'Content-Length': String(body.length) },
        body,
      );
      expect([type, answer.status]).toEqual([type, 415]);
    }
    const fetched = await raw('POST', '/api/auth/refresh', {
      'X-Kerfyard': '1',
      'Sec-Fetch-Site': 'same-origin',
    });
    expect(fetched.status).toBe(401);
  });

  it('exempts webhooks alone, which answer only to a signature', async () => {
    expect(routes.filter(isWebhook)).not.toHaveLength(0);
    for (const route of routes.filter(isWebhook)) {
      const answer = await raw(
        'POST',
        route.path,
        { 'Content-Type': 'application/json', 'Content-Length': '2' },
        '{}',
      );
      expect([route.path, answer.status]).toEqual([route.path, 400]);
    }
  });

  it('changes nothing on GET', async () => {
    const snapshot = async () => {
      const { companyId } = crew.owner;
      const rows = await sql<{ audit: string; company: string; sessions: string }>(
        `SELECT (SELECT count(*) FROM audit_event WHERE actor_user_id = $1) AS audit,
           (SELECT c::text FROM company c WHERE id = $2) AS company,
           (SELECT string_agg(s::text, ',') FROM session s WHERE user_id = $1) AS sessions`,
        [crew.owner.userId, companyId],
      );
      return rows[0];
    };
    const before = await snapshot();
    for (const route of routes.filter(({ method }) => method === 'get')) {
      await crew.owner.client.get(concrete(route.path));
    }
    expect(await snapshot()).toEqual(before);
  });
});

describe('D-21, D-22, D-23 headers', () => {
  const policy =
    "default-src 'none';script-src 'self' 'wasm-unsafe-eval';style-src 'self' 'unsafe-inline';img-src 'self' blob: data:;" +
    "connect-src 'self';font-src 'self';worker-src 'self';manifest-src 'self';base-uri 'none';";

  it('stand on every answer of every route and on pages', async () => {
    const paths = ['/', '/scopes', '/nowhere/at/all', ...routes.map((route) => concrete(route.path))];
    for (const path of paths) {
      const { headers } = await raw('GET', path, { Accept: 'text/html' });
      const csp = String(headers['content-security-policy']);
      // A missing page is answered by the static server with a policy stricter still.
      if (csp !== "default-src 'none'") expect([path, csp.startsWith(policy)]).toEqual([path, true]);
      expect([path, headers['x-content-type-options']]).toEqual([path, 'nosniff']);
      expect([path, headers['referrer-policy']]).toEqual([path, 'same-origin']);
      expect([path, headers['cross-origin-opener-policy']]).toEqual([path, 'same-origin']);
      expect([path, headers['cross-origin-resource-policy']]).toEqual([path, 'same-origin']);
      expect([path, headers['x-powered-by']]).toEqual([path, undefined]);
      expect([path, headers['x-request-id']]).toEqual([path, expect.stringMatching(/^[0-9a-f-]{36}$/)]);
      if (path.startsWith('/api/'))
        expect([path, headers['cache-control']]).toEqual([path, expect.stringContaining('no-store')]);
    }
  });

  it('allow no other origin to read, whatever it says', async () => {
    for (const origin of ['https://evil.example', 'null', `${baseUrl()}.evil.example`]) {
      for (const method of ['GET', 'OPTIONS']) {
        const { headers } = await raw(method, '/api/auth/me', {
          Origin: origin,
          Cookie: crew.owner.client.cookieHeader,
          'Access-Control-Request-Method': 'POST',
          'Access-Control-Request-Headers': 'x-kerfyard',
        });
        expect(Object.keys(headers).filter((name) => name.startsWith('access-control-'))).toEqual([]);
      }
    }
  });

  it('demand https for good where the app is served by https, and only there', async () => {
    const server = await startSecondServer({ APP_URL: 'https://app.kerfyard.example' });
    try {
      const { headers } = await fetch(`${server.url}/api/health`);
      expect(headers.get('strict-transport-security')).toMatch(/max-age=\d{7,}/);
    } finally {
      await server.stop();
    }
    expect((await raw('GET', '/api/health', {})).headers['strict-transport-security']).toBeUndefined();
  });
});

describe('D-28, D-32 bodies and queries of any shape', () => {
  const { stringify } = JSON;
  const post = (body: string, type = 'application/json') =>
    raw(
      'POST',
      '/api/auth/sign-in',
      {
        'X-Kerfyard': '1',
        Origin: baseUrl(),
        'Content-Type': type,
        'Content-Length': String(Buffer.byteLength(body)),
      },
      body,
    );

  it('answers 4xx quickly to what is unreadable, too large, too deep or pollutes', async () => {
    const cases: [string, string, number][] = [
      ['broken', '{"email":', 400],
      ['not an object', '"text"', 400],
      ['10,000 deep', `${'['.repeat(10_000)}${']'.repeat(10_000)}`, 400],
      ['400,000 deep', `${'['.repeat(400_000)}${']'.repeat(400_000)}`, 400],
      ['40 deep', `${'{"a":'.repeat(40)}1${'}'.repeat(40)}`, 400],
      ['too large', stringify({ email: 'x'.repeat(1_100_000) }), 413],
      ['a prototype', '{"__proto__":{"isStaff":true}}', 422],
      ['a nested constructor', '{"email":{"constructor":{"prototype":{}}}}', 422],
      ['an operator for a value', '{"email":{"$gt":""},"password":{"$ne":null}}', 422],
      ['an array for a value', '{"email":["a@b.example"],"password":["x"]}', 422],
      ['infinity for a value', '{"email":1e309,"password":"x"}', 422],
      ['nothing', '{}', 422],
    ];
    for (const [name, body, status] of cases) {
      const before = Date.now();
      const answer = await post(body);
      expect([name, answer.status]).toEqual([name, status]);
      expect(Date.now() - before).toBeLessThan(1_000);
      expect(answer.body.length).toBeLessThan(5_000);
    }
    expect(({} as { isStaff?: boolean }).isStaff).toBeUndefined();
  });

  it('D-19, D-32 takes each parameter once, as what it is', async () => {
    const { client } = crew.owner;
    const statuses = async (paths: string[]) =>
      Promise.all(paths.map(async (path) => [path, (await client.get(path)).status]));
    const wrong = [
      '/api/places/time-zone?lat=1&lat=2&lon=3',
      '/api/places/time-zone?lat[]=1&lon=3',
      '/api/places/time-zone?lat=1&lon=3&extra=1',
      '/api/places/time-zone?lat=95&lon=3',
      '/api/places/time-zone?lat=x&lon=3',
    ];
    expect(await statuses(wrong)).toEqual(wrong.map((path) => [path, 422]));
    const missing = [
      "/api/scopes/' OR 1=1 --",
      '/api/scopes/1',
      '/api/places/zip/%00',
      '/api/places/zip/80202%27',
      `/api/scopes/${randomUUID()}`,
    ];
    const answers = await Promise.all(
      missing.map((path) => client.get(encodeURI(path).replace(/%25/g, '%'))),
    );
    expect(answers.map((answer) => answer.status)).toEqual(missing.map(() => 404));
    expect(new Set(answers.map((answer) => answer.body.error.message)).size).toBe(1);
    expect((await client.get('/api/scopes/%FF')).status).toBe(400);
  });

  it('every list refuses a page of more than a hundred', async () => {
    const { client } = crew.owner;
    const lists = routes.filter((route) => route.method === 'get' && !route.path.includes(':'));
    const paged: string[] = [];
    for (const route of lists) {
      const answer = await client.get(`${route.path}?limit=100000`);
      if (answer.status === 422) paged.push(route.path);
      expect([routeName(route), [200, 403, 404, 422].includes(answer.status)]).toEqual([
        routeName(route),
        true,
      ]);
    }
    expect(paged).toEqual(expect.arrayContaining(['/api/open-scopes', '/api/scopes', '/api/threads']));
  });

  it('slow patterns do not slow it: every field of a sign-up with a text made for backtracking', async () => {
    const evil = `${'a+'.repeat(2_000)}!`;
    const before = Date.now();
    const answer = await new Client().post('/api/auth/sign-up', {
      name: evil,
      email: `${evil}@${evil}`,
      password: evil,
      company: { kind: 'general_contractor', name: evil, phone: `${' '.repeat(20_000)}x` },
    });
    expect(answer.status).toBe(422);
    expect(Date.now() - before).toBeLessThan(500);
  });
});
