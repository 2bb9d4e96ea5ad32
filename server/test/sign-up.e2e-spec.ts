import { randomUUID } from 'node:crypto';
import type { ErrorBody } from '@kerfyard/common/errors';
import {
  expectStatus,
  makeCompany,
  PASSWORD,
  signIn,
  signUpBody,
  tokenOf,
  uniqueEmail,
} from './builders/people.ts';
import { Client } from './client.ts';
import { closeDatabase, sql } from './database.ts';
import { mailsTo } from './mail.ts';

afterAll(closeDatabase);

const fieldPaths = (body: unknown) => (body as ErrorBody).error.fields?.map((field) => field.path) ?? [];

describe('sign-up', () => {
  it('makes the account only when the link is used, and then the password signs in as owner of the company', async () => {
    const client = new Client();
    const body = signUpBody('general_contractor', uniqueEmail());
    await expectStatus(client.post('/api/auth/sign-up', body), 202);
    expect((await client.post('/api/auth/sign-in', { email: body.email, password: PASSWORD })).status).toBe(
      401,
    );
    expect(await sql('SELECT 1 FROM app_user WHERE email = $1', [body.email])).toHaveLength(0);

    const verified = await client.post('/api/auth/verify', { token: await tokenOf(body.email) });
    expect(verified.status).toBe(204);
    expect(verified.headers['set-cookie']).toBeUndefined();
    const signedIn = await client.post('/api/auth/sign-in', { email: body.email, password: PASSWORD });
    expect(signedIn.body).toMatchObject({
      user: { name: body.name, email: body.email, isStaff: false },
      company: { kind: 'general_contractor', name: body.company.name },
      role: 'owner',
      limits: { signCents: null, setAsideCents: null, changeCents: null },
      unread: { messages: 0 },
    });
    expect(signedIn.body.permissions).toContain('scope.write');
    expect(signedIn.body.permissions).not.toContain('bid.write');
    expect((await client.get('/api/auth/me')).body).toEqual(signedIn.body);
  });

  it('D-09 answers the same for a known and an unknown address; only the mail differs', async () => {
    const { owner } = await makeCompany('cutting_contractor');
    const fresh = uniqueEmail();
    const [known, unknown] = [
      await new Client().post('/api/auth/sign-up', signUpBody('general_contractor', owner.email)),
      await new Client().post('/api/auth/sign-up', signUpBody('general_contractor', fresh)),
    ];
    expect([known.status, known.text]).toEqual([unknown.status, unknown.text]);
    expect(known.status).toBe(202);
    const [toKnown] = await mailsTo(owner.email, 2).then((mails) =>
      mails.filter((m) => /already/.test(m.subject)),
    );
    expect(toKnown?.text).not.toContain('/verify?token=');
    const [toUnknown] = await mailsTo(fresh, 1);
    expect(toUnknown?.text).toContain(`/verify?token=${await tokenOf(fresh)}`);
    // The link of a sign-up for an address with an account makes nothing.
    const dead = await new Client().post('/api/auth/verify', { token: await tokenOf(owner.email) });
    expect(dead.status).toBe(422);
    await signIn(owner.email);
  });

  it('keeps each of two sign-ups for one address apart: only the one whose link is used counts', async () => {
    const email = uniqueEmail();
    const client = new Client();
    await expectStatus(client.post('/api/auth/sign-up', signUpBody('general_contractor', email)), 202);
    const first = await tokenOf(email);
    const other = { ...signUpBody('cutting_contractor', email), password: 'somebody else typed this one' };
    await expectStatus(client.post('/api/auth/sign-up', other), 202);
    const second = await tokenOf(email);
    await expectStatus(client.post('/api/auth/verify', { token: first }), 204);
    expect((await client.post('/api/auth/verify', { token: second })).status).toBe(422);
    expect((await client.post('/api/auth/sign-in', { email, password: other.password })).status).toBe(401);
    await signIn(email);
  });

  it('D-16 a link works once: of ten parallel uses one wins, and a second use reads as an unknown link does', async () => {
    const body = signUpBody('general_contractor', uniqueEmail());
    await expectStatus(new Client().post('/api/auth/sign-up', body), 202);
    const token = await tokenOf(body.email);
    const answers = await Promise.all(
      Array.from({ length: 10 }, () => new Client().post('/api/auth/verify', { token })),
    );
    expect(answers.filter((answer) => answer.status === 204)).toHaveLength(1);
    expect(answers.filter((answer) => answer.status === 422)).toHaveLength(9);
    expect(await sql('SELECT 1 FROM company WHERE name = $1', [body.company.name])).toHaveLength(1);
    const [again, unknown] = [
      await new Client().post('/api/auth/verify', { token }),
      await new Client().post('/api/auth/verify', { token: 'x'.repeat(43) }),
    ];
    expect(withoutRequestId(again.body)).toEqual(withoutRequestId(unknown.body));
  });

  it('D-16 a link runs out, and the database holds no token', async () => {
    const body = signUpBody('general_contractor', uniqueEmail());
    await expectStatus(new Client().post('/api/auth/sign-up', body), 202);
    const token = await tokenOf(body.email);
    const [row] = await sql<{ life: number; whole: string }>(
      `SELECT extract(epoch FROM expires_at - created_at)::int AS life, s::text AS whole FROM sign_up s WHERE email = $1`,
      [body.email],
    );
    expect(row?.life).toBeLessThanOrEqual(3_600);
    expect(row?.whole).not.toContain(token);
    const jobs = await sql<{ data: string }>(`SELECT data::text FROM pgboss.job WHERE name = 'send_mail'`);
    expect(jobs.some((job) => job.data.includes(token))).toBe(false);
    await sql(`UPDATE sign_up SET expires_at = clock_timestamp() - interval '1 second' WHERE email = $1`, [
      body.email,
    ]);
    expect((await new Client().post('/api/auth/verify', { token })).status).toBe(422);
  });

  it('D-08 stores argon2id with the agreed cost, keeps spaces and unicode, refuses guessable and short passwords', async () => {
    const email = uniqueEmail();
    const password = ' über-lange Wörter 木漏れ日 ';
    const body = { ...signUpBody('general_contractor', email), password };
    await expectStatus(new Client().post('/api/auth/sign-up', body), 202);
    await expectStatus(new Client().post('/api/auth/verify', { token: await tokenOf(email) }), 204);
    const [row] = await sql<{ password_hash: string }>(
      'SELECT password_hash FROM app_user WHERE email = $1',
      [email],
    );
    expect(row?.password_hash).toMatch(/^\$argon2id\$v=19\$m=19456,t=2,p=1\$/);
    expect((await new Client().post('/api/auth/sign-in', { email, password: password.trim() })).status).toBe(
      401,
    );
    await signIn(email, password.normalize('NFD'));

    for (const weak of ['password1234', 'short', 'x'.repeat(129), 'kerfyard-kerfyard', 'NorthPier123456']) {
      const refused = await new Client().post('/api/auth/sign-up', {
        ...signUpBody('general_contractor', uniqueEmail()),
        password: weak,
      });
      expect([weak, refused.status, fieldPaths(refused.body)]).toEqual([weak, 422, ['password']]);
    }
  });

  it('says all faults at once, and takes no field it did not ask for (D-03, D-32)', async () => {
    const client = new Client();
    const refused = await client.post('/api/auth/sign-up', {
      name: '',
      email: 'nobody',
      password: 'short',
      role: 'owner',
      company: { kind: 'bank', name: 'x', phone: '!', balance: 5 },
    });
    expect(refused.status).toBe(422);
    expect(fieldPaths(refused.body).sort()).toEqual([
      'company.balance',
      'company.kind',
      'company.phone',
      'email',
      'name',
      'password',
      'role',
    ]);
    for (const field of ['isStaff', 'companyId', 'status', 'feeBps', 'ownerId', 'id', 'constructor']) {
      const body = { ...signUpBody('general_contractor', uniqueEmail()), [field]: randomUUID() };
      const answer = await client.post('/api/auth/sign-up', body);
      expect([field, answer.status, fieldPaths(answer.body)]).toEqual([field, 422, [field]]);
    }
  });
});

const withoutRequestId = (body: unknown) => {
  const { error } = body as ErrorBody;
  return { ...error, requestId: '' };
};
