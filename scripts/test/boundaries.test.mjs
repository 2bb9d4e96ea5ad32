import assert from 'node:assert/strict';
import { existsSync, readdirSync } from 'node:fs';
import { dirname, join, relative } from 'node:path';
import { before, describe, it } from 'node:test';
import { ESLint } from 'eslint';
import { inRoot, root } from '../lib/paths.mjs';

let eslint;

before(() => {
  // The files here exist only in this test, so no TypeScript project knows them.
  const noTypes = {
    files: ['**/*.{ts,tsx}'],
    languageOptions: { parserOptions: { projectService: false } },
    rules: {
      '@typescript-eslint/no-floating-promises': 'off',
      '@typescript-eslint/no-misused-promises': 'off',
    },
  };
  eslint = new ESLint({ cwd: root, overrideConfig: [noTypes] });
});

/** The rules that a file with this text at this path breaks. */
async function broken(path, text) {
  const [result] = await eslint.lintText(text, { filePath: inRoot(path) });
  return result.messages
    .filter(({ ruleId }) => ruleId !== '@typescript-eslint/no-unused-vars')
    .map(({ ruleId }) => ruleId);
}

/** Some module that exists below a folder: a boundary is only checked towards a file that is there. */
function someModule(folder) {
  const entries = readdirSync(inRoot(folder), { withFileTypes: true, recursive: true });
  const module = entries.find((entry) => entry.isFile() && /(?<!\.test|\.spec)\.tsx?$/.test(entry.name));
  return module && join(relative(root, module.parentPath ?? module.path), module.name);
}

async function brokenByImport(from, toFolder) {
  const target = someModule(toFolder);
  const specifier = relative(dirname(from), target);
  return broken(from, `import '${specifier.startsWith('.') ? specifier : `./${specifier}`}';`);
}

const forbidden = [
  ['common/src/money/made-up.ts', 'server/src'],
  ['common/src/money/made-up.ts', 'client/src'],
  ['common/src/cutting/made-up.ts', 'common/src/scopes'],
  ['client/src/lib/made-up.ts', 'server/src'],
  ['server/src/made-up.ts', 'client/src'],
  ['server/src/made-up.ts', 'server/fakes'],
  ['client/src/lib/made-up.ts', 'client/src/features'],
  ['client/src/components/made-up.tsx', 'client/src/features'],
  ['client/src/components/made-up.tsx', 'client/src/routes'],
  ['client/src/features/bids/made-up.ts', 'client/src/routes'],
  ['client/src/routes/made-up.tsx', 'client/src/app'],
];

const allowed = [
  ['common/src/cutting/made-up.ts', 'common/src/money'],
  ['common/src/scopes/made-up.ts', 'common/src/cutting'],
  ['client/src/features/bids/made-up.ts', 'client/src/lib'],
  ['client/src/routes/made-up.tsx', 'client/src/features'],
  ['client/src/app/made-up.tsx', 'client/src/routes'],
];

describe('the boundaries between folders', () => {
  for (const [from, to] of forbidden) {
    it(`${from} must not import from ${to}`, { skip: !existsSync(inRoot(to)) }, async () => {
      assert.deepEqual(await brokenByImport(from, to), ['import-x/no-restricted-paths']);
    });
  }
  for (const [from, to] of allowed) {
    it(`${from} may import from ${to}`, { skip: !existsSync(inRoot(to)) }, async () => {
      assert.deepEqual(await brokenByImport(from, to), []);
    });
  }
});

const oneHome = [
  ['common/src/money/made-up.ts', "import 'luxon';", 'no-restricted-imports'],
  ['common/src/cutting/made-up.ts', "import 'zod';", 'no-restricted-imports'],
  ['server/src/payments/made-up.ts', "import 'stripe';", 'no-restricted-imports'],
  ['server/src/bids/made-up.ts', 'export const port = process.env.PORT;', 'no-restricted-syntax'],
  ['server/src/bids/made-up.ts', 'export const now = Date.now();', 'no-restricted-syntax'],
  ['server/src/bids/made-up.queries.ts', 'export const now = new Date();', 'no-restricted-syntax'],
  [
    'server/src/bids/made-up.ts',
    'export const q = (s, id) => s.query(`DELETE FROM bid WHERE id = ${id}`);',
    'no-restricted-syntax',
  ],
  [
    'server/src/bids/made-up.queries.ts',
    'export const q = (s, b) => s.query(`SELECT ${b.id}`);',
    'no-restricted-syntax',
  ],
  [
    'server/src/bids/made-up.queries.ts',
    "export const q = (s, id) => s.query('SELECT ' + id);",
    'no-restricted-syntax',
  ],
  [
    'client/src/features/bids/made-up.ts',
    "export const load = () => fetch('/api/bids');",
    'no-restricted-globals',
  ],
  [
    'client/src/features/bids/made-up.tsx',
    'export const x = <p dangerouslySetInnerHTML={{ __html: "" }} />;',
    'no-restricted-syntax',
  ],
  ['client/src/features/bids/made-up.tsx', 'export const x = <p>Hand in</p>;', 'no-restricted-syntax'],
  ['client/src/features/bids/made-up.ts', 'export const now = Date.now();', 'no-restricted-syntax'],
];

const inItsHome = [
  ['common/src/scopes/made-up.ts', "import 'zod';"],
  ['server/src/platform/stripe/made-up.ts', "import 'stripe';"],
  ['server/src/platform/config/made-up.ts', 'export const port = process.env.PORT;'],
  ['server/src/platform/clock/made-up.ts', 'export const now = Date.now();'],
  ['server/src/bids/made-up.ts', 'export const at = new Date(0);'],
  [
    'server/src/bids/made-up.queries.ts',
    'const COLUMNS = "id";\nexport const q = (s) => s.query(`SELECT ${COLUMNS}`);',
  ],
  ['client/src/lib/api-client.ts', "export const load = () => fetch('/api/bids');"],
  ['client/src/components/made-up.tsx', "export const x = <p>Kerfyard {'·'} 4 × 8</p>;"],
];

describe('import cycles', () => {
  it('are refused', async () => {
    // The index of money imports cents, so cents must not import the index.
    assert.deepEqual(await broken('common/src/money/cents.ts', "export { splitCents } from './index.ts';"), [
      'import-x/no-cycle',
    ]);
  });
});

describe('things with one home', () => {
  for (const [path, text, rule] of oneHome) {
    it(`${path} must not: ${text}`, async () => assert.deepEqual(await broken(path, text), [rule]));
  }
  for (const [path, text] of inItsHome) {
    it(`${path} may: ${text}`, async () => assert.deepEqual(await broken(path, text), []));
  }
});
