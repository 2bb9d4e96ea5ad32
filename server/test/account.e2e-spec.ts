import type { ErrorBody } from '@kerfyard/common/errors';
import type { AccountView, SessionEndView, SessionView } from '@kerfyard/common/people';
import { linkToken } from '../src/people/link-token.ts';
import { expectStatus, makeCompany, PASSWORD, signIn, uniqueEmail, type Company } from './builders/people.ts';
import { Client } from './client.ts';
import { closeDatabase, sql } from './database.ts';
import { openLine } from './live.ts';
import { mailsTo, mailTo } from './mail.ts';

afterAll(closeDatabase);

const OTHER_PASSWORD = 'nine herons over a gravel bar';
const newCompany = () => makeCompany('general_contractor');
const me = (client: Client) => client.get('/api/auth/me').then((answer) => answer.status);
const sessionOf = (client: Client) => client.cookie('refresh')?.split('.')[0] ?? '';
const codeOf = (answer: { status: number; body: unknown }) => [
  answer.status,
  (answer.body as ErrorBody).error.code,
];
const fieldsOf = (body: unknown) => (body as ErrorBody).error.fields?.map((field) => field.path) ?? [];
const withoutRequestId = (body: unknown) => ({ ...(body as ErrorBody).error, requestId: '' });
const tokenIn = (text: string) => /\?token=([\w-]{43})/.exec(text)?.[1] ?? '';
/** As if the holder had last said who they are this many minutes ago. */
const age = (client: Client, minutes: number) =>
  sql(`UPDATE session SET proved_at = proved_at - $2 * interval '1 minute' WHERE id = $1`, [
    sessionOf(client),
    minutes,
  ]);
const audited = async (action: string, userId: string) =>
  (await sql(`SELECT 1 FROM audit_event WHERE action = $1 AND subject_id = $2`, [action, userId])).length;

const askReset = (email: string) => new Client().post('/api/auth/reset', { email });
const useReset = (token: string, password = OTHER_PASSWORD) =>
  new Client().post('/api/auth/reset/use', { token, password });
async function resetToken(email: string): Promise<string> {
  await expectStatus(askReset(email), 202);
  const [row] = await sql<{ id: string }>(
    'SELECT id FROM password_reset WHERE email = $1 ORDER BY id DESC LIMIT 1',
    [email],
  );
  return linkToken(process.env.TEST_SIGNING_SECRET ?? '', 'reset', row?.id ?? '');
}

describe('a forgotten password', () => {
  it('D-09 is answered the same for a known and an unknown address; only the known one gets mail', async () => {
    const { owner } = await newCompany();
    const unknown = uniqueEmail();
    const answers = [await askReset(owner.email), await askReset(unknown)];
    expect(answers.map(({ status, text }) => [status, text])).toEqual([
      [202, ''],
      [202, ''],
    ]);
    const mail = await mailTo(owner.email, /^Set a new password/);
    expect(tokenIn(mail.text)).not.toBe('');
    await askReset(owner.email);
    await mailsTo(owner.email, 3);
    expect(await mailsTo(unknown, 0)).toEqual([]);
  });

  it('D-11, D-16 is replaced by the link, which ends every session and its sockets and signs nobody in', async () => {
    const { owner } = await newCompany();
    const other = await signIn(owner.email);
    const line = await openLine(other);
    const closed = new Promise((resolve) => line.socket.once('disconnect', resolve));
    await expectStatus(askReset(owner.email), 202);
    const token = tokenIn((await mailTo(owner.email, /^Set a new password/)).text);
    const answer = await expectStatus(useReset(token), 204);
    expect(answer.headers['set-cookie']).toBeUndefined();
    expect(await closed).toBe('io server disconnect');
    expect([await me(owner.client), await me(other)]).toEqual([401, 401]);
    expect((await other.post('/api/auth/refresh')).status).toBe(401);
    const old = await new Client().post('/api/auth/sign-in', { email: owner.email, password: PASSWORD });
    expect(codeOf(old)).toEqual([401, 'wrong_credentials']);
    await signIn(owner.email, OTHER_PASSWORD);
    await mailTo(owner.email, /^Your password was changed/);
    expect(await audited('password.reset', owner.userId)).toBe(1);
  });

  it('D-16 has a link that works once: of ten parallel uses one wins, the others are told why', async () => {
    const { owner } = await newCompany();
    const token = await resetToken(owner.email);
    const answers = await Promise.all(Array.from({ length: 10 }, () => useReset(token)));
    expect(answers.filter(({ status }) => status === 204)).toHaveLength(1);
    const refused = answers.filter(({ status }) => status !== 204);
    expect(refused.map(codeOf)).toEqual(refused.map(() => [409, 'link_used']));
    expect(codeOf(await useReset(token.slice(0, 20)))).toEqual([422, 'link_unknown']);
    expect(codeOf(await useReset('x'))).toEqual([422, 'link_unknown']);
  });

  it('D-16 has a link of an hour at most, kept as a hash, bound to its purpose, person and address', async () => {
    const { owner } = await newCompany();
    const token = await resetToken(owner.email);
    const [row] = await sql<{ life: number; whole: string }>(
      `SELECT extract(epoch FROM expires_at - created_at)::int AS life, r::text AS whole
       FROM password_reset r WHERE email = $1`,
      [owner.email],
    );
    expect(row?.life).toBeLessThanOrEqual(3_600);
    expect(row?.whole).not.toContain(token);
    const jobs = await sql<{ data: string }>(`SELECT data::text FROM pgboss.job WHERE name = 'send_mail'`);
    expect(jobs.some((job) => job.data.includes(token))).toBe(false);
    for (const path of ['verify', 'email/confirm', 'invitation']) {
      expect((await new Client().post(`/api/auth/${path}`, { token })).status).toBe(422);
    }
    await sql('UPDATE app_user SET email = $2 WHERE id = $1', [owner.userId, uniqueEmail()]);
    expect(codeOf(await useReset(token))).toEqual([422, 'link_unknown']);
    await sql('UPDATE app_user SET email = $2 WHERE id = $1', [owner.userId, owner.email]);
    await sql(`UPDATE password_reset SET expires_at = clock_timestamp() WHERE email = $1`, [owner.email]);
    expect(codeOf(await useReset(token))).toEqual([409, 'link_expired']);
    await signIn(owner.email);
  });

  it('D-08 takes no guessable password, and the link stays good for a better one', async () => {
    const { owner } = await newCompany();
    const token = await resetToken(owner.email);
    for (const weak of ['short', 'password1234', `${owner.name.toLowerCase()}1`]) {
      const refused = await useReset(token, weak);
      expect([weak, refused.status, fieldsOf(refused.body)]).toEqual([weak, 422, ['password']]);
    }
    await expectStatus(useReset(token), 204);
  });

  it('D-10 a correct reset clears what a stranger tried', async () => {
    const { owner } = await newCompany();
    const count = () => sql(`SELECT 1 FROM rate_limit WHERE key LIKE 'sign-in:3600:%'`);
    await new Client().post('/api/auth/sign-in', { email: owner.email, password: 'not it, not it at all' });
    const before = (await count()).length;
    await expectStatus(useReset(await resetToken(owner.email)), 204);
    expect((await count()).length).toBeLessThan(before);
  });
});

describe('one’s own password', () => {
  it('D-11, D-17 asks for the present one, ends the other sessions and sockets, and tells by mail', async () => {
    const { owner } = await newCompany();
    const other = await signIn(owner.email);
    const line = await openLine(other);
    const closed = new Promise((resolve) => line.socket.once('disconnect', resolve));
    const change = (current: string, password: string) =>
      owner.client.put('/api/account/password', { current, password });
    const wrong = await change('not the present one', OTHER_PASSWORD);
    expect([wrong.status, fieldsOf(wrong.body)]).toEqual([422, ['current']]);
    const weak = await change(PASSWORD, 'password1234');
    expect([weak.status, fieldsOf(weak.body)]).toEqual([422, ['password']]);
    expect(await me(other)).toBe(200);
    await expectStatus(change(PASSWORD, OTHER_PASSWORD), 204);
    expect(await closed).toBe('io server disconnect');
    expect([await me(owner.client), await me(other)]).toEqual([200, 401]);
    await mailTo(owner.email, /^Your password was changed/);
    expect(await audited('password.changed', owner.userId)).toBe(1);
  });

  it('D-27 leaves no trace of a password in the audit', async () => {
    const rows = await sql<{ detail: string }>(
      `SELECT detail::text FROM audit_event WHERE detail::text LIKE $1 OR detail::text LIKE '%argon2%'`,
      [`%${OTHER_PASSWORD}%`],
    );
    expect(rows).toEqual([]);
  });
});

describe('one’s own e-mail address', () => {
  const change = (client: Client, email: string) => client.post('/api/account/email', { email });
  const confirm = (token: string) => new Client().post('/api/auth/email/confirm', { token });

  it('D-17 changes when the new address confirms; the old one hears of it before and after', async () => {
    const { owner } = await newCompany();
    const email = uniqueEmail();
    await expectStatus(change(owner.client, email), 202);
    const view = (await owner.client.get('/api/account')).body as AccountView;
    expect(view).toMatchObject({ email: owner.email, pendingEmail: email });
    const warning = await mailTo(owner.email, /about to change/);
    expect(warning.text).toContain(email);
    expect(tokenIn(warning.text)).toBe('');
    const token = tokenIn((await mailTo(email, /^Confirm your new/)).text);
    await signIn(owner.email);
    const pressed = await expectStatus(confirm(token), 204);
    expect(pressed.headers['set-cookie']).toBeUndefined();
    await mailTo(owner.email, /was changed/);
    await signIn(email);
    const old = await new Client().post('/api/auth/sign-in', { email: owner.email, password: PASSWORD });
    expect(old.status).toBe(401);
    expect(codeOf(await confirm(token))).toEqual([409, 'link_used']);
    const [row] = await sql<{ detail: object }>(
      `SELECT detail FROM audit_event WHERE action = 'email.changed' AND subject_id = $1`,
      [owner.userId],
    );
    expect(row?.detail).toEqual({ before: owner.email, after: email });
  });

  it('D-09 says nothing about whether the new address has an account; its owner is told, nobody else', async () => {
    const [{ owner }, other, third] = [await newCompany(), await newCompany(), await newCompany()];
    const [taken, free] = [
      await change(owner.client, other.owner.email),
      await change(third.owner.client, uniqueEmail()),
    ];
    expect([taken.status, taken.text]).toEqual([free.status, free.text]);
    const mail = await mailTo(other.owner.email, /has an account already/);
    expect(tokenIn(mail.text)).toBe('');
  });

  it('D-16 only the newest wish counts, and not once the address has an account or the password was reset', async () => {
    const { owner } = await newCompany();
    const [first, second, third] = [uniqueEmail(), uniqueEmail(), uniqueEmail()];
    const tokenTo = async (email: string) => {
      await expectStatus(change(owner.client, email), 202);
      return tokenIn((await mailTo(email, /^Confirm your new/)).text);
    };
    const [one, two] = [await tokenTo(first), await tokenTo(second)];
    expect(codeOf(await confirm(one))).toEqual([409, 'link_expired']);
    const parallel = await Promise.all(Array.from({ length: 5 }, () => confirm(two)));
    expect(parallel.filter(({ status }) => status === 204)).toHaveLength(1);
    const three = await tokenTo(third);
    await sql('UPDATE app_user SET email = $2 WHERE id = $1', [(await newCompany()).owner.userId, third]);
    expect(codeOf(await confirm(three))).toEqual([409, 'has_account']);
    await expectStatus(useReset(await resetToken(second)), 204);
    expect(codeOf(await confirm(three))).toEqual([409, 'link_expired']);
  });

  it('D-17 needs a sign-in of the last ten minutes, or the password again', async () => {
    const { owner } = await newCompany();
    await age(owner.client, 11);
    const email = uniqueEmail();
    expect(codeOf(await change(owner.client, email))).toEqual([403, 'confirm_with_password']);
    const wrong = await owner.client.post('/api/account/confirm', { password: 'not it at all' });
    expect([wrong.status, fieldsOf(wrong.body)]).toEqual([422, ['password']]);
    expect(codeOf(await change(owner.client, email))).toEqual([403, 'confirm_with_password']);
    await expectStatus(owner.client.post('/api/account/confirm', { password: PASSWORD }), 204);
    await expectStatus(change(owner.client, email), 202);
    const own = await change(owner.client, owner.email);
    expect([own.status, fieldsOf(own.body)]).toEqual([422, ['email']]);
  });
});

describe('one’s own sessions', () => {
  let company: Company;
  beforeAll(async () => {
    company = await newCompany();
  });
  const list = async (client: Client) => (await client.get('/api/account/sessions')).body as SessionView[];

  it('D-11 are listed without a secret, and ended one by one or all others at once, sockets too', async () => {
    const { owner } = company;
    const [phone, desk] = [await signIn(owner.email), await signIn(owner.email)];
    const listed = await list(owner.client);
    expect(listed).toHaveLength(3);
    expect(listed.filter(({ isCurrent }) => isCurrent).map(({ id }) => id)).toEqual([
      sessionOf(owner.client),
    ]);
    expect(Object.keys(listed[0] ?? {}).sort()).toEqual([
      'id',
      'ip',
      'isCurrent',
      'lastUsedAt',
      'startedAt',
      'userAgent',
    ]);
    const line = await openLine(phone);
    const closed = new Promise((resolve) => line.socket.once('disconnect', resolve));
    await expectStatus(owner.client.delete(`/api/account/sessions/${sessionOf(phone)}`), 204);
    expect(await closed).toBe('io server disconnect');
    expect([await me(phone), await me(desk)]).toEqual([401, 200]);
    expect((await owner.client.delete(`/api/account/sessions/${sessionOf(phone)}`)).status).toBe(404);
    await expectStatus(owner.client.delete('/api/account/sessions'), 204);
    expect([await me(owner.client), await me(desk)]).toEqual([200, 401]);
    expect(await list(owner.client)).toHaveLength(1);
  });

  it('D-01 another person’s session answers as a missing one', async () => {
    const stranger = (await newCompany()).owner.client;
    const [foreign, missing] = [
      await company.owner.client.delete(`/api/account/sessions/${sessionOf(stranger)}`),
      await company.owner.client.delete(`/api/account/sessions/${crypto.randomUUID()}`),
    ];
    expect([foreign.status, withoutRequestId(foreign.body)]).toEqual([404, withoutRequestId(missing.body)]);
    expect(await me(stranger)).toBe(200);
  });

  it('E-09 say when they end; a refresh extends them, up to a last moment', async () => {
    const client = await signIn(company.owner.email);
    const end = async () => (await client.get('/api/account/session')).body as SessionEndView;
    await sql(
      `UPDATE session SET last_used_at = clock_timestamp() - interval '6 days 23 hours' WHERE id = $1`,
      [sessionOf(client)],
    );
    const before = await end();
    const minutesLeft = (Date.parse(before.endsAt) - Date.now()) / 60_000;
    expect(minutesLeft).toBeGreaterThan(55);
    expect(minutesLeft).toBeLessThan(65);
    await expectStatus(client.post('/api/auth/refresh'), 204);
    const after = await end();
    expect(Date.parse(after.endsAt) - Date.parse(before.endsAt)).toBeGreaterThan(6 * 86_400_000);
    expect([before.isFinal, after.isFinal]).toEqual([false, false]);
    await sql(`UPDATE session SET expires_at = clock_timestamp() + interval '5 minutes' WHERE id = $1`, [
      sessionOf(client),
    ]);
    expect((await end()).isFinal).toBe(true);
  });
});
