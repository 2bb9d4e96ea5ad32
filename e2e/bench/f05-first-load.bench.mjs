import { createRequire } from 'node:module';
import { existsSync, mkdirSync } from 'node:fs';
import { setTimeout as sleep } from 'node:timers/promises';
import { fileURLToPath, pathToFileURL } from 'node:url';
import { chromium } from '@playwright/test';
import { Browser } from '../../server/bench/lib/browser.mjs';
import { ratios, spread } from '../../server/bench/lib/figures.mjs';
import { startServer } from '../../server/bench/lib/listening.mjs';

const ROUNDS = 7;
const CREW = 'marisol';
const KB = 1000;
const debianBrowsers = ['/usr/bin/chromium', '/usr/bin/chromium-headless-shell'];
const inRepository = (path) => fileURLToPath(new URL(`../../${path}`, import.meta.url));

/** The applied form of the slow-4G phone profile: every request pays the latency. */
const slowLine = {
  offline: false,
  latency: 562.5,
  downloadThroughput: (1_474.56 * 1024) / 8,
  uploadThroughput: (675 * 1024) / 8,
};
const phone = { viewport: { width: 390, height: 844 }, deviceScaleFactor: 3, isMobile: true, hasTouch: true };

/** An empty page of the theme, by the client's own build settings and style sheet. */
async function buildEmptyPage() {
  const fromClient = createRequire(inRepository('client/package.json'));
  const { build } = await import(pathToFileURL(fromClient.resolve('vite')).href);
  const outDir = inRepository('.tmp/empty-page');
  mkdirSync(outDir, { recursive: true });
  await build({
    root: inRepository('e2e/bench/empty-page'),
    configFile: inRepository('client/vite.config.ts'),
    publicDir: false,
    logLevel: 'error',
    build: { outDir, emptyOutDir: true },
  });
  return outDir;
}

/** Runs in the page before anything else of it. */
function watchPaints() {
  globalThis.largestPaint = 0;
  new PerformanceObserver((list) => {
    globalThis.largestPaint = list.getEntries().at(-1).startTime;
  }).observe({ type: 'largest-contentful-paint', buffered: true });
}

const cookiesOf = (browser) =>
  [...browser.cookies].map(([name, value]) => ({
    name,
    value,
    domain: '127.0.0.1',
    path: '/',
    secure: true,
    httpOnly: true,
  }));

/** One first visit with an empty cache: LCP in ms, and the bytes of JavaScript on the wire until `shown` is there. */
async function visit(chrome, { url, cookies, shown }) {
  const context = await chrome.newContext({ ...phone, serviceWorkers: 'block' });
  try {
    await context.addCookies(cookies);
    const page = await context.newPage();
    const session = await context.newCDPSession(page);
    await session.send('Network.enable');
    await session.send('Network.emulateNetworkConditions', slowLine);
    await session.send('Emulation.setCPUThrottlingRate', { rate: 4 });
    const scripts = new Set();
    let scriptBytes = 0;
    session.on('Network.responseReceived', ({ requestId, type }) => {
      if (type === 'Script') scripts.add(requestId);
    });
    session.on('Network.dataReceived', ({ requestId, encodedDataLength }) => {
      if (scripts.has(requestId)) scriptBytes += encodedDataLength;
    });
    await page.addInitScript(watchPaints);
    await page.goto(url);
    await page.locator(shown).first().waitFor({ timeout: 60_000 });
    const bytes = scriptBytes;
    // The last picture may still be on its way to the screen.
    await sleep(1_500);
    return { lcp: await page.evaluate(() => globalThis.largestPaint), bytes };
  } finally {
    await context.close();
  }
}

/**
 * F-05: the first load of the list of open scopes as a crew on a phone (CPU four times slower, slow 4G) against an empty
 * page of the theme, built and served the same way.
 */
export default async function firstLoad() {
  const empty = await startServer({ CLIENT_DIST: await buildEmptyPage() });
  const executablePath = process.env.CHROMIUM ?? debianBrowsers.find((path) => existsSync(path));
  const chrome = await chromium.launch({ executablePath, args: ['--no-sandbox', '--disable-gpu'] });
  try {
    const crew = await Browser.of(CREW);
    const listPage = {
      url: `${process.env.BASE_URL}/open-scopes`,
      cookies: cookiesOf(crew),
      shown: 'article h2',
    };
    const emptyPage = { url: `${empty.url}/`, cookies: [], shown: '#root p' };
    const ours = [];
    const bare = [];
    for (let round = 0; round < ROUNDS; round += 1) {
      ours.push(await visit(chrome, listPage));
      bare.push(await visit(chrome, emptyPage));
    }
    const lcp = (visits) => visits.map((one) => one.lcp);
    const kilobytes = (visits) => visits.map((one) => one.bytes / KB);
    return {
      title: `F-05 First load of open scopes on a phone: ${ROUNDS} visits each, empty caches`,
      rows: [
        { what: 'LCP ms, open scopes', ...spread(lcp(ours)) },
        { what: 'LCP ms, empty page', ...spread(lcp(bare)) },
        { what: 'LCP ratio', ...spread(ratios(lcp(ours), lcp(bare))), budget: '<= 1.3' },
        { what: 'JavaScript kB on the wire', ...spread(kilobytes(ours)), budget: '<= 200' },
        { what: 'JavaScript kB, empty page', ...spread(kilobytes(bare)) },
      ],
    };
  } finally {
    await chrome.close();
    await empty.stop();
  }
}
