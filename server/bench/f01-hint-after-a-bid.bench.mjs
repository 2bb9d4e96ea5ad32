import { randomUUID } from 'node:crypto';
import { io } from 'socket.io-client';
import { Browser } from './lib/browser.mjs';
import { capture, retell } from './lib/capture.mjs';
import { quantile, ratios, spread } from './lib/figures.mjs';
import { startBare } from './lib/listening.mjs';
import { cloneScopes, lumpBid, withdrawScopes } from './lib/scopes.mjs';

const SOCKETS = 1_000;
const ROUNDS = 5;
const CREWS = ['marisol', 'agnes', 'ezra', 'june'];
/** Each crew lowers its bid this often in a ranked scope; the rules allow no more. */
const REVISIONS = 5;
const FIRST_CENTS = 1_000_000;

const path = (scope) => `/api/scopes/${scope.id}/own-bid`;

/** Opens many sockets and waits for them all. */
async function openSockets(url, headersOf) {
  const sockets = [];
  for (let from = 0; from < SOCKETS; from += 50) {
    const some = Array.from({ length: 50 }, (_, n) =>
      io(url, { transports: ['websocket'], forceNew: true, extraHeaders: headersOf(from + n) }),
    );
    sockets.push(...some);
    await Promise.all(
      some.map(
        (socket) =>
          new Promise((resolve, reject) => {
            socket.once('connect', resolve);
            socket.once('connect_error', reject);
          }),
      ),
    );
  }
  return sockets;
}

/** Counts one kind of hint; `all(send)` gives the milliseconds from sending to the last socket's hint. */
function createEar(sockets, fits) {
  let heard = 0;
  let wake = () => {};
  for (const socket of sockets) {
    socket.on('hint', (hint) => {
      if (!fits(hint)) return;
      heard += 1;
      if (heard === sockets.length) wake(performance.now());
    });
  }
  return async (send) => {
    heard = 0;
    const last = new Promise((resolve) => (wake = resolve));
    const start = performance.now();
    const [end] = await Promise.all([last, send()]);
    return end - start;
  };
}

/** One scope where every crew has bid, and the revisions still allowed: crews in turn, each lower than its last. */
async function revisionsOf(scope, browsers) {
  for (const browser of browsers)
    await browser.send('PUT', path(scope), lumpBid(scope.revision, FIRST_CENTS));
  return Array.from({ length: REVISIONS * browsers.length }, (_, n) => ({
    scope,
    browser: browsers[n % browsers.length],
    body: lumpBid(scope.revision, FIRST_CENTS - 20_000 * (1 + Math.floor(n / browsers.length))),
  }));
}

/** What one revision says to the database, and what it answers. */
async function hearRevision(scope, browsers) {
  const [first] = await revisionsOf(scope, browsers);
  return capture(CREWS[0], (tapped, record) => record(() => tapped.send('PUT', path(scope), first.body)));
}

/** The app with its sockets open: `time(revision)` gives one bid's milliseconds. */
async function openOurs(browsers) {
  const sockets = await openSockets(process.env.BASE_URL, (n) => ({
    Cookie: browsers[n % browsers.length].cookie,
    Origin: process.env.BASE_URL,
  }));
  const listen = createEar(sockets, ({ topic }) => topic === 'own_bid');
  return {
    time: ({ browser, scope, body }) => listen(() => browser.send('PUT', path(scope), body)),
    close: () => sockets.forEach((socket) => socket.close()),
  };
}

/** The bare server likewise; it is told beforehand what each bid says to the database. */
async function openBare(settings) {
  const server = await startBare(new URL('./lib/bare-live.mjs', import.meta.url), settings);
  const sockets = await openSockets(server.url, () => ({}));
  const listen = createEar(sockets, () => true);
  let number = 0;
  const send = async ({ body }) => {
    const response = await fetch(`${server.url}/${number++}`, { method: 'PUT', body: JSON.stringify(body) });
    await response.json();
  };
  return {
    time: (revision) => listen(() => send(revision)),
    close: async () => {
      sockets.forEach((socket) => socket.close());
      await server.stop();
    },
  };
}

/** Each round's times at both, a bid here and a bid there, so that a busy moment burdens both. */
async function measure(rounds, ours, bare) {
  const measured = [];
  for (const round of rounds) {
    const times = { ours: [], bare: [] };
    for (const revision of round) {
      times.ours.push(await ours.time(revision));
      times.bare.push(await bare.time(revision));
    }
    measured.push(times);
  }
  // The first round only warms up.
  return measured.slice(1);
}

/**
 * F-01: a bid is sent in a ranked scope; how long until the last of 1,000 sockets of the bidding crews has its hint.
 * Against the same request by node:http, the same statements by the bare driver in one transaction, and a bare emit.
 */
export default async function hintAfterABid() {
  const [sample, ...scopes] = await cloneScopes(2 + ROUNDS, 'ranked');
  try {
    const browsers = await Promise.all(CREWS.map((key) => Browser.of(key)));
    const since = Date.now();
    const { statements, answer } = await hearRevision(sample, browsers);
    const rounds = [];
    for (const scope of scopes) rounds.push(await revisionsOf(scope, browsers));
    const bids = rounds
      .flat()
      .map(({ scope }) => retell(statements, { known: { [sample.id]: scope.id }, since, newId: randomUUID }));
    const hint = { topic: 'own_bid', scopeId: sample.id };
    const ours = await openOurs(browsers);
    const bare = await openBare({ databaseUrl: process.env.TEST_PG_URL, bids, answer, hint });
    const measured = await measure(rounds, ours, bare);
    ours.close();
    await bare.close();
    const at = (part, side) => measured.map((times) => quantile(times[side], part));
    return {
      title: `F-01 Bid sent until the last of ${SOCKETS} sockets has its hint: ${ROUNDS} rounds of ${rounds[0].length} bids`,
      rows: [
        { what: 'p99 ms, app', ...spread(at(0.99, 'ours')) },
        { what: 'p99 ms, bare', ...spread(at(0.99, 'bare')) },
        { what: 'p99 ratio', ...spread(ratios(at(0.99, 'ours'), at(0.99, 'bare'))), budget: '<= 1.5' },
        { what: 'p50 ratio', ...spread(ratios(at(0.5, 'ours'), at(0.5, 'bare'))) },
      ],
    };
  } finally {
    await withdrawScopes([sample, ...scopes]);
  }
}
