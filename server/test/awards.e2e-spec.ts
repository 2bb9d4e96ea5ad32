import { createHash, randomUUID } from 'node:crypto';
import type { OwnBidView } from '@kerfyard/common/bids';
import type { ErrorBody } from '@kerfyard/common/errors';
import type { ScopeDetailView } from '@kerfyard/common/scopes';
import {
  addPerson,
  expectStatus,
  makeCuttingContractor,
  makeGeneralContractor,
  signIn,
} from './builders/people.ts';
import { comeDue, linesBid, lumpBid, placeBid, publishScope } from './builders/scopes.ts';
import { award, awardedWork, dueScope, viewWork } from './builders/awards.ts';
import { Client } from './client.ts';
import { closeDatabase, sql } from './database.ts';
import { fileBytes } from './file-bytes.ts';
import { openLine } from './live.ts';
import { mailTo } from './mail.ts';
import { readPdfText } from './pdf-text.ts';
import { startSecondServer } from './second-server.ts';

const codeOf = (response: { body: unknown }) => (response.body as ErrorBody).error.code;
const statuses = (answers: readonly { status: number }[]) =>
  answers.reduce<Record<number, number>>(
    (counts, { status }) => ({ ...counts, [status]: (counts[status] ?? 0) + 1 }),
    {},
  );

describe('awards', () => {
  afterAll(closeDatabase);

  it('write a subcontract, its schedule of values and its paper, and tell both sides', async () => {
    const due = await dueScope([1_000_000, 1_040_000, 1_400_000]);
    const [winner, second] = due.crews;
    const lines = await Promise.all([openLine(winner!.owner.client), openLine(second!.owner.client)]);
    const answer = await expectStatus(award(due.gc, due.scope.id, due.bidIds[0]!), 201);
    const { subcontractId } = answer.body as { subcontractId: string };

    const view = await viewWork(winner!.owner, subcontractId);
    expect(view).toMatchObject({
      status: 'awaiting_signatures',
      side: 'crew',
      totalCents: 1_000_000,
      scopeId: due.scope.id,
      signatures: [],
      signedDocument: null,
      money: {
        contractCents: 1_000_000,
        setAsideCents: 0,
        releasedCents: 0,
        retainageCents: 0,
        objectedCents: 0,
      },
    });
    expect(view.number).toMatch(/^S-\d{4,}$/);
    expect(view.sov.reduce((sum, line) => sum + line.amountCents, 0)).toBe(1_000_000);
    expect(view.sov.flatMap((line) => line.cutIds).sort()).toEqual(view.cuts.map((line) => line.id).sort());
    // The last day to sign ends at the site, in Denver, a week on.
    expect(
      new Intl.DateTimeFormat('en-US', { timeStyle: 'medium', timeZone: 'America/Denver' }).format(
        new Date(view.signBy),
      ),
    ).toBe('11:59:59 PM');

    const scope = await due.gc.owner.client.get(`/api/scopes/${due.scope.id}`);
    expect((scope.body as ScopeDetailView).status).toBe('awarded');
    expect((scope.body as ScopeDetailView).subcontractId).toBe(subcontractId);
    await lines[0].hint((hint) => hint.topic === 'subcontract' && hint.subcontractId === subcontractId);
    await lines[1].hint((hint) => hint.topic === 'own_bid' && hint.scopeId === due.scope.id);
    expect(lines[1].hints.some((hint) => hint.topic === 'subcontract')).toBe(false);
    lines.forEach((line) => line.close());
  });

  it('store the paper that the hash names, readable by both sides and by nobody else', async () => {
    const work = await awardedWork(812_345);
    const { document, number } = await viewWork(work.gc.owner, work.subcontractId);
    for (const person of [work.gc.owner, work.crew.owner]) {
      const bytes = await fileBytes(person.client, document.fileId);
      expect(createHash('sha256').update(bytes).digest('hex')).toBe(document.sha256);
      const text = (await readPdfText(bytes)).join(' ').replace(/\s+/g, ' ');
      for (const part of [
        `Subcontract ${number}`,
        work.gc.name,
        work.crew.name,
        '$8,123.45',
        '914 Ninth Street',
      ]) {
        expect(text).toContain(part);
      }
    }
    const [stranger, rival] = await Promise.all([makeGeneralContractor(), makeCuttingContractor()]);
    for (const { owner } of [stranger, rival]) {
      expect((await owner.client.get(`/api/files/${document.fileId}`)).status).toBe(404);
      const view = await owner.client.get(`/api/subcontracts/${work.subcontractId}`);
      const missing = await owner.client.get(`/api/subcontracts/${randomUUID()}`);
      expect([view.status, missing.status]).toEqual([404, 404]);
      expect((view.body as ErrorBody).error.message).toBe((missing.body as ErrorBody).error.message);
    }
    expect((await new Client().get(`/api/files/${document.fileId}`)).status).toBe(401);
  });

  it('tell losers rank, band and reason by mail and on their bid, never the price (D-02)', async () => {
    const due = await dueScope([1_234_501, 1_290_002, 1_500_003]);
    await expectStatus(award(due.gc, due.scope.id, due.bidIds[0]!), 201);
    const own = await due.crews[1]!.owner.client.get(`/api/scopes/${due.scope.id}/own-bid`);
    expect((own.body as OwnBidView).outcome).toEqual({
      won: false,
      rank: 2,
      of: 3,
      band: 'within_5',
      reason: 'price',
      note: 'Thank you for the careful bid.',
    });
    const lost = await mailTo(due.crews[2]!.owner.email, /another crew/);
    expect(lost.text.replace(/\s+/g, ' ')).toContain(
      'ranked 3 of 3, more than 15 and at most 30 % above the award',
    );
    const told = JSON.stringify([own.body, lost]);
    expect(told).not.toMatch(/1234501|12,345\.01/);
    const won = await mailTo(due.crews[0]!.owner.email, /^Yours: subcontract S-/);
    expect(won.text).toContain(due.gc.name);
  });

  it('give the reason only with two bids', async () => {
    const due = await dueScope([500_000, 510_000]);
    await expectStatus(award(due.gc, due.scope.id, due.bidIds[0]!), 201);
    const own = await due.crews[1]!.owner.client.get(`/api/scopes/${due.scope.id}/own-bid`);
    expect((own.body as OwnBidView).outcome).toMatchObject({
      won: false,
      rank: null,
      of: null,
      band: null,
      reason: 'price',
    });
  });

  it('take a bid by lines as its lines, with what the minimum adds spread over them', async () => {
    const gc = await makeGeneralContractor();
    const crew = await makeCuttingContractor();
    const scope = await publishScope(gc);
    const input = linesBid(scope, 10_000);
    if (input.price.form !== 'lines') throw new Error('a bid by lines');
    // One trench and six cores at $100 each come to $700; the minimum lifts that to $1,400, mobilization is on top.
    input.price = {
      ...input.price,
      minimumCents: 140_000,
      mobilizationCents: 25_000,
      minimumIncludesMobilization: false,
    };
    const bid = await placeBid(crew, scope.id, input);
    await comeDue(gc, scope.id);
    const answer = await expectStatus(award(gc, scope.id, bid.id), 201);
    const view = await viewWork(gc.owner, (answer.body as { subcontractId: string }).subcontractId);
    expect(view.sov.map((line) => [line.description, line.amountCents])).toEqual([
      ['A1: trench 40 × 2 ft, 6 in thick', 20_000],
      ['B1: 6 × core 4 in dia., 8 in deep', 120_000],
      ['Mobilization', 25_000],
    ]);
    expect(view.totalCents).toBe(165_000);
  });

  it('have one winner of 50 parallel presses for different bids over two servers', async () => {
    const due = await dueScope([700_000, 710_000, 720_000]);
    const second = await startSecondServer({ RATE_LIMIT_FACTOR: '1000' });
    try {
      const elsewhere = await signIn(due.gc.owner.email, undefined, second.url);
      const answers = await Promise.all(
        Array.from({ length: 50 }, (_, index) => {
          const client = index % 2 === 0 ? due.gc.owner.client : elsewhere;
          const body = { bidId: due.bidIds[index % 3], reason: 'price' };
          return client.post(`/api/scopes/${due.scope.id}/award`, body);
        }),
      );
      expect(statuses(answers)).toEqual({ 201: 1, 409: 49 });
      const codes = answers.filter(({ status }) => status === 409).map(codeOf);
      expect(new Set(codes)).toEqual(new Set(['already_awarded']));
      const counts = await sql<{ awards: number; subcontracts: number; outcomes: number }>(
        `SELECT (SELECT count(*)::int FROM award WHERE scope_id = $1) AS awards,
           (SELECT count(*)::int FROM subcontract WHERE scope_id = $1) AS subcontracts,
           (SELECT count(*)::int FROM bid_outcome o JOIN bid b ON b.id = o.bid_id WHERE b.scope_id = $1) AS outcomes`,
        [due.scope.id],
      );
      expect(counts).toEqual([{ awards: 1, subcontracts: 1, outcomes: 3 }]);
    } finally {
      await second.stop();
    }
  }, 60_000);

  it('refuse what is out of order, foreign, or not a bid of the scope (D-06)', async () => {
    const open = await publishScope(await makeGeneralContractor());
    const due = await dueScope([600_000]);
    const other = await dueScope([600_000]);
    const post = (client: Client, scopeId: string, body: object) =>
      client.post(`/api/scopes/${scopeId}/award`, body);
    const body = { bidId: due.bidIds[0], reason: 'price' };

    const notDue = await makeGeneralContractor();
    const early = await publishScope(notDue);
    expect(codeOf(await post(notDue.owner.client, early.id, body))).toBe('illegal_move');
    expect((await post(due.gc.owner.client, open.id, body)).status).toBe(404);
    expect((await post(due.gc.owner.client, randomUUID(), body)).status).toBe(404);
    expect((await post(due.gc.owner.client, due.scope.id, { ...body, bidId: other.bidIds[0] })).status).toBe(
      422,
    );
    expect((await post(due.gc.owner.client, due.scope.id, { ...body, totalCents: 1 })).status).toBe(422);
    expect((await post(due.gc.owner.client, due.scope.id, { ...body, reason: 'because' })).status).toBe(422);
    expect((await post(new Client(), due.scope.id, body)).status).toBe(401);
    expect((await post(due.crews[0]!.owner.client, due.scope.id, body)).status).toBe(403);
    const accounts = await addPerson(due.gc, 'accounts');
    expect((await post(accounts.client, due.scope.id, body)).status).toBe(403);
    await expectStatus(post(due.gc.owner.client, due.scope.id, body), 201);
    expect(codeOf(await post(due.gc.owner.client, due.scope.id, body))).toBe('already_awarded');
  });

  it('award right after due, though the job that opens the bids has not run', async () => {
    const gc = await makeGeneralContractor();
    const crew = await makeCuttingContractor();
    const scope = await publishScope(gc);
    const bid = await placeBid(crew, scope.id, lumpBid(400_000));
    await sql(`UPDATE scope SET due_at = app_now() - interval '1 second' WHERE id = $1`, [scope.id], 'owner');
    await expectStatus(award(gc, scope.id, bid.id), 201);
  });

  it('lapse when not signed in time: the scope is due again and can be awarded anew', async () => {
    const due = await dueScope([800_000, 850_000, 900_000]);
    const answer = await expectStatus(award(due.gc, due.scope.id, due.bidIds[0]!), 201);
    const { subcontractId } = answer.body as { subcontractId: string };
    await sql(
      `UPDATE subcontract SET sign_by = app_now() - interval '1 second' WHERE id = $1`,
      [subcontractId],
      'owner',
    );

    const { document } = await viewWork(due.gc.owner, subcontractId);
    const late = { name: 'Too Late', documentSha256: document.sha256 };
    const signing = await due.gc.owner.client.post(`/api/subcontracts/${subcontractId}/sign`, late);
    expect(codeOf(signing)).toBe('illegal_move');

    await runSweep(async () => (await viewWork(due.gc.owner, subcontractId)).status === 'lapsed');
    const scope = (await due.gc.owner.client.get(`/api/scopes/${due.scope.id}`)).body as ScopeDetailView;
    expect(scope.status).toBe('due');
    expect(scope.subcontractId).toBeNull();
    const own = await due.crews[1]!.owner.client.get(`/api/scopes/${due.scope.id}/own-bid`);
    expect((own.body as OwnBidView).outcome).toBeNull();

    const again = await expectStatus(award(due.gc, due.scope.id, due.bidIds[1]!), 201);
    expect((again.body as { subcontractId: string }).subcontractId).not.toBe(subcontractId);
    const outcome = await due.crews[0]!.owner.client.get(`/api/scopes/${due.scope.id}/own-bid`);
    expect((outcome.body as OwnBidView).outcome).toMatchObject({ won: false, band: 'below' });
  }, 30_000);
});

/** Put the minute's sweep into the job runner now and wait until it has done its work. */
async function runSweep(isDone: () => Promise<boolean>): Promise<void> {
  await sql(`INSERT INTO pgboss.job (name, data) VALUES ('sweep', '{}')`, [], 'super');
  for (let tries = 0; tries < 100; tries += 1) {
    if (await isDone()) return;
    await new Promise((resolve) => setTimeout(resolve, 100));
  }
  throw new Error('the sweep did not do its work within ten seconds');
}
