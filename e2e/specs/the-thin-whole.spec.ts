import '../fixtures/own-stack.ts';
import { DENVER, makeCuttingContractor } from '../../server/test/builders/people.ts';
import { lumpBid, moveDue, placeBid } from '../../server/test/builders/scopes.ts';
import { mailTo } from '../../server/test/mail.ts';
import { expectBooksToHold, readLedger, readProvider } from '../fixtures/books.ts';
import { LiveLine } from '../fixtures/live-line.ts';
import { tell } from '../fixtures/stack.ts';
import { expect, test, type Visitor } from '../fixtures/test.ts';
import { silence } from '../fixtures/watch.ts';
import { amountOf, fillLinesBid, handIn } from '../steps/bids.ts';
import { completeCrew, setUpPayouts } from '../steps/company.ts';
import { readStatement, setAsideByCard } from '../steps/money.ts';
import { accountOf, isLive, join, lineIsDown } from '../steps/people.ts';
import { award, postScope } from '../steps/scopes.ts';
import { messages, readTheOneThatWaits, say } from '../steps/talk.ts';
import { completion, confirmed, proposeWindows, sign, submitAllAsListed, visits } from '../steps/work.ts';

const gcAccount = accountOf('general_contractor', 'Harrow & Pell Builders', 'Ines Harrow');
const crewAccount = accountOf('cutting_contractor', 'Blue Anvil Cutting', 'Tomas Reyes');
const title = `Feeder trench ${Date.now().toString(36)}`;
const mails = {
  gc: [
    /^A bid came in: Feeder trench/,
    /^Bids are due: /,
    /signed by both sides$/,
    /^Windows on offer/,
    /asks for \$/,
  ],
  crew: [
    /^New scope near you: Feeder trench/,
    /^Yours: subcontract /,
    /signed by both sides$/,
    /^\$.* set aside for /,
    /^Confirmed for /,
    /^\$.* released on /,
    /^\$.* transferred for /,
  ],
};
const rates = { L1: '1.10', T1: '0.95', O1: '1.45', C1: '85' };

test('a scope travels from sign-up to released money, in two browsers', async ({ visit }) => {
  test.setTimeout(300_000);
  const [gc, crew] = await Promise.all([visit('desk'), visit('phone')]);
  const lineOfCrew = await LiveLine.through(crew.context);

  await test.step('both sign up, and the crew says what it has', async () => {
    await Promise.all([
      join(gc, gcAccount),
      join(crew, crewAccount).then(() =>
        completeCrew(crew, { zip: DENVER.zip, methods: ['Flat saw', 'Wall saw', 'Core drill'] }),
      ),
    ]);
  });

  const scopeId = await test.step('the crew sees the scope appear without a reload', async () => {
    await crew.page.getByRole('link', { name: 'Open scopes' }).click();
    await isLive(crew.page);
    await crew.audit();
    const id = await postScope(gc, { title, zip: DENVER.zip });
    await expect(crew.page.getByRole('heading', { name: title })).toBeVisible();
    return id;
  });

  const priceCents = await test.step('the crew bids by lines, while the server is cut', async () => {
    await crew.page.getByRole('link', { name: title }).click();
    await fillLinesBid(crew.page, rates);
    await cutTheServer(crew, gc);
    await expect(crew.page.getByLabel('Rate for T1')).toHaveValue('0.95');
    const cents = await amountOf(crew.page, 'Your price');
    await handIn(crew.page);
    expect(await amountOf(crew.page, 'Your price')).toBe(cents);
    await crew.audit();
    return cents;
  });

  await test.step('two more crews bid; nobody reads an amount before due', async () => {
    const others = await Promise.all([1, 2].map(() => makeCuttingContractor({ yard: { ...DENVER } })));
    await placeBid(others[0]!, scopeId, lumpBid(priceCents + 150_000, { exclusions: ['Slurry disposal'] }));
    await placeBid(others[1]!, scopeId, lumpBid(priceCents + 420_000));
    await expect(gc.page.getByText('3 bids are in.')).toBeVisible();
    await gc.audit();
    await gc.page.getByRole('link', { name: 'See the bids' }).click();
    await expect(gc.page.getByRole('heading', { name: '3 sealed bids are in' })).toBeVisible();
    await expect(gc.page.getByRole('main')).not.toContainText('$');
    await gc.audit();
  });

  await test.step('they talk about how to get there, and see what waits', async () => {
    await say(crew.page, 'Is gate 2 wide enough for a 26 ft truck?');
    await readTheOneThatWaits(gc, crewAccount.company, 'Is gate 2 wide enough');
    await say(gc.page, 'Gate 2 is 14 ft wide.');
    await expect(messages(crew.page).filter({ hasText: 'Gate 2 is 14 ft wide.' })).toBeVisible();
  });

  const subcontractId =
    await test.step('due comes while the general contractor looks on; it awards', async () => {
      await moveDue(scopeId, 6000);
      await gc.page.goto(`/scopes/${scopeId}/bids`);
      await expect(gc.page.getByRole('heading', { name: '3 sealed bids are in' })).toBeVisible();
      await expect(gc.page.getByRole('columnheader', { name: crewAccount.company })).toBeVisible();
      await gc.audit();
      return award(gc.page, crewAccount.company);
    });

  await test.step('both sign', async () => {
    await sign(gc.page, gcAccount.name);
    await gc.audit();
    await crew.page.getByRole('link', { name: 'Bids', exact: true }).click();
    await expect(crew.page.getByText('Awarded to you')).toBeVisible();
    await crew.audit();
    await crew.page.getByRole('link', { name: 'Open the subcontract' }).click();
    await sign(crew.page, crewAccount.name);
    await expect(gc.page.getByText(`signed by ${crewAccount.name}`)).toBeVisible();
    await expect(gc.page.getByRole('link', { name: 'Read the signed subcontract (PDF)' })).toBeVisible();
  });

  await test.step('money is set aside while the line of the crew is half-open', async () => {
    lineOfCrew.silence();
    await gc.page.getByRole('link', { name: 'Money', exact: true }).last().click();
    await gc.audit();
    await setAsideByCard(gc);
    await lineIsDown(crew.page);
    await isLive(crew.page);
    await expect(crew.page.getByText('Set aside', { exact: true }).first()).toBeVisible();
  });

  await test.step('a visit is proposed, confirmed, started and finished', async () => {
    await proposeWindows(crew.page);
    await gc.page.getByRole('link', { name: /^Back to / }).click();
    await visits(gc.page)
      .getByRole('button', { name: /^Confirm / })
      .first()
      .click();
    await expect(visits(crew.page).getByText('Confirmed')).toBeVisible();
    await visits(crew.page).getByRole('button', { name: 'Start the visit' }).click();
    await expect(visits(gc.page).getByText('On site', { exact: true })).toBeVisible();
    await visits(crew.page).getByRole('button', { name: 'Finish the visit' }).click();
    await expect(visits(gc.page).getByText('Finished')).toBeVisible();
  });

  await test.step('the crew says what it cut; the general contractor accepts and releases', async () => {
    await submitAllAsListed(crew.page);
    await crew.audit();
    await expect(completion(gc.page).getByRole('img', { name: 'sleeves.jpg' })).toBeVisible();
    await confirmed(gc.page, /^Accept the work$/);
    await confirmed(gc.page, /^Release \$/);
    await expect(completion(gc.page).getByText('Released', { exact: true })).toBeVisible();
    await gc.audit();
  });

  await test.step('the crew sets up payouts, and its money arrives', async () => {
    await setUpPayouts(crew, crewAccount.company);
    await crew.page.goto(`/work/${subcontractId}/money`);
    const releases = crew.page.getByRole('region', { name: 'Releases' });
    await expect(releases.getByText('Transferred', { exact: true })).toBeVisible({ timeout: 30_000 });
    await crew.audit();
  });

  await test.step('each turn was mailed to the side that waited for it', async () => {
    for (const subject of mails.crew) await mailTo(crewAccount.email, subject);
    for (const subject of mails.gc) await mailTo(gcAccount.email, subject);
  });

  await test.step('both statements equal the ledger and the provider', async () => {
    await compareStatements({ gc, crew, subcontractId, priceCents });
  });
});

async function compareStatements(whole: {
  gc: Visitor;
  crew: Visitor;
  subcontractId: string;
  priceCents: number;
}): Promise<void> {
  const { gc, crew, subcontractId, priceCents } = whole;
  const [ledger, provider] = await Promise.all([readLedger(subcontractId), readProvider(subcontractId)]);
  expect(ledger).toMatchObject({ setAside: priceCents, held: 0, released: priceCents, payable: 0 });
  expect(provider).toEqual({ paid: ledger.setAside + ledger.charges, transferred: ledger.transferred });
  await expectBooksToHold();

  await Promise.all([gc, crew].map(({ page }) => page.goto('/money')));
  const paid = await readStatement(gc.page);
  expect(paid.totals).toEqual({
    'Set aside, all told': ledger.setAside,
    'Charges for setting aside': ledger.charges,
    Released: ledger.released,
    'Retainage held': 0,
    'Held now': ledger.held,
  });
  expect(paid.sumOf('Set aside')).toBe(provider.paid - ledger.charges);
  await gc.audit();

  const earned = await readStatement(crew.page);
  expect(earned.totals).toEqual({
    Released: ledger.released,
    'Platform fees': ledger.fees,
    'Released, transfer under way': ledger.payable,
    Transferred: ledger.transferred,
    'Retainage held': 0,
  });
  expect(-earned.sumOf('Transferred to you')).toBe(provider.transferred);
  await crew.audit();
}

/** Nobody answers for a while; what both pages show stays, and they come back by themselves. */
async function cutTheServer(...visitors: Visitor[]): Promise<void> {
  const [first, second] = visitors as [Visitor, Visitor];
  await first.allowing(silence, () =>
    second.allowing(silence, async () => {
      await tell('stop-app');
      await Promise.all(visitors.map(({ page }) => lineIsDown(page)));
      await tell('start-app');
      await Promise.all(visitors.map(({ page }) => isLive(page)));
    }),
  );
}
