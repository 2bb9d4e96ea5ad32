import { createHmac, generateKeyPairSync, sign } from 'node:crypto';
import { deriveKey } from '../src/platform/crypto/sealing.ts';
import { expectStatus, makeCompany, PASSWORD, signIn, type Company } from './builders/people.ts';
import { Client } from './client.ts';
import { closeDatabase, sql } from './database.ts';
import { openLine } from './live.ts';
import { startSecondServer, type SecondServer } from './second-server.ts';

let company: Company;

beforeAll(async () => {
  company = await makeCompany('general_contractor');
});
afterAll(closeDatabase);

const newBrowser = () => signIn(company.owner.email);
const me = (client: Client) => client.get('/api/auth/me').then((answer) => answer.status);
const sessionOf = (client: Client) => client.cookie('refresh')?.split('.')[0] ?? '';
/** As if the last rotation lay this many seconds back. */
const age = (client: Client, seconds: number) =>
  sql(`UPDATE session SET rotated_at = rotated_at - $2 * interval '1 second' WHERE id = $1`, [
    sessionOf(client),
    seconds,
  ]);

describe('sessions', () => {
  it('D-12 sets cookies that only this host, port and https or loopback get, and no script reads', async () => {
    const answer = await new Client().post('/api/auth/sign-in', {
      email: company.owner.email,
      password: PASSWORD,
    });
    const port = new URL(process.env.BASE_URL ?? '').port;
    const lines = answer.headers['set-cookie'] as unknown as string[];
    expect(lines).toHaveLength(2);
    for (const [line, kind] of [
      [lines[0], 'access'],
      [lines[1], 'refresh'],
    ] as const) {
      expect(line).toMatch(new RegExp(`^__Host-kerfyard-${port}-${kind}=`));
      expect(
        line
          ?.split('; ')
          .slice(1)
          .map((part) => part.split('=')[0]),
      ).toEqual(['Path', 'Expires', 'HttpOnly', 'Secure', 'SameSite']);
      expect(line).toMatch(/; Path=\/;.*SameSite=Lax$/);
    }
    expect(answer.text).not.toContain('eyJ');
  });

  it('D-11 stores the refresh token hashed and gives a browser a session of its own, whatever it brought', async () => {
    const victim = new Client();
    const planted = await newBrowser();
    for (const kind of ['access', 'refresh'] as const) victim.setCookie(kind, planted.cookie(kind) ?? '');
    await expectStatus(
      victim.post('/api/auth/sign-in', { email: company.owner.email, password: PASSWORD }),
      200,
    );
    expect(sessionOf(victim)).not.toBe(sessionOf(planted));
    expect(await me(planted)).toBe(401);
    expect(await me(victim)).toBe(200);
    const [row] = await sql<{ whole: string }>('SELECT s::text AS whole FROM session s WHERE id = $1', [
      sessionOf(victim),
    ]);
    expect(row?.whole).not.toContain(victim.cookie('refresh')?.split('.')[1]);
  });

  it('D-11 signing out ends the session for a kept cookie, its refresh token and its sockets', async () => {
    const browser = await newBrowser();
    const kept = browser.tab();
    const line = await openLine(browser);
    const ended = new Promise((resolve) => line.socket.once('session_ended', () => resolve('ended')));
    const closed = new Promise((resolve) => line.socket.once('disconnect', resolve));
    const answer = await browser.post('/api/auth/sign-out');
    expect(answer.status).toBe(204);
    expect(browser.cookies.size).toBe(0);
    expect(await me(kept)).toBe(401);
    expect((await kept.post('/api/auth/refresh')).status).toBe(401);
    expect(await ended).toBe('ended');
    expect(await closed).toBe('io server disconnect');
  });

  it('D-11 two tabs refreshing at once get the same successor and both stay in', async () => {
    const browser = await newBrowser();
    const tabs = [browser.tab(), browser.tab(), browser.tab(), browser.tab()];
    const answers = await Promise.all(tabs.map((tab) => tab.post('/api/auth/refresh')));
    expect(answers.map((answer) => answer.status)).toEqual([204, 204, 204, 204]);
    expect(new Set(tabs.map((tab) => tab.cookie('refresh'))).size).toBe(1);
    expect(tabs[0]?.cookie('refresh')).not.toBe(browser.cookie('refresh'));
    expect(await Promise.all(tabs.map(me))).toEqual([200, 200, 200, 200]);
  });

  it('D-11 a lost reply is made good within the grace; after it, reuse ends the session for both', async () => {
    const browser = await newBrowser();
    const stale = browser.tab();
    await expectStatus(browser.post('/api/auth/refresh'), 204);
    await age(browser, 25);
    const late = stale.tab();
    await expectStatus(late.post('/api/auth/refresh'), 204);
    expect(late.cookie('refresh')).toBe(browser.cookie('refresh'));

    await age(browser, 10);
    expect((await stale.post('/api/auth/refresh')).status).toBe(401);
    expect(stale.cookies.size).toBe(0);
    expect(await me(browser)).toBe(401);
    expect((await browser.post('/api/auth/refresh')).status).toBe(401);
    const [row] = await sql('SELECT ended_because FROM session WHERE id = $1', [sessionOf(late)]);
    expect(row?.ended_because).toBe('refresh_reused');
  });

  it('D-11 a token from two rotations ago ends the session too; a made-up one of no session ends nothing', async () => {
    const browser = await newBrowser();
    const first = browser.tab();
    await expectStatus(browser.post('/api/auth/refresh'), 204);
    await age(browser, 31);
    await expectStatus(browser.post('/api/auth/refresh'), 204);
    const other = await newBrowser();
    const madeUp = new Client();
    madeUp.setCookie('refresh', `${crypto.randomUUID()}.${'A'.repeat(43)}`);
    expect((await madeUp.post('/api/auth/refresh')).status).toBe(401);
    expect(await me(other)).toBe(200);
    expect((await first.post('/api/auth/refresh')).status).toBe(401);
    expect(await me(browser)).toBe(401);
  });

  it('D-11 a session runs out without use and in any case', async () => {
    const [idle, old] = [await newBrowser(), await newBrowser()];
    await sql(`UPDATE session SET last_used_at = now() - interval '7 days 1 minute' WHERE id = $1`, [
      sessionOf(idle),
    ]);
    await sql(`UPDATE session SET expires_at = now() - interval '1 second' WHERE id = $1`, [sessionOf(old)]);
    for (const client of [idle, old]) {
      expect(await me(client)).toBe(401);
      expect((await client.post('/api/auth/refresh')).status).toBe(401);
    }
  });

  it('a deactivated person is out at once, everywhere', async () => {
    const { owner } = await makeCompany('general_contractor');
    await sql('UPDATE app_user SET deactivated_at = now() WHERE id = $1', [owner.userId]);
    expect(await me(owner.client)).toBe(401);
    expect((await owner.client.post('/api/auth/refresh')).status).toBe(401);
    const again = await new Client().post('/api/auth/sign-in', { email: owner.email, password: PASSWORD });
    expect([again.status, again.body.error.code]).toEqual([401, 'wrong_credentials']);
  });
});

describe('D-15 access tokens', () => {
  const part = (value: object) => Buffer.from(JSON.stringify(value)).toString('base64url');
  const key = () => deriveKey(process.env.TEST_SIGNING_SECRET ?? '', 'kerfyard access token');
  const hs = (header: object, claims: object, secret: Buffer | string = key(), hash = 'sha256') => {
    const body = `${part(header)}.${part(claims)}`;
    return `${body}.${createHmac(hash, secret).update(body).digest('base64url')}`;
  };
  const claimsOf = (client: Client) =>
    JSON.parse(Buffer.from(client.cookie('access')?.split('.')[1] ?? '', 'base64url').toString()) as Record<
      string,
      unknown
    >;

  it('takes only its own algorithm, audience, kind, time and a living session', async () => {
    const browser = await newBrowser();
    const claims = claimsOf(browser);
    expect(Number(claims.exp) - Number(claims.iat)).toBe(600);
    const header = { alg: 'HS256', typ: 'JWT' };
    const { privateKey, publicKey } = generateKeyPairSync('rsa', { modulusLength: 2048 });
    const rsBody = `${part({ alg: 'RS256', typ: 'JWT' })}.${part(claims)}`;
    const other = await makeCompany('general_contractor');
    const forged: Record<string, string> = {
      'alg none': `${part({ alg: 'none', typ: 'JWT' })}.${part(claims)}.`,
      'another secret': hs(header, claims, 'x'.repeat(32)),
      RS256: `${rsBody}.${sign('sha256', Buffer.from(rsBody), privateKey).toString('base64url')}`,
      'HS256 by a public key': hs(
        header,
        claims,
        publicKey.export({ type: 'spki', format: 'pem' }) as string,
      ),
      HS512: hs({ ...header, alg: 'HS512' }, claims, key(), 'sha512'),
      'kid that is a path': hs({ ...header, kid: '../../../../dev/null' }, claims, ''),
      expired: hs(header, { ...claims, exp: Math.floor(Date.now() / 1000) - 1 }),
      'no expiry': hs(header, { ...claims, exp: undefined }),
      'not yet valid': hs(header, { ...claims, nbf: Math.floor(Date.now() / 1000) + 60 }),
      'another audience': hs(header, { ...claims, aud: 'somewhere' }),
      'another kind': hs(header, { ...claims, typ: 'refresh' }),
      'no session': hs(header, { ...claims, sid: crypto.randomUUID() }),
      "another person's name on the session": hs(header, { ...claims, sub: other.owner.userId }),
      'not a token': 'x',
    };
    const accepted = new Client();
    accepted.setCookie('access', hs(header, claims));
    expect(await me(accepted)).toBe(200);
    for (const [name, token] of Object.entries(forged)) {
      const client = new Client();
      client.setCookie('access', token);
      expect([name, await me(client)]).toEqual([name, 401]);
      await expect(openLine(client)).rejects.toThrow('unauthenticated');
    }
  });

  it('is read from its cookie alone', async () => {
    const token = (await newBrowser()).cookie('access') ?? '';
    const client = new Client();
    const answer = await client.get('/api/auth/me', { headers: { Authorization: `Bearer ${token}` } });
    expect(answer.status).toBe(401);
    expect((await client.get(`/api/auth/me?access_token=${token}`)).status).toBe(401);
  });
});

describe('D-10 limits on signing in', () => {
  let server: SecondServer;
  beforeAll(async () => {
    server = await startSecondServer({ TRUST_PROXY: '1', RATE_LIMIT_FACTOR: '1' });
  });
  afterAll(() => server.stop());

  const from = (address: string) => ({ headers: { 'X-Forwarded-For': address } });
  const tryOnce = (email: string, password: string, address: string, url = server.url) =>
    new Client(url).post('/api/auth/sign-in', { email, password }, from(address));

  it('slows wrong passwords with Retry-After, leaves the owner elsewhere alone, and counts an unknown address too', async () => {
    const { owner } = await makeCompany('general_contractor');
    const statuses: number[] = [];
    for (let tries = 0; tries < 20; tries += 1) {
      const answer = await tryOnce(owner.email, 'not the password at all', '192.0.2.10');
      statuses.push(answer.status);
      if (answer.status === 429) {
        expect(Number(answer.headers['retry-after'])).toBeGreaterThan(0);
        expect(answer.body.error.code).toBe('too_many_requests');
      }
    }
    expect(statuses.slice(0, 5)).toEqual([401, 401, 401, 401, 401]);
    expect(statuses.slice(12).every((status) => status === 429)).toBe(true);
    // Even the right password waits there; the owner elsewhere does not.
    expect((await tryOnce(owner.email, PASSWORD, '192.0.2.10')).status).toBe(429);
    expect((await tryOnce(owner.email, PASSWORD, '192.0.2.11')).status).toBe(200);

    const nobody: number[] = [];
    for (let tries = 0; tries < 14; tries += 1) {
      nobody.push(
        (await tryOnce('nobody@northpier.example', 'not the password at all', '192.0.2.12')).status,
      );
    }
    expect(nobody.slice(0, 5)).toEqual([401, 401, 401, 401, 401]);
    expect(nobody.at(-1)).toBe(429);
  });

  it('stops an attack from many addresses, but not the owner at an address used before', async () => {
    const { owner } = await makeCompany('general_contractor');
    expect((await tryOnce(owner.email, PASSWORD, '198.51.100.1')).status).toBe(200);
    const statuses = await Promise.all(
      Array.from({ length: 80 }, (_, n) => tryOnce(owner.email, 'not the password at all', `203.0.113.${n}`)),
    );
    expect(statuses.filter((answer) => answer.status === 401).length).toBeLessThanOrEqual(60);
    expect(statuses.filter((answer) => answer.status === 429).length).toBeGreaterThanOrEqual(20);
    expect((await tryOnce(owner.email, PASSWORD, '203.0.113.200')).status).toBe(429);
    expect((await tryOnce(owner.email, PASSWORD, '198.51.100.1')).status).toBe(200);
  });

  it('believes no forwarded address without a trusted proxy', async () => {
    const plain = await startSecondServer({ RATE_LIMIT_FACTOR: '1' });
    try {
      await sql(`DELETE FROM rate_limit`);
      const { owner } = await makeCompany('general_contractor');
      const statuses: number[] = [];
      for (let tries = 0; tries < 16; tries += 1) {
        statuses.push(
          (await tryOnce(owner.email, 'not the password at all', `192.0.2.${tries}`, plain.url)).status,
        );
      }
      expect(statuses.at(-1)).toBe(429);
    } finally {
      await plain.stop();
    }
  });
});
