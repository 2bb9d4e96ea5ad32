import { randomUUID } from 'node:crypto';
import type { BooksView, ReleaseView, SetAsideQuote, StatementView } from '@kerfyard/common/payments';
import { brokenRules } from './book-rules.ts';
import { addPerson, addStaff, expectStatus, makeGeneralContractor } from './builders/people.ts';
import {
  acceptedCompletion,
  askForMoney,
  readWork,
  setAside,
  signWork,
  signedWork,
  startVisit,
  workToRelease,
  awardWork,
  type Work,
} from './builders/paid-work.ts';
import { Client } from './client.ts';
import { closeDatabase, sql } from './database.ts';
import { control, onboardCrew, payCheckout, provider, until } from './provider.ts';

jest.setTimeout(60_000);
afterAll(closeDatabase);

async function statement(work: Work, side: 'gc' | 'crew'): Promise<StatementView> {
  const query = { subcontractId: work.subcontractId };
  return (await expectStatus(work[side].owner.client.get('/api/payments/statement', { query }), 200))
    .body as StatementView;
}

const release = (work: Work, completionId: string, id: string = randomUUID()) =>
  work.gc.owner.client.post('/api/releases', { id, completionId });

const transferred = (work: Work) =>
  until('the transfer', async () => {
    const [first] = (await readWork(work)).releases;
    return first?.status === 'transferred' ? first : null;
  });

async function ledgerBalance(code: string): Promise<number> {
  const [row] = await sql<{ balance_cents: string }>(
    'SELECT balance_cents FROM ledger_account WHERE code = $1',
    [code],
  );
  return Number(row?.balance_cents ?? 0);
}

describe('setting money aside', () => {
  it('shows the cost before paying, then holds exactly the lines (E01, E04)', async () => {
    const work = await signedWork(1_000_000);
    const { sov } = await readWork(work);
    const sovLineIds = sov.map((line) => line.id);
    const quote = (
      await expectStatus(
        work.gc.owner.client.post(`/api/subcontracts/${work.subcontractId}/set-aside-quote`, {
          sovLineIds,
          method: 'card',
        }),
        200,
      )
    ).body as SetAsideQuote;
    // ⌈(1,000,000 + 30) / 0.971⌉ − 1,000,000 by the charge rule for cards.
    expect(quote).toEqual({ amountCents: 1_000_000, platformChargeCents: 29_898, totalCents: 1_029_898 });

    const funding = await setAside(work);
    expect(funding).toMatchObject({
      amountCents: 1_000_000,
      platformChargeCents: 29_898,
      status: 'succeeded',
    });
    for (const line of sov) {
      expect(await ledgerBalance(`held:${work.subcontractId}:${line.id}`)).toBe(-line.amountCents);
    }
    const view = await readWork(work, 'crew');
    expect(view.sov.map((line) => line.state)).toEqual(sov.map(() => 'set_aside'));
    expect(view.money.setAsideCents).toBe(1_000_000);
    expect(view.fundings[0]).toMatchObject({ checkoutUrl: null, platformChargeCents: 0 });
    expect(await brokenRules()).toEqual([]);
  });

  it('D-06, C-09: refuses before signatures, and of 20 parallel requests for a line one stands', async () => {
    const work = await awardWork(200_000);
    const { sov } = await readWork(work);
    const sovLineIds = sov.map((line) => line.id);
    const path = `/api/subcontracts/${work.subcontractId}/set-aside`;
    const ask = (id: string) => work.gc.owner.client.post(path, { id, sovLineIds, method: 'card' });
    expect((await ask(randomUUID())).status).toBe(409);
    expect(await sql('SELECT 1 FROM funding WHERE subcontract_id = $1', [work.subcontractId])).toEqual([]);

    await signWork(work);
    const answers = await Promise.all(Array.from({ length: 20 }, () => ask(randomUUID())));
    expect(answers.filter((answer) => answer.status === 201)).toHaveLength(1);
    expect(answers.filter((answer) => answer.status === 409)).toHaveLength(19);
  });

  it('answers a repeated request with the same payment, and an id used for other lines with 409', async () => {
    const work = await signedWork(300_000);
    const { sov } = await readWork(work);
    const path = `/api/subcontracts/${work.subcontractId}/set-aside`;
    const input = { id: randomUUID(), sovLineIds: [sov[0]?.id], method: 'card' };
    const { client } = work.gc.owner;
    const first = await expectStatus(client.post(path, input), 201);
    const again = await client.post(path, input);
    expect((again.body as { id: string }).id).toBe((first.body as { id: string }).id);
    expect((await client.post(path, { ...input, sovLineIds: [sov[1]?.id] })).status).toBe(409);
    expect(await sql('SELECT id FROM funding WHERE subcontract_id = $1', [work.subcontractId])).toHaveLength(
      1,
    );
  });

  it('a declined card holds nothing; the page stays open and pays at the next try', async () => {
    const work = await signedWork(150_000);
    const { sessionId } = await askForMoney(work);
    await payCheckout(sessionId, { cardNumber: '4000000000000002' }).catch(() => undefined);
    expect((await readWork(work)).money.setAsideCents).toBe(0);
    await payCheckout(sessionId);
    await until('the money', async () =>
      (await readWork(work)).money.setAsideCents === 150_000 ? true : null,
    );
    expect(await brokenRules()).toEqual([]);
  });

  it('an expired page gives its lines back', async () => {
    const work = await signedWork(150_000);
    const { sessionId } = await askForMoney(work);
    await provider.checkout.sessions.expire(sessionId);
    await until('the expiry', async () =>
      (await readWork(work)).sov[0]?.state === 'not_set_aside' ? true : null,
    );
    expect((await setAside(work)).amountCents).toBe(150_000);
  });

  it('D-07: no request carries an amount', async () => {
    const work = await signedWork(150_000);
    const sovLineIds = (await readWork(work)).sov.map((line) => line.id);
    const path = `/api/subcontracts/${work.subcontractId}/set-aside`;
    for (const extra of [
      { amountCents: 1 },
      { totalCents: -5 },
      { platformChargeCents: 0 },
      { currency: 'eur' },
    ]) {
      const answer = await work.gc.owner.client.post(path, {
        id: randomUUID(),
        sovLineIds,
        method: 'card',
        ...extra,
      });
      expect(answer.status).toBe(422);
    }
    expect(
      (await work.gc.owner.client.post(path, { id: randomUUID(), sovLineIds, method: 'cash' })).status,
    ).toBe(422);
  });

  it('D-01: another company, the crew and other roles set nothing aside', async () => {
    const work = await signedWork(150_000);
    const stranger = await makeGeneralContractor();
    const sovLineIds = (await readWork(work)).sov.map((line) => line.id);
    const path = `/api/subcontracts/${work.subcontractId}/set-aside`;
    const body = { id: randomUUID(), sovLineIds, method: 'card' };
    const missing = await stranger.owner.client.post(`/api/subcontracts/${randomUUID()}/set-aside`, body);
    const foreign = await stranger.owner.client.post(path, body);
    expect([foreign.status, foreign.body.error.code]).toEqual([missing.status, missing.body.error.code]);
    expect(foreign.status).toBe(404);
    expect((await work.crew.owner.client.post(path, body)).status).toBe(403);
    expect((await (await addPerson(work.gc, 'manager')).client.post(path, body)).status).toBe(403);
    expect((await new Client().post(path, body)).status).toBe(401);
    const limited = await addPerson(work.gc, 'accounts', { setAsideLimitCents: 10_000 });
    const over = await limited.client.post(path, body);
    expect([over.status, over.body.error.code]).toEqual([403, 'over_limit']);
  });
});

describe('releasing', () => {
  it('E07, E08: splits, transfers to the crew, and both statements equal ledger and provider', async () => {
    const { work, completion } = await workToRelease(1_000_001);
    const answer = (await expectStatus(release(work, completion.id), 201)).body as ReleaseView;
    // 5 % of 1,000,001 cents, floored: 50,000; the rest is the crew's.
    expect(answer).toMatchObject({
      grossCents: 1_000_001,
      retainageCents: 0,
      feeCents: 50_000,
      crewCents: 950_001,
    });
    await transferred(work);

    const gc = await statement(work, 'gc');
    expect(gc.totals).toMatchObject({ setAsideCents: 1_000_001, heldCents: 0, releasedCents: 1_000_001 });
    // Two lines of the schedule of values, released by one entry.
    expect(gc.lines.filter((line) => line.kind === 'released').map((line) => line.cents)).toEqual([
      -1_000_001,
    ]);
    const crew = await statement(work, 'crew');
    expect(crew.totals).toMatchObject({ transferredCents: 950_001, payableCents: 0, feesCents: 50_000 });

    const [row] = await sql<{ payout_account_id: string }>(
      'SELECT payout_account_id FROM company WHERE id = $1',
      [work.crew.id],
    );
    const account = row?.payout_account_id ?? '';
    const transfers = await provider.transfers.list({ destination: account });
    expect(transfers.data.map((transfer) => transfer.amount)).toEqual([950_001]);
    expect(await ledgerBalance(`crew_balance:${account}`)).toBe(950_001);
    const balance = await provider.balance.retrieve({}, { stripeAccount: account });
    const atProvider = [...balance.available, ...balance.pending].reduce((sum, part) => sum + part.amount, 0);
    expect(atProvider).toBe(950_001);
    expect((await readWork(work)).status).toBe('completed');
    expect(await brokenRules()).toEqual([]);
  });

  it('C-09: 50 parallel releases make one transfer', async () => {
    const { work, completion } = await workToRelease(400_000);
    const answers = await Promise.all(Array.from({ length: 50 }, () => release(work, completion.id)));
    expect(answers.filter((answer) => answer.status === 201)).toHaveLength(1);
    expect(answers.filter((answer) => answer.status === 409)).toHaveLength(49);
    await transferred(work);
    const [row] = await sql<{ payout_account_id: string }>(
      'SELECT payout_account_id FROM company WHERE id = $1',
      [work.crew.id],
    );
    const transfers = await provider.transfers.list({ destination: row?.payout_account_id ?? '' });
    expect(transfers.data).toHaveLength(1);
    expect(await sql('SELECT id FROM release WHERE subcontract_id = $1', [work.subcontractId])).toHaveLength(
      1,
    );
  });

  it('draws on several payments first in, first out: one transfer per charge', async () => {
    const work = await signedWork(500_000);
    await onboardCrew(work.crew);
    const { sov } = await readWork(work);
    for (const line of sov) await setAside(work, [line.id]);
    const completion = await acceptedCompletion(work, await startVisit(work));
    await expectStatus(release(work, completion.id), 201);
    await transferred(work);
    const drawn = await sql<{ amount_cents: string; funded: string }>(
      `SELECT t.amount_cents, f.amount_cents AS funded FROM release_transfer t JOIN funding f ON f.id = t.funding_id
       WHERE f.subcontract_id = $1 ORDER BY f.settled_at`,
      [work.subcontractId],
    );
    expect(drawn.length).toBe(sov.length);
    expect(drawn.reduce((sum, row) => sum + Number(row.amount_cents), 0)).toBe(475_000);
    // The first charge is used up before the second is touched.
    expect(drawn[0]?.amount_cents).toBe(drawn[0]?.funded);
    expect(await brokenRules()).toEqual([]);
  });

  it('holds retainage back where the scope agreed on it', async () => {
    const { work, completion } = await workToRelease(1_000_000, { terms: { retainageBasisPoints: 1000 } });
    const answer = (await expectStatus(release(work, completion.id), 201)).body as ReleaseView;
    // The worked example of the ledger's design: 10 % retainage, 5 % fee on the rest.
    expect(answer).toMatchObject({ retainageCents: 100_000, feeCents: 45_000, crewCents: 855_000 });
    expect(await ledgerBalance(`retainage_held:${work.subcontractId}`)).toBe(-100_000);
    expect((await readWork(work)).money).toMatchObject({
      releasedCents: 900_000,
      retainageCents: 100_000,
      setAsideCents: 1_000_000,
    });
    expect(await brokenRules()).toEqual([]);
  });

  it('a crew without payout set-up waits visibly and is paid once it is done', async () => {
    const work = await signedWork(250_000);
    await setAside(work);
    const completion = await acceptedCompletion(work, await startVisit(work));
    await expectStatus(release(work, completion.id), 201);
    await until('the refusal', async () => {
      const rows = await sql(
        `SELECT 1 FROM provider_operation WHERE kind = 'transfer' AND status = 'refused' AND subject_id =
        (SELECT id FROM release WHERE completion_id = $1)`,
        [completion.id],
      );
      return rows.length > 0 ? true : null;
    });
    expect((await readWork(work, 'crew')).releases[0]).toMatchObject({
      status: 'blocked',
      blockedBecause: 'capability',
    });
    await onboardCrew(work.crew);
    await transferred(work);
    expect(await brokenRules()).toEqual([]);
  });

  it('D-06: nothing is released before acceptance, or twice, or by the crew', async () => {
    const work = await signedWork(250_000);
    await onboardCrew(work.crew);
    await setAside(work);
    const visit = await startVisit(work);
    const { sov } = await readWork(work);
    const body = {
      id: randomUUID(),
      visitId: visit.id,
      sovLineIds: visit.sovLineIds,
      asCut: sov.flatMap((line) => line.cutIds).map((cutId) => ({ cutId, asListed: true, note: '' })),
      photoIds: [],
      note: '',
    };
    await expectStatus(work.crew.owner.client.post('/api/completions', body), 201);
    const before = await sql('SELECT id FROM ledger_entry WHERE subcontract_id = $1', [work.subcontractId]);
    expect((await release(work, body.id)).status).toBe(409);
    expect(await sql('SELECT id FROM ledger_entry WHERE subcontract_id = $1', [work.subcontractId])).toEqual(
      before,
    );
    expect(
      (await work.crew.owner.client.post('/api/releases', { id: randomUUID(), completionId: body.id }))
        .status,
    ).toBe(403);
    expect((await release(work, randomUUID())).status).toBe(404);
    const stranger = await makeGeneralContractor();
    expect(
      (await stranger.owner.client.post('/api/releases', { id: randomUUID(), completionId: body.id })).status,
    ).toBe(404);
  });

  it('C-04: a reply lost after the transfer, a 500 and a conflict leave exactly one transfer', async () => {
    const { work, completion } = await workToRelease(330_000);
    await control('faults', { kind: 'drop_after', path: '/v1/transfers', method: 'POST', count: 2 });
    await control('faults', { kind: '409', path: '/v1/transfers', method: 'POST', count: 1 });
    await expectStatus(release(work, completion.id), 201);
    await transferred(work);
    await control('faults', {}, 'DELETE');
    const [row] = await sql<{ payout_account_id: string }>(
      'SELECT payout_account_id FROM company WHERE id = $1',
      [work.crew.id],
    );
    const transfers = await provider.transfers.list({ destination: row?.payout_account_id ?? '' });
    expect(transfers.data).toHaveLength(1);
    expect(await brokenRules()).toEqual([]);
  });
});

describe('staff’s books', () => {
  it('show a trial balance of zero and every rule holding, to staff alone', async () => {
    const gc = await makeGeneralContractor();
    expect((await gc.owner.client.get('/api/staff/books')).status).toBe(403);
    expect((await new Client().get('/api/staff/books')).status).toBe(401);
    const staff = await addStaff(gc);
    const { body } = await expectStatus(staff.client.get('/api/staff/books'), 200);
    const books = body as BooksView;
    for (const book of books.trialBalance) expect(book.sumCents).toBe(0);
    expect(books.checks.length).toBeGreaterThanOrEqual(8);
    expect(books.checks.filter((check) => check.failures > 0)).toEqual([]);
  });
});
