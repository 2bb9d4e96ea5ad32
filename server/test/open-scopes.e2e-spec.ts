import { distanceMiles } from '@kerfyard/common/places';
import type { Page } from '@kerfyard/common/api';
import type { ErrorBody } from '@kerfyard/common/errors';
import type { Actor } from '@kerfyard/common/people';
import { openScopesQuerySchema, type ScopeCardView } from '@kerfyard/common/scopes';
import { Sequelize } from 'sequelize';
import { OwnMarks } from '../src/bids/own-marks.ts';
import { UnitOfWork } from '../src/platform/database/unit-of-work.ts';
import { ScopeAccess } from '../src/scopes/scope-access.ts';
import { ScopeLists } from '../src/scopes/scope-lists.ts';
import { ScopeReader } from '../src/scopes/scope-reader.ts';
import { Client } from './client.ts';
import { startQueryCounter } from './query-counter.ts';
import { closeDatabase } from './database.ts';
import {
  addPerson,
  expectStatus,
  makeCompany,
  makeCuttingContractor,
  makeGeneralContractor,
  type Company,
} from './builders/people.ts';
import {
  completeDraft,
  cutLine,
  inDays,
  lumpBid,
  moveDue,
  placeBid,
  publishScope,
} from './builders/scopes.ts';

// Out at sea no other spec has a site: distances from here find these scopes alone.
const BUOY = { zip: '96701', lat: 21.4, lon: -158.5 };
const SITES = [
  { lat: 21.45, lon: -158.5 },
  { lat: 21.9, lon: -158.5 },
  { lat: 23.1, lon: -158.5 },
];

describe('the list of open scopes', () => {
  let gc: Company;
  let crew: Company;
  const ids: string[] = [];

  beforeAll(async () => {
    gc = await makeGeneralContractor();
    crew = await makeCuttingContractor({ yard: BUOY, serviceRadiusMi: 40, methods: ['core_drill'] });
    for (const [n, place] of SITES.entries()) {
      const cuts =
        n === 1
          ? [cutLine('B1', { kind: 'core', diameterIn: 4, depthIn: 8, count: 6 })]
          : [cutLine('A1', { kind: 'line', lengthFt: 100 * (n + 1), depthIn: 5, count: 1 })];
      const draft = completeDraft();
      const scope = await publishScope(gc, {
        title: `At sea ${n}`,
        cuts,
        site: { ...draft.site, ...place, state: 'HI', city: 'Buoy' },
        dueAt: inDays(10 - n),
      });
      ids.push(scope.id);
    }
  });
  afterAll(closeDatabase);

  const list = async (query: Record<string, string | number>, client: Client = crew.owner.client) =>
    (await expectStatus(client.get('/api/open-scopes', { query }), 200)).body as Page<ScopeCardView>;
  const own = (page: Page<ScopeCardView>) =>
    page.items.map((item) => ids.indexOf(item.id)).filter((n) => n >= 0);

  it('measures from the yard: within so many miles, nearest first, as the haversine formula does', async () => {
    expect(own(await list({ withinMiles: 5 }))).toEqual([0]);
    expect(own(await list({ withinMiles: 60, sort: 'nearest' }))).toEqual([0, 1]);
    const all = await list({ withinMiles: 200, sort: 'nearest' });
    expect(own(all)).toEqual([0, 1, 2]);
    for (const item of all.items) {
      const site = SITES[ids.indexOf(item.id)];
      if (site !== undefined) expect(item.distanceMi).toBeCloseTo(distanceMiles(BUOY, site), 0);
    }
  });

  it('filters by method, size and due', async () => {
    const near = { withinMiles: 200 };
    expect(own(await list({ ...near, method: 'core_drill' }))).toEqual([1]);
    expect(own(await list({ ...near, method: 'flat_saw', sort: 'due' }))).toEqual([2, 0]);
    expect(own(await list({ ...near, minInchFeet: 501, sort: 'due' }))).toEqual([2]);
    expect(own(await list({ ...near, maxInchFeet: 500, sort: 'due' }))).toEqual([1, 0]);
    expect(own(await list({ ...near, dueBefore: inDays(8.5), sort: 'due' }))).toEqual([2]);
  });

  it.each([
    ['newest', [2, 1, 0]],
    ['due', [2, 1, 0]],
    ['nearest', [0, 1, 2]],
    ['largest', [2, 0, 1]],
  ] as const)('sorts by %s, the same page by page', async (sort, expected) => {
    const seen: number[] = [];
    let cursor: string | null = null;
    do {
      const query: Record<string, string | number> = { withinMiles: 200, sort, limit: 1 };
      if (cursor !== null) query.cursor = cursor;
      const page: Page<ScopeCardView> = await list(query);
      seen.push(...own(page));
      cursor = page.nextCursor;
    } while (cursor !== null);
    expect(seen).toEqual(expected);
  });

  it('shows a card with sketch, totals and the general contractor’s record, and nothing of rivals', async () => {
    const rival = await makeCuttingContractor({ yard: BUOY });
    await placeBid(rival, ids[1] ?? '', lumpBid(500_000));
    const { items } = await list({ withinMiles: 200, method: 'core_drill' });
    expect(items[0]).toMatchObject({
      title: 'At sea 1',
      status: 'open',
      mode: 'sealed',
      totals: { coreHoles: 6, coreInches: 48 },
      cutCount: 1,
      gc: { id: gc.id, name: gc.name },
      gcRecord: { due: 0, awarded: 0 },
      ownBid: null,
      bidCount: null,
    });
    expect(items[0]?.cuts[0]?.cut).toMatchObject({ kind: 'core' });
  });

  it('leaves out what is due, though its opening has not run yet', async () => {
    const draft = completeDraft();
    const scope = await publishScope(gc, { site: { ...draft.site, ...SITES[0], state: 'HI' } });
    await moveDue(scope.id, -1);
    const { items } = await list({ withinMiles: 5 });
    expect(items.map((item) => item.id)).not.toContain(scope.id);
  });

  it('asks for a yard before it measures', async () => {
    const yardless = await makeCompany('cutting_contractor');
    const page = await list({}, yardless.owner.client);
    expect(page.items.every((item) => item.distanceMi === null)).toBe(true);
    for (const query of ['sort=nearest', 'withinMiles=10']) {
      const refused = await yardless.owner.client.get(`/api/open-scopes?${query}`);
      expect([refused.status, (refused.body as ErrorBody).error.code]).toEqual([409, 'profile_incomplete']);
    }
  });

  it('refuses what it does not know, and cursors of another order (D-19, D-28, D-32)', async () => {
    const cursor = (await list({ limit: 1, sort: 'due', withinMiles: 200 })).nextCursor;
    for (const query of [
      'sort=title',
      'limit=101',
      'limit=1&limit=2',
      'withinMiles=0',
      'method[]=flat_saw',
      `method=${encodeURIComponent("' OR 1=1")}`,
      'status=draft',
      `cursor=${cursor ?? ''}&sort=newest`,
      'cursor=bm9uc2Vuc2U',
      `cursor=${Buffer.from('["newest",1e99,"0192f000-0000-7000-8000-000000000001"]').toString('base64url')}`,
    ]) {
      expect([query, (await crew.owner.client.get(`/api/open-scopes?${query}`)).status]).toEqual([
        query,
        422,
      ]);
    }
  });

  it('is for crews: signed in, and without own bids for the field', async () => {
    expect((await new Client().get('/api/open-scopes')).status).toBe(401);
    expect((await gc.owner.client.get('/api/open-scopes')).status).toBe(403);
    await placeBid(crew, ids[0] ?? '', lumpBid(500_000));
    const field = await addPerson(crew, 'field');
    const find = (page: Page<ScopeCardView>) => page.items.find((item) => item.id === ids[0])?.ownBid;
    expect(find(await list({ withinMiles: 5 }))).toMatchObject({ status: 'in' });
    expect(find(await list({ withinMiles: 5 }, field.client))).toBeNull();
  });

  it('costs the same few statements for one row and for twenty-five', async () => {
    for (let n = 0; n < 25; n += 1) await publishScope(gc);
    // Readers of our own behind the counter: the app's timed jobs would be counted too.
    const counter = await startQueryCounter(process.env.TEST_PG_URL ?? '');
    const sequelize = new Sequelize(counter.url, {
      logging: false,
      // One connection: each new one sends statements of its own, whenever the pool opens it.
      pool: { max: 1 },
      dialectOptions: { application_name: 'reader' },
    });
    const uow = new UnitOfWork(sequelize);
    const lists = new ScopeLists(uow, new ScopeAccess(uow), new ScopeReader(uow), new OwnMarks(uow));
    const { owner } = crew;
    const actor: Actor = {
      userId: owner.userId,
      sessionId: '',
      name: owner.name,
      isStaff: false,
      company: { id: crew.id, kind: 'cutting_contractor', name: crew.name },
      role: 'owner',
      limits: { signCents: null, setAsideCents: null, changeCents: null },
    };
    const cost = async (limit: number) => {
      const before = counter.count('reader');
      const page = await lists.open(actor, openScopesQuerySchema.parse({ limit }));
      expect(page.items).toHaveLength(limit);
      return counter.count('reader') - before;
    };
    await cost(1);
    await cost(25);
    const costs = [await cost(1), await cost(25)];
    await sequelize.close();
    await counter.close();
    expect(costs[0]).toBe(costs[1]);
    expect(costs[0]).toBeGreaterThanOrEqual(4);
    expect(costs[0]).toBeLessThanOrEqual(6);
  });
});
