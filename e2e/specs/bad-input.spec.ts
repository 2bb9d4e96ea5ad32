import type { Locator, Page } from '@playwright/test';
import {
  DENVER,
  makeCuttingContractor,
  makeGeneralContractor,
  PASSWORD,
  type Person,
} from '../../server/test/builders/people.ts';
import { makeDraft, publishScope } from '../../server/test/builders/scopes.ts';
import { notAPhoto, photo, spreadsheet } from '../fixtures/samples.ts';
import { endSessions } from '../fixtures/sessions.ts';
import { expect, test, type Visitor } from '../fixtures/test.ts';
import { refusals, silence } from '../fixtures/watch.ts';
import { isLive, signIn } from '../steps/people.ts';
import { beginScope, fillSite, scopeForm } from '../steps/scopes.ts';

/** The fields that the summary of a form names, each of them marked and described by what is wrong with it. */
async function expectErrorsBeside(form: Locator, names: string[]): Promise<void> {
  const summary = form.getByRole('alert').first();
  for (const name of names) {
    const line = summary.getByRole('button', { name: new RegExp(`^${name}: .+`) });
    await expect(line).toBeVisible();
    const said = (await line.innerText()).slice(name.length + 2);
    await line.click();
    const field = form.locator(':focus');
    await expect(field).toHaveAttribute('aria-invalid', 'true');
    await expect(field).toHaveAccessibleDescription(
      new RegExp(said.replaceAll(/[.*+?^${}()|[\]\\]/g, '\\$&')),
    );
  }
}

/** The sign-in ran out: the page asks for the password over what is on the screen, and goes on. */
async function signInAgain(visitor: Visitor): Promise<void> {
  const dialog = visitor.page.getByRole('dialog', { name: 'Please sign in again' });
  await expect(dialog.getByLabel('Password')).toBeFocused();
  await visitor.audit();
  await visitor.page.keyboard.type(PASSWORD);
  await visitor.page.keyboard.press('Enter');
  await expect(dialog).toBeHidden();
}

/** No line for as long as something is done. */
async function withoutLine(visitor: Visitor, meanwhile: () => Promise<void>): Promise<void> {
  await visitor.allowing(silence, async () => {
    await visitor.context.setOffline(true);
    await expect(visitor.page.getByText(/^No connection\./)).toBeVisible();
    await meanwhile();
    await visitor.context.setOffline(false);
    await isLive(visitor.page);
  });
}

test('a sign-up says everything that is wrong at once', async ({ visit }) => {
  const visitor = await visit('phone');
  await visitor.page.goto('/sign-up');
  const form = visitor.page.getByRole('form', { name: 'Sign up' });
  await form.getByLabel('Work e-mail').fill('not an address');
  await form.getByLabel('Password').fill('short');
  await form.getByRole('button', { name: 'Send me the link' }).click();
  await expect(form.getByRole('alert')).toContainText('fields need another look');
  await expectErrorsBeside(form, ['Company', 'Company phone', 'Your name', 'Work e-mail', 'Password']);
  await visitor.audit();
});

test('a scope in the making loses nothing and says all that is missing', async ({ visit }) => {
  const gc = await makeGeneralContractor();
  const visitor = await visit();
  const { page } = visitor;
  await signIn(visitor, gc.owner.email, '/scopes');
  await visitor.audit();
  await beginScope(visitor);
  const form = scopeForm(page);
  const title = form.getByLabel('Title');
  const isSaved = () => expect(form.getByText(/^Saved( \d+ s ago)?$/)).toBeVisible({ timeout: 15_000 });

  await test.step('all errors at once, beside the fields and read out', async () => {
    await fillSite(page, DENVER.zip);
    await form.getByRole('button', { name: 'Add core' }).click();
    await form.getByRole('button', { name: 'Publish' }).click();
    await expect(form.getByRole('alert').first()).toContainText('fields need another look');
    await expectErrorsBeside(form, [
      'Title',
      'C1, Diameter',
      'C1, Depth',
      'Element',
      'Work from',
      'Bids due',
    ]);
    await visitor.audit();
  });

  await test.step('a reload', async () => {
    await title.fill('Before the reload');
    await page.reload();
    await expect(title).toHaveValue('Before the reload');
    await expect(form.getByLabel('Site name')).toHaveValue('Ninth Street Annex');
    await isSaved();
    await isLive(page);
  });

  await test.step('a dropped line', async () => {
    await withoutLine(visitor, () => title.fill('While the line was down'));
    await isSaved();
    await expect(title).toHaveValue('While the line was down');
  });

  await test.step('an expired sign-in', async () => {
    await endSessions(gc.owner);
    await visitor.allowing(refusals(401), async () => {
      await title.fill('After the sign-in ran out');
      await signInAgain(visitor);
      await isSaved();
    });
    await page.reload();
    await expect(title).toHaveValue('After the sign-in ran out');
  });
});

test('a bid in the making loses nothing either', async ({ visit }) => {
  const [gc, crew] = await Promise.all([
    makeGeneralContractor(),
    makeCuttingContractor({ yard: { ...DENVER } }),
  ]);
  const scope = await publishScope(gc, { site: { ...DENVER } });
  const visitor = await visit('phone');
  const { page } = visitor;
  await signIn(visitor, crew.owner.email, `/open-scopes/${scope.id}`);
  const form = page.getByRole('form', { name: 'Your bid' });

  await test.step('a line dropped while typing, and a reload after it', async () => {
    await form.getByRole('radio', { name: 'By lines' }).check();
    await form.getByLabel('Rate for A1').fill('1.25');
    await withoutLine(visitor, () => form.getByLabel('Also excluded').fill('Patching'));
    await page.reload();
    await expect(form.getByLabel('Rate for A1')).toHaveValue('1.25');
    await expect(form.getByLabel('Also excluded')).toHaveValue('Patching');
  });

  await test.step('errors of several fields at once', async () => {
    await form.getByLabel('Rate for B1').fill('a lot');
    await form.getByLabel('Valid for').fill('0');
    await form.getByRole('button', { name: 'Hand in the bid' }).click();
    await expectErrorsBeside(form, ['Rate for B1', 'Valid for']);
    await visitor.audit();
    await form.getByLabel('Rate for B1').fill('90');
    await form.getByLabel('Valid for').fill('45');
  });

  await test.step('a sign-in that ran out before it was handed in', async () => {
    await endSessions(crew.owner);
    await visitor.allowing(refusals(401), async () => {
      await form.getByRole('button', { name: 'Hand in the bid' }).click();
      await signInAgain(visitor);
      await expectHandedIn(page, crew.owner);
    });
  });
});

async function expectHandedIn(page: Page, owner: Person): Promise<void> {
  await expect(page.getByRole('region', { name: 'Your bid' }).getByText('In', { exact: true })).toBeVisible();
  expect((await owner.client.get('/api/bids')).status).toBe(401);
}

test('an upload that fails says which file and why, and the others arrive', async ({ visit }) => {
  const gc = await makeGeneralContractor();
  const draft = await makeDraft(gc);
  const visitor = await visit();
  await signIn(visitor, gc.owner.email, `/scopes/${draft.id}`);
  const form = scopeForm(visitor.page);
  const photos = form.getByLabel('Photos of the place');

  await test.step('refused by kind, refused by content, taken', async () => {
    await photos.setInputFiles([spreadsheet, notAPhoto, await photo('good.jpg', 'A1')]);
    const row = (name: string) => form.getByRole('listitem').filter({ hasText: name });
    await expect(row('takeoff.xlsx').getByRole('alert')).toHaveText('Not a JPEG, PNG, WebP or PDF file');
    await expect(row('not-a-photo.jpg').getByRole('alert')).toHaveText(/\S/);
    await expect(form.getByRole('img', { name: 'good.jpg' })).toBeVisible();
    await visitor.audit();
  });

  await test.step('sent again after the line was down', async () => {
    const late = await photo('late.jpg', 'B1');
    const row = form.getByRole('listitem').filter({ hasText: 'late.jpg' });
    await withoutLine(visitor, async () => {
      await photos.setInputFiles(late);
      await expect(row.getByRole('alert')).toHaveText('No answer came.');
    });
    await row.getByRole('button', { name: 'Try again' }).click();
    await expect(form.getByRole('img', { name: 'late.jpg' })).toBeVisible();
  });
});
