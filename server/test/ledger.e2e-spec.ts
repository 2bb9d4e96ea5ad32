import { Sequelize } from 'sequelize';
import { accounts, credit, debit, type AccountRef } from '../src/ledger/accounts.ts';
import { Ledger } from '../src/ledger/ledger.service.ts';
import { BOOK_CHECKS } from '../src/ledger/ledger.queries.ts';
import { UnitOfWork } from '../src/platform/database/unit-of-work.ts';
import { newId } from '../src/platform/ids/ids.ts';

const app = new Sequelize(process.env.TEST_PG_URL ?? '', { logging: false, pool: { max: 20 } });
const owner = new Sequelize(process.env.TEST_PG_OWNER_URL ?? '', { logging: false });
const uow = new UnitOfWork(app);
const ledger = new Ledger(uow);

afterAll(async () => {
  await app.close();
  await owner.close();
});

/** Accounts of this run only, so that other specs' money is untouched. */
function testAccounts(): { held: AccountRef; payable: AccountRef } {
  const run = newId();
  const base = accounts.crewPayable('x', 'x');
  return {
    held: { ...base, code: `held:test:${run}`, companyId: null, subcontractId: null },
    payable: { ...base, code: `crew_payable:test:${run}`, companyId: null, subcontractId: null },
  };
}

async function balance(code: string): Promise<number> {
  const [row] = await uow.rows<{ balance_cents: string }>(
    null,
    'SELECT balance_cents FROM ledger_account WHERE code = $1',
    [code],
  );
  return Number(row?.balance_cents);
}

async function fund(held: AccountRef, cents: number): Promise<void> {
  await uow.run((tx) =>
    ledger.post(tx, {
      book: 'platform',
      event: 'E01',
      key: `fund:${newId()}`,
      lines: [debit(accounts.stripeAvailable(), cents), credit(held, cents)],
    }),
  );
}

function release(held: AccountRef, payable: AccountRef, cents: number, key = newId()) {
  return uow.run((tx) =>
    ledger.post(tx, {
      book: 'platform',
      event: 'E07',
      key,
      lines: [debit(held, cents), credit(payable, cents)],
    }),
  );
}

/** The SQLSTATE a piece of raw SQL fails with, or 'none'. */
async function failureOf(database: Sequelize, sql: string): Promise<string> {
  try {
    await database.transaction(async (transaction) => {
      await database.query(sql, { transaction });
      // What commit would check, checked here: a failing COMMIT makes Sequelize drop the connection with a warning.
      await database.query('SET CONSTRAINTS ALL IMMEDIATE', { transaction });
    });
    return 'none';
  } catch (error) {
    return String((error as { original?: { code?: string } }).original?.code);
  }
}

describe('the ledger', () => {
  it('B.2: of 64 parallel releases of 500.00 from 10,000.00 exactly 20 succeed', async () => {
    const { held, payable } = testAccounts();
    await fund(held, 1_000_000);
    const results = await Promise.allSettled(
      Array.from({ length: 64 }, () => release(held, payable, 50_000)),
    );
    expect(results.filter((r) => r.status === 'fulfilled')).toHaveLength(20);
    expect(await balance(held.code)).toBe(0);
    expect(await balance(payable.code)).toBe(-1_000_000);
  });

  it('B.2: 32 parallel posts under one key make one entry; other lines under that key are refused', async () => {
    const { held, payable } = testAccounts();
    await fund(held, 10_000);
    const key = newId();
    const results = await Promise.all(Array.from({ length: 32 }, () => release(held, payable, 100, key)));
    expect(new Set(results.map((r) => r.entryId)).size).toBe(1);
    expect(results.filter((r) => !r.replayed)).toHaveLength(1);
    expect(await balance(payable.code)).toBe(-100);
    await expect(release(held, payable, 101, key)).rejects.toMatchObject({ code: 'key_reused' });
  });

  it('B-I1: an entry that does not sum to zero, or has one line, fails at commit', async () => {
    const { held } = testAccounts();
    await fund(held, 100);
    const entry = (lines: string) => `
      WITH e AS (INSERT INTO ledger_entry (id, book, event, idempotency_key, request_hash)
        VALUES ('${newId()}', 'platform', 'E19', '${newId()}', '\\x00') RETURNING id),
      a AS (SELECT id FROM ledger_account WHERE code = '${held.code}')
      INSERT INTO ledger_posting (entry_id, line, account_id, amount_cents) ${lines}`;
    expect(await failureOf(app, entry('SELECT e.id, 1, a.id, 5 FROM e, a'))).toBe('23514');
    expect(await failureOf(app, entry('SELECT e.id, n, a.id, 5 FROM e, a, generate_series(1, 2) n'))).toBe(
      '23514',
    );
    const empty = `INSERT INTO ledger_entry (id, book, event, idempotency_key, request_hash) VALUES ('${newId()}', 'platform', 'E19', '${newId()}', '\\x00')`;
    expect(await failureOf(app, empty)).toBe('23514');
    expect(await balance(held.code)).toBe(-100);
  });

  it('B-I10, D-05: history is append-only for the app and for the owner; the app cannot write a balance', async () => {
    const { held, payable } = testAccounts();
    await fund(held, 100);
    await release(held, payable, 100);
    for (const database of [app, owner]) {
      expect(await failureOf(database, `UPDATE ledger_entry SET memo = 'x'`)).toBe('42501');
      expect(await failureOf(database, 'DELETE FROM ledger_posting')).toBe('42501');
      expect(await failureOf(database, 'TRUNCATE ledger_posting')).toBe('42501');
    }
    expect(
      await failureOf(app, `UPDATE ledger_account SET balance_cents = 0 WHERE code = '${held.code}'`),
    ).toBe('42501');
    expect(await failureOf(app, 'ALTER TABLE ledger_account DISABLE TRIGGER ALL')).toBe('42501');
  });

  it('refuses a late line in a closed entry', async () => {
    const { held, payable } = testAccounts();
    await fund(held, 100);
    const { entryId } = await release(held, payable, 100);
    const late = `INSERT INTO ledger_posting (entry_id, line, account_id, amount_cents)
      SELECT '${entryId}', 9, id, 1 FROM ledger_account WHERE code = '${held.code}'`;
    expect(await failureOf(app, late)).toBe('42501');
    expect(await failureOf(owner, late)).toBe('42501');
  });

  it('posts one entry per provider object and kind', async () => {
    const { held, payable } = testAccounts();
    await fund(held, 1000);
    const post = () =>
      uow.run((tx) =>
        ledger.post(tx, {
          book: 'platform',
          event: 'E07',
          key: newId(),
          provider: { objectId: `tr_${held.code}`, kind: 'transfer.created' },
          lines: [debit(held, 10), credit(payable, 10)],
        }),
      );
    await post();
    await expect(post()).rejects.toThrow();
    expect(await balance(payable.code)).toBe(-10);
  });

  it('B-I2, B-I3, B-I4: books balance and caches equal their postings', async () => {
    for (const id of ['B-I1', 'B-I2', 'B-I3', 'B-I4'] as const) {
      expect({ id, rows: await uow.rows(null, BOOK_CHECKS[id].sql) }).toEqual({ id, rows: [] });
    }
  });
});
