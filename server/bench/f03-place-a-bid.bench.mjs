import { randomUUID } from 'node:crypto';
import { setTimeout as sleep } from 'node:timers/promises';
import { Browser } from './lib/browser.mjs';
import { capture, retell } from './lib/capture.mjs';
import { ratios, spread } from './lib/figures.mjs';
import { cloneScopes, linesBid, openPool, withdrawScopes } from './lib/scopes.mjs';

const ROUNDS = 7;
const BIDS = 40;
const CREW = 'marisol';

const path = (scope) => `/api/scopes/${scope.id}/own-bid`;

/** The letters that a bid causes are written after it, by jobs: each bid waits until they are. */
const LETTERS_MS = 60;
const SAMPLES = 5;

/** Bids a second, one after the other, by the time each itself takes. */
async function rate(bids) {
  let spentMs = 0;
  for (const bid of bids) {
    const start = performance.now();
    await bid();
    spentMs += performance.now() - start;
    await sleep(LETTERS_MS);
  }
  return (bids.length * 1000) / spentMs;
}

/** What a bid says to the database: the shortest of several, since a job's words may fall among the others'. */
function hearBids(samples, input) {
  return capture(CREW, async (browser, record) => {
    const heard = [];
    for (const scope of samples) {
      const { statements } = await record(() => browser.send('PUT', path(scope), input));
      heard.push({ scope, statements });
    }
    return heard.reduce((least, one) => (one.statements.length < least.statements.length ? one : least));
  });
}

async function sayAll(pool, statements) {
  const client = await pool.connect();
  try {
    await client.query('BEGIN');
    for (const { text, values } of statements) await client.query(text, values);
    await client.query('COMMIT');
  } finally {
    client.release();
  }
}

/**
 * F-03: place a sealed bid by lines (checked, priced again, encrypted, audited, the mail's job in the transaction)
 * against the statements of that request, sign-in check and all, said by the bare driver in one transaction.
 */
export default async function placeABid() {
  const pool = openPool();
  const scopes = await cloneScopes(SAMPLES + ROUNDS * BIDS * 2, 'sealed');
  const samples = scopes.slice(0, SAMPLES);
  const rest = scopes.slice(SAMPLES);
  try {
    const browser = await Browser.of(CREW);
    const { body } = await browser.send('GET', `/api/scopes/${samples[0].id}`);
    const input = linesBid(samples[0].revision, body.cuts, 12_500);
    const since = Date.now();
    const { scope: sample, statements } = await hearBids(samples, input);
    const inserts = statements.filter(({ text }) => /INSERT INTO sealed_bid/.test(text));
    if (inserts.length !== 1) throw new Error('the bid was not among the statements heard');
    const ours = [];
    const bare = [];
    for (let round = 0; round < ROUNDS; round += 1) {
      const mine = rest.splice(0, BIDS).map((scope) => () => browser.send('PUT', path(scope), input));
      const theirs = rest
        .splice(0, BIDS)
        .map((scope) => retell(statements, { known: { [sample.id]: scope.id }, since, newId: randomUUID }))
        .map((told) => () => sayAll(pool, told));
      ours.push(await rate(mine));
      bare.push(await rate(theirs));
    }
    const budget = '>= 0.4';
    return {
      title: `F-03 Place a bid: ${statements.length} statements, ${ROUNDS} rounds of ${BIDS} bids`,
      rows: [
        { what: 'bids/s, app', ...spread(ours) },
        { what: 'transactions/s, bare pg', ...spread(bare) },
        { what: 'ratio', ...spread(ratios(ours, bare)), budget },
      ],
    };
  } finally {
    await withdrawScopes(scopes);
    await pool.end();
  }
}
