import { randomUUID } from 'node:crypto';
import { brokenRules } from './book-rules.ts';
import { askForMoney, readWork, setAside, signedWork } from './builders/paid-work.ts';
import { Client } from './client.ts';
import { closeDatabase, sql } from './database.ts';
import { control, payCheckout, provider, until } from './provider.ts';

afterAll(closeDatabase);

describe('the provider’s webhooks', () => {
  const secret = process.env.TEST_STRIPE_WEBHOOK_SECRET ?? '';
  const connectSecret = process.env.TEST_STRIPE_CONNECT_WEBHOOK_SECRET ?? '';

  function event(object: object, more: object = {}) {
    return JSON.stringify({
      id: `evt_${randomUUID().replaceAll('-', '')}`,
      object: 'event',
      type: 'checkout.session.completed',
      created: Math.floor(Date.now() / 1000),
      livemode: false,
      data: { object },
      ...more,
    });
  }

  async function deliver(endpoint: 'account' | 'connect', payload: string, header: string | null) {
    const sending = new Client().prepare('post', `/api/payments/webhooks/${endpoint}`, {
      idempotencyKey: null,
    });
    sending.unset('X-Kerfyard').unset('Origin').set('Content-Type', 'application/json');
    if (header !== null) sending.set('Stripe-Signature', header);
    return sending.send(payload);
  }

  const signed = (payload: string, withSecret = secret, timestamp = Math.floor(Date.now() / 1000)) =>
    provider.webhooks.generateTestHeaderString({ payload, secret: withSecret, timestamp });

  const stored = async (payload: string) =>
    sql('SELECT id FROM stripe_event WHERE id = $1', [(JSON.parse(payload) as { id: string }).id]);

  it('D-24: refuses a missing, wrong, old or other endpoint’s signature and stores nothing', async () => {
    const payload = event({ id: 'cs_test_unknown', object: 'checkout.session' });
    const headers = [
      null,
      't=1,v1=00',
      signed(payload, 'whsec_other'),
      signed(payload, connectSecret),
      signed(payload, secret, Math.floor(Date.now() / 1000) - 301),
    ];
    for (const header of headers) expect((await deliver('account', payload, header)).status).toBe(400);
    expect((await deliver('account', `${payload} `, signed(payload))).status).toBe(400);
    expect(await stored(payload)).toEqual([]);
  });

  it('D-24: a connected account’s event posing as ours is not taken in', async () => {
    const payload = event({ id: 'cs_test_unknown', object: 'checkout.session' }, { account: 'acct_poser' });
    expect((await deliver('account', payload, signed(payload))).status).toBe(200);
    expect(await stored(payload)).toEqual([]);
  });

  it('D-24, C-05: a signed event for an unpaid page credits nothing; delivered three times it is one', async () => {
    const work = await signedWork(120_000);
    const { sessionId } = await askForMoney(work);
    const payload = event({
      id: sessionId,
      object: 'checkout.session',
      payment_status: 'paid',
      amount_total: 120_000,
    });
    for (let n = 0; n < 3; n += 1)
      expect((await deliver('account', payload, signed(payload))).status).toBe(200);
    await until('the event', async () => {
      const [row] = await sql<{ status: string }>('SELECT status FROM stripe_event WHERE id = $1', [
        (JSON.parse(payload) as { id: string }).id,
      ]);
      return row?.status === 'processed' ? true : null;
    });
    expect((await readWork(work)).money.setAsideCents).toBe(0);
    await payCheckout(sessionId);
    await until('the money', async () =>
      (await readWork(work)).money.setAsideCents === 120_000 ? true : null,
    );
    const entries = await sql(`SELECT id FROM ledger_entry WHERE subcontract_id = $1 AND event = 'E01'`, [
      work.subcontractId,
    ]);
    expect(entries).toHaveLength(1);
  });

  it('E02: settled money moves from pending to available, by the net amount the provider names', async () => {
    const work = await signedWork(90_000);
    await setAside(work);
    await control('clock/advance', { days: 5 });
    await until('the settlement', async () => {
      const [row] = await sql<{ available_at: Date | null }>(
        'SELECT available_at FROM funding WHERE subcontract_id = $1',
        [work.subcontractId],
      );
      return row?.available_at ?? null;
    });
    const rows = await sql<{ event: string; code: string; amount_cents: string }>(
      `SELECT e.event, a.code, p.amount_cents FROM ledger_entry e JOIN ledger_posting p ON p.entry_id = e.id
       JOIN ledger_account a ON a.id = p.account_id
       WHERE e.subcontract_id = $1 AND a.code IN ('stripe_pending', 'stripe_available') ORDER BY e.number, a.code`,
      [work.subcontractId],
    );
    const [funding] = await sql<{ charge_id: string }>(
      'SELECT charge_id FROM funding WHERE subcontract_id = $1',
      [work.subcontractId],
    );
    const charge = await provider.charges.retrieve(funding?.charge_id ?? '', {
      expand: ['balance_transaction'],
    });
    const net = String((charge.balance_transaction as { net: number }).net);
    expect(rows).toEqual([
      { event: 'E01', code: 'stripe_pending', amount_cents: net },
      { event: 'E02', code: 'stripe_available', amount_cents: net },
      { event: 'E02', code: 'stripe_pending', amount_cents: `-${net}` },
    ]);
    expect(await brokenRules()).toEqual([]);
  });
});
