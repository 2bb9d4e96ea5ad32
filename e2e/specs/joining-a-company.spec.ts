import type { Page } from '@playwright/test';
import {
  makeCuttingContractor,
  makeGeneralContractor,
  PASSWORD,
  uniqueEmail,
} from '../../server/test/builders/people.ts';
import { sql } from '../../server/test/database.ts';
import { mailTo } from '../../server/test/mail.ts';
import { Authenticator } from '../../server/test/totp.ts';
import { expect, test, type Visitor } from '../fixtures/test.ts';
import { refusals, silence } from '../fixtures/watch.ts';
import { isLive, linkIn, signIn } from '../steps/people.ts';

const OTHER_PASSWORD = 'nine herons over a gravel bar';

/** As if everyone with this address had last said who they are this long ago. */
const ageProof = (email: string) =>
  sql(
    `UPDATE session SET proved_at = proved_at - interval '11 minutes'
     WHERE user_id = (SELECT id FROM app_user WHERE email = $1)`,
    [email],
  );

async function invite({ page, audit }: Visitor, email: string): Promise<void> {
  await page.getByRole('link', { name: 'People' }).click();
  await audit();
  await page.getByLabel('E-mail of the person').fill(email);
  await page.getByRole('radio', { name: /^Accounts/ }).check();
  await page.getByLabel('May set aside up to').fill('2,500');
  await page.getByRole('button', { name: 'Send the invitation', exact: true }).click();
  await expect(page.getByRole('listitem').filter({ hasText: email })).toContainText(
    'Setting aside: up to $2,500',
  );
  await audit();
}

async function accept({ page, audit }: Visitor, email: string): Promise<void> {
  await page.goto(linkIn(await mailTo(email, /invites you/)));
  await expect(page.getByRole('heading', { level: 1 })).toHaveText(/^Join /);
  await audit();
  await page.getByLabel('Your name').fill('Cy Larch');
  await page.getByLabel('Password').fill(PASSWORD);
  await page.getByRole('button', { name: 'Join' }).click();
  await expect(page.getByRole('heading', { level: 1, name: 'You are in' })).toBeVisible();
  await audit();
  await expect(page.getByLabel('E-mail')).toHaveValue(email);
  await page.getByLabel('Password').fill(PASSWORD);
  await page.getByRole('button', { name: 'Sign in' }).last().click();
  await isLive(page);
  await audit();
}

async function openAccount({ page }: Visitor): Promise<void> {
  await page.getByRole('button', { name: /^Account of/ }).click();
  await page.getByRole('menuitem', { name: 'Your account' }).click();
  await expect(page.getByRole('heading', { level: 1, name: 'Your account' })).toBeVisible();
}

async function setUpSecondFactor(visitor: Visitor): Promise<Authenticator> {
  const { page, audit } = visitor;
  await page.getByRole('button', { name: 'Set it up' }).click();
  await expect(page.getByRole('img', { name: /^QR code/ })).toBeVisible();
  await audit();
  const address = await page.getByRole('link', { name: /on this device/ }).getAttribute('href');
  const app = new Authenticator(new URL(address ?? '').searchParams.get('secret') ?? '');
  await paste(page, 'First code', await app.next());
  await page.getByRole('button', { name: 'Turn it on' }).click();
  const codes = page.getByRole('group', { name: 'Your recovery codes' });
  await expect(codes.getByRole('listitem')).toHaveCount(10);
  await audit();
  await codes.getByRole('button', { name: 'I have kept them' }).click();
  await expect(page.getByText('10 recovery codes are left.')).toBeVisible();
  return app;
}

/** E-11: codes are pasted, as from another window or a password manager. */
async function paste(page: Page, label: string, text: string): Promise<void> {
  await page.getByLabel(label).focus();
  await page.evaluate((pasted) => document.execCommand('insertText', false, pasted), text);
}

test('D-18 from an invitation to a second factor, which is asked for again before a sensitive act', async ({
  visit,
}) => {
  test.setTimeout(150_000);
  const gc = await makeGeneralContractor();
  const email = uniqueEmail();
  const [owner, newcomer] = [await visit('desk'), await visit('phone')];
  await signIn(owner, gc.owner.email, '/company');
  await owner.audit();
  await invite(owner, email);
  await accept(newcomer, email);
  await openAccount(newcomer);
  await newcomer.audit();
  const app = await setUpSecondFactor(newcomer);

  const { page } = newcomer;
  await page.getByRole('button', { name: /^Account of/ }).click();
  await page.getByRole('menuitem', { name: 'Sign out' }).click();
  await expect(page.getByRole('link', { name: 'Sign in' }).first()).toBeVisible();
  await newcomer.audit();
  await page.goto('/sign-in?next=/account');
  await newcomer.allowing(refusals(401), async () => {
    await page.getByLabel('E-mail').fill(email);
    await page.getByLabel('Password').fill(PASSWORD);
    await page.getByRole('button', { name: 'Sign in' }).last().click();
    await expect(page.getByLabel('Code from your authenticator app')).toBeFocused();
  });
  await newcomer.audit();
  await paste(page, 'Code from your authenticator app', await app.next());
  await page.getByRole('button', { name: 'Sign in' }).last().click();
  await isLive(page);

  await ageProof(email);
  await newcomer.allowing(refusals(403), async () => {
    await page.getByRole('button', { name: 'Make new recovery codes' }).click();
    await page.getByRole('alertdialog').getByRole('button', { name: 'Make new recovery codes' }).click();
    await expect(page.getByRole('dialog', { name: 'Is it still you?' })).toBeVisible();
  });
  await paste(page, 'Code from your authenticator app', await app.next());
  await page.getByRole('button', { name: 'Go on' }).click();
  await expect(page.getByRole('group', { name: 'Your recovery codes' })).toBeVisible();
  await newcomer.audit();

  await newcomer.allowing([...refusals(401), ...silence], () => takeOut(owner, newcomer));
});

/** D-11: whoever is taken out is out at once, wherever they are. */
async function takeOut(owner: Visitor, newcomer: Visitor): Promise<void> {
  await owner.page.reload();
  await owner.page.getByRole('button', { name: 'Take out Cy Larch' }).click();
  await owner.page.getByRole('alertdialog').getByRole('button', { name: 'Take out' }).click();
  await expect(owner.page.getByRole('listitem').filter({ hasText: 'Cy Larch' })).toContainText('Has left');
  await owner.audit();
  await newcomer.page.reload();
  await expect(newcomer.page).toHaveURL(/\/sign-in/);
}

test('D-16 a forgotten password is replaced through the mail; a half-copied link says so', async ({
  visit,
}) => {
  const { owner } = await makeGeneralContractor();
  const visitor = await visit('phone');
  const { page } = visitor;
  await page.goto('/sign-in');
  await visitor.audit();
  await page.getByRole('link', { name: 'Forgot your password?' }).click();
  await visitor.audit();
  await page.getByLabel('E-mail').fill(owner.email);
  await page.getByRole('button', { name: 'Send me the link' }).click();
  await expect(page.getByRole('heading', { level: 1, name: 'Look in your mail' })).toBeVisible();
  await visitor.audit();
  const link = linkIn(await mailTo(owner.email, /^Set a new password/));
  await visitor.allowing(refusals(422), async () => {
    await page.goto(link.slice(0, -12));
    await page.getByLabel('New password', { exact: true }).fill(OTHER_PASSWORD);
    await page.getByRole('button', { name: 'Set the password' }).click();
    await expect(page.getByText('This link is not whole, or not one of ours.')).toBeVisible();
    await visitor.audit();
  });
  await page.goto(link);
  await page.getByLabel('New password', { exact: true }).fill(OTHER_PASSWORD);
  await page.getByRole('button', { name: 'Set the password' }).click();
  await expect(page.getByRole('heading', { level: 1, name: 'Your password is set' })).toBeVisible();
  await visitor.audit();
  await page.getByRole('link', { name: 'Sign in' }).last().click();
  await page.getByLabel('E-mail').fill(owner.email);
  await page.getByLabel('Password').fill(OTHER_PASSWORD);
  await page.getByRole('button', { name: 'Sign in' }).last().click();
  await isLive(page);
  await visitor.audit();
});

test('D-17 a new address is confirmed by its own mail', async ({ visit }) => {
  const { owner } = await makeCuttingContractor();
  const email = uniqueEmail();
  const visitor = await visit();
  const { page } = visitor;
  await signIn(visitor, owner.email, '/account');
  await page.getByLabel('New address').fill(email);
  await page.getByRole('button', { name: 'Send the link' }).click();
  await expect(page.getByText(`A link is on its way to ${email}`).first()).toBeVisible();
  await visitor.audit();
  await page.goto(linkIn(await mailTo(email, /^Confirm your new/)));
  await visitor.audit();
  await page.getByRole('button', { name: 'Confirm this address' }).click();
  await expect(page.getByRole('heading', { level: 1, name: 'Your address was changed' })).toBeVisible();
  await page.getByRole('link', { name: 'To your account' }).click();
  await expect(page.getByText(`You sign in with ${email}`)).toBeVisible();
  await mailTo(owner.email, /was changed/);
});

test('E-09 a session about to end says so and is extended by a press', async ({ visit }) => {
  const { owner } = await makeGeneralContractor();
  const visitor = await visit();
  const { page } = visitor;
  await signIn(visitor, owner.email, '/company');
  await visitor.audit();
  await sql(
    `UPDATE session SET last_used_at = clock_timestamp() - interval '7 days' + interval '4 minutes' WHERE user_id = $1`,
    [owner.userId],
  );
  await page.reload();
  const warning = page.getByRole('alertdialog', { name: 'Your sign-in is about to end' });
  await expect(warning).toContainText('It ends in 3 min');
  await warning.getByRole('button', { name: 'Stay signed in' }).click();
  await expect(warning).toBeHidden();
  await expect
    .poll(async () =>
      sql(
        `SELECT 1 FROM session WHERE user_id = $1 AND last_used_at > clock_timestamp() - interval '1 minute'`,
        [owner.userId],
      ),
    )
    .toHaveLength(1);
});
