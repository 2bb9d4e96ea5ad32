import type { Page } from '@playwright/test';
import type { CompanyKind } from '@kerfyard/common/people';
import { mailTo } from '../../server/test/mail.ts';
import { PASSWORD, uniqueEmail } from '../../server/test/builders/people.ts';
import { expect, type Visitor } from '../fixtures/test.ts';

export interface Account {
  kind: CompanyKind;
  company: string;
  name: string;
  email: string;
}

export function accountOf(kind: CompanyKind, company: string, name: string): Account {
  return { kind, company, name, email: uniqueEmail() };
}

/** From the first look to a signed-in page: sign-up, the link in the mail, sign-in. */
export async function join(visitor: Visitor, account: Account): Promise<void> {
  const { page } = visitor;
  const isGc = account.kind === 'general_contractor';
  await page.goto('/');
  await visitor.audit();
  await page
    .getByRole('link', { name: isGc ? 'Sign up to buy cutting' : 'Sign up as a cutting crew' })
    .click();
  await expect(page.getByRole('radio', { name: isGc ? /^We buy/ : /^We cut/ })).toBeChecked();
  await visitor.audit();
  await page.getByLabel('Company', { exact: true }).fill(account.company);
  await page.getByLabel('Company phone').fill('+1 555 0100');
  await page.getByLabel('Your name').fill(account.name);
  await page.getByLabel('Work e-mail').fill(account.email);
  await page.getByLabel('Password').fill(PASSWORD);
  await page.getByRole('button', { name: 'Send me the link' }).click();
  await expect(page.getByRole('heading', { name: 'Look in your mail' })).toBeVisible();

  await page.goto(linkIn(await mailTo(account.email, /^Confirm your e-mail/)));
  await visitor.audit();
  await page.getByRole('button', { name: 'Confirm this address' }).click();
  await page.getByRole('link', { name: 'Sign in' }).last().click();
  await visitor.audit();
  await fillSignIn(page, account.email);
  await expect(page.getByRole('navigation', { name: 'Main' })).toBeVisible();
}

/** The address that a mail leads to. */
export function linkIn(mail: { text: string }): string {
  const [link] = /https?:\/\/\S+/.exec(mail.text) ?? [];
  if (link === undefined) throw new Error(`no link in: ${mail.text}`);
  return link;
}

async function fillSignIn(page: Page, email: string): Promise<void> {
  await page.getByLabel('E-mail').fill(email);
  await page.getByLabel('Password').fill(PASSWORD);
  await page.getByRole('button', { name: 'Sign in' }).click();
}

/** Somebody who has an account, on to a page of theirs. */
export async function signIn(visitor: Visitor, email: string, next = '/'): Promise<void> {
  await visitor.page.goto(`/sign-in?next=${encodeURIComponent(next)}`);
  await visitor.audit();
  await fillSignIn(visitor.page, email);
  await expect(visitor.page.getByRole('navigation', { name: 'Main' })).toBeVisible();
  await isLive(visitor.page);
}

/** The state of the line says that what is shown is up to date. */
export async function isLive(page: Page): Promise<void> {
  await expect(page.getByRole('status').filter({ hasText: /^Live$/ })).toBeVisible({ timeout: 30_000 });
}

export async function lineIsDown(page: Page): Promise<void> {
  await expect(page.getByRole('status').filter({ hasText: /^Reconnecting$/ })).toBeVisible({
    timeout: 30_000,
  });
}
