import autocannon from 'autocannon';
import { Browser } from './lib/browser.mjs';
import { capture } from './lib/capture.mjs';
import { median, quantile, ratios, spread } from './lib/figures.mjs';
import { startBare } from './lib/listening.mjs';
import { openPool } from './lib/scopes.mjs';

const CREW = 'marisol';
const ROUNDS = 5;
const LOAD_SECONDS = 2;
const ALONE = 200;
const FILL_LIMIT_SECONDS = 60;
const SIZES = [1_000, 100_000, 1_000_000];

const lists = [
  '/api/open-scopes?method=core_drill&withinMiles=100',
  '/api/open-scopes?sort=nearest&method=flat_saw',
  '/api/open-scopes?sort=due&withinMiles=250&maxInchFeet=400',
  '/api/open-scopes?sort=largest&minInchFeet=100',
];

/** Open scopes all over the contiguous states, of all sizes and methods. $1 how many, $2 the last number taken. */
const FILL = `
  INSERT INTO scope (id, company_id, number, status, created_by, revision, title, mode, due_at, time_zone, city, state,
    lat, lon, methods, indoors, inch_feet, totals, sketch, cut_count, plugs, published_at)
  SELECT gen_random_uuid(), t.company_id, $2::bigint + n, 'open', t.created_by, t.revision, t.title, t.mode,
    app_now() + interval '1 day' + random() * interval '30 days', t.time_zone, t.city, t.state,
    25 + random() * 24, -124 + random() * 57,
    CASE n % 3 WHEN 0 THEN ARRAY['core_drill'] WHEN 1 THEN ARRAY['flat_saw'] ELSE ARRAY['flat_saw', 'core_drill'] END,
    t.indoors, exp(random() * 9), t.totals, t.sketch, t.cut_count, t.plugs, app_now() - random() * interval '20 days'
  FROM (SELECT * FROM scope WHERE status = 'open' ORDER BY number LIMIT 1) t, generate_series(1, $1::int) n`;

async function fill(pool, count) {
  const start = performance.now();
  const { rows } = await pool.query('SELECT max(number) AS last FROM scope');
  await pool.query(FILL, [count, rows[0].last]);
  await pool.query('VACUUM (ANALYZE) scope');
  return (performance.now() - start) / 1000;
}

/** Nothing points at the rows that were filled in, so they may go without a look for what does. */
async function empty(pool, last) {
  const client = await pool.connect();
  await client.query('SET session_replication_role = replica');
  await client.query('DELETE FROM scope WHERE number > $1', [last]);
  await client.query('SET session_replication_role = DEFAULT');
  await client.query('VACUUM (ANALYZE) scope');
  client.release();
}

/** Requests a second of eight lines at once, the lists in turn. */
async function throughput(url, headers) {
  const result = await autocannon({
    url,
    connections: 8,
    duration: LOAD_SECONDS,
    requests: lists.map((path) => ({ method: 'GET', path, headers })),
  });
  if (result.non2xx > 0 || result.errors > 0) throw new Error(`${result.non2xx} answers were not 2xx`);
  return result.requests.average;
}

/** The time that 99 of 100 requests take, one after the other. */
async function p99(url, headers) {
  const times = [];
  for (let n = 0; n < ALONE; n += 1) {
    const start = performance.now();
    const response = await fetch(url + lists[n % lists.length], { headers });
    await response.arrayBuffer();
    if (!response.ok) throw new Error(`the list gave ${response.status}`);
    times.push(performance.now() - start);
  }
  return quantile(times, 0.99);
}

/** What each list says to the database at its present size, for the bare server to say. */
function hear() {
  return capture(CREW, async (browser, record) => {
    const heard = [];
    for (const path of lists) {
      await browser.send('GET', path);
      const { answer, statements } = await record(() => browser.send('GET', path));
      heard.push([path, { answer, statements }]);
    }
    return heard;
  });
}

async function measure(size) {
  const browser = await Browser.of(CREW);
  const headers = browser.headers('GET');
  const bareServer = await startBare(new URL('./lib/bare-lists.mjs', import.meta.url), {
    databaseUrl: process.env.TEST_PG_URL,
    lists: await hear(),
  });
  try {
    const figures = { size, ours: [], bare: [], ourP99: [], bareP99: [] };
    await throughput(browser.url, headers);
    await throughput(bareServer.url, headers);
    for (let round = 0; round < ROUNDS; round += 1) {
      figures.ours.push(await throughput(browser.url, headers));
      figures.bare.push(await throughput(bareServer.url, headers));
      figures.ourP99.push(await p99(browser.url, headers));
      figures.bareP99.push(await p99(bareServer.url, headers));
    }
    return figures;
  } finally {
    await bareServer.stop();
  }
}

function rowsOf({ size, ours, bare, ourP99, bareP99 }) {
  const scopes = size.toLocaleString('en-US');
  const ratio = { what: 'requests/s, ratio', ...spread(ratios(ours, bare)) };
  return [
    { scopes, what: 'requests/s, app', ...spread(ours) },
    { scopes, what: 'requests/s, node:http and pg', ...spread(bare) },
    { scopes, ...ratio, ...(size === 100_000 ? { budget: '>= 0.5' } : {}) },
    { scopes, what: 'p99 ms, app', ...spread(ourP99) },
    { scopes, what: 'p99 ms, node:http and pg', ...spread(bareP99) },
  ];
}

/**
 * F-02: a page of open scopes with filters and distance against a bare server that says the same statements and writes
 * the same JSON; and how the p99 of one request after another grows with the number of open scopes.
 */
export default async function openScopes() {
  const pool = openPool('TEST_PG_SUPER_URL', 1);
  const { rows: found } = await pool.query('SELECT max(number) AS last FROM scope');
  try {
    const measured = [];
    let filled = 0;
    let secondsEach = 0;
    for (const size of SIZES) {
      const wanted = size - filled;
      if (secondsEach * wanted > FILL_LIMIT_SECONDS) break;
      secondsEach = (await fill(pool, wanted)) / wanted;
      filled = size;
      measured.push(await measure(size));
    }
    const [first] = measured;
    const last = measured.at(-1);
    const growth = {
      scopes: `${first.size.toLocaleString('en-US')} to ${last.size.toLocaleString('en-US')}`,
      what: 'p99 growth, app',
      ...spread(ratios(last.ourP99, first.ourP99)),
      budget: '<= 1.5',
    };
    return {
      title: `F-02 Open scopes with filters and distance; p99 of ${ALONE} requests, medians of ${ROUNDS} rounds: ${median(last.ourP99).toFixed(1)} ms`,
      rows: [...measured.flatMap(rowsOf), growth],
    };
  } finally {
    await empty(pool, found[0].last);
    await pool.end();
  }
}
