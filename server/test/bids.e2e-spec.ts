import { randomUUID } from 'node:crypto';
import type { BidListItem, BidPricePreview, BidTabulationView, OwnBidView } from '@kerfyard/common/bids';
import type { ErrorBody } from '@kerfyard/common/errors';
import type { ScopeDetailView } from '@kerfyard/common/scopes';
import { Client } from './client.ts';
import { closeDatabase, sql } from './database.ts';
import { openLine } from './live.ts';
import {
  addPerson,
  expectStatus,
  makeCompany,
  makeCuttingContractor,
  makeGeneralContractor,
  type Company,
} from './builders/people.ts';
import {
  comeDue,
  completeDraft,
  linesBid,
  lumpBid,
  makeDraft,
  moveDue,
  placeBid,
  publishScope,
} from './builders/scopes.ts';

const errorOf = (response: { body: unknown }) => (response.body as ErrorBody).error;
const fieldsOf = (response: { body: unknown }) => (errorOf(response).fields ?? []).map((field) => field.path);

describe('bids on a sealed scope', () => {
  let gc: Company;
  let crew: Company;
  let rival: Company;
  let scope: ScopeDetailView;

  beforeAll(async () => {
    [gc, crew, rival] = await Promise.all([
      makeGeneralContractor(),
      makeCuttingContractor(),
      makeCuttingContractor(),
    ]);
  });
  beforeEach(async () => {
    scope = await publishScope(gc);
  });
  afterAll(closeDatabase);

  const put = (company: Pick<Company, 'owner'>, body: object) =>
    company.owner.client.put(`/api/scopes/${scope.id}/own-bid`, body);
  const own = async (company: Pick<Company, 'owner'>) =>
    (await expectStatus(company.owner.client.get(`/api/scopes/${scope.id}/own-bid`), 200))
      .body as OwnBidView | null;
  const tabulation = async () =>
    (await expectStatus(gc.owner.client.get(`/api/scopes/${scope.id}/bids`), 200)).body as BidTabulationView;

  it('are priced by the server from the scope’s quantities and read back by their own crew', async () => {
    const [trench, cores] = scope.body?.cuts ?? [];
    const price = {
      form: 'lines',
      lines: [
        { cutId: trench?.id, unit: 'in_ft', rate: 8500 },
        { cutId: cores?.id, unit: 'each', rate: 450_000, factors: [150] },
      ],
      minimumCents: 45_000,
      mobilizationCents: 12_500,
      minimumIncludesMobilization: false,
    };
    const preview = await expectStatus(
      crew.owner.client.post(`/api/scopes/${scope.id}/bid-price`, { revision: 1, price }),
      200,
    );
    // 504 × $0.85 = $428.40; 6 × $45 × 1.5 = $405.00; mobilization $125.00 on top.
    expect((preview.body as BidPricePreview).priced).toMatchObject({
      totalCents: 95_840,
      computedCents: 83_340,
    });
    const answer = await put(crew, {
      ...lumpBid(100),
      price,
      answers: [{ item: 'slurry', answer: 'excluded' }],
    });
    expect(answer.status).toBe(200);
    expect(answer.body).toMatchObject({
      status: 'in',
      version: 1,
      priced: { totalCents: 95_840 },
      rank: null,
    });
    expect(await own(crew)).toEqual(answer.body);
  });

  it('are none at first, and that is no error', async () => {
    const response = await crew.owner.client.get(`/api/scopes/${scope.id}/own-bid`);
    expect([response.status, response.text]).toEqual([200, 'null']);
  });

  it('refuse a total, amounts that are no whole cents, and unknown fields (D-07)', async () => {
    const faulty: object[] = [
      { ...lumpBid(5_000), totalCents: 1 },
      ...[-1, 0, 0.1, 2 ** 53, '5000', '1e3', null].map((lumpCents) => ({
        ...lumpBid(5_000),
        price: { form: 'lump', lumpCents },
      })),
      { ...lumpBid(5_000), price: { form: 'lump', lumpCents: 5_000, currency: 'eur' } },
      { ...lumpBid(5_000), companyId: rival.id },
    ];
    for (const body of faulty) expect((await put(crew, body)).status).toBe(422);
    const infinite = JSON.stringify(lumpBid(5_000)).replace('5000', '1e309');
    const sending = crew.owner.client.prepare('put', `/api/scopes/${scope.id}/own-bid`);
    expect((await sending.type('json').send(infinite)).status).toBe(422);
    expect(await own(crew)).toBeNull();
  });

  it('name everything wrong at once: foreign cut, cut left out, answer that is not the crew’s', async () => {
    const bid = linesBid(scope, 5_000, { answers: [{ item: 'scan', answer: 'included' }] });
    if (bid.price.form !== 'lines') throw new Error('lines');
    bid.price.lines = [{ cutId: randomUUID(), unit: 'lf', rate: 1, factors: [] }];
    expect(fieldsOf(await put(crew, bid))).toEqual(['price.lines.0.unit', 'price.lines', 'answers.0.item']);
  });

  it('ask for the form the scope names', async () => {
    scope = await publishScope(gc, { terms: { ...completeDraft().terms, priceForm: 'lump' } });
    expect(fieldsOf(await put(crew, linesBid(scope, 5_000)))).toEqual(['price.form']);
    expect((await put(crew, lumpBid(5_000))).status).toBe(200);
  });

  it('are made on the revision that stands', async () => {
    const stale = await put(crew, lumpBid(5_000, { revision: 2 }));
    expect([stale.status, errorOf(stale).code]).toEqual([409, 'stale_revision']);
  });

  it('need yard, radius and a method, each named when missing', async () => {
    const fresh = await makeCompany('cutting_contractor');
    const refused = await put(fresh, lumpBid(5_000));
    expect(errorOf(refused).code).toBe('profile_incomplete');
    expect(fieldsOf(refused)).toEqual(['yard', 'service_radius', 'methods']);
  });

  it('need sign-in, a crew and a role; drafts and missing scopes answer 404', async () => {
    const body = lumpBid(5_000);
    const path = `/api/scopes/${scope.id}/own-bid`;
    const [field, accounts] = await Promise.all([addPerson(crew, 'field'), addPerson(crew, 'accounts')]);
    expect((await new Client().put(path, body)).status).toBe(401);
    expect((await gc.owner.client.put(path, body)).status).toBe(403);
    expect((await field.client.put(path, body)).status).toBe(403);
    expect((await accounts.client.put(path, body)).status).toBe(403);
    expect((await field.client.get(path)).status).toBe(403);
    expect((await accounts.client.get(path)).status).toBe(200);
    const draft = await makeDraft(gc);
    for (const id of [draft.id, randomUUID()]) {
      for (const answer of [
        await crew.owner.client.put(`/api/scopes/${id}/own-bid`, body),
        await crew.owner.client.get(`/api/scopes/${id}/own-bid`),
        await crew.owner.client.post(`/api/scopes/${id}/own-bid/withdraw`),
        await crew.owner.client.post(`/api/scopes/${id}/bid-price`, { revision: 1, price: body.price }),
        await crew.owner.client.get(`/api/scopes/${id}/bid-draft`),
        await crew.owner.client.put(`/api/scopes/${id}/bid-draft`, { draft: {} }),
      ]) {
        expect(answer.status).toBe(404);
      }
    }
  });

  it('are revised as often as wanted, and the same again is the same bid', async () => {
    const first = await placeBid(crew, scope.id, lumpBid(500_000));
    const again = await placeBid(crew, scope.id, lumpBid(500_000));
    expect(again).toEqual(first);
    const dearer = await placeBid(crew, scope.id, lumpBid(600_000));
    expect(dearer).toMatchObject({ id: first.id, version: 2, priced: { totalCents: 600_000 } });
    const audit = await sql<{ action: string; detail: object }>(
      `SELECT action, detail FROM audit_event WHERE subject_id = $1 ORDER BY id`,
      [first.id],
    );
    expect(audit).toEqual([
      { action: 'bid.submitted', detail: { scopeId: scope.id, revision: 1 } },
      { action: 'bid.revised', detail: { scopeId: scope.id, revision: 1 } },
    ]);
  });

  it('handed in many times at once stay one bid', async () => {
    const answers = await Promise.all(Array.from({ length: 10 }, (_, n) => put(crew, lumpBid(500_000 + n))));
    expect(new Set(answers.map((answer) => answer.status))).toEqual(new Set([200]));
    const rows = await sql('SELECT 1 FROM sealed_bid WHERE scope_id = $1', [scope.id]);
    expect(rows).toHaveLength(1);
  });

  it('show the general contractor a count only, and rivals nothing (D-02)', async () => {
    const line = await openLine(rival.owner.client);
    const gcLine = await openLine(gc.owner.client);
    await line.watch({ topic: 'scope', id: scope.id });
    await placeBid(crew, scope.id, lumpBid(739_184_627));
    await gcLine.hint((hint) => hint.topic === 'bids' && hint.scopeId === scope.id);
    const seen = await tabulation();
    expect(seen).toMatchObject({
      mode: 'sealed',
      status: 'open',
      count: 1,
      bids: [],
      tabulated: [],
      openedAt: null,
    });
    const detail = await rival.owner.client.get(`/api/scopes/${scope.id}`);
    expect(detail.body).toMatchObject({ bidCount: null, seq: scope.seq });
    expect((await rival.owner.client.get(`/api/scopes/${scope.id}/bids`)).status).toBe(403);
    expect(await own(rival)).toBeNull();
    // A bid is heard by the general contractor and the bidder alone: rivals must not count them.
    expect(line.hints.filter((hint) => hint.topic !== 'scopes')).toEqual([]);
    expect(JSON.stringify(gcLine.hints)).not.toContain('739184627');
    line.close();
    gcLine.close();
  });

  it('are another general contractor’s to read never', async () => {
    const other = await makeGeneralContractor();
    expect((await other.owner.client.get(`/api/scopes/${scope.id}/bids`)).status).toBe(404);
    const plugs = { plugs: [] };
    expect((await other.owner.client.put(`/api/scopes/${scope.id}/plugs`, plugs)).status).toBe(404);
  });

  it('are withdrawn before due and may come again; withdrawn ones are not opened', async () => {
    await placeBid(crew, scope.id, lumpBid(500_000));
    await placeBid(rival, scope.id, lumpBid(480_000));
    const withdraw = () => crew.owner.client.post(`/api/scopes/${scope.id}/own-bid/withdraw`);
    expect((await expectStatus(withdraw(), 200)).body).toMatchObject({ status: 'withdrawn' });
    expect(errorOf(await withdraw()).code).toBe('illegal_move');
    expect((await tabulation()).count).toBe(1);
    expect(await placeBid(crew, scope.id, lumpBid(500_000))).toMatchObject({ status: 'in' });
    await expectStatus(withdraw(), 200);
    const opened = await comeDue(gc, scope.id);
    expect(opened.bids.map((bid) => bid.crew.id)).toEqual([rival.id]);
    expect(errorOf(await withdraw()).code).toBe('bids_closed');
    expect(await own(crew)).toMatchObject({ status: 'withdrawn', priced: { totalCents: 500_000 } });
  });

  it('without one there is nothing to withdraw', async () => {
    const answer = await crew.owner.client.post(`/api/scopes/${scope.id}/own-bid/withdraw`);
    expect(answer.status).toBe(404);
  });

  it('have a draft that only their own crew reads and that goes when the bid is in', async () => {
    const path = `/api/scopes/${scope.id}/bid-draft`;
    const draft = { price: { form: 'lump', lump: '7,391.84' }, note: 'half typed' };
    await expectStatus(crew.owner.client.put(path, { draft }), 200);
    expect((await crew.owner.client.get(path)).body).toMatchObject({ draft });
    expect((await rival.owner.client.get(path)).body).toEqual({ draft: null, updatedAt: null });
    const dump = await sql<{ row: string }>('SELECT d::text AS row FROM bid_draft d WHERE scope_id = $1', [
      scope.id,
    ]);
    expect(dump[0]?.row).not.toContain('7,391');
    const card = async () => {
      const list = await crew.owner.client.get('/api/open-scopes?limit=100');
      return (list.body as { items: { id: string; ownBid: unknown }[] }).items.find(
        (item) => item.id === scope.id,
      );
    };
    expect(await card()).toMatchObject({ ownBid: { status: 'draft' } });
    await placeBid(crew, scope.id, lumpBid(739_184));
    expect((await crew.owner.client.get(path)).body).toEqual({ draft: null, updatedAt: null });
    expect(await card()).toMatchObject({ ownBid: { status: 'in', rank: null, of: null } });
    const big = { draft: { note: 'x'.repeat(300_000) } };
    expect((await crew.owner.client.put(path, big)).status).toBe(413);
  });

  it('are listed for their crew, sealed ones too, page by page', async () => {
    const busy = await makeCuttingContractor();
    const scopes = [scope, await publishScope(gc), await publishScope(gc, { mode: 'ranked' })];
    for (const [n, one] of scopes.entries()) await placeBid(busy, one.id, lumpBid(100_000 * (n + 1)));
    await comeDue(gc, scope.id);
    const page = async (cursor?: string) => {
      const query: Record<string, string | number> = {
        limit: 2,
        ...(cursor === undefined ? {} : { cursor }),
      };
      const answer = await expectStatus(busy.owner.client.get('/api/bids', { query }), 200);
      return answer.body as { items: BidListItem[]; nextCursor: string | null };
    };
    const first = await page();
    const second = await page(first.nextCursor ?? '');
    const items = [...first.items, ...second.items];
    expect(items.map((item) => [item.scopeId, item.totalCents, item.status])).toEqual([
      [scopes[2]?.id, 300_000, 'in'],
      [scopes[1]?.id, 200_000, 'in'],
      [scopes[0]?.id, 100_000, 'opened'],
    ]);
    expect(second.nextCursor).toBeNull();
    const foreign = await busy.owner.client.get('/api/bids', { query: { cursor: 'x' } });
    expect(foreign.status).toBe(422);
  });

  describe('once due', () => {
    it('are side by side with what each leaves out added back at the plug’s price', async () => {
      const third = await makeCuttingContractor();
      await placeBid(crew, scope.id, lumpBid(500_000, { answers: [{ item: 'slurry', answer: 'excluded' }] }));
      await placeBid(
        rival,
        scope.id,
        lumpBid(510_000, {
          answers: [
            { item: 'cut', answer: 'included' },
            { item: 'slurry', answer: 'included' },
          ],
        }),
      );
      await placeBid(third, scope.id, linesBid(scope, 400_000));
      const opened = await comeDue(gc, scope.id);
      expect(opened).toMatchObject({ status: 'due', count: 3, awardedBidId: null });
      expect(opened.openedAt).not.toBeNull();
      expect(opened.rows).toEqual([
        { item: 'cut', plugCents: 0 },
        { item: 'slurry', plugCents: 0 },
      ]);
      const plugged = await expectStatus(
        gc.owner.client.put(`/api/scopes/${scope.id}/plugs`, { plugs: [{ item: 'slurry', cents: 15_000 }] }),
        200,
      );
      const { tabulated, bids } = plugged.body as BidTabulationView;
      const byCrew = new Map(bids.map((bid) => [bid.id, bid.crew.id]));
      expect(tabulated.map((row) => [byCrew.get(row.bidId), row.adjustedCents, row.unclear])).toEqual([
        [rival.id, 510_000, 0],
        [crew.id, 515_000, 1],
        [third.id, 2_800_000, 2],
      ]);
      const lines = await sql(
        'SELECT 1 FROM bid_line l JOIN bid b ON b.id = l.bid_id WHERE b.scope_id = $1',
        [scope.id],
      );
      expect(lines).toHaveLength(2);
      expect(bids.every((bid) => bid.distanceMi === 0)).toBe(true);
    });

    it('take plugs only for what the crew has, once each', async () => {
      const plugs = [
        { item: 'scan', cents: 1 },
        { item: 'cut', cents: 1 },
        { item: 'cut', cents: 2 },
      ];
      const refused = await gc.owner.client.put(`/api/scopes/${scope.id}/plugs`, { plugs });
      expect(fieldsOf(refused)).toEqual(['plugs.0.item', 'plugs.2.item']);
      await expectStatus(gc.owner.client.post(`/api/scopes/${scope.id}/withdraw`), 200);
      const late = await gc.owner.client.put(`/api/scopes/${scope.id}/plugs`, { plugs: [] });
      expect(errorOf(late).code).toBe('illegal_move');
    });

    it('are not taken any more, but the same one sent again is still that bid', async () => {
      await placeBid(crew, scope.id, lumpBid(500_000));
      await moveDue(scope.id, -1);
      expect(errorOf(await put(rival, lumpBid(1_000))).code).toBe('bids_closed');
      expect(errorOf(await put(crew, lumpBid(400_000))).code).toBe('bids_closed');
      expect((await put(crew, lumpBid(500_000))).status).toBe(200);
      await comeDue(gc, scope.id);
      expect(await own(crew)).toMatchObject({ status: 'opened', priced: { totalCents: 500_000 } });
    });
  });
});
