import { randomUUID } from 'node:crypto';
import type { CompanyKind, EditCompany, MeView, OwnCompanyView, Role } from '@kerfyard/common/people';
import { linkToken } from '../../src/people/link-token.ts';
import { verifyToken } from '../../src/people/verify-token.ts';
import { Client } from '../client.ts';
import { sql } from '../database.ts';

export const PASSWORD = 'a kettle on the ninth stair';

/** Someone signed in. */
export interface Person {
  client: Client;
  userId: string;
  name: string;
  email: string;
  companyId: string;
}

export interface Company {
  id: string;
  kind: CompanyKind;
  name: string;
  owner: Person;
}

let counter = 0;
const unique = () => `${Date.now().toString(36)}${process.pid.toString(36)}${(counter += 1).toString(36)}`;

export const uniqueEmail = (): string => `p${unique()}@northpier.example`;

/** The link's token of the newest waiting sign-up of an address, as its e-mail carries it. */
export async function tokenOf(email: string): Promise<string> {
  const [row] = await sql<{ id: string }>(
    'SELECT id FROM sign_up WHERE email = $1 ORDER BY id DESC LIMIT 1',
    [email],
  );
  if (row === undefined) throw new Error(`${email} has not signed up`);
  return verifyToken(process.env.TEST_SIGNING_SECRET ?? '', row.id);
}

export function signUpBody(kind: CompanyKind, email: string) {
  const id = unique();
  return {
    name: `Ada Quill ${id}`,
    email,
    password: PASSWORD,
    company: { kind, name: `North Pier ${id}`, phone: '+1 555 0100' },
  };
}

export async function signIn(email: string, password: string = PASSWORD, url?: string): Promise<Client> {
  const client = new Client(url);
  const response = await client.post('/api/auth/sign-in', { email, password });
  if (response.status !== 200)
    throw new Error(`sign-in of ${email} gave ${response.status}: ${response.text}`);
  return client;
}

/** A company with its owner signed in, made as people make one: sign-up, link, sign-in. */
export async function makeCompany(kind: CompanyKind): Promise<Company> {
  const client = new Client();
  const body = signUpBody(kind, uniqueEmail());
  await expectStatus(client.post('/api/auth/sign-up', body), 202);
  await expectStatus(client.post('/api/auth/verify', { token: await tokenOf(body.email) }), 204);
  const signedIn = await expectStatus(
    client.post('/api/auth/sign-in', { email: body.email, password: PASSWORD }),
    200,
  );
  const me = signedIn.body as MeView;
  const companyId = me.company?.id ?? '';
  const owner = { client, userId: me.user.id, name: body.name, email: body.email, companyId };
  return { id: companyId, kind, name: body.company.name, owner };
}

export const makeGeneralContractor = () => makeCompany('general_contractor');

/** Denver's centre: 80202. */
export const DENVER = { zip: '80202', lat: 39.7491, lon: -104.9946 } as const;

/**
 * Where this spec's crews and sites lie unless told otherwise: Denver's ZIP code moved by hand to a place of its own,
 * so that a scope of one spec is not announced by e-mail to the crews of all the others.
 */
export const HOME = {
  zip: DENVER.zip,
  lat: 31 + Math.random() * 16,
  lon: -124 + Math.random() * 38,
} as const;

/** A cutting contractor that may bid: yard (`HOME`), service radius, methods, one crew and one truck. */
export async function makeCuttingContractor(
  edit: Partial<EditCompany> = {},
): Promise<Company & { crewId: string; truckId: string }> {
  const company = await makeCompany('cutting_contractor');
  const { client } = company.owner;
  const body: EditCompany = {
    name: company.name,
    phone: '+1 555 0100',
    yard: { ...HOME },
    serviceRadiusMi: 150,
    methods: [
      'flat_saw',
      'wall_saw',
      'hand_saw',
      'core_drill',
      'wire_saw',
      'stitch_drill',
      'ring_saw',
      'chain_saw',
      'joint_saw',
    ],
    ...edit,
  };
  await expectStatus(client.put('/api/company', body), 200);
  const crewId = randomUUID();
  const truckId = randomUUID();
  await expectStatus(client.post('/api/company/crews', { id: crewId, name: 'Crew 1' }), 201);
  await expectStatus(client.post('/api/company/trucks', { id: truckId, name: 'Truck 1' }), 201);
  return { ...company, name: body.name, crewId, truckId };
}

export async function viewCompany(person: Person): Promise<OwnCompanyView> {
  return (await expectStatus(person.client.get('/api/company'), 200)).body as OwnCompanyView;
}

export interface PersonOptions {
  signLimitCents?: number | null;
  setAsideLimitCents?: number | null;
  changeLimitCents?: number | null;
}

/** An owner's invitation, on its way by mail. Gives its id. */
export async function invite(
  company: Company,
  email: string,
  role: Role,
  limits: PersonOptions = {},
): Promise<string> {
  const id = randomUUID();
  const body = {
    id,
    email,
    role,
    limits: {
      signCents: limits.signLimitCents ?? null,
      setAsideCents: limits.setAsideLimitCents ?? null,
      changeCents: limits.changeLimitCents ?? null,
    },
  };
  await expectStatus(company.owner.client.post('/api/company/invitations', body), 201);
  return id;
}

/** The token that an invitation's mail carries. */
export const invitationToken = (id: string): string =>
  linkToken(process.env.TEST_SIGNING_SECRET ?? '', 'invitation', id);

/** One more person of a company: invited, accepted, signed in. */
export async function addPerson(company: Company, role: Role, limits: PersonOptions = {}): Promise<Person> {
  const email = uniqueEmail();
  const name = `Ben Alder ${unique()}`;
  const token = invitationToken(await invite(company, email, role, limits));
  const accepting = { token, name, password: PASSWORD };
  await expectStatus(new Client().post('/api/auth/invitation/accept', accepting), 204);
  const client = await signIn(email);
  const me = (await expectStatus(client.get('/api/auth/me'), 200)).body as MeView;
  return { client, userId: me.user.id, name, email, companyId: company.id };
}

/** A staff person, signed in; `by` is anyone whose password is the builders'. */
export async function addStaff(by: Company): Promise<Person> {
  const userId = randomUUID();
  const email = uniqueEmail();
  const name = `Staff ${unique()}`;
  await sql(
    `INSERT INTO app_user (id, email, name, password_hash, is_staff, email_verified_at)
     SELECT $1, $2, $3, password_hash, true, app_now() FROM app_user WHERE id = $4`,
    [userId, email, name, by.owner.userId],
  );
  return { client: await signIn(email), userId, name, email, companyId: '' };
}

/** The response, which must have this status; else the answer is in the error. */
export async function expectStatus<Answer extends { status: number; text: string }>(
  sending: Promise<Answer>,
  status: number,
): Promise<Answer> {
  const response = await sending;
  if (response.status !== status)
    throw new Error(`expected ${status}, got ${response.status}: ${response.text}`);
  return response;
}
