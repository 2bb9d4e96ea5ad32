import { randomUUID } from 'node:crypto';
import { Pool } from 'pg';
import { addStaff, expectStatus, makeGeneralContractor } from './builders/people.ts';
import { acceptLines, makeMoneyWork, type MoneyWork } from './builders/money-work.ts';
import { makeAccountReady, releaseOnce, type Model, type Real } from './money-commands.ts';
import { openMoneyLab, type MoneyLab } from './money-lab.ts';
import { wireMoney, type MoneyServices } from './money-services.ts';
import { Client } from './client.ts';
import { closeDatabase } from './database.ts';

jest.setTimeout(60_000);

let lab: MoneyLab;
let money: MoneyServices;

beforeAll(async () => {
  lab = await openMoneyLab(async (ownerUrl) => {
    const owner = new Pool({ connectionString: ownerUrl, max: 1 });
    await owner.query('CREATE SCHEMA IF NOT EXISTS pgboss');
    await owner.end();
  });
  money = wireMoney(lab);
});
afterAll(async () => {
  await money.close();
  await lab.close();
  await closeDatabase();
});

const origin = { ip: '127.0.0.1', requestId: 'reconcile', userAgent: 'reconcile' };

async function runJobs(): Promise<void> {
  await money.events.poll();
  for (const job of money.jobs.waiting.splice(0)) await money.run(job);
}

/** A line paid for, accepted, released and transferred. */
async function paidWork(): Promise<{ real: Real; work: MoneyWork }> {
  await lab.empty();
  money.jobs.waiting.length = 0;
  const terms = { lineCents: [500_000, 250_000], retainageBasisPoints: 1000, feeBasisPoints: 500 };
  const work = await makeMoneyWork(lab, terms);
  const real: Real = { lab, money, work, requireBooks: async () => undefined };
  await makeAccountReady({ lines: [], fundings: [], completions: [], account: 'none' } as Model, real);
  const id = randomUUID();
  const sovLineIds = work.lines.map((line) => line.id);
  await money.setAside.request(work.gc, origin, work.subcontractId, { id, sovLineIds, method: 'card' });
  await runJobs();
  const [funding] = await lab.sql<{ checkout_session_id: string }>(
    'SELECT checkout_session_id FROM funding WHERE id = $1',
    [id],
  );
  await lab.control('pay', { session: funding?.checkout_session_id });
  await runJobs();
  await releaseOnce(real, await acceptLines(lab, work, [sovLineIds[0] ?? '']));
  await runJobs();
  return { real, work };
}

const kinds = async () => (await money.reconciliation.compare()).map(({ kind }) => kind).sort();

describe('comparing the books with the provider (B-I7, B-I8)', () => {
  it('finds nothing while they agree, money under way included', async () => {
    const { real, work } = await paidWork();
    expect(await kinds()).toEqual([]);

    // A transfer that was made and whose answer was lost: there, and not yet here.
    await lab.control('faults', { kind: 'drop_after', path: '/v1/transfers', method: 'POST', count: 2 });
    await releaseOnce(real, await acceptLines(lab, work, [work.lines[1]?.id ?? '']));
    const [job] = money.jobs.waiting.splice(0);
    await money.run(job!);
    expect(money.jobs.waiting).toHaveLength(1);
    const transfers = await lab.provider.transfers.list();
    expect(transfers.data).toHaveLength(2);
    expect(await kinds()).toEqual([]);
    await runJobs();
    expect(await kinds()).toEqual([]);
  });

  it('finds a transfer of the provider that no release made, and says so as one incident', async () => {
    const { work } = await paidWork();
    const [row] = await lab.sql<{ charge_id: string; payout_account_id: string }>(
      `SELECT f.charge_id, c.payout_account_id FROM funding f JOIN company c ON c.id = $1`,
      [work.crew.company?.id],
    );
    const stray = await lab.provider.transfers.create({
      amount: 1_000,
      currency: 'usd',
      destination: row?.payout_account_id ?? '',
      source_transaction: row?.charge_id ?? '',
    });
    expect(await kinds()).toEqual(['balance_differs', 'crew_balance_differs', 'transfer_unknown']);
    await money.reconciliation.run();
    await money.reconciliation.run();
    const incidents = await lab.sql<{ kind: string; subject: string }>('SELECT kind, subject FROM incident');
    expect(incidents).toHaveLength(3);
    expect(incidents).toContainEqual({ kind: 'transfer_unknown', subject: stray.id });
  });

  it('finds a refund made at the provider alone, and a charge that no funding knows', async () => {
    await paidWork();
    const [row] = await lab.sql<{ charge_id: string }>('SELECT charge_id FROM funding');
    await lab.provider.refunds.create({ charge: row?.charge_id ?? '', amount: 5_000 });
    expect(await kinds()).toContain('refund_unknown');

    await lab.empty();
    const session = await lab.provider.checkout.sessions.create({
      mode: 'payment',
      line_items: [
        { quantity: 1, price_data: { currency: 'usd', unit_amount: 700, product_data: { name: 'Stray' } } },
      ],
      success_url: 'http://127.0.0.1:1/',
    });
    await lab.control('pay', { session: session.id });
    expect(await kinds()).toEqual(['balance_differs', 'charge_unknown']);
  });

  it('finds an entry whose object the provider does not know', async () => {
    await paidWork();
    await lab.unruled(
      `UPDATE ledger_entry SET provider_object_id = 'tr_gone' WHERE provider_event_kind = 'transfer.created'`,
    );
    expect(await kinds()).toEqual(['object_missing_at_provider']);
  });
});

describe('the chain of seals (B-I10)', () => {
  it('seals what is committed, once, and holds', async () => {
    await paidWork();
    const entries = await lab.sql('SELECT id FROM ledger_entry');
    const sealed = await Promise.all([money.seals.sealAll(), money.seals.sealAll()]);
    expect(sealed.sort()).toEqual([0, entries.length]);
    expect(await money.seals.waiting()).toBe(0);
    expect(await money.seals.verify()).toEqual([]);
    expect(await money.seals.verify(2)).toEqual([]);
  });

  it('is append-only for the app’s role and the owner', async () => {
    await paidWork();
    await money.seals.sealAll();
    const owner = new Pool({ connectionString: lab.ownerUrl, max: 1 });
    for (const sql of [
      'UPDATE ledger_seal SET position = 99',
      'DELETE FROM ledger_seal',
      'TRUNCATE ledger_seal',
    ]) {
      await expect(money.uow.rows(null, sql)).rejects.toThrow();
      await expect(owner.query(sql)).rejects.toThrow();
    }
    await owner.end();
  });

  it.each([
    ['an amount', `UPDATE ledger_posting SET amount_cents = amount_cents * 2 WHERE entry_id = $1`],
    [
      'an account',
      `UPDATE ledger_posting SET account_id = (SELECT max(id) FROM ledger_account) WHERE entry_id = $1`,
    ],
    ['a time', `UPDATE ledger_entry SET posted_at = posted_at - interval '1 day' WHERE id = $1`],
    ['a whole entry', `DELETE FROM ledger_entry WHERE id = $1`],
    ['a seal', `DELETE FROM ledger_seal WHERE entry_id = $1`],
  ])('shows where %s was changed past the rules', async (_, sql) => {
    await paidWork();
    await money.seals.sealAll();
    const [second] = await lab.sql<{ entry_id: string }>(
      'SELECT entry_id FROM ledger_seal ORDER BY position OFFSET 1 LIMIT 1',
    );
    await lab.unruled(sql, [second?.entry_id]);
    const broken = await money.seals.verify();
    expect(broken.length).toBeGreaterThan(0);
    expect(broken[0]).toMatch(/^seal [23]:/);
    const check = (await money.books.checks(true)).find(({ id }) => id === 'B-I10');
    expect(check?.failures).toBe(broken.length);
  });
});

describe('asking for a comparison', () => {
  it('is for staff alone', async () => {
    const gc = await makeGeneralContractor();
    const path = '/api/staff/books/reconcile';
    expect((await new Client().post(path)).status).toBe(401);
    expect((await gc.owner.client.post(path)).status).toBe(403);
    const staff = await addStaff(gc);
    const { body } = await expectStatus(staff.client.post(path), 200);
    expect(Array.isArray((body as { differences: unknown[] }).differences)).toBe(true);
  });
});
