import type { BidTabulationView, OwnBidView } from '@kerfyard/common/bids';
import type { ErrorBody } from '@kerfyard/common/errors';
import type { ScopeDetailView } from '@kerfyard/common/scopes';
import { closeDatabase, sql } from './database.ts';
import { openLine } from './live.ts';
import {
  expectStatus,
  makeCuttingContractor,
  makeGeneralContractor,
  type Company,
} from './builders/people.ts';
import { comeDue, lumpBid, moveDue, placeBid, publishScope } from './builders/scopes.ts';

const codeOf = (response: { body: unknown }) => (response.body as ErrorBody).error.code;

describe('bids on a ranked scope', () => {
  let gc: Company;
  let crews: [Company, Company, Company, Company];
  let scope: ScopeDetailView;

  beforeAll(async () => {
    gc = await makeGeneralContractor();
    crews = await Promise.all([
      makeCuttingContractor(),
      makeCuttingContractor(),
      makeCuttingContractor(),
      makeCuttingContractor(),
    ]);
  });
  beforeEach(async () => {
    scope = await publishScope(gc, { mode: 'ranked' });
  });
  afterAll(closeDatabase);

  const put = (crew: Company, cents: number) =>
    crew.owner.client.put(`/api/scopes/${scope.id}/own-bid`, lumpBid(cents));
  const own = async (crew: Company) =>
    (await expectStatus(crew.owner.client.get(`/api/scopes/${scope.id}/own-bid`), 200)).body as OwnBidView;
  const detail = async () =>
    (await expectStatus(gc.owner.client.get(`/api/scopes/${scope.id}`), 200)).body as ScopeDetailView;
  const tabulation = async () =>
    (await expectStatus(gc.owner.client.get(`/api/scopes/${scope.id}/bids`), 200)).body as BidTabulationView;
  const dueInMs = async () => {
    const [row] = await sql<{ left: number }>(
      `SELECT (extract(epoch FROM due_at - app_now()) * 1000)::float8 AS left FROM scope WHERE id = $1`,
      [scope.id],
    );
    return row?.left ?? 0;
  };

  it('are read by the general contractor at once, all prices', async () => {
    const line = await openLine(gc.owner.client);
    await placeBid(crews[0], scope.id, lumpBid(500_000));
    await line.hint((hint) => hint.topic === 'bids' && hint.scopeId === scope.id);
    await placeBid(crews[1], scope.id, lumpBid(450_000));
    const seen = await tabulation();
    expect(seen).toMatchObject({ mode: 'ranked', status: 'open', count: 2, openedAt: null });
    expect(seen.bids.map((bid) => bid.priced.totalCents)).toEqual([450_000, 500_000]);
    line.close();
  });

  it('have a rank from the third bid on, each crew its own, and all bidders hear when ranks change', async () => {
    await placeBid(crews[0], scope.id, lumpBid(500_000));
    await placeBid(crews[1], scope.id, lumpBid(450_000));
    expect(await own(crews[0])).toMatchObject({ rank: null, of: null, revisionsLeft: 5 });
    const line = await openLine(crews[0].owner.client);
    const stranger = await openLine(crews[3].owner.client);
    await stranger.watch({ topic: 'scope', id: scope.id });
    await placeBid(crews[2], scope.id, lumpBid(475_000));
    await line.hint((hint) => hint.topic === 'own_bid' && hint.scopeId === scope.id);
    expect(stranger.hints.filter((hint) => hint.topic !== 'scopes')).toEqual([]);
    const ranks = await Promise.all([crews[0], crews[1], crews[2]].map(own));
    expect(ranks.map((bid) => [bid.rank, bid.of])).toEqual([
      [3, 3],
      [1, 3],
      [2, 3],
    ]);
    await placeBid(crews[0], scope.id, lumpBid(440_000));
    expect(await own(crews[0])).toMatchObject({ rank: 1, of: 3, revisionsLeft: 4 });
    const card = await crews[0].owner.client.get('/api/open-scopes?limit=100');
    const items = (card.body as { items: { id: string; ownBid: unknown }[] }).items;
    expect(items.find((item) => item.id === scope.id)?.ownBid).toEqual({ status: 'in', rank: 1, of: 3 });
    // A withdrawal takes the rank away again: with two left it would give a price away.
    await expectStatus(crews[2].owner.client.post(`/api/scopes/${scope.id}/own-bid/withdraw`), 200);
    expect(await own(crews[0])).toMatchObject({ rank: null, of: null });
    line.close();
    stranger.close();
  });

  it('rank the earlier of two equal bids first', async () => {
    for (const crew of [crews[0], crews[1], crews[2]]) await placeBid(crew, scope.id, lumpBid(500_000));
    const ranks = await Promise.all([crews[0], crews[1], crews[2]].map(own));
    expect(ranks.map((bid) => bid.rank)).toEqual([1, 2, 3]);
  });

  it('never show a crew another’s price (D-02)', async () => {
    await placeBid(crews[0], scope.id, lumpBid(512_345));
    await placeBid(crews[1], scope.id, lumpBid(623_456));
    await placeBid(crews[2], scope.id, lumpBid(734_567));
    const line = await openLine(crews[1].owner.client);
    await placeBid(crews[0], scope.id, lumpBid(498_765));
    await line.hint((hint) => hint.topic === 'own_bid');
    const answers = await Promise.all(
      [`scopes/${scope.id}`, `scopes/${scope.id}/own-bid`, 'bids', 'open-scopes?limit=100'].map((path) =>
        crews[1].owner.client.get(`/api/${path}`),
      ),
    );
    const seen = answers.map((answer) => answer.text).join('\n') + JSON.stringify(line.hints);
    expect(seen).toContain('623456');
    for (const foreign of ['512345', '498765', '734567']) expect(seen).not.toContain(foreign);
    line.close();
  });

  it('only go down, by at least 1 % and $10', async () => {
    await placeBid(crews[0], scope.id, lumpBid(500_000));
    for (const cents of [500_001, 499_999, 495_001]) {
      const refused = await put(crews[0], cents);
      expect([refused.status, codeOf(refused)]).toEqual([409, 'bid_must_go_down']);
    }
    expect((await put(crews[0], 495_000)).status).toBe(200);
    const small = await publishScope(gc, { mode: 'ranked' });
    await placeBid(crews[0], small.id, lumpBid(5_000));
    const step = (cents: number) =>
      crews[0].owner.client.put(`/api/scopes/${small.id}/own-bid`, lumpBid(cents));
    expect(codeOf(await step(4_001))).toBe('bid_must_go_down');
    expect((await step(4_000)).status).toBe(200);
  });

  it('are revised five times, the same again not counted', async () => {
    await placeBid(crews[0], scope.id, lumpBid(500_000));
    for (let n = 1; n <= 5; n += 1) {
      await placeBid(crews[0], scope.id, lumpBid(500_000 - 10_000 * n));
      const again = await placeBid(crews[0], scope.id, lumpBid(500_000 - 10_000 * n));
      expect(again.revisionsLeft).toBe(5 - n);
    }
    expect(codeOf(await put(crews[0], 400_000))).toBe('bid_revisions_used');
    const lines = await sql('SELECT 1 FROM bid WHERE scope_id = $1', [scope.id]);
    expect(lines).toHaveLength(1);
  });

  it('stay away once withdrawn', async () => {
    await placeBid(crews[0], scope.id, lumpBid(500_000));
    await expectStatus(crews[0].owner.client.post(`/api/scopes/${scope.id}/own-bid/withdraw`), 200);
    expect(codeOf(await put(crews[0], 400_000))).toBe('bid_withdrawn');
    expect(codeOf(await put(crews[0], 500_000))).toBe('bid_withdrawn');
    expect((await tabulation()).count).toBe(0);
  });

  it('in the last two minutes move due to two minutes after them, and everyone hears', async () => {
    await moveDue(scope.id, 60_000);
    const line = await openLine(crews[3].owner.client);
    await line.watch({ topic: 'scope', id: scope.id });
    await placeBid(crews[0], scope.id, lumpBid(500_000));
    const left = await dueInMs();
    expect(left).toBeGreaterThan(115_000);
    expect(left).toBeLessThanOrEqual(120_000);
    await line.hint((hint) => hint.topic === 'scope' && hint.scopeId === scope.id);
    const seen = await detail();
    expect(seen.seq).toBe(scope.seq + 1);
    expect(seen.body?.bidding.dueAt).toBe(seen.dueAt);
    const jobs = await sql(
      `SELECT 1 FROM pgboss.job WHERE name = 'come_due' AND data->>'scopeId' = $1`,
      [scope.id],
      'super',
    );
    expect(jobs).toHaveLength(2);
    line.close();
  });

  it('leave due alone before that, when nothing changes, and after ten extensions', async () => {
    await moveDue(scope.id, 180_000);
    await placeBid(crews[0], scope.id, lumpBid(500_000));
    expect(await dueInMs()).toBeGreaterThan(170_000);
    await moveDue(scope.id, 60_000);
    await placeBid(crews[0], scope.id, lumpBid(500_000));
    expect(await dueInMs()).toBeLessThanOrEqual(60_000);
    await sql('UPDATE scope SET extensions = 9 WHERE id = $1', [scope.id], 'owner');
    await placeBid(crews[1], scope.id, lumpBid(400_000));
    expect(await dueInMs()).toBeGreaterThan(115_000);
    await moveDue(scope.id, 60_000);
    await placeBid(crews[2], scope.id, lumpBid(390_000));
    expect(await dueInMs()).toBeLessThanOrEqual(60_000);
  });

  it('close at due: nothing more comes in and what stands can be awarded', async () => {
    await placeBid(crews[0], scope.id, lumpBid(500_000));
    await placeBid(crews[1], scope.id, lumpBid(480_000));
    await expectStatus(crews[1].owner.client.post(`/api/scopes/${scope.id}/own-bid/withdraw`), 200);
    const seen = await comeDue(gc, scope.id);
    expect(seen).toMatchObject({ status: 'due', count: 1 });
    expect(seen.openedAt).not.toBeNull();
    expect(codeOf(await put(crews[0], 400_000))).toBe('bids_closed');
    expect(await own(crews[0])).toMatchObject({ status: 'opened' });
    expect(await own(crews[1])).toMatchObject({ status: 'withdrawn' });
  });

  it('handed in at once by many crews are all there, ranked without gaps', async () => {
    const many = await Promise.all(Array.from({ length: 8 }, () => makeCuttingContractor()));
    const answers = await Promise.all(many.map((crew, n) => put(crew, 500_000 + 1_000 * n)));
    expect(answers.every((answer) => answer.status === 200)).toBe(true);
    const ranks = await Promise.all(many.map(async (crew) => (await own(crew)).rank));
    expect(ranks).toEqual([1, 2, 3, 4, 5, 6, 7, 8]);
  });
});
