import { setTimeout as sleep } from 'node:timers/promises';
import Stripe from 'stripe';
import { sql } from './database.ts';
import { expectStatus, type Company } from './builders/people.ts';

const address = new URL(process.env.FAKE_STRIPE_URL ?? 'http://localhost:1');

/** The payment provider as the outside sees it, by the real SDK: what tests compare the ledger with. */
export const provider = new Stripe(process.env.FAKE_STRIPE_SECRET_KEY ?? 'sk_test_x', {
  host: address.hostname,
  port: Number(address.port),
  protocol: 'http',
  telemetry: false,
});

/** Press a button of the local stand-in (clock, faults, payments) that no customer has. */
export async function control(path: string, body: object = {}, method = 'POST'): Promise<unknown> {
  const init = method === 'GET' ? { method } : { method, body: JSON.stringify(body) };
  const response = await fetch(new URL(`/_fake/${path}`, address), init);
  if (!response.ok) throw new Error(`stand-in ${path}: ${response.status} ${await response.text()}`);
  return response.json();
}

/** Pay an open checkout session as its page would. */
export const payCheckout = (session: string, more: object = {}) => control('pay', { session, ...more });

/** Take a crew through its payout set-up and wait until we know of it. */
export async function onboardCrew(crew: Company): Promise<string> {
  await expectStatus(crew.owner.client.post('/api/company/payouts'), 200);
  const [row] = await sql<{ payout_account_id: string }>(
    'SELECT payout_account_id FROM company WHERE id = $1',
    [crew.id],
  );
  const account = row?.payout_account_id ?? '';
  await control('onboard', { account });
  await until('the payout account', async () => {
    const [company] = await sql<{ payouts_ready: boolean }>(
      'SELECT payouts_ready FROM company WHERE id = $1',
      [crew.id],
    );
    return company?.payouts_ready === true ? account : null;
  });
  return account;
}

/** Poll for something that jobs bring about; throws after the time with what was waited for. */
export async function until<T>(what: string, look: () => Promise<T | null>, timeoutMs = 15_000): Promise<T> {
  const end = Date.now() + timeoutMs;
  for (;;) {
    const found = await look();
    if (found !== null) return found;
    if (Date.now() > end) throw new Error(`waited ${timeoutMs} ms for ${what}`);
    await sleep(60);
  }
}
