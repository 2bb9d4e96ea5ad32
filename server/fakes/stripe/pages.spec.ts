import { Harness } from './test/harness.ts';

/** The hosted pages as a browser without scripts uses them. */

const harness = new Harness();
beforeAll(() => harness.start());
afterAll(() => harness.stop());

const CARD = {
  method: 'card',
  card_number: '4242 4242 4242 4242',
  expiry: '12/40',
  cvc: '123',
  card_name: 'Ada Harrow',
};
const BANK = {
  method: 'us_bank_account',
  bank_name: 'Harrow Builders',
  routing_number: '110000000',
  account_number: '000123456789',
};

describe('the payment page', () => {
  test('pays by card and leads back with the id of the session', async () => {
    const session = await harness.session();
    const page = await fetch(session.url!);
    const html = await page.text();
    expect(html).toContain('No real money moves.');
    expect(html).toContain('$10,299.00');
    expect(html).toContain('Set aside for one job');
    const paid = await harness.submit(session.url!, CARD);
    expect(paid).toMatchObject({ status: 303, location: `http://127.0.0.1:4000/done?session=${session.id}` });
    const complete = await harness.stripe.checkout.sessions.retrieve(session.id, {
      expand: ['payment_intent'],
    });
    expect(complete).toMatchObject({
      status: 'complete',
      payment_status: 'paid',
      customer_details: { name: 'Ada Harrow' },
    });
    const after = await (await fetch(`${harness.url}/pay/${session.id}`)).text();
    expect(after).toContain('This payment has been made');
    expect((await harness.submit(`${harness.url}/pay/${session.id}`, CARD)).page).toContain(
      'This payment has been made',
    );
    expect((await harness.stripe.charges.list({ limit: 100 })).data).toHaveLength(1);
  });

  test('a decline is told in place, what was typed stays, and another card goes through', async () => {
    const session = await harness.session();
    const declined = await harness.submit(session.url!, { ...CARD, card_number: '4000000000009995' });
    expect(declined.status).toBe(200);
    expect(declined.page).toContain('role="alert"');
    expect(declined.page).toContain('Your card has insufficient funds.');
    expect(declined.page).toContain('value="Ada Harrow"');
    expect((await harness.stripe.checkout.sessions.retrieve(session.id)).status).toBe('open');
    expect((await harness.submit(session.url!, CARD)).status).toBe(303);
    const { payment_intent: intent } = await harness.stripe.checkout.sessions.retrieve(session.id);
    const tries = await harness.stripe.charges.list({ payment_intent: intent as string });
    expect(tries.data.map(({ status }) => status)).toEqual(['succeeded', 'failed']);
  });

  test.each([
    ['card_number', { card_number: '1234 5678 9012 3456' }],
    ['card_number', { card_number: '4111 1111 1111 1111' }],
    ['expiry', { expiry: '13/40' }],
    ['expiry', { expiry: '01/20' }],
    ['cvc', { cvc: '12' }],
    ['card_name', { card_name: ' ' }],
  ])('a wrong %s is marked beside its field', async (field, change) => {
    const session = await harness.session();
    const { status, page } = await harness.submit(session.url!, { ...CARD, ...change });
    expect(status).toBe(200);
    expect(page).toContain(`id="${field}-error"`);
    expect(page.match(/aria-invalid="true"/g)).toHaveLength(1);
    expect((await harness.stripe.checkout.sessions.retrieve(session.id)).payment_intent).toBeNull();
  });

  test('bank debit is offered only when the session allows it', async () => {
    const cardOnly = await harness.session({ allowed_payment_method_types: ['card'] });
    expect(await (await fetch(cardOnly.url!)).text()).not.toContain('Pay by bank debit');
    const both = await harness.session();
    expect(await (await fetch(both.url!)).text()).toContain('Pay by bank debit');
    const wrong = await harness.submit(both.url!, { ...BANK, routing_number: '1' });
    expect(wrong.page).toContain('id="routing_number-error"');
    expect((await harness.submit(both.url!, BANK)).status).toBe(303);
    const session = await harness.stripe.checkout.sessions.retrieve(both.id, { expand: ['payment_intent'] });
    expect(session).toMatchObject({ payment_status: 'unpaid', payment_intent: { status: 'processing' } });
  });

  test('a card that asks its holder: refused leads back to the page, confirmed to the app', async () => {
    const session = await harness.session();
    const ask = async () => harness.submit(session.url!, { ...CARD, card_number: '4000002760003184' });
    const first = await ask();
    expect(first.location).toMatch(/^\/confirm\/pi_/);
    const refused = await harness.submit(`${harness.url}${first.location}`, { answer: 'no' });
    expect(refused.page).toContain('The payment was not confirmed.');
    await ask();
    const confirmed = await harness.submit(`${harness.url}${first.location}`, { answer: 'yes' });
    expect(confirmed.location).toContain(`session=${session.id}`);
    expect((await harness.stripe.checkout.sessions.retrieve(session.id)).payment_status).toBe('paid');
  });

  test('no script, no foreign address, and a policy that says so', async () => {
    const session = await harness.session();
    const page = await fetch(session.url!);
    const policy = page.headers.get('content-security-policy')!;
    expect(policy).toContain("default-src 'none'");
    expect(policy).toContain("form-action 'self' http://127.0.0.1:4000");
    const html = await page.text();
    expect(html).not.toMatch(/<script|javascript:|style=|\son\w+=/);
    expect(html.match(/(?:src|href)="https?:[^"]+"/g)).toEqual(['href="http://127.0.0.1:4000/canceled"']);
  });

  test('names from the app are text, never markup', async () => {
    const session = await harness.session({
      line_items: [
        {
          quantity: 1,
          price_data: {
            currency: 'usd',
            unit_amount: 5000,
            product_data: { name: '<img src=x onerror=alert(1)>' },
          },
        },
      ],
    });
    const html = await (await fetch(session.url!)).text();
    expect(html).toContain('&lt;img src=x onerror=alert(1)&gt;');
  });

  test('an unknown session is not there', async () => {
    expect((await fetch(`${harness.url}/pay/cs_test_nobody`)).status).toBe(404);
  });
});

describe('the onboarding page (A-02)', () => {
  async function link(): Promise<{ account: string; url: string }> {
    const account = await harness.stripe.accounts.create({
      type: 'express',
      capabilities: { transfers: { requested: true } },
    });
    const { url } = await harness.stripe.accountLinks.create({
      account: account.id,
      type: 'account_onboarding',
      refresh_url: 'http://127.0.0.1:4000/refresh',
      return_url: 'http://127.0.0.1:4000/return',
    });
    return { account: account.id, url };
  }

  async function open(url: string): Promise<string> {
    const response = await fetch(url, { redirect: 'manual' });
    return response.headers.get('location')!;
  }

  test('details lead back, and the account becomes active after verification', async () => {
    const { account, url } = await link();
    const form = `${harness.url}${await open(url)}`;
    expect(await (await fetch(form)).text()).toContain('Business name');
    const wrong = await harness.submit(form, {
      business_name: '',
      routing_number: '1',
      account_number: '2',
      step: 'complete',
    });
    expect(wrong.status).toBe(200);
    expect(wrong.page.match(/aria-invalid="true"/g)).toHaveLength(3);
    const details = {
      business_name: 'Quarry Lane Cutting',
      routing_number: '110000000',
      account_number: '000123456789',
    };
    const saved = await harness.submit(form, { ...details, step: 'complete' });
    expect(saved).toMatchObject({ status: 303, location: 'http://127.0.0.1:4000/return' });
    await harness.advance({ seconds: 2 });
    const ready = await harness.stripe.accounts.retrieve(account);
    expect(ready).toMatchObject({ payouts_enabled: true, company: { name: 'Quarry Lane Cutting' } });
    expect(ready.external_accounts?.data[0]).toMatchObject({ last4: '6789', routing_number: '110000000' });
  });

  test('coming back does not mean complete', async () => {
    const { account, url } = await link();
    const form = `${harness.url}${await open(url)}`;
    const saved = await harness.submit(form, { business_name: 'Quarry Lane Cutting', step: 'later' });
    expect(saved.location).toBe('http://127.0.0.1:4000/return');
    await harness.advance({ seconds: 2 });
    expect(await harness.stripe.accounts.retrieve(account)).toMatchObject({
      details_submitted: false,
      payouts_enabled: false,
      capabilities: { transfers: 'inactive' },
    });
  });

  test('a link works once and for 300 seconds, then leads to the refresh address', async () => {
    const { url } = await link();
    expect(await open(url)).toMatch(/^\/onboarding\//);
    expect(await open(url)).toBe('http://127.0.0.1:4000/refresh');
    const late = await link();
    await harness.advance({ seconds: 301 });
    expect(await open(late.url)).toBe('http://127.0.0.1:4000/refresh');
  });

  test('a new link changes where payouts go', async () => {
    const { id } = await harness.onboardedAccount({ bankAccountNumber: '000111111116' });
    const { url } = await harness.stripe.accountLinks.create({
      account: id,
      type: 'account_update',
      refresh_url: 'http://127.0.0.1:4000/refresh',
      return_url: 'http://127.0.0.1:4000/return',
    });
    const form = `${harness.url}${await open(url)}`;
    await harness.submit(form, {
      business_name: 'Quarry Lane Cutting',
      routing_number: '110000000',
      account_number: '000123456789',
      step: 'complete',
    });
    const account = await harness.stripe.accounts.retrieve(id);
    expect(account.external_accounts?.data.map((bank) => bank.last4)).toEqual(['6789']);
    expect(account.payouts_enabled).toBe(true);
  });
});

describe('the page of all objects', () => {
  test('shows what there is and lets a person press outcomes and move the clock', async () => {
    const charge = await harness.paidCharge(12_345, 'pm_usBankAccount_success');
    const page = await (await fetch(`${harness.url}/`)).text();
    expect(page).toContain('$123.45');
    expect(page).toContain('Debit succeeds');
    const pressed = await harness.submit(`${harness.url}/outcome`, { action: 'debit_fails', id: charge.id });
    expect(pressed.location).toBe('/');
    expect((await harness.stripe.charges.retrieve(charge.id)).status).toBe('failed');
    const again = await harness.submit(`${harness.url}/outcome`, { action: 'dispute_opens', id: charge.id });
    expect(again.status).toBe(200);
    expect(again.page).toContain('role="alert"');
    const before = await harness.control<{ now: string }>('GET', 'clock');
    await harness.submit(`${harness.url}/clock`, { hours: '24' });
    const after = await harness.control<{ now: string }>('GET', 'clock');
    expect(Date.parse(after.now) - Date.parse(before.now)).toBeGreaterThanOrEqual(86_400_000);
    const refused = await harness.submit(`${harness.url}/clock`, { hours: '-1' });
    expect(refused.page).toContain('The clock moves by whole hours.');
  });

  test('takes no orders from another site', async () => {
    const foreign = { method: 'POST', headers: { 'Sec-Fetch-Site': 'cross-site' }, body: 'hours=24' };
    expect((await fetch(`${harness.url}/clock`, foreign)).status).toBe(403);
    expect((await fetch(`${harness.url}/_fake/reset`, foreign)).status).toBe(403);
  });
});

describe('the control API', () => {
  test('refuses what it does not know', async () => {
    const ask = (path: string, body: string) =>
      fetch(`${harness.url}/_fake/${path}`, { method: 'POST', body });
    expect((await ask('clock/advance', '{"weeks":1}')).status).toBe(400);
    expect((await ask('clock/advance', 'soon')).status).toBe(400);
    expect((await ask('faults', '{"kind":"flood","path":"/v1/transfers"}')).status).toBe(400);
    expect((await ask('outcomes', '{"action":"debit_fails","id":"ch_nobody"}')).status).toBe(400);
    expect((await ask('nothing', '{}')).status).toBe(404);
  });
});
