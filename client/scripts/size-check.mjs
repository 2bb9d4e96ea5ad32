// Measures what the built client makes a browser fetch, against the budgets: run after `vite build`.
// usage: node scripts/size-check.mjs [dist folder]
import { readFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { gzipSync } from 'node:zlib';

const KB = 1000;
const budgets = { firstLoadJs: 200 * KB, css: 70 * KB, routeChunk: 60 * KB };
/** The page whose first load is measured; its own catalogue comes with it. */
const firstPage = { route: 'src/routes/open-scopes-page.tsx', words: 'src/locales/en/open-scopes.json' };

const here = dirname(fileURLToPath(import.meta.url));
const dist = process.argv[2] ?? join(here, '..', 'dist');
const manifest = JSON.parse(readFileSync(join(dist, '.vite', 'manifest.json'), 'utf8'));
const sizes = new Map();

function gzipped(file) {
  if (!sizes.has(file)) sizes.set(file, gzipSync(readFileSync(join(dist, file)), { level: 9 }).length);
  return sizes.get(file);
}

/** Every file that a chunk needs before it runs: itself and what it imports, not what it imports later. */
function filesOf(key, seen = new Set()) {
  const chunk = manifest[key];
  if (chunk === undefined || seen.has(key)) return { js: [], css: [] };
  seen.add(key);
  const below = (chunk.imports ?? []).map((name) => filesOf(name, seen));
  return {
    js: [chunk.file, ...below.flatMap((part) => part.js)],
    css: [...(chunk.css ?? []), ...below.flatMap((part) => part.css)],
  };
}

const sum = (files) => [...new Set(files)].reduce((total, file) => total + gzipped(file), 0);
const show = (bytes) => `${(bytes / KB).toFixed(1)} kB`;
const problems = [];

function check(what, bytes, budget) {
  const ok = bytes <= budget;
  console.log(`${ok ? 'ok  ' : 'OVER'} ${what}: ${show(bytes)} of ${show(budget)} gzip`);
  if (!ok) problems.push(what);
}

const entry = filesOf('index.html');
const pages = Object.keys(manifest).filter((key) => /^src\/routes\/.*-page\.tsx$/.test(key));
const first = pages.includes(firstPage.route) ? firstPage.route : pages[0];
const firstFiles = [first, firstPage.words].map((key) => filesOf(key));
check(
  `JavaScript before ${first} shows`,
  sum([...entry.js, ...firstFiles.flatMap((part) => part.js)]),
  budgets.firstLoadJs,
);
check(
  'CSS of the heaviest page',
  Math.max(...pages.map((page) => sum([...entry.css, ...filesOf(page).css]))),
  budgets.css,
);
for (const page of pages) {
  const own = manifest[page].file;
  if (gzipped(own) > budgets.routeChunk / 4) check(`own code of ${page}`, gzipped(own), budgets.routeChunk);
}

const early = new Set(entry.js.concat(firstFiles.flatMap((part) => part.js)));
for (const late of ['zod', 'socket.io', 'react-hook-form']) {
  const found = [...early].filter((file) => mentions(file, late));
  if (found.length > 0) {
    console.log(`OVER ${late} is fetched before the first page: ${found.join(', ')}`);
    problems.push(late);
  }
}

/** The source map knows which packages went into a file. */
function mentions(file, name) {
  try {
    const { sources } = JSON.parse(readFileSync(join(dist, `${file}.map`), 'utf8'));
    return sources.some((source) => source.includes(`node_modules/${name}`));
  } catch {
    return false;
  }
}

if (problems.length > 0) {
  console.error(`Above the budget: ${problems.join(', ')}`);
  process.exit(1);
}
