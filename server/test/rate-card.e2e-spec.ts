import { emptyRateCard, type RateCard, type RateCardView } from '@kerfyard/common/people';
import {
  addPerson,
  addStaff,
  expectStatus,
  makeCuttingContractor,
  makeGeneralContractor,
  type Company,
} from './builders/people.ts';
import { Client } from './client.ts';
import { closeDatabase, sql } from './database.ts';

const path = '/api/company/rate-card';
let gc: Company;
let crew: Company;

beforeAll(async () => {
  [gc, crew] = await Promise.all([makeGeneralContractor(), makeCuttingContractor()]);
});
afterAll(closeDatabase);

/** A card that can be found again wherever it should not be. */
function card(rate = 7_654_321, over: Partial<RateCard> = {}): RateCard {
  return {
    ...emptyRateCard(),
    rates: [{ method: 'flat_saw', kind: null, unit: 'in_ft', upToIn: 6, rate }],
    minimumCents: 65_000,
    ...over,
  };
}

const view = async (client: Client) => (await expectStatus(client.get(path), 200)).body as RateCardView;

describe('a crew’s rate card', () => {
  it('is empty before it is saved, then comes back as it was put, version by version', async () => {
    const { client } = crew.owner;
    expect(await view(client)).toEqual({ card: null, version: 0, updatedAt: null });
    const first = await expectStatus(client.put(path, { version: 0, card: card() }), 200);
    expect(first.body).toMatchObject({ version: 1, card: card() });
    expect(await view(client)).toEqual(first.body);
    const second = await expectStatus(client.put(path, { version: 1, card: card(1) }), 200);
    expect(second.body).toMatchObject({ version: 2, card: card(1) });
  });

  it('is refused whole when someone saved another meanwhile; of ten at once one wins', async () => {
    const { client } = (await makeCuttingContractor()).owner;
    const save = (version: number) =>
      Promise.all(
        Array.from({ length: 10 }, (_, n) => client.tab().put(path, { version, card: card(n + 1) })),
      );
    for (const version of [0, 1]) {
      const answers = await save(version);
      expect(answers.map(({ status }) => status).sort()).toEqual([200, ...Array(9).fill(409)]);
      const lost = answers.find(({ status }) => status === 409);
      expect(lost?.body.error.code).toBe('stale_version');
      expect((await view(client)).version).toBe(version + 1);
    }
    expect((await client.put(path, { version: 7, card: card() })).status).toBe(409);
  });

  it('is seen by those who see bids, edited by those who hand them in, and is nothing to anybody else', async () => {
    await expectStatus(crew.owner.client.put(path, { version: 2, card: card() }), 200);
    const [manager, accounts, field, staff] = await Promise.all([
      addPerson(crew, 'manager'),
      addPerson(crew, 'accounts'),
      addPerson(crew, 'field'),
      addStaff(gc),
    ]);
    const rows = [
      [manager.client, 200, 200],
      [accounts.client, 200, 403],
      [field.client, 403, 403],
      [gc.owner.client, 404, 404],
      [staff.client, 403, 403],
      [new Client(), 401, 401],
    ] as const;
    for (const [client, read, write] of rows) {
      expect((await client.get(path)).status).toBe(read);
      expect((await client.put(path, { version: 3, card: card() })).status).toBe(write);
    }
  });

  it('is never another company’s', async () => {
    const other = await makeCuttingContractor();
    expect(await view(other.owner.client)).toEqual({ card: null, version: 0, updatedAt: null });
    await expectStatus(other.owner.client.put(path, { version: 0, card: card(1) }), 200);
    expect((await view(crew.owner.client)).card?.rates[0]?.rate).toBe(7_654_321);
    const company = await expectStatus(gc.owner.client.get('/api/company'), 200);
    expect(company.text).not.toContain('7654321');
  });

  it('says every fault at its field, and takes no unknown one', async () => {
    const { client } = crew.owner;
    const wrong = card(-1, { minimumCents: 0.5 });
    const answer = await client.put(path, {
      version: 3,
      card: {
        ...wrong,
        factors: { ...wrong.factors, night: 900 },
        rates: [...wrong.rates, { method: 'axe', kind: null, unit: 'lump', upToIn: 0, rate: 1 }],
        companyId: gc.id,
      },
    });
    expect(answer.status).toBe(422);
    const paths = (answer.body.error.fields as { path: string }[]).map((field) => field.path);
    expect(paths.sort()).toEqual([
      'card.companyId',
      'card.factors.night',
      'card.minimumCents',
      'card.rates.0.rate',
      'card.rates.1.method',
      'card.rates.1.unit',
      'card.rates.1.upToIn',
    ]);
    const row = { method: 'flat_saw', kind: null, unit: 'in_ft', rate: 1 };
    const many = Array.from({ length: 501 }, (_, index) => ({ ...row, upToIn: index + 1 }));
    expect((await client.put(path, { version: 3, card: { ...card(), rates: many } })).status).toBe(422);
  });

  it('lies in the database without a readable amount, bound to its company; the audit names no amount', async () => {
    const { client } = crew.owner;
    const { version } = await view(client);
    await expectStatus(client.put(path, { version, card: card() }), 200);
    const rows = await sql<{ row: string; sealed: Buffer }>(
      'SELECT r::text AS row, ciphertext AS sealed FROM rate_card r WHERE company_id = $1',
      [crew.id],
    );
    expect(rows).toHaveLength(1);
    expect(rows[0]?.row).not.toMatch(/7654321|flat_saw/);
    expect(rows[0]?.sealed.toString('latin1')).not.toMatch(/7654321|flat_saw/);
    const audits = await sql<{ detail: string }>(
      `SELECT detail::text AS detail FROM audit_event WHERE subject_id = $1 AND action = 'rate_card.saved'`,
      [crew.id],
    );
    expect(audits.length).toBeGreaterThan(0);
    for (const { detail } of audits) expect(detail).not.toMatch(/7654321|65000/);

    // Another company's ciphertext put into this row does not open.
    const thief = await makeCuttingContractor();
    await sql(`INSERT INTO rate_card (company_id, ciphertext, version, updated_by) VALUES ($1, $2, 1, $3)`, [
      thief.id,
      rows[0]?.sealed,
      thief.owner.userId,
    ]);
    const stolen = await thief.owner.client.get(path);
    expect(stolen.status).toBe(500);
    expect(stolen.text).not.toContain('7654321');
  });
});
