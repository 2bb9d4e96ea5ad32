import type { Page } from '@playwright/test';
import { expect } from '../fixtures/test.ts';

/** A rate for each mark, in dollars as typed. */
export type Rates = Record<string, string>;

/** Fill in the bid form line by line; the price shown is the one the server will compute. */
export async function fillLinesBid(page: Page, rates: Rates): Promise<void> {
  const form = page.getByRole('form', { name: 'Your bid' });
  await form.getByRole('radio', { name: 'By lines' }).check();
  for (const [mark, rate] of Object.entries(rates)) {
    await form.getByLabel(`Rate for ${mark}`).fill(rate);
  }
  await form.getByRole('textbox', { name: 'Mobilization' }).fill('350');
}

export async function handIn(page: Page): Promise<void> {
  await page.getByRole('button', { name: 'Hand in the bid' }).click();
  await expect(page.getByRole('region', { name: 'Your bid' }).getByText('In', { exact: true })).toBeVisible();
}

/** The amount beside a name in a list of names and amounts, in cents. */
export async function amountOf(page: Page, name: string): Promise<number> {
  const term = page.locator('dt').filter({ hasText: new RegExp(`^${name}$`) });
  return centsIn(await term.locator('xpath=following-sibling::dd[1]').first().innerText());
}

/** $12,345.60 or −$1.00 → cents. */
export function centsIn(text: string): number {
  const [, sign, dollars, cents] = /([-−(]?)\$([\d,]+)(?:\.(\d\d))?/.exec(text) ?? [];
  if (dollars === undefined) throw new Error(`no amount of money in "${text}"`);
  const absolute = Number(dollars.replaceAll(',', '')) * 100 + Number(cents ?? 0);
  return sign === '' ? absolute : -absolute;
}
