import { html } from '../../shared/html.ts';
import type { SafeHtml } from '../../shared/html.ts';
import type { SessionRecord } from '../resources/checkout-sessions.ts';
import { successUrlOf } from '../resources/checkout-sessions.ts';
import {
  findBankByNumber,
  findCardByNumber,
  TEST_BANKS,
  TEST_CARDS,
  TEST_ROUTING_NUMBER,
} from '../test-values.ts';
import type { TestBank, TestCard } from '../test-values.ts';
import { alertBox, dollars, layout, textField } from './layout.ts';

export interface CheckoutForm {
  values: Record<string, string>;
  errors: Record<string, string>;
  /** About the payment as a whole, for example a decline. */
  problem?: string;
}

export const EMPTY_FORM: CheckoutForm = { values: {}, errors: {} };

function spaced(number: string): string {
  return number.replace(/(\d{4})(?=\d)/g, '$1 ');
}

function cardSection(session: SessionRecord, { values, errors }: CheckoutForm): SafeHtml {
  const field = (name: string) => ({ name, value: values[name] ?? '', error: errors[name] });
  return html`<section class="sheet" aria-labelledby="card-title">
    <h2 id="card-title">Pay by card</h2>
    <form method="post" action="/pay/${session.id}" novalidate>
      <input type="hidden" name="method" value="card" />
      ${textField({ ...field('card_number'), label: 'Card number', autocomplete: 'cc-number', inputMode: 'numeric' })}
      <div class="row">
        ${textField({ ...field('expiry'), label: 'Expiry (MM/YY)', autocomplete: 'cc-exp', inputMode: 'numeric' })}
        ${textField({ ...field('cvc'), label: 'Security code', autocomplete: 'cc-csc', inputMode: 'numeric' })}
      </div>
      ${textField({ ...field('card_name'), label: 'Name on card', autocomplete: 'cc-name' })}
      <button class="wide-button">Pay ${dollars(session.api.amount_total ?? 0)} by card</button>
    </form>
    <details>
      <summary>Test card numbers</summary>
      <ul>
        ${TEST_CARDS.map((card) => html`<li><code>${spaced(card.number)}</code> ${card.hint}</li>`)}
      </ul>
      <p>Any expiry to come and any security code will do.</p>
    </details>
  </section>`;
}

function bankSection(session: SessionRecord, { values, errors }: CheckoutForm): SafeHtml {
  const field = (name: string) => ({ name, value: values[name] ?? '', error: errors[name] });
  return html`<section class="sheet" aria-labelledby="bank-title">
    <h2 id="bank-title">Pay by bank debit</h2>
    <p>Takes up to four business days and may still fail.</p>
    <form method="post" action="/pay/${session.id}" novalidate>
      <input type="hidden" name="method" value="us_bank_account" />
      ${textField({ ...field('bank_name'), label: 'Account holder', autocomplete: 'name' })}
      ${textField({ ...field('routing_number'), label: 'Routing number', hint: `Test: ${TEST_ROUTING_NUMBER}`, inputMode: 'numeric' })}
      ${textField({ ...field('account_number'), label: 'Account number', inputMode: 'numeric' })}
      <button class="wide-button">Pay ${dollars(session.api.amount_total ?? 0)} by bank debit</button>
    </form>
    <details>
      <summary>Test account numbers</summary>
      <ul>
        ${TEST_BANKS.map((bank) => html`<li><code>${bank.accountNumber}</code> ${bank.hint}</li>`)}
      </ul>
    </details>
  </section>`;
}

/** The page on which a session is paid. */
export function checkoutPage(session: SessionRecord, form: CheckoutForm): SafeHtml {
  const { api, notes } = session;
  const allows = (type: string): boolean => api.payment_method_types.includes(type);
  return layout(
    'Pay',
    html`<h1>Pay</h1>
      <p class="amount">${dollars(api.amount_total ?? 0)}</p>
      <ul class="items">
        ${notes.lineItems.map(
          (item) => html`<li><span>${item.description}</span><span>${dollars(item.amount_total)}</span></li>`,
        )}
      </ul>
      ${alertBox(form.problem)} ${allows('card') && cardSection(session, form)}
      ${allows('us_bank_account') && bankSection(session, form)}
      ${api.cancel_url && html`<p><a href="${api.cancel_url}">Cancel and go back</a></p>`}`,
  );
}

/** A session that can no longer be paid. */
export function endedPage(session: SessionRecord): SafeHtml {
  const isComplete = session.api.status === 'complete';
  const target = isComplete ? successUrlOf(session) : session.api.cancel_url;
  return layout(
    'Nothing to pay here',
    html`<h1>${isComplete ? 'This payment has been made' : 'This payment page has expired'}</h1>
      ${target && html`<p><a href="${target}">Go back</a></p>`}`,
  );
}

/** The card holder's bank asks. */
export function confirmPage(intentId: string, amountCents: number): SafeHtml {
  return layout(
    'Confirm the payment',
    html`<h1>Confirm the payment</h1>
      <p>The bank of the card asks whether you want to pay ${dollars(amountCents)}.</p>
      <form method="post" action="/confirm/${intentId}" class="bar">
        <button name="answer" value="yes">Confirm</button>
        <button class="quiet" name="answer" value="no">Refuse</button>
      </form>`,
  );
}

/** What a form gave: either something usable or what is wrong, by field. */
export type Checked<Entry> = { entry: Entry } | { errors: Record<string, string> };

export interface CardEntry {
  card: TestCard;
  expMonth: number;
  expYear: number;
  name: string;
}

function parseExpiry(text: string): { month: number; year: number } | null {
  const [, month, year] = text.trim().match(/^(\d{1,2})\s*\/\s*(\d{2}|\d{4})$/) ?? [];
  if (!month || !year || Number(month) < 1 || Number(month) > 12) return null;
  return { month: Number(month), year: year.length === 2 ? 2000 + Number(year) : Number(year) };
}

/** Whether a number passes the check digit (ISO/IEC 7812-1, Luhn). */
export function passesCheckDigit(number: string): boolean {
  const digits = [...number].reverse().map(Number);
  const sum = digits.reduce((total, digit, index) => {
    const doubled = index % 2 === 1 ? digit * 2 : digit;
    return total + (doubled > 9 ? doubled - 9 : doubled);
  }, 0);
  return sum % 10 === 0;
}

/** Checks the card form; `nowSeconds` decides whether the card has expired. */
export function readCardForm(values: Record<string, string>, nowSeconds: number): Checked<CardEntry> {
  const errors: Record<string, string> = {};
  const number = (values['card_number'] ?? '').replace(/[\s-]/g, '');
  const card = findCardByNumber(number);
  if (!/^\d{13,19}$/.test(number) || !passesCheckDigit(number))
    errors['card_number'] = 'Enter a card number.';
  else if (!card) errors['card_number'] = 'Only test card numbers work here. They are listed below.';
  const expiry = parseExpiry(values['expiry'] ?? '');
  const now = new Date(nowSeconds * 1000);
  if (!expiry) errors['expiry'] = 'Enter month and year, for example 12/30.';
  else if (expiry.year * 12 + expiry.month < now.getUTCFullYear() * 12 + now.getUTCMonth() + 1) {
    errors['expiry'] = 'This card has expired.';
  }
  if (!/^\d{3,4}$/.test((values['cvc'] ?? '').trim())) errors['cvc'] = 'Enter the three or four digits.';
  const name = (values['card_name'] ?? '').trim();
  if (name === '') errors['card_name'] = 'Enter the name on the card.';
  if (!card || !expiry || Object.keys(errors).length > 0) return { errors };
  return { entry: { card, expMonth: expiry.month, expYear: expiry.year, name } };
}

export interface BankEntry {
  bank: TestBank;
  name: string;
}

/** Checks the bank debit form. */
export function readBankForm(values: Record<string, string>): Checked<BankEntry> {
  const errors: Record<string, string> = {};
  const name = (values['bank_name'] ?? '').trim();
  if (name === '') errors['bank_name'] = 'Enter the account holder.';
  if ((values['routing_number'] ?? '').trim() !== TEST_ROUTING_NUMBER) {
    errors['routing_number'] = `Only ${TEST_ROUTING_NUMBER} works here.`;
  }
  const bank = findBankByNumber((values['account_number'] ?? '').trim());
  if (!bank) errors['account_number'] = 'Only test account numbers work here. They are listed below.';
  if (!bank || Object.keys(errors).length > 0) return { errors };
  return { entry: { bank, name } };
}
