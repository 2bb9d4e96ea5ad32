import type { Page } from '@playwright/test';
import { photo } from '../fixtures/samples.ts';
import { expect } from '../fixtures/test.ts';

export async function sign(page: Page, name: string): Promise<void> {
  const paper = page.getByRole('region', { name: 'Subcontract', exact: true });
  await paper.getByLabel('Your full name').fill(name);
  await paper.getByRole('button', { name: 'Sign', exact: true }).click();
  await expect(paper.getByText(`signed by ${name}`)).toBeVisible();
}

/** Two windows to choose from, as the form offers them. */
export async function proposeWindows(page: Page): Promise<void> {
  await page.getByRole('button', { name: 'Propose a visit' }).click();
  const form = page.getByRole('form', { name: 'Propose a visit' });
  await form.getByRole('button', { name: 'Another window' }).click();
  await form.getByLabel('Note to the general contractor').fill('We bring our own water.');
  await form.getByRole('button', { name: 'Send the windows' }).click();
  await expect(visits(page).getByText('Proposed')).toBeVisible();
}

export const visits = (page: Page) => page.getByRole('region', { name: 'Visits' });
export const completion = (page: Page) => page.getByRole('region', { name: 'Completion' });

/** Everything cut as listed, with two photos. */
export async function submitAllAsListed(page: Page): Promise<void> {
  const form = page.getByRole('form', { name: 'Completion' });
  await form
    .getByLabel('Photos of what was cut')
    .setInputFiles([await photo('trench-open.jpg', 'T1'), await photo('sleeves.jpg', 'C1')]);
  await expect(form.getByRole('img', { name: 'trench-open.jpg' })).toBeVisible();
  await expect(form.getByRole('img', { name: 'sleeves.jpg' })).toBeVisible();
  await form.getByRole('button', { name: 'All as listed' }).click();
  await form.getByRole('button', { name: 'Submit and ask for payment' }).click();
  await expect(completion(page).getByText('Waiting for acceptance')).toBeVisible();
}

/** Press a button that asks first, and say yes. */
export async function confirmed(page: Page, name: RegExp): Promise<void> {
  await page.getByRole('button', { name }).click();
  const dialog = page.getByRole('alertdialog');
  await dialog.getByRole('button', { name }).click();
  await expect(dialog).toBeHidden();
}
