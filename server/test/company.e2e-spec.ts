import { randomUUID } from 'node:crypto';
import type { OwnCompanyView } from '@kerfyard/common/people';
import {
  addPerson,
  addStaff,
  DENVER,
  expectStatus,
  makeCompany,
  makeCuttingContractor,
  makeGeneralContractor,
  viewCompany,
  type Company,
} from './builders/people.ts';
import { Client } from './client.ts';
import { closeDatabase, sql } from './database.ts';

let gc: Company;
let crew: Company;

beforeAll(async () => {
  gc = await makeGeneralContractor();
  crew = await makeCuttingContractor();
});
afterAll(closeDatabase);

const edit = (over: object = {}) => ({
  name: 'North Pier',
  phone: '+1 555 0100',
  yard: { ...DENVER },
  serviceRadiusMi: 80,
  methods: ['core_drill'],
  ...over,
});

describe('one’s own company', () => {
  it('asks for each thing only when a step needs it', async () => {
    const fresh = await makeCompany('cutting_contractor');
    expect(await viewCompany(fresh.owner)).toMatchObject({
      id: fresh.id,
      yard: null,
      payouts: { state: 'not_started', missing: [] },
      ladder: {
        look: ['yard', 'service_radius'],
        bid: ['yard', 'service_radius', 'methods'],
        be_paid: ['payouts'],
      },
    });
    const saved = await expectStatus(fresh.owner.client.put('/api/company', edit({ methods: [] })), 200);
    expect((saved.body as OwnCompanyView).ladder).toEqual({
      look: [],
      bid: ['methods'],
      be_paid: ['payouts'],
    });
    expect((await viewCompany(gc.owner)).ladder).toEqual({ look: [], bid: [], be_paid: [] });
  });

  it('takes city and state from the ZIP table, the position from the person, and shows no key', async () => {
    const { client } = (await makeCuttingContractor()).owner;
    const answer = await expectStatus(
      client.put('/api/company', edit({ yard: { zip: '60601', lat: 41.9, lon: -87.7 } })),
      200,
    );
    expect(answer.body.yard).toEqual({ zip: '60601', city: 'Chicago', state: 'IL', lat: 41.9, lon: -87.7 });
    expect(Object.keys(answer.body).sort()).toEqual([
      'crews',
      'id',
      'kind',
      'ladder',
      'methods',
      'name',
      'payouts',
      'phone',
      'serviceRadiusMi',
      'trucks',
      'yard',
    ]);
    expect(answer.text).not.toMatch(/wrapped|key|acct_/i);
  });

  it('refuses an unknown ZIP code, and a yard of a general contractor', async () => {
    const unknown = await crew.owner.client.put(
      '/api/company',
      edit({ yard: { zip: '00000', lat: 1, lon: 1 } }),
    );
    expect([unknown.status, unknown.body.error.fields[0].path]).toEqual([422, 'yard.zip']);
    expect((await gc.owner.client.put('/api/company', edit())).status).toBe(422);
    const plain = edit({ yard: null, serviceRadiusMi: null, methods: [] });
    await expectStatus(gc.owner.client.put('/api/company', plain), 200);
  });

  it('D-03 lets nobody write what is not theirs to write', async () => {
    const [before] = await sql('SELECT * FROM company WHERE id = $1', [crew.id]);
    for (const field of [
      'id',
      'kind',
      'payoutAccountId',
      'payouts_ready',
      'wrappedKey',
      'version',
      'ownerId',
      'balance',
    ]) {
      const answer = await crew.owner.client.put('/api/company', edit({ [field]: 'x' }));
      expect([field, answer.status, answer.body.error.fields]).toEqual([
        field,
        422,
        [{ path: field, message: 'Not a field here' }],
      ]);
    }
    expect((await sql('SELECT * FROM company WHERE id = $1', [crew.id]))[0]).toEqual(before);
  });

  it('is edited by owners and managers, read by all of its people, and by nobody outside', async () => {
    const [manager, accounts, field] = await Promise.all([
      addPerson(crew, 'manager'),
      addPerson(crew, 'accounts'),
      addPerson(crew, 'field'),
    ]);
    for (const person of [manager, accounts, field]) expect((await viewCompany(person)).id).toBe(crew.id);
    const statuses = await Promise.all(
      [manager, accounts, field].map(({ client }) =>
        client.put('/api/company', edit()).then(({ status }) => status),
      ),
    );
    expect(statuses).toEqual([200, 403, 403]);
    const staff = await addStaff(gc);
    expect((await staff.client.get('/api/company')).status).toBe(403);
    expect((await staff.client.get('/api/auth/me')).body).toMatchObject({
      user: { isStaff: true },
      company: null,
      role: null,
      permissions: ['staff.read'],
    });
  });

  it('D-27 records who changed what, from where, before and after', async () => {
    const { client, userId } = crew.owner;
    const answer = await expectStatus(client.put('/api/company', edit({ phone: '+1 555 0177' })), 200);
    const [row] = await sql(
      `SELECT actor_user_id, actor_company_id, detail, ip, request_id FROM audit_event
       WHERE subject_id = $1 AND action = 'company.edited' ORDER BY id DESC LIMIT 1`,
      [crew.id],
    );
    expect(row).toMatchObject({
      actor_user_id: userId,
      actor_company_id: crew.id,
      ip: '127.0.0.1',
      request_id: answer.headers['x-request-id'],
      detail: { after: { phone: '+1 555 0177' }, before: { phone: '+1 555 0100' } },
    });
    await expect(
      sql(`UPDATE audit_event SET action = 'nothing' WHERE subject_id = $1`, [crew.id]),
    ).rejects.toThrow(/permission denied|append-only/);
    await expect(sql(`DELETE FROM audit_event`, [], 'owner')).rejects.toThrow(/append-only/);
  });
});

describe('crews and trucks', () => {
  it('are added once by the same press sent ten times at once, and again later', async () => {
    const { client } = crew.owner;
    const unit = { id: randomUUID(), name: 'Crew of ten' };
    const answers = await Promise.all(
      Array.from({ length: 10 }, () =>
        client.tab().post('/api/company/crews', unit, { idempotencyKey: unit.id }),
      ),
    );
    const statuses = answers.map(({ status }) => status);
    expect(statuses.filter((status) => status !== 201 && status !== 409)).toEqual([]);
    expect(statuses).toContain(201);
    expect((await client.post('/api/company/crews', unit)).status).toBe(201);
    expect((await viewCompany(crew.owner)).crews.filter(({ name }) => name === unit.name)).toHaveLength(1);
  });

  it('refuse a name already there, an id of another company, and a general contractor', async () => {
    const other = await makeCuttingContractor();
    const { client } = other.owner;
    const again = await client.post('/api/company/crews', { id: randomUUID(), name: 'Crew 1' });
    expect([again.status, again.body.error.fields[0].path]).toEqual([422, 'name']);
    const taken = (await viewCompany(crew.owner)).crews[0]?.id ?? '';
    const stolen = await client.post('/api/company/crews', { id: taken, name: 'Mine now' });
    expect([stolen.status, stolen.body.error.code]).toEqual([409, 'key_reused']);
    expect((await gc.owner.client.post('/api/company/crews', { id: randomUUID(), name: 'x' })).status).toBe(
      403,
    );
  });
});

describe('request keys', () => {
  const path = '/api/company/trucks';
  const truck = (name: string) => ({ id: randomUUID(), name });

  it('give the same answer again, once done, and refuse another input or route', async () => {
    const { client } = (await makeCuttingContractor()).owner;
    const [input, idempotencyKey] = [truck('Blue'), randomUUID()];
    const first = await client.post(path, input, { idempotencyKey });
    const second = await client.post(path, input, { idempotencyKey });
    expect([first.status, second.status, second.text]).toEqual([201, 201, first.text]);
    expect([first.headers['idempotency-replayed'], second.headers['idempotency-replayed']]).toEqual([
      undefined,
      'true',
    ]);
    for (const [where, what] of [
      [path, truck('Red')],
      ['/api/company/crews', input],
    ] as const) {
      const reused = await client.post(where, what, { idempotencyKey });
      expect([reused.status, reused.body.error.code]).toEqual([409, 'key_reused']);
    }
  });

  it('belong to a company, are free again after a refusal, and are asked for', async () => {
    const { client } = (await makeCuttingContractor()).owner;
    const idempotencyKey = randomUUID();
    expect((await client.post(path, truck(''), { idempotencyKey })).status).toBe(422);
    expect((await client.post(path, truck('Green'), { idempotencyKey })).status).toBe(201);
    const other = (await makeCuttingContractor()).owner.client;
    expect((await other.post(path, truck('Green'), { idempotencyKey })).status).toBe(201);
    for (const key of [null, 'x']) {
      const answer = await client.post(path, truck('Grey'), { idempotencyKey: key });
      expect([answer.status, answer.body.error.fields[0].path]).toEqual([422, 'Idempotency-Key']);
    }
  });

  it('say that the same request is running; one left behind by a dead server is taken over', async () => {
    const { client, companyId } = (await makeCuttingContractor()).owner;
    const [input, idempotencyKey] = [truck('Late'), randomUUID()];
    await expectStatus(client.post(path, input, { idempotencyKey }), 201);
    await sql(
      'UPDATE idempotency_key SET status = NULL, created_at = now() WHERE company_id = $1 AND key = $2',
      [companyId, idempotencyKey],
    );
    const running = await client.post(path, input, { idempotencyKey });
    expect([running.status, running.body.error.code]).toEqual([409, 'request_running']);
    await sql(`UPDATE idempotency_key SET created_at = now() - interval '2 minutes' WHERE key = $1`, [
      idempotencyKey,
    ]);
    expect((await client.post(path, input, { idempotencyKey })).status).toBe(201);
  });

  it('keep an HMAC of the input, not the input', async () => {
    const { client, companyId } = (await makeCuttingContractor()).owner;
    await expectStatus(client.post(path, truck('A very particular truck')), 201);
    const rows = await sql<{ whole: string }>(
      'SELECT k::text AS whole FROM idempotency_key k WHERE company_id = $1',
      [companyId],
    );
    expect(rows.length).toBeGreaterThan(0);
    for (const { whole } of rows) expect(whole).not.toContain('particular');
  });
});

describe('places', () => {
  it('knows ZIP codes with their time zones, and zones of positions; asks for a sign-in', async () => {
    const { client } = gc.owner;
    const zones = {
      '80202': 'America/Denver',
      '85001': 'America/Phoenix',
      '96801': 'Pacific/Honolulu',
      '10001': 'America/New_York',
      '60601': 'America/Chicago',
      '99501': 'America/Anchorage',
    };
    for (const [zip, timeZone] of Object.entries(zones)) {
      expect((await client.get(`/api/places/zip/${zip}`)).body).toMatchObject({ zip, timeZone });
    }
    expect((await client.get('/api/places/time-zone?lat=34.05&lon=-118.24')).body).toEqual({
      timeZone: 'America/Los_Angeles',
    });
    for (const path of ['/api/places/zip/00000', '/api/places/zip/K1A0B1', '/api/places/zip/8020']) {
      expect([path, (await client.get(path)).status]).toEqual([path, 404]);
    }
    expect((await new Client().get('/api/places/zip/80202')).status).toBe(401);
  });
});
