const path = require('node:path');
const { defineConfig, globalIgnores } = require('eslint/config');
const expo = require('eslint-config-expo/flat');
const prettier = require('eslint-config-prettier');
const { importRules } = require('./scripts/lib/import-rules');

/** The zones of import/no-restricted-paths, whose exceptions are relative to what is banned. */
function importZones(rules) {
  return rules.flatMap(({ importer, banned, except = [], sentence }) =>
    banned.map((from) => ({
      target: importer.map((folder) => `./${folder}`),
      from: `./${from}`,
      except: except
        .filter((allowed) => `${allowed}/`.startsWith(`${from}/`))
        .map((allowed) => `./${path.relative(from, allowed)}`),
      message: sentence,
    })),
  );
}

function restrictImports(rules) {
  return {
    'import/no-restricted-paths': ['error', { basePath: __dirname, zones: importZones(rules) }],
  };
}

/** Files that one rule leaves out keep all the others. */
const importExceptions = importRules
  .filter(({ unless }) => unless)
  .map((rule) => ({
    files: rule.unless,
    rules: restrictImports(importRules.filter((other) => other !== rule)),
  }));

const restrictedSyntax = [
  { selector: 'TSEnumDeclaration', message: 'Write a union of strings instead of an enum.' },
  {
    selector:
      'MemberExpression[object.name=/^(test|it|describe)$/][property.name=/^(only|skip|todo|failing)$/]',
    message: 'Every test runs: mend it or remove it.',
  },
  {
    selector: 'CallExpression[callee.name=/^(xit|xtest|xdescribe|fit|fdescribe)$/]',
    message: 'Every test runs: mend it or remove it.',
  },
];

/** JavaScript engines differ in the last bit of these. */
const inexactFunctions = [
  ...['exp', 'expm1', 'log', 'log1p', 'log2', 'log10', 'pow', 'cbrt', 'hypot'],
  ...['sin', 'cos', 'tan', 'asin', 'acos', 'atan', 'atan2'],
  ...['sinh', 'cosh', 'tanh', 'asinh', 'acosh', 'atanh'],
];
const sameBits =
  'JavaScript engines differ in its last bit; use pricing/numerics/elementary, the same everywhere.';
const repeatable =
  'The engine reads no clock, draws no unseeded number and does no input or output.';

const pricing = {
  files: ['pricing/**/*.ts'],
  rules: {
    'no-restricted-syntax': [
      'error',
      ...restrictedSyntax,
      { selector: 'BinaryExpression[operator="**"]', message: sameBits },
      { selector: 'AssignmentExpression[operator="**="]', message: sameBits },
      { selector: 'ImportDeclaration[source.value=/^node:/]', message: repeatable },
    ],
    'no-restricted-properties': [
      'error',
      ...inexactFunctions.map((property) => ({ object: 'Math', property, message: sameBits })),
      { object: 'Math', property: 'random', message: repeatable },
    ],
    'no-restricted-globals': [
      'error',
      ...['Date', 'performance', 'process', 'fetch', 'setTimeout', 'setInterval', 'window'].map(
        (name) => ({ name, message: repeatable }),
      ),
    ],
  },
};

const typescript = {
  files: ['**/*.ts', '**/*.tsx'],
  rules: {
    // The compiler knows which names exist.
    'no-undef': 'off',
    '@typescript-eslint/no-explicit-any': 'error',
    '@typescript-eslint/no-non-null-assertion': 'error',
    '@typescript-eslint/ban-ts-comment': 'error',
    '@typescript-eslint/consistent-type-definitions': ['error', 'type'],
    '@typescript-eslint/consistent-type-imports': ['error', { fixStyle: 'inline-type-imports' }],
  },
};

/** A promise that nobody waits for is an error that nobody hears of. */
const promises = {
  files: ['server/**/*.ts'],
  languageOptions: { parserOptions: { projectService: true, tsconfigRootDir: __dirname } },
  rules: {
    'expo/no-env-var-destructuring': 'off',
    '@typescript-eslint/no-floating-promises': 'error',
    '@typescript-eslint/no-misused-promises': 'error',
  },
};

const nodeScripts = {
  files: ['**/*.js'],
  rules: { 'expo/no-env-var-destructuring': 'off' },
  languageOptions: {
    globals: Object.fromEntries(
      ['__dirname', 'process', 'fetch', 'AbortSignal'].map((name) => [name, 'readonly']),
    ),
  },
};

module.exports = defineConfig([
  globalIgnores(['node_modules/', 'dist/', 'build/', '.expo/', '.cache/', 'coverage/', 'screens/']),
  // A rule that does not fit is discussed here, not silenced at a line.
  { linterOptions: { noInlineConfig: true, reportUnusedDisableDirectives: 'error' } },
  expo,
  {
    rules: {
      ...restrictImports(importRules),
      // The compiler knows what a module exports; cycles are found by the architecture test, which
      // is quicker by far.
      'import/namespace': 'off',
      'import/named': 'off',
      'import/no-default-export': 'error',
      // `import Decimal from` and `import fc from` are how those packages are meant to be used.
      'import/no-named-as-default': 'off',
      'import/no-named-as-default-member': 'off',
      'no-console': 'error',
      'no-restricted-syntax': ['error', ...restrictedSyntax],
    },
  },
  ...importExceptions,
  // Expo Router finds a route by its default export.
  { files: ['app/**/*.tsx'], rules: { 'import/no-default-export': 'off' } },
  typescript,
  promises,
  pricing,
  nodeScripts,
  prettier,
]);
