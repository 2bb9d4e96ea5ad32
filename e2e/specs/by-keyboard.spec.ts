import { dueScope, sign } from '../../server/test/builders/awards.ts';
import {
  DENVER,
  expectStatus,
  makeCuttingContractor,
  makeGeneralContractor,
  PASSWORD,
} from '../../server/test/builders/people.ts';
import { publishScope } from '../../server/test/builders/scopes.ts';
import { Keyboard } from '../fixtures/keyboard.ts';
import { expect, test, type Visitor } from '../fixtures/test.ts';

/** Sign in without a mouse, and go on to a page. */
async function signInByKeys(visitor: Visitor, email: string, next: string): Promise<Keyboard> {
  const { page } = visitor;
  const keys = new Keyboard(page);
  await page.goto(`/sign-in?next=${encodeURIComponent(next)}`);
  await keys.type(page.getByLabel('E-mail'), email);
  await visitor.audit();
  await keys.type(page.getByLabel('Password'), PASSWORD);
  await page.keyboard.press('Enter');
  await expect(page.getByRole('navigation', { name: 'Main' })).toBeVisible();
  return keys;
}

test('a crew finds a scope and bids on it by keyboard alone', async ({ visit }) => {
  const [gc, crew] = await Promise.all([
    makeGeneralContractor(),
    makeCuttingContractor({ yard: { ...DENVER } }),
  ]);
  const title = `Sleeves ${Date.now().toString(36)}`;
  await publishScope(gc, { title, site: { ...DENVER } });
  const visitor = await visit();
  const { page } = visitor;
  const keys = await signInByKeys(visitor, crew.owner.email, '/open-scopes');
  await expect(page.getByRole('link', { name: title })).toBeVisible();
  await visitor.audit();

  await test.step('the skip link leads past the navigation', async () => {
    await page.reload();
    await expect(page.getByRole('link', { name: title })).toBeVisible();
    await page.keyboard.press('Tab');
    await expect(page.getByRole('link', { name: 'Skip to the content' })).toBeFocused();
    await page.keyboard.press('Enter');
    await expect(page.getByRole('main')).toBeFocused();
  });

  await test.step('an own bid, its errors at once', async () => {
    await keys.press(page.getByRole('link', { name: title }));
    const form = page.getByRole('form', { name: 'Your bid' });
    await keys.type(form.getByLabel('Valid for'), '0');
    await keys.press(form.getByRole('button', { name: 'Hand in the bid' }));
    await expect(form.getByRole('alert')).toContainText('2 fields need another look');
    await keys.press(form.getByRole('alert').getByRole('button', { name: /^Lump sum/ }));
    await expect(form.getByLabel('Lump sum', { exact: true }).and(form.getByRole('textbox'))).toBeFocused();
    await page.keyboard.type('4,850');
    await keys.type(form.getByLabel('Valid for'), '30');
    await visitor.audit();
    await keys.press(form.getByRole('button', { name: 'Hand in the bid' }));
    const own = page.getByRole('region', { name: 'Your bid' });
    await expect(own.getByText(/^Handed in /)).toBeVisible();
    await expect(own.getByRole('definition').filter({ hasText: '$4,850.00' })).toBeVisible();
  });

  await test.step('a dialog keeps the focus, and gives it back', async () => {
    const withdraw = page.getByRole('region', { name: 'Your bid' }).getByRole('button', { name: 'Withdraw' });
    await keys.press(withdraw);
    const dialog = page.getByRole('alertdialog');
    await expect(dialog.getByRole('button', { name: 'Cancel' })).toBeFocused();
    await keys.tabTo(dialog.getByRole('button', { name: 'Withdraw' }));
    await page.keyboard.press('Tab');
    await expect(dialog.getByRole('button', { name: 'Cancel' })).toBeFocused();
    await page.keyboard.press('Escape');
    await expect(dialog).toBeHidden();
    await expect(withdraw).toBeFocused();
  });

  await test.step('no stop of the page is a trap', async () => {
    expect(await keys.walk()).toBeGreaterThan(15);
  });
});

test('a general contractor awards, signs and sets aside by keyboard alone', async ({ visit }) => {
  const due = await dueScope([480_000, 520_000]);
  const [winner] = due.crews as [(typeof due.crews)[number]];
  const visitor = await visit();
  const { page } = visitor;
  const keys = await signInByKeys(visitor, due.gc.owner.email, `/scopes/${due.scope.id}/bids`);

  await test.step('award', async () => {
    await keys.press(page.getByRole('button', { name: `Award to ${winner.name}` }));
    const dialog = page.getByRole('alertdialog');
    await keys.choose(dialog.getByLabel('Reason the others are told'), 'Start date');
    await visitor.audit();
    await keys.press(dialog.getByRole('button', { name: 'Award', exact: true }));
    await page.waitForURL(/\/work\/[0-9a-f-]{36}$/);
  });

  await test.step('sign', async () => {
    const paper = page.getByRole('region', { name: 'Subcontract', exact: true });
    await keys.type(paper.getByLabel('Your full name'), due.gc.owner.name);
    await page.keyboard.press('Enter');
    await expect(paper.getByText(`signed by ${due.gc.owner.name}`)).toBeVisible();
    await visitor.audit();
  });

  await test.step('set aside, up to the payment page', async () => {
    const subcontractId = page.url().slice(-36);
    await expectStatus(sign(winner.owner, subcontractId), 200);
    await keys.press(page.getByRole('link', { name: 'Money', exact: true }).last());
    await keys.press(page.getByRole('button', { name: /^Set aside \$/ }));
    await keys.press(page.getByRole('link', { name: 'Go to the payment page' }));
    await expect(page.getByRole('heading', { name: 'Pay by card' })).toBeVisible();
    await visitor.audit();
    await page.goBack();
    await visitor.audit();
  });
});
