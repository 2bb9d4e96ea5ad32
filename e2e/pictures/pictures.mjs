// A picture of every page in every role, at a desk and on a phone, light and dark. Started by `npm run pictures`, which
// gives it a demo of its own (BASE_URL); the pictures go to pictures/ beside the packages, which git ignores.
/* global document -- inside the pages */
import { chromium } from '@playwright/test';
import { existsSync, mkdirSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { parseArgs } from 'node:util';

const folder = fileURLToPath(new URL('../../pictures', import.meta.url));
const debianBrowsers = ['/usr/bin/chromium', '/usr/bin/chromium-headless-shell'];
const usage = `npm run pictures [-- --role NAME]...   NAME: signed-out, gc-owner, crew-field, staff and so on`;

const { values: options } = parseArgs({ options: { role: { type: 'string', multiple: true } } });

const widths = { 1280: { width: 1280, height: 900 }, 390: { width: 390, height: 844 } };
const schemes = ['light', 'dark'];

/** Where nobody is signed in; nothing leads to some of these. */
const publicPaths = ['/', '/sign-in', '/sign-up?as=gc', '/sign-up?as=crew', '/verify?token=used', '/no-such-page'];
/** For everybody signed in; menus lead to some of these, and links do not. */
const signedInPaths = ['/', '/account'];
/** Opening the first begins a scope, so it is left to people; the others are the same for everybody: see signed-out. */
const leftOut = /^\/(scopes\/new|calculators)/;
/** Pages of one kind that differ in what they hold, for owners and staff; one for everybody else. */
const EXAMPLES = 4;

const idPart = /[0-9a-f]{8}-[0-9a-f-]{27}/g;
const kindOf = (path) => new URL(path, 'http://x').pathname.replaceAll(idPart, 'id');
const fileName = (path, example) => `${kindOf(path).slice(1).replaceAll('/', '.') || 'first-look'}${example > 1 ? `-${example}` : ''}`;

/** Somebody of the demo for each kind of company and role, and nobody. */
async function rolesIn(baseURL) {
  const people = await (await fetch(`${baseURL}/api/demo/people`)).json();
  if (people.length === 0) throw new Error('There is nobody in the demo: seed it first.');
  const sides = { general_contractor: 'gc', cutting_contractor: 'crew' };
  const roles = new Map([['signed-out', null]]);
  for (const person of people) {
    const side = sides[person.kind];
    const role = side === undefined ? 'staff' : `${side}-${person.role}`;
    if (!roles.has(role)) roles.set(role, person.key);
  }
  return roles;
}

async function openPage(browser, { baseURL, key, width, scheme }) {
  const context = await browser.newContext({
    baseURL,
    viewport: widths[width],
    colorScheme: scheme,
    reducedMotion: 'reduce',
    locale: 'en-US',
    timezoneId: 'America/New_York',
    ...(width === '390' ? { isMobile: true, hasTouch: true } : {}),
  });
  const page = await context.newPage();
  if (key !== null) await signIn(page, key);
  return page;
}

/** By the demo's own door, inside the page, so that its cookies are the page's. */
async function signIn(page, key) {
  await page.goto('/sign-in');
  const status = await page.evaluate(async (body) => {
    const headers = { 'Content-Type': 'application/json', 'X-Kerfyard': '1', 'Idempotency-Key': crypto.randomUUID() };
    const answer = await fetch('/api/demo/sign-in', { method: 'POST', headers, body });
    localStorage.setItem('kerfyard.signed-in', '1');
    return answer.status;
  }, JSON.stringify({ key }));
  if (status !== 200) throw new Error(`Signing in as ${key} gave ${status}.`);
}

/** Go there and wait until everything asked for has come. */
async function rest(page, path) {
  await page.goto(path);
  await page.locator('h1').first().waitFor();
  await page.waitForFunction(
    () =>
      ![...document.querySelectorAll('[role=status]')].some((status) => /^Loading/.test(status.textContent)) &&
      [...document.images].every((image) => image.loading === 'lazy' || image.complete),
  );
  // Pictures further down load when they come near.
  await page.evaluate(async () => {
    for (const image of document.images) image.loading = 'eager';
    await Promise.all([...document.images].map((image) => image.decode().catch(() => undefined)));
    await document.fonts.ready;
  });
}

async function picture(page, { role, name, width, scheme }) {
  mkdirSync(join(folder, role), { recursive: true });
  await page.screenshot({ path: join(folder, role, `${name}.${width}.${scheme}.png`), fullPage: true });
}

/** Follow the links from the first pages on, and picture each page on the way; the pages found, with their names. */
async function discover(page, role) {
  const limit = /owner|staff/.test(role) ? EXAMPLES : 1;
  const isSignedOut = role === 'signed-out';
  const waiting = isSignedOut ? [...publicPaths] : [...signedInPaths];
  const isLeftOut = (path) => !isSignedOut && leftOut.test(path);
  const seen = new Map();
  const found = [];
  const known = new Set();
  while (waiting.length > 0) {
    const path = waiting.shift();
    await rest(page, path);
    const { pathname, search } = new URL(page.url());
    const here = pathname + search;
    const example = (seen.get(kindOf(here)) ?? 0) + 1;
    if (known.has(here) || isLeftOut(pathname) || (!isSignedOut && example > limit)) continue;
    known.add(here);
    seen.set(kindOf(here), example);
    found.push({ path: here, name: fileName(here, example) });
    await picture(page, { role, name: found.at(-1).name, width: '1280', scheme: 'light' });
    for (const link of await linksOn(page)) {
      const isWanted = !known.has(link) && !waiting.includes(link) && !isLeftOut(link);
      const count = (seen.get(kindOf(link)) ?? 0) + waiting.filter((other) => kindOf(other) === kindOf(link)).length;
      if (isWanted && count < limit) waiting.push(link);
    }
  }
  return found;
}

/** Where the page leads inside the app. */
async function linksOn(page) {
  const addresses = await page.locator('a[href]').evaluateAll((links) => links.map((link) => link.href));
  const { origin } = new URL(page.url());
  const inside = addresses.map((address) => new URL(address)).filter((url) => url.origin === origin);
  return [...new Set(inside.map((url) => url.pathname + url.search))].filter(
    (path) => !path.startsWith('/api/'),
  );
}

async function pictureRole(browser, { baseURL, role, key }) {
  const first = await openPage(browser, { baseURL, key, width: '1280', scheme: 'light' });
  const found = await discover(first, role);
  await first.context().close();
  const looks = Object.keys(widths).flatMap((width) => schemes.map((scheme) => ({ width, scheme })));
  for (const { width, scheme } of looks.filter((look) => look.width !== '1280' || look.scheme !== 'light')) {
    const page = await openPage(browser, { baseURL, key, width, scheme });
    for (const { path, name } of found) {
      await rest(page, path);
      await picture(page, { role, name, width, scheme });
    }
    await page.context().close();
  }
  console.log(`${role}: ${found.length} pages, ${found.length * looks.length} pictures`);
}

async function main() {
  const baseURL = process.env.BASE_URL;
  if (!baseURL) throw new Error('BASE_URL is not set: run `npm run pictures`.');
  const roles = await rolesIn(baseURL);
  const wanted = options.role ?? [...roles.keys()];
  const unknown = wanted.filter((role) => !roles.has(role));
  if (unknown.length > 0) throw new Error(`No such role: ${unknown.join(', ')}\n${usage}`);
  for (const role of wanted) rmSync(join(folder, role), { recursive: true, force: true });
  const browser = await chromium.launch({
    executablePath: process.env.CHROMIUM ?? debianBrowsers.find((path) => existsSync(path)),
    args: ['--no-sandbox', '--disable-gpu', '--disable-dev-shm-usage'],
  });
  try {
    for (const role of wanted) await pictureRole(browser, { baseURL, role, key: roles.get(role) });
  } finally {
    await browser.close();
  }
  console.log(`The pictures are in ${folder}`);
}

await main();
