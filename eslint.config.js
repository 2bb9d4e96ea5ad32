import js from '@eslint/js';
import importX, { createNodeResolver } from 'eslint-plugin-import-x';
import reactHooks from 'eslint-plugin-react-hooks';
import globals from 'globals';
import tseslint from 'typescript-eslint';

const source = ['.ts', '.tsx'];
const tests = [
  '**/*.test.ts',
  '**/*.test.tsx',
  '**/*.spec.ts',
  '**/*.e2e-spec.ts',
  '**/test/**',
  'e2e/**',
  '**/bench/**',
];

/** What a folder may import, as zones of import-x/no-restricted-paths. */
const zone = (target, from, message, except) => ({ target, from, message, ...(except ? { except } : {}) });
const clientLayers = ['lib', 'components', 'features', 'routes', 'app'];
/** In the client lower never imports higher; lib and components are one level. */
const layerZones = clientLayers.flatMap((layer, index) =>
  clientLayers
    .slice(layer === 'lib' ? 2 : index + 1)
    .map((higher) =>
      zone(
        `./client/src/${layer}`,
        `./client/src/${higher}`,
        `${layer} must not import from ${higher}, which builds on it.`,
      ),
    ),
);
const boundaries = [
  zone('./common/src', './server', 'common imports only zod and itself.'),
  zone('./common/src', './client', 'common imports only zod and itself.'),
  zone('./common/src/cutting', './common/src', 'The engine imports only itself, units and money.', [
    './cutting',
    './units',
    './money',
  ]),
  zone('./client', './server', 'Client and server meet in common only.'),
  zone('./server', './client', 'Client and server meet in common only.'),
  zone('./server/src', './server/fakes', 'The server does not know the stand-ins.'),
  zone('./server/fakes', './server/src', 'A stand-in knows the real service’s rules, not our server.'),
  ...layerZones,
];

const workspacePackages = (names) => ({
  regex: `^@kerfyard/(${names})`,
  message: 'Client and server meet in common only.',
});
const onlyPackages = (pattern, message) => ({ regex: pattern, message });

/** Syntax that has one home in the whole tree. Each file gets all of them but its own, since rules do not add up. */
const homes = {
  environment: {
    selector: "MemberExpression[object.name='process'][property.name='env']",
    message: 'Settings come from server/src/platform/config.',
  },
  now: {
    selector: "CallExpression[callee.object.name='Date'][callee.property.name='now']",
    message: 'The time comes from the clock (server/src/platform/clock, client/src/lib/clock.ts).',
  },
  newDate: {
    selector: "NewExpression[callee.name='Date'][arguments.length=0]",
    message: 'The time comes from the clock (server/src/platform/clock, client/src/lib/clock.ts).',
  },
  html: {
    selector: "JSXAttribute[name.name='dangerouslySetInnerHTML']",
    message: 'Markup from data is a way in for scripts; render elements.',
  },
  words: {
    selector: 'JSXText[value=/^(?!\\s*Kerfyard\\s*$)[^]*[A-Za-z]{2}/]',
    message: 'Words on screens come from client/src/locales.',
  },
  templateSql: {
    selector:
      "CallExpression[callee.property.name='query'][arguments.0.type='TemplateLiteral'][arguments.0.expressions.length>0]",
    message: 'Values go into SQL as parameters; SQL put together lives in *.queries.ts, from constants.',
  },
  joinedSql: {
    selector: "CallExpression[callee.property.name='query'][arguments.0.type='BinaryExpression']",
    message: 'Values go into SQL as parameters.',
  },
  computedSql: {
    selector:
      "CallExpression[callee.property.name='query'] > TemplateLiteral > :not(Identifier, TemplateElement, CallExpression[callee.property.name='join'])",
    message: 'Only named constants are put into SQL text; values are parameters.',
  },
};
const restrictSyntax = (...names) => ['error', ...names.map((name) => homes[name])];

const stripeHome = {
  name: 'stripe',
  message: 'The provider’s SDK is used in server/src/platform/stripe only.',
};

export default tseslint.config(
  {
    ignores: [
      '**/dist/**',
      '**/dist-fakes/**',
      '**/node_modules/**',
      '**/.tmp/**',
      '.data/**',
      'pictures/**',
      'e2e/test-results/**',
    ],
  },
  { linterOptions: { reportUnusedDisableDirectives: 'error' } },
  js.configs.recommended,
  ...tseslint.configs.recommended,
  {
    plugins: { 'import-x': importX },
    settings: {
      'import-x/extensions': [...source, '.js', '.mjs'],
      'import-x/parsers': { '@typescript-eslint/parser': source },
      'import-x/resolver-next': [
        createNodeResolver({
          conditionNames: ['@kerfyard/source', 'import', 'node', 'default'],
          extensions: [...source, '.js', '.mjs', '.json'],
        }),
      ],
    },
    rules: {
      'import-x/no-restricted-paths': ['error', { basePath: import.meta.dirname, zones: boundaries }],
      '@typescript-eslint/consistent-type-imports': ['error', { fixStyle: 'separate-type-imports' }],
      '@typescript-eslint/no-unused-vars': [
        'error',
        { argsIgnorePattern: '^_', varsIgnorePattern: '^_', ignoreRestSiblings: true },
      ],
      complexity: ['error', 20],
      eqeqeq: ['error', 'always', { null: 'ignore' }],
      'max-depth': ['error', 4],
      'max-lines': ['error', 450],
      'no-control-regex': 'off', // those we write are meant: they keep such characters out
      'no-implicit-coercion': ['error', { boolean: false }],
    },
  },

  // Packages
  {
    files: ['common/src/**'],
    ignores: tests,
    rules: {
      'no-restricted-imports': [
        'error',
        { patterns: [onlyPackages('^(?!\\.|zod$)', 'common imports only zod and itself.')] },
      ],
      'no-restricted-syntax': restrictSyntax('now', 'newDate', 'environment'),
    },
  },
  {
    files: ['common/src/cutting/**'],
    ignores: tests,
    rules: {
      'no-restricted-imports': [
        'error',
        { patterns: [onlyPackages('^(?!\\.)', 'The engine imports only itself, units and money.')] },
      ],
    },
  },
  {
    files: ['client/**'],
    rules: { 'no-restricted-imports': ['error', { patterns: [workspacePackages('server|e2e')] }] },
  },
  {
    files: ['server/**'],
    rules: {
      'no-restricted-imports': [
        'error',
        { paths: [stripeHome], patterns: [workspacePackages('client|e2e')] },
      ],
    },
  },
  {
    files: ['server/src/platform/stripe/**', 'server/fakes/**', 'server/test/**', 'server/**/*.spec.ts'],
    rules: { 'no-restricted-imports': ['error', { patterns: [workspacePackages('client|e2e')] }] },
  },

  // Things with one home
  {
    files: ['server/src/**/*.ts'],
    ignores: tests,
    rules: {
      'no-restricted-syntax': restrictSyntax('environment', 'now', 'newDate', 'templateSql', 'joinedSql'),
    },
  },
  {
    files: ['server/src/**/*.queries.ts', 'server/src/database/**/*.ts'],
    ignores: tests,
    rules: {
      'no-restricted-syntax': restrictSyntax('environment', 'now', 'newDate', 'computedSql', 'joinedSql'),
    },
  },
  {
    files: ['server/src/platform/config/**/*.ts'],
    rules: { 'no-restricted-syntax': restrictSyntax('now', 'newDate', 'templateSql', 'joinedSql') },
  },
  {
    files: ['server/src/platform/clock/**/*.ts'],
    rules: { 'no-restricted-syntax': restrictSyntax('environment', 'computedSql', 'joinedSql') },
  },
  {
    files: ['client/src/**/*.{ts,tsx}'],
    ignores: tests,
    rules: {
      'no-restricted-syntax': restrictSyntax('now', 'newDate', 'html', 'words'),
      'no-restricted-globals': [
        'error',
        { name: 'fetch', message: 'Requests go through client/src/lib/api-client.ts.' },
      ],
      'no-restricted-properties': [
        'error',
        { object: 'window', property: 'fetch', message: 'Requests go through client/src/lib/api-client.ts.' },
        {
          object: 'globalThis',
          property: 'fetch',
          message: 'Requests go through client/src/lib/api-client.ts.',
        },
      ],
    },
  },
  {
    files: ['client/src/lib/api-client.ts'],
    rules: { 'no-restricted-globals': 'off', 'no-restricted-properties': 'off' },
  },
  { files: ['client/src/lib/clock.ts'], rules: { 'no-restricted-syntax': restrictSyntax('html') } },

  // Where things run
  { files: ['client/src/**', 'client/public/**'], languageOptions: { globals: globals.browser } },
  {
    files: ['**/*.{mjs,cjs,js}', 'server/**', 'e2e/**', '*.config.ts', '**/vite*.config.ts'],
    languageOptions: { globals: globals.node },
  },
  { files: ['client/public/**'], languageOptions: { sourceType: 'script' } },
  { files: ['**/*.cjs'], rules: { '@typescript-eslint/no-require-imports': 'off' } },
  {
    files: ['client/src/**/*.{ts,tsx}'],
    ignores: tests,
    ...reactHooks.configs.flat.recommended,
    // react-hooks/refs takes the `ref` of a react-hook-form field for a React ref that is read while rendering.
    rules: { ...reactHooks.configs.flat.recommended.rules, 'react-hooks/refs': 'off' },
  },

  // What needs types: a forgotten await is a write outside its transaction.
  {
    files: ['common/src/**/*.ts', 'server/src/**/*.ts', 'client/src/**/*.{ts,tsx}'],
    ignores: tests,
    languageOptions: { parserOptions: { projectService: true, tsconfigRootDir: import.meta.dirname } },
    rules: {
      '@typescript-eslint/no-floating-promises': 'error',
      '@typescript-eslint/no-misused-promises': ['error', { checksVoidReturn: { attributes: false } }],
      'import-x/no-cycle': ['error', { ignoreExternal: true }],
    },
  },
  {
    files: tests,
    rules: {
      'max-lines': ['error', 700],
      complexity: 'off',
      'import-x/no-cycle': 'off',
      '@typescript-eslint/no-non-null-assertion': 'off',
    },
  },
);
