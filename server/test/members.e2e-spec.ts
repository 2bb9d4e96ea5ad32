import { randomUUID } from 'node:crypto';
import type { ErrorBody } from '@kerfyard/common/errors';
import type { InvitationOfferView, MeView, PeopleView } from '@kerfyard/common/people';
import {
  addPerson,
  expectStatus,
  invitationToken,
  invite,
  makeCompany,
  PASSWORD,
  signIn,
  signUpBody,
  tokenOf,
  uniqueEmail,
  type Company,
} from './builders/people.ts';
import { Client } from './client.ts';
import { closeDatabase, sql } from './database.ts';
import { openLine } from './live.ts';
import { mailTo } from './mail.ts';

afterAll(closeDatabase);

let company: Company;
beforeAll(async () => {
  company = await makeCompany('general_contractor');
});

const limits = { signCents: 500_000, setAsideCents: 250_000, changeCents: null };
const accept = (token: string, name = 'Cy Larch') =>
  new Client().post('/api/auth/invitation/accept', { token, name, password: PASSWORD });
const read = (token: string) => new Client().post('/api/auth/invitation', { token });
const people = async (client: Client) => (await client.get('/api/company/people')).body as PeopleView;
const codeOf = (answer: { status: number; body: unknown }) => [
  answer.status,
  (answer.body as ErrorBody).error.code,
];
const me = (client: Client) => client.get('/api/auth/me').then((answer) => answer.status);
const audit = (action: string, subject: string) =>
  sql<{ detail: Record<string, unknown>; actor_user_id: string }>(
    'SELECT detail, actor_user_id FROM audit_event WHERE action = $1 AND subject_id = $2',
    [action, subject],
  );

describe('invitations', () => {
  it('bring someone in with the role and limits an owner set, from the mail to the first page', async () => {
    const email = uniqueEmail();
    const id = await invite(company, email, 'accounts', { signLimitCents: 1, setAsideLimitCents: 250_000 });
    const listed = (await people(company.owner.client)).invitations.find((one) => one.id === id);
    expect(listed).toMatchObject({
      email,
      role: 'accounts',
      invitedBy: company.owner.name,
      isExpired: false,
    });
    const mail = await mailTo(email, /invites you/);
    const token = /\/invitation\?token=([\w-]+)/.exec(mail.text)?.[1] ?? '';
    const offer = (await expectStatus(read(token), 200)).body as InvitationOfferView;
    expect(offer).toMatchObject({
      email,
      company: { name: company.name, kind: 'general_contractor' },
      invitedBy: company.owner.name,
      role: 'accounts',
      hasAccount: false,
    });
    const answer = await expectStatus(accept(token), 204);
    expect(answer.headers['set-cookie']).toBeUndefined();
    const client = await signIn(email);
    const view = (await client.get('/api/auth/me')).body as MeView;
    expect(view).toMatchObject({
      user: { name: 'Cy Larch', email },
      company: { id: company.id },
      role: 'accounts',
      limits: { signCents: 1, setAsideCents: 250_000, changeCents: null },
    });
    expect((await people(company.owner.client)).invitations.map((one) => one.id)).not.toContain(id);
    await mailTo(company.owner.email, /Cy Larch has joined/);
    expect(await audit('invitation.sent', id)).toHaveLength(1);
    expect(await audit('invitation.accepted', view.user.id)).toMatchObject([
      { detail: { companyId: company.id, role: 'accounts', invitationId: id } },
    ]);
  });

  it('D-16 are taken up once: of ten people with one link one wins, the others are told why', async () => {
    const email = uniqueEmail();
    const token = invitationToken(await invite(company, email, 'field'));
    const answers = await Promise.all(Array.from({ length: 10 }, (_, n) => accept(token, `Person ${n}`)));
    expect(answers.filter(({ status }) => status === 204)).toHaveLength(1);
    const refused = answers.filter(({ status }) => status !== 204);
    expect(refused.map(codeOf)).toEqual(refused.map(() => [409, 'link_used']));
    expect(await sql('SELECT 1 FROM app_user WHERE email = $1', [email])).toHaveLength(1);
    expect(codeOf(await read(token))).toEqual([409, 'link_used']);
  });

  it('D-16 run out, are taken back, replaced by a newer one, and tell a half-copied link from those', async () => {
    const email = uniqueEmail();
    const [expired, withdrawn, former] = [
      await invite(company, uniqueEmail(), 'field'),
      await invite(company, uniqueEmail(), 'field'),
      await invite(company, email, 'field'),
    ];
    await sql('UPDATE invitation SET expires_at = clock_timestamp() WHERE id = $1', [expired]);
    await expectStatus(company.owner.client.delete(`/api/company/invitations/${withdrawn}`), 204);
    const newer = await invite(company, email, 'manager');
    for (const id of [expired, withdrawn, former]) {
      expect(codeOf(await read(invitationToken(id)))).toEqual([409, 'link_expired']);
      expect(codeOf(await accept(invitationToken(id)))).toEqual([409, 'link_expired']);
    }
    expect(codeOf(await read(invitationToken(newer).slice(0, 30)))).toEqual([422, 'link_unknown']);
    await expectStatus(read(invitationToken(newer)), 200);
    const listed = (await people(company.owner.client)).invitations;
    expect(listed.find(({ id }) => id === expired)?.isExpired).toBe(true);
    expect((await company.owner.client.delete(`/api/company/invitations/${withdrawn}`)).status).toBe(404);
    const [row] = await sql<{ whole: string; life: number }>(
      `SELECT i::text AS whole, extract(epoch FROM expires_at - created_at)::int AS life
       FROM invitation i WHERE id = $1`,
      [newer],
    );
    expect(row?.whole).not.toContain(invitationToken(newer));
    expect(row?.life).toBeLessThanOrEqual(3 * 86_400);
  });

  it('D-09 to an address with an account are answered the same; the mail explains, and nothing is joined', async () => {
    const other = await makeCompany('cutting_contractor');
    const id = await invite(company, other.owner.email, 'owner');
    const mail = await mailTo(other.owner.email, /invites you/);
    expect(mail.text).not.toContain('token=');
    expect(mail.text).toContain('has an account already');
    expect(((await read(invitationToken(id))).body as InvitationOfferView).hasAccount).toBe(true);
    expect(codeOf(await accept(invitationToken(id)))).toEqual([409, 'has_account']);
    const view = (await other.owner.client.get('/api/auth/me')).body as MeView;
    expect(view.company?.id).toBe(other.id);
  });

  it('make a waiting sign-up of the same address worthless, and the other way round', async () => {
    const email = uniqueEmail();
    const token = invitationToken(await invite(company, email, 'field'));
    await expectStatus(new Client().post('/api/auth/sign-up', signUpBody('cutting_contractor', email)), 202);
    const signUpToken = await tokenOf(email);
    await expectStatus(accept(token), 204);
    expect((await new Client().post('/api/auth/verify', { token: signUpToken })).status).toBe(422);
  });

  it('of a colleague, or one who left, say so instead', async () => {
    const colleague = await addPerson(company, 'field');
    const { client } = company.owner;
    const body = { id: randomUUID(), email: colleague.email, role: 'field', limits };
    const present = await client.post('/api/company/invitations', body);
    expect((present.body as ErrorBody).error.fields?.[0]?.message).toContain('with you already');
    await expectStatus(client.post(`/api/company/people/${colleague.userId}/deactivate`), 204);
    const left = await client.post('/api/company/invitations', { ...body, id: randomUUID() });
    expect((left.body as ErrorBody).error.fields?.[0]?.message).toContain('let them back in');
  });

  it('D-07 take limits in whole cents within range, nothing else', async () => {
    for (const signCents of [-1, 0.5, 1e300, '1e3', undefined]) {
      const body = {
        id: randomUUID(),
        email: uniqueEmail(),
        role: 'manager',
        limits: { ...limits, signCents },
      };
      const answer = await company.owner.client.post('/api/company/invitations', body);
      expect([signCents, answer.status]).toEqual([signCents, 422]);
    }
  });
});

describe('people of a company', () => {
  it('see each other; only an owner sees addresses, limits and invitations', async () => {
    const field = await addPerson(company, 'field');
    await invite(company, uniqueEmail(), 'field');
    const seen = await people(field.client);
    expect(seen.invitations).toEqual([]);
    expect(seen.members.every(({ details }) => details === null)).toBe(true);
    expect(JSON.stringify(seen)).not.toContain('@');
    const own = await people(company.owner.client);
    expect(own.members.find(({ id }) => id === field.userId)?.details).toMatchObject({ email: field.email });
  });

  it('get another role and other limits, which count with their next request; sockets come back anew', async () => {
    const person = await addPerson(company, 'field');
    const line = await openLine(person.client);
    const closed = new Promise((resolve) => line.socket.once('disconnect', resolve));
    const body = { role: 'manager', limits };
    await expectStatus(company.owner.client.put(`/api/company/people/${person.userId}`, body), 204);
    expect(await closed).toBe('io server disconnect');
    const view = (await person.client.get('/api/auth/me')).body as MeView;
    expect(view).toMatchObject({ role: 'manager', limits });
    expect(await audit('member.changed', person.userId)).toMatchObject([
      {
        actor_user_id: company.owner.userId,
        detail: { before: { role: 'field' }, after: { role: 'manager', limits } },
      },
    ]);
    await mailTo(person.email, /role was changed/);
  });

  it('D-11 are out at once when deactivated, sockets too, and may be let back in', async () => {
    const person = await addPerson(company, 'accounts');
    const line = await openLine(person.client);
    const closed = new Promise((resolve) => line.socket.once('disconnect', resolve));
    const { client } = company.owner;
    await expectStatus(client.post(`/api/company/people/${person.userId}/deactivate`), 204);
    expect(await closed).toBe('io server disconnect');
    expect(await me(person.client)).toBe(401);
    expect((await person.client.post('/api/auth/refresh')).status).toBe(401);
    const again = () => new Client().post('/api/auth/sign-in', { email: person.email, password: PASSWORD });
    expect(codeOf(await again())).toEqual([401, 'wrong_credentials']);
    expect((await client.post(`/api/company/people/${person.userId}/deactivate`)).status).toBe(409);
    await expectStatus(client.post(`/api/company/people/${person.userId}/reactivate`), 204);
    expect((await again()).status).toBe(200);
    expect(await audit('member.deactivated', person.userId)).toHaveLength(1);
    expect(await audit('member.reactivated', person.userId)).toHaveLength(1);
  });

  it('always keep an owner: of two who throw each other out at once, one stays', async () => {
    const two = await makeCompany('cutting_contractor');
    const partner = await addPerson(two, 'owner');
    const self = `/api/company/people/${two.owner.userId}`;
    const answers = await Promise.all([
      two.owner.client.post(`/api/company/people/${partner.userId}/deactivate`),
      partner.client.post(`${self}/deactivate`),
    ]);
    expect(answers.filter(({ status }) => status === 204)).toHaveLength(1);
    const rest = (await me(two.owner.client)) === 200 ? two.owner : partner;
    const own = `/api/company/people/${rest.userId}`;
    expect(codeOf(await rest.client.post(`${own}/deactivate`))).toEqual([409, 'last_owner']);
    const lesser = await rest.client.put(own, { role: 'manager', limits });
    expect(codeOf(lesser)).toEqual([409, 'last_owner']);
  });

  it('leave no way back in: invitations of an owner who is one no more do not work', async () => {
    const partner = await addPerson(company, 'owner');
    const id = randomUUID();
    const body = { id, email: uniqueEmail(), role: 'owner', limits };
    await expectStatus(partner.client.post('/api/company/invitations', body), 201);
    const lesser = { role: 'manager', limits };
    await expectStatus(company.owner.client.put(`/api/company/people/${partner.userId}`, lesser), 204);
    expect(codeOf(await accept(invitationToken(id)))).toEqual([409, 'link_expired']);
  });

  it('D-17 are changed only after a recent sign-in', async () => {
    const person = await addPerson(company, 'field');
    const stale = await signIn(company.owner.email);
    await sql(`UPDATE session SET proved_at = proved_at - interval '11 minutes' WHERE id = $1`, [
      stale.cookie('refresh')?.split('.')[0],
    ]);
    const tries = [
      stale.put(`/api/company/people/${person.userId}`, { role: 'owner', limits }),
      stale.post(`/api/company/people/${person.userId}/deactivate`),
      stale.post(`/api/company/people/${person.userId}/reactivate`),
      stale.post('/api/company/invitations', {
        id: randomUUID(),
        email: uniqueEmail(),
        role: 'field',
        limits,
      }),
      stale.delete(`/api/company/invitations/${randomUUID()}`),
    ];
    for (const answer of await Promise.all(tries)) {
      expect(codeOf(answer)).toEqual([403, 'confirm_with_password']);
    }
    expect((await people(stale)).members.length).toBeGreaterThan(1);
  });
});
