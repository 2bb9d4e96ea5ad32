import type { Locator, Page } from '@playwright/test';
import { drawing, photo } from '../fixtures/samples.ts';
import { expect, type Visitor } from '../fixtures/test.ts';

const DAY_MS = 86_400_000;
const dateIn = (days: number) => new Date(Date.now() + days * DAY_MS).toISOString().slice(0, 10);

export const scopeForm = (page: Page) => page.getByRole('form', { name: 'Scope' });

/** The cuts of the scope below as they are typed: the figures after the kind, in the order of their fields. */
const cuts = [
  { kind: 'line', mark: 'L1', figures: { Length: '30', Depth: '4' } },
  { kind: 'trench', mark: 'T1', figures: { Length: '40', Width: '2', Thickness: '6' } },
  { kind: 'opening', mark: 'O1', figures: { Length: '4', Width: '3', Thickness: '8' } },
  { kind: 'core', mark: 'C1', figures: { Diameter: '4', Depth: '8', 'How many': '6' } },
];

export async function beginScope(visitor: Visitor): Promise<void> {
  const { page } = visitor;
  await page.getByRole('link', { name: 'Scopes', exact: true }).click();
  await page.getByRole('link', { name: 'New scope' }).first().click();
  await expect(scopeForm(page)).toBeVisible();
  visitor.passedBy('/scopes/new');
}

export async function fillSite(page: Page, zip: string): Promise<void> {
  const form = scopeForm(page);
  await form.getByLabel('Site name').fill('Ninth Street Annex');
  await form.getByLabel('Street address').fill('914 Ninth Street');
  await form.getByLabel('ZIP code', { exact: true }).fill(zip);
  await expect(form.getByLabel('City')).toHaveValue('Denver');
  await form.getByLabel('Contact on site').fill('Gate 2, ask for Imani');
}

async function fillCuts(form: Locator): Promise<void> {
  for (const { kind, mark, figures } of cuts) {
    await form.getByRole('button', { name: `Add ${kind}` }).click();
    const row = form.getByRole('listitem', { name: `Cut ${mark}` });
    for (const [label, value] of Object.entries(figures))
      await row.getByLabel(label, { exact: true }).fill(value);
  }
}

async function fillConditions(form: Locator): Promise<void> {
  for (const [label, choice] of [
    ['Element', 'Slab on grade'],
    ['Face', 'Floor'],
    ['Below', 'Soil'],
    ['Steel', 'Mesh'],
    ['Post-tension', 'Proved: none'],
  ] as const) {
    await form.getByRole('combobox', { name: label }).selectOption(choice);
  }
  for (const [question, answer] of [
    ['Indoors', 'No'],
    ['Engines allowed', 'Yes'],
    ['Overcuts allowed', 'Yes'],
  ] as const) {
    await form.getByRole('radiogroup', { name: question }).getByLabel(answer).check();
  }
}

async function addFiles(form: Locator): Promise<void> {
  await form
    .getByLabel('Photos of the place')
    .setInputFiles([await photo('slab.jpg', 'T1'), await photo('wall-4.jpg', 'C1')]);
  await form.getByLabel('Drawings', { exact: true }).setInputFiles(await drawing('S-101.pdf'));
  await expect(form.getByRole('img', { name: 'slab.jpg' })).toBeVisible();
  await expect(form.getByRole('img', { name: 'wall-4.jpg' })).toBeVisible();
  await expect(form.getByText('2 sheets')).toBeVisible();
}

/** Somebody else has the shoring; the rest is as the sheet fills itself in. */
async function fillSheet(form: Locator): Promise<void> {
  await form.getByRole('button', { name: 'Open the whole sheet' }).click();
  await form.getByRole('radiogroup', { name: 'Scan for embedded items' }).getByLabel('Other').check();
  await form.getByLabel('Who has it: Scan for embedded items').fill('Gray Ridge Scanning');
}

export async function fillTerms(form: Locator): Promise<void> {
  await form.getByLabel('Work from').fill(dateIn(20));
  await form.getByLabel('Work until').fill(dateIn(40));
  await form.getByRole('radio', { name: /^Sealed bids/ }).check();
  await form.getByLabel('Bids due').fill(`${dateIn(7)}T14:00`);
}

/** Write a scope in the form and publish it; its id. */
export async function postScope(visitor: Visitor, scope: { title: string; zip: string }): Promise<string> {
  const { page } = visitor;
  await visitor.audit();
  await beginScope(visitor);
  const form = scopeForm(page);
  await form.getByLabel('Title').fill(scope.title);
  await fillSite(page, scope.zip);
  await fillCuts(form);
  await fillConditions(form);
  await addFiles(form);
  await fillSheet(form);
  await fillTerms(form);
  await expect(form.getByText(/^Saved \d+ s ago$/)).toBeVisible();
  await visitor.audit();
  await page.getByRole('button', { name: 'Publish', exact: true }).click();
  await page.getByRole('alertdialog').getByRole('button', { name: 'Publish now' }).click();
  await expect(page.getByText('No bid is in yet.')).toBeVisible();
  return /[0-9a-f-]{36}/.exec(page.url())?.[0] ?? '';
}

/** The bids are side by side; award one and land on its subcontract, whose id is returned. */
export async function award(page: Page, crew: string): Promise<string> {
  await page.getByRole('button', { name: `Award to ${crew}` }).click();
  const dialog = page.getByRole('alertdialog');
  await expect(dialog.getByText(`Award to ${crew}?`)).toBeVisible();
  await dialog.getByRole('button', { name: 'Award', exact: true }).click();
  await page.waitForURL(/\/work\/[0-9a-f-]{36}$/);
  return page.url().slice(-36);
}
