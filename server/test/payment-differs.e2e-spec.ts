import { askForMoney, readWork, signedWork } from './builders/paid-work.ts';
import { closeDatabase, sql } from './database.ts';
import { payCheckout, until } from './provider.ts';

jest.setTimeout(60_000);
afterAll(closeDatabase);

describe('a payment that is not what was asked for', () => {
  it('D-24 of another amount credits nothing and is an incident for people', async () => {
    const work = await signedWork(120_000);
    const { fundingId, sessionId } = await askForMoney(work);
    // The page asks for 1,200.00 and its charge; what we remember of it says a cent less.
    await sql('UPDATE funding SET platform_charge_cents = platform_charge_cents - 1 WHERE id = $1', [
      fundingId,
    ]);
    await payCheckout(sessionId);
    const detail = await until('the incident', async () => {
      const [row] = await sql<{ detail: string }>(
        `SELECT detail FROM incident WHERE kind = 'payment_differs' AND detail LIKE $1`,
        [`%${work.subcontractId}%`],
      );
      return row?.detail ?? null;
    });
    expect(detail).toMatch(/expected \d+ usd/);
    const { money, fundings } = await readWork(work);
    expect(money.setAsideCents).toBe(0);
    expect(fundings.find(({ id }) => id === fundingId)?.status).not.toBe('succeeded');
    expect(await sql('SELECT id FROM ledger_entry WHERE subcontract_id = $1', [work.subcontractId])).toEqual(
      [],
    );
  });
});
