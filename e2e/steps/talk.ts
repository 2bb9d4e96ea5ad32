import type { Page } from '@playwright/test';
import { expect, type Visitor } from '../fixtures/test.ts';

/** Write in the thread on the page. */
export async function say(page: Page, words: string): Promise<void> {
  const form = page.getByRole('form', { name: /^Message to / });
  await form.getByRole('textbox').fill(words);
  await form.getByRole('button', { name: 'Send' }).click();
  await expect(messages(page).filter({ hasText: words })).toBeVisible();
}

export const messages = (page: Page) =>
  page.getByRole('list', { name: 'Messages, the last first' }).getByRole('listitem');

/** How many messages wait, by the link that every page has. */
export const unread = (page: Page, words: string) =>
  page.getByRole('link', { name: `Talk ${words}`, exact: true });

/** See that one message waits, open its thread from there, read it; then none waits. */
export async function readTheOneThatWaits(visitor: Visitor, from: string, words: string): Promise<void> {
  const { page } = visitor;
  await unread(page, '1 new message').click();
  await visitor.audit();
  await page.getByRole('link', { name: new RegExp(from) }).click();
  await expect(messages(page).filter({ hasText: words })).toBeVisible();
  await expect(unread(page, '')).toBeVisible();
  await visitor.audit();
}
