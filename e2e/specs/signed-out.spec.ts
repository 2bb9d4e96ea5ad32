import { award } from '../../server/test/builders/awards.ts';
import { jpegPhoto, uploadFiles } from '../../server/test/builders/files.ts';
import {
  DENVER,
  expectStatus,
  makeCuttingContractor,
  makeGeneralContractor,
  type Company,
} from '../../server/test/builders/people.ts';
import {
  comeDue,
  completeDraft,
  cutLine,
  lumpBid,
  makeDraft,
  placeBid,
} from '../../server/test/builders/scopes.ts';
import { sql } from '../../server/test/database.ts';
import { expect, test, type Visitor } from '../fixtures/test.ts';
import { refusals } from '../fixtures/watch.ts';
import { isLive, signIn } from '../steps/people.ts';

for (const look of ['desk', 'phone'] as const) {
  test(`the first look says what this is, draws it, and leads on (${look})`, async ({ visit }) => {
    const visitor = await visit(look);
    const { page } = visitor;
    await page.goto('/');
    await expect(page.getByRole('heading', { level: 1 })).toHaveText('Concrete cutting, bought and paid for');
    await expect(page.getByRole('img', { name: /^Cut sketch/ })).toBeVisible();
    await expect(page.getByRole('img', { name: /^Contract \$/ })).toBeVisible();
    await visitor.audit();
    for (const [name, path] of [
      ['Sign up to buy cutting', /\/sign-up\?as=gc$/],
      ['Sign up as a cutting crew', /\/sign-up\?as=crew$/],
    ] as const) {
      await page.getByRole('link', { name }).click();
      await expect(page).toHaveURL(path);
      await visitor.audit();
      await page.goBack();
    }
  });
}

test('each number of the first look opens to its working', async ({ visit }) => {
  const visitor = await visit();
  const { page } = visitor;
  await page.goto('/');
  const figure = page.getByRole('button', { name: /^Saw cut|^To saw/ });
  await figure.click();
  await expect(page.getByRole('dialog', { name: /^How it was worked out/ })).toBeVisible();
  await visitor.audit();
  await page.keyboard.press('Escape');
  await expect(figure).toBeFocused();
});

test('one press leads into the demo, as either side', async ({ visit }) => {
  const [gc, crew] = await Promise.all([makeGeneralContractor(), makeCuttingContractor()]);
  for (const [position, { owner }] of [gc, crew].entries()) {
    await sql(
      'INSERT INTO demo_person (key, user_id, position) VALUES ($1, $2, $3)',
      [`door-${owner.userId}`, owner.userId, position],
      'owner',
    );
  }
  const doors = [
    ['As a general contractor', 'Scopes'],
    ['As a cutting crew', 'Open scopes'],
  ] as const;
  for (const [door, title] of doors) {
    const visitor = await visit();
    await visitor.page.goto('/');
    await expect(visitor.page.getByRole('button', { name: door })).toBeVisible();
    await visitor.audit();
    await visitor.page.getByRole('button', { name: door }).click();
    await expect(visitor.page.getByRole('heading', { level: 1, name: title })).toBeVisible();
    await isLive(visitor.page);
    await visitor.audit();
  }
});

test('every page before sign-in has a title of its own, one heading and one main part', async ({ visit }) => {
  const visitor = await visit();
  const titles: string[] = [];
  for (const path of ['/sign-in', '/sign-up', '/verify?token=old', '/nothing/here']) {
    await visitor.page.goto(path);
    await visitor.audit();
    titles.push(await visitor.page.title());
  }
  expect(new Set(titles).size).toBe(titles.length);
  for (const title of titles) expect(title).toContain('Kerfyard');
});

test('a page for signed-in people asks to sign in, and never leads to another site', async ({ visit }) => {
  const gc = await makeGeneralContractor();
  const visitor = await visit();
  const { page } = visitor;
  await visitor.allowing(refusals(401), async () => {
    await page.goto('/money');
    await expect(page).toHaveURL(/\/sign-in\?next=%2Fmoney$/);
    visitor.passedBy('/money');
  });
  for (const next of [
    '//elsewhere.example/',
    'https://elsewhere.example/',
    'javascript:alert(1)',
    '/\\elsewhere.example',
  ]) {
    await visitor.context.clearCookies();
    await page.evaluate(() => localStorage.clear());
    await signIn(visitor, gc.owner.email, next);
    await expect(page.getByRole('heading', { level: 1, name: 'Scopes' })).toBeVisible();
  }
  await visitor.audit();
});

test('a script that got into the page does not run', async ({ visit }) => {
  const visitor = await visit();
  const { page } = visitor;
  await page.goto('/sign-in');
  await visitor.audit();
  await visitor.allowing([/script-src/, /Content Security Policy/], async () => {
    const blocked = await page.evaluate(async () => {
      const report = new Promise<string>((resolve) =>
        document.addEventListener('securitypolicyviolation', (event) => resolve(event.effectiveDirective)),
      );
      const script = document.createElement('script');
      script.textContent = 'document.title = "ran"';
      document.body.append(script);
      return report;
    });
    expect(blocked).toBe('script-src-elem');
  });
  expect(await page.title()).not.toBe('ran');
});

const script = `<img src=x onerror=alert(1)>"'><script>alert(2)</script>`;

interface Planted {
  gc: Company;
  crew: Company;
  scopeId: string;
  threadId: string;
  subcontractId: string;
}

/** Words that are a script, in every field that takes words. */
async function plant(): Promise<Planted> {
  const [gc, crew] = await Promise.all([
    makeGeneralContractor(),
    makeCuttingContractor({ yard: { ...DENVER }, name: `Crew ${script}`.slice(0, 100) }),
  ]);
  await expectStatus(
    gc.owner.client.put('/api/company', {
      name: `GC ${script}`,
      phone: '+1 555 0100',
      yard: null,
      serviceRadiusMi: null,
      methods: [],
    }),
    200,
  );
  const draft = completeDraft({
    title: `Title ${script}`,
    site: { ...DENVER, name: `Site ${script}`, address: script, contact: script },
    cuts: [{ ...cutLine('A1', { kind: 'core', diameterIn: 4, depthIn: 8, count: 2 }), note: script }],
    conditions: { floor: script.slice(0, 60), workHours: script, access: script },
    terms: { notes: script },
  });
  draft.summary = `Summary ${script}`;
  const scope = await makeDraft(gc, draft);
  const [fileId] = await uploadFiles(gc.owner, 'photo', [
    await jpegPhoto('<img src=x onerror=alert(3)>.jpg'),
  ]);
  await expectStatus(gc.owner.client.post(`/api/scopes/${scope.id}/files`, { fileId, caption: script }), 201);
  const { body: filed } = await expectStatus(gc.owner.client.get(`/api/scopes/${scope.id}`), 200);
  await expectStatus(
    gc.owner.client.post(`/api/scopes/${scope.id}/publish`, { version: filed.draft.version }),
    200,
  );
  const bid = lumpBid(300_000, { inclusions: [script], exclusions: [script], note: script });
  const { id: bidId } = await placeBid(crew, scope.id, bid);
  const { body: thread } = await expectStatus(
    crew.owner.client.post(`/api/scopes/${scope.id}/threads`, {}),
    200,
  );
  await expectStatus(
    crew.owner.client.post(`/api/threads/${thread.id}/messages`, {
      id: crypto.randomUUID(),
      body: script,
      fileIds: [],
    }),
    201,
  );
  await comeDue(gc, scope.id);
  const awarded = await expectStatus(award(gc, scope.id, bidId), 201);
  return { gc, crew, scopeId: scope.id, threadId: thread.id, subcontractId: awarded.body.subcontractId };
}

test('words that are a script are shown as words, to either side', async ({ visit }) => {
  const planted = await plant();
  const { scopeId, threadId, subcontractId } = planted;
  const both = [
    '/company',
    `/work`,
    `/work/${subcontractId}`,
    `/work/${subcontractId}/money`,
    `/talk/${threadId}`,
  ];
  await Promise.all([
    readAll(await visit(), planted.gc, [...both, '/scopes', `/scopes/${scopeId}`, `/scopes/${scopeId}/bids`]),
    readAll(await visit('phone'), planted.crew, [...both, '/bids', `/open-scopes/${scopeId}`]),
  ]);
});

/** Open each page; the words stand there, and are nothing but words. */
async function readAll(visitor: Visitor, company: Company, pages: string[]): Promise<void> {
  const { page } = visitor;
  await signIn(visitor, company.owner.email, pages[0]);
  for (const path of pages) {
    await page.goto(path);
    await expect(page.getByText('<img src=x onerror=').first()).toBeAttached();
    await visitor.audit();
    expect(await page.locator('img[src="x"], script:not([src])').count(), path).toBe(0);
  }
}
