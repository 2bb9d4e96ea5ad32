import { expect, type Visitor } from '../fixtures/test.ts';

/** What a crew needs before it may bid: yard, service radius, methods; and what a visit books. */
export async function completeCrew(
  visitor: Visitor,
  crew: { zip: string; methods: string[] },
): Promise<void> {
  const { page } = visitor;
  await page.getByRole('link', { name: 'Company' }).click();
  await expect(page.getByText('To bid you still need')).toBeVisible();
  await page.getByLabel('ZIP code of your yard').fill(crew.zip);
  await expect(page.getByText('Denver, CO')).toBeVisible();
  await page.getByLabel('Service radius').fill('60');
  for (const method of crew.methods) await page.getByLabel(method, { exact: true }).check();
  await page.getByRole('button', { name: 'Save', exact: true }).click();
  await expect(page.getByText('You can bid')).toBeVisible();
  await page.getByLabel("New crew's name").fill('Crew Gray');
  await page.getByRole('button', { name: 'Add crew' }).click();
  await expect(page.getByRole('listitem').filter({ hasText: 'Crew Gray' })).toBeVisible();
  await page.getByLabel("New truck's name").fill('Truck 7');
  await page.getByRole('button', { name: 'Add truck' }).click();
  await expect(page.getByRole('listitem').filter({ hasText: 'Truck 7' })).toBeVisible();
  await visitor.audit();
}

/** Payouts, on the payment provider's own page. */
export async function setUpPayouts(visitor: Visitor, businessName: string): Promise<void> {
  const { page } = visitor;
  await page.getByRole('link', { name: 'Company' }).click();
  await page.getByRole('button', { name: 'Set up payouts' }).click();
  await expect(page.getByRole('heading', { name: 'Get ready to be paid' })).toBeVisible();
  await visitor.audit();
  await page.getByLabel('Business name').fill(businessName);
  await page.getByLabel('Routing number').fill('110000000');
  await page.getByLabel('Account number').fill('000123456789');
  await page.getByRole('button', { name: 'Save and finish' }).click();
  await expect(page.getByText('You can be paid')).toBeVisible();
}
