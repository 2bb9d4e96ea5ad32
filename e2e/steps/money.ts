import type { Page } from '@playwright/test';
import { expect, type Visitor } from '../fixtures/test.ts';
import { centsIn } from './bids.ts';

export const cards = { good: '4242 4242 4242 4242', declined: '4000 0000 0000 0002' };

/** From the money page of a subcontract to the payment provider's page. */
export async function toPaymentPage(page: Page): Promise<void> {
  await page.getByRole('button', { name: /^Set aside \$/ }).click();
  await page.getByRole('link', { name: 'Go to the payment page' }).click();
  await expect(page.getByRole('heading', { name: 'Pay by card' })).toBeVisible();
}

export async function payByCard(page: Page, number: string): Promise<void> {
  await page.getByLabel('Card number').fill(number);
  await page.getByLabel('Expiry (MM/YY)').fill('12/34');
  await page.getByLabel('Security code').fill('123');
  await page.getByLabel('Name on card').fill('Ines Harrow');
  await page.getByRole('button', { name: /^Pay \$.* by card$/ }).click();
}

/** Declined once, then paid; back on the money page, which shows it set aside without a reload. */
export async function setAsideByCard(visitor: Visitor): Promise<void> {
  const { page } = visitor;
  await toPaymentPage(page);
  await visitor.audit();
  await payByCard(page, cards.declined);
  await expect(page.getByRole('alert')).toContainText(/declined/i);
  await payByCard(page, cards.good);
  const payments = page.getByRole('region', { name: 'Payments in' });
  await expect(payments.getByText('Set aside', { exact: true })).toBeVisible();
}

/** Totals and entries of the statement on the page, as shown, in cents. */
export async function readStatement(page: Page) {
  await expect(page.getByRole('heading', { name: 'Totals' })).toBeVisible();
  const totals = page.getByRole('region', { name: 'Totals' });
  const names = await totals.locator('dt').allInnerTexts();
  const amounts = await totals.locator('dd').allInnerTexts();
  const rows = await page.getByRole('table', { name: 'Statement' }).locator('tbody tr').all();
  const entries = await Promise.all(
    rows.map(async (row) => {
      const cells = await row.locator('th, td').allInnerTexts();
      return { words: cells.join(' '), cents: centsIn(cells.at(-1) ?? '') };
    }),
  );
  const sumOf = (kind: string) =>
    entries.filter(({ words }) => words.includes(kind)).reduce((total, { cents }) => total + cents, 0);
  return {
    totals: Object.fromEntries(names.map((name, index) => [name, centsIn(amounts[index] ?? '')])),
    sumOf,
  };
}
