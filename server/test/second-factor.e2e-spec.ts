import { randomUUID } from 'node:crypto';
import type { ErrorBody } from '@kerfyard/common/errors';
import type { AccountView, NewSecondFactorView, RecoveryCodesView } from '@kerfyard/common/people';
import {
  addPerson,
  expectStatus,
  makeCompany,
  makeCuttingContractor,
  PASSWORD,
  signIn,
  uniqueEmail,
  type Company,
  type Person,
} from './builders/people.ts';
import { Client } from './client.ts';
import { closeDatabase, sql } from './database.ts';
import { mailTo } from './mail.ts';
import { startSecondServer } from './second-server.ts';
import { Authenticator } from './totp.ts';

afterAll(closeDatabase);

let company: Company;
beforeAll(async () => {
  company = await makeCompany('general_contractor');
});

const codeOf = (answer: { status: number; body: unknown }) => [
  answer.status,
  (answer.body as ErrorBody).error.code,
];
const fieldsOf = (body: unknown) => (body as ErrorBody).error.fields?.map((field) => field.path) ?? [];
const enter = (email: string, code?: string, client = new Client()) =>
  client.post('/api/auth/sign-in', { email, password: PASSWORD, ...(code === undefined ? {} : { code }) });
const age = (client: Client) =>
  sql(`UPDATE session SET proved_at = proved_at - interval '11 minutes' WHERE id = $1`, [
    client.cookie('refresh')?.split('.')[0],
  ]);

/** Sets up a second factor as the account page does. */
async function setUp({ client }: Person): Promise<{ app: Authenticator; codes: string[] }> {
  const begun = await expectStatus(client.post('/api/account/second-factor'), 201);
  const app = new Authenticator((begun.body as NewSecondFactorView).secret);
  const done = client.post('/api/account/second-factor/confirm', { code: await app.next() });
  return { app, codes: ((await expectStatus(done, 201)).body as RecoveryCodesView).codes };
}

describe('D-18 a second factor', () => {
  it('is asked for only after its first code has come back, and then with every sign-in', async () => {
    const person = await addPerson(company, 'accounts');
    const begun = await expectStatus(person.client.post('/api/account/second-factor'), 201);
    const { secret, address } = begun.body as NewSecondFactorView;
    expect(new URL(address).searchParams.get('secret')).toBe(secret);
    await signIn(person.email);
    const app = new Authenticator(secret);
    const wrong = await person.client.post('/api/account/second-factor/confirm', { code: '000000' });
    expect([wrong.status, fieldsOf(wrong.body)]).toEqual([422, ['code']]);
    const done = person.client.post('/api/account/second-factor/confirm', { code: await app.next() });
    const { codes } = (await expectStatus(done, 201)).body as RecoveryCodesView;
    expect(new Set(codes).size).toBe(10);
    expect(codeOf(await enter(person.email))).toEqual([401, 'second_factor_needed']);
    expect(codeOf(await enter(person.email, '000000'))).toEqual([401, 'wrong_code']);
    await expectStatus(enter(person.email, await app.next()), 200);
    await mailTo(person.email, /second factor was set up/);
    const view = (await person.client.get('/api/account')).body as AccountView;
    expect(view.secondFactor).toEqual({ isSet: true, recoveryCodesLeft: 10, isRequired: false });
  });

  it('says nothing to someone without the password', async () => {
    const person = await addPerson(company, 'accounts');
    await setUp(person);
    const answer = await new Client().post('/api/auth/sign-in', {
      email: person.email,
      password: 'not the password at all',
      code: '123456',
    });
    expect(codeOf(answer)).toEqual([401, 'wrong_credentials']);
  });

  it('takes a code once: a replay within its thirty seconds is refused, as is one of ten at once but the first', async () => {
    const person = await addPerson(company, 'accounts');
    const { app } = await setUp(person);
    const code = await app.next();
    await expectStatus(enter(person.email, code), 200);
    expect(codeOf(await enter(person.email, code))).toEqual([401, 'wrong_code']);
    const refused = await person.client.post('/api/account/confirm', { code });
    expect([refused.status, fieldsOf(refused.body)]).toEqual([422, ['code']]);
    const fresh = await app.next();
    const answers = await Promise.all(Array.from({ length: 5 }, () => enter(person.email, fresh)));
    expect(answers.filter(({ status }) => status === 200)).toHaveLength(1);
  }, 90_000);

  it('lets recovery codes stand in, each once, kept as hashes; the rest die when they are made anew', async () => {
    const person = await addPerson(company, 'accounts');
    const { app, codes } = await setUp(person);
    const [first, second] = codes as [string, string];
    const answers = await Promise.all(
      Array.from({ length: 5 }, () => enter(person.email, first.toLowerCase().replaceAll('-', ' '))),
    );
    expect(answers.filter(({ status }) => status === 200)).toHaveLength(1);
    await mailTo(person.email, /recovery code was used/);
    const rows = await sql<{ whole: string }>(
      'SELECT r::text AS whole FROM recovery_code r WHERE user_id = $1',
      [person.userId],
    );
    expect(rows).toHaveLength(10);
    expect(rows.some(({ whole }) => codes.some((code) => whole.includes(code)))).toBe(false);
    await age(person.client);
    const renew = () => person.client.post('/api/account/recovery-codes');
    expect(codeOf(await renew())).toEqual([403, 'confirm_with_code']);
    await expectStatus(person.client.post('/api/account/confirm', { code: await app.next() }), 204);
    const fresh = ((await expectStatus(renew(), 201)).body as RecoveryCodesView).codes;
    expect(codeOf(await enter(person.email, second))).toEqual([401, 'wrong_code']);
    await expectStatus(enter(person.email, fresh[0]), 200);
  }, 90_000);

  it('lies encrypted in the database, and no secret is in the audit', async () => {
    const person = await addPerson(company, 'accounts');
    const begun = await expectStatus(person.client.post('/api/account/second-factor'), 201);
    const { secret } = begun.body as NewSecondFactorView;
    const [row] = await sql<{ whole: string }>(
      `SELECT encode(secret_sealed, 'escape') AS whole FROM second_factor WHERE user_id = $1`,
      [person.userId],
    );
    expect(row?.whole.length).toBeGreaterThan(40);
    expect(await sql(`SELECT 1 FROM audit_event WHERE detail::text LIKE $1`, [`%${secret}%`])).toEqual([]);
  });

  it('is taken away only after a code, and then no more asked for', async () => {
    const person = await addPerson(company, 'field');
    const { app } = await setUp(person);
    expect((await person.client.post('/api/account/second-factor')).status).toBe(409);
    await age(person.client);
    expect(codeOf(await person.client.delete('/api/account/second-factor'))).toEqual([
      403,
      'confirm_with_code',
    ]);
    // The password alone does not do for someone who has more.
    const byPassword = await person.client.post('/api/account/confirm', { password: PASSWORD });
    expect(codeOf(byPassword)).toEqual([403, 'confirm_with_code']);
    await expectStatus(person.client.post('/api/account/confirm', { code: await app.next() }), 204);
    await expectStatus(person.client.delete('/api/account/second-factor'), 204);
    await expectStatus(enter(person.email), 200);
    expect((await person.client.post('/api/account/recovery-codes')).status).toBe(409);
    const actions = await sql<{ action: string }>(
      `SELECT action FROM audit_event WHERE subject_id = $1 AND action LIKE 'second_factor.%' ORDER BY id`,
      [person.userId],
    );
    expect(actions.map(({ action }) => action)).toEqual(['second_factor.set', 'second_factor.removed']);
  }, 60_000);
});

describe('a colleague’s second factor', () => {
  it('is taken away by an owner when phone and codes are lost: sessions end, the colleague hears of it', async () => {
    const person = await addPerson(company, 'accounts');
    await setUp(person);
    const { client, userId } = company.owner;
    await expectStatus(client.delete(`/api/company/people/${person.userId}/second-factor`), 204);
    expect((await person.client.get('/api/auth/me')).status).toBe(401);
    await expectStatus(enter(person.email), 200);
    await mailTo(person.email, /second factor was taken away/);
    const again = await client.delete(`/api/company/people/${person.userId}/second-factor`);
    expect(codeOf(again)).toEqual([409, 'illegal_move']);
    const [row] = await sql<{ actor_user_id: string }>(
      `SELECT actor_user_id FROM audit_event WHERE action = 'second_factor.removed' AND subject_id = $1`,
      [person.userId],
    );
    expect(row?.actor_user_id).toBe(userId);
  });

  it('is not taken away so by its own holder, nor by another role', async () => {
    const partner = await addPerson(company, 'owner');
    await setUp(partner);
    const own = await partner.client.delete(`/api/company/people/${partner.userId}/second-factor`);
    expect(codeOf(own)).toEqual([409, 'illegal_move']);
    const manager = await addPerson(company, 'manager');
    const other = await manager.client.delete(`/api/company/people/${partner.userId}/second-factor`);
    expect(codeOf(other)).toEqual([403, 'forbidden']);
  });
});

describe('D-17 money and the second factor', () => {
  const moves = (client: Client) => [
    client.post(`/api/subcontracts/${randomUUID()}/set-aside`, {
      id: randomUUID(),
      sovLineIds: [randomUUID()],
      method: 'card',
    }),
    client.post('/api/releases', { id: randomUUID(), completionId: randomUUID() }),
  ];

  it('who has one is asked for a code when the last is ten minutes old; who has none is not', async () => {
    const [holder, other] = [await addPerson(company, 'accounts'), await addPerson(company, 'accounts')];
    const { app } = await setUp(holder);
    for (const answer of await Promise.all(moves(holder.client))) expect(answer.status).toBe(404);
    await Promise.all([age(holder.client), age(other.client)]);
    for (const answer of await Promise.all(moves(other.client))) expect(answer.status).toBe(404);
    for (const answer of await Promise.all(moves(holder.client))) {
      expect(codeOf(answer)).toEqual([403, 'confirm_with_code']);
    }
    await expectStatus(holder.client.post('/api/account/confirm', { code: await app.next() }), 204);
    for (const answer of await Promise.all(moves(holder.client))) expect(answer.status).toBe(404);
  }, 60_000);

  it('where the settings demand one, whoever moves money without it is told, and nobody else', async () => {
    const server = await startSecondServer({ SECOND_FACTOR: 'money' });
    try {
      const gc = await signIn(company.owner.email, PASSWORD, server.url);
      const crew = await makeCuttingContractor();
      const owner = await signIn(crew.owner.email, PASSWORD, server.url);
      for (const answer of await Promise.all([...moves(gc), owner.post('/api/company/payouts')])) {
        expect(codeOf(answer)).toEqual([403, 'second_factor_required']);
      }
      const account = (await gc.get('/api/account')).body as AccountView;
      expect(account.secondFactor.isRequired).toBe(true);
      const change = { current: PASSWORD, password: 'nine herons over a gravel bar' };
      await expectStatus(owner.put('/api/account/password', change), 204);
      const body = { id: randomUUID(), email: uniqueEmail(), role: 'field', limits: noLimits };
      await expectStatus(gc.post('/api/company/invitations', body), 201);
    } finally {
      await server.stop();
    }
  }, 60_000);
});

const noLimits = { signCents: null, setAsideCents: null, changeCents: null };
