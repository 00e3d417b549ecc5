import js from '@eslint/js';
import { defineConfig, globalIgnores } from 'eslint/config';
import tseslint from 'typescript-eslint';

/** The packages whose numbers are the same to the last bit in every engine. */
const NUMERIC = [
  'core',
  'arguments',
  'constituents',
  'nodal',
  'basis',
  'fit',
  'predict',
  'datums',
  'gauge',
];
const sources = (folders) => folders.map((folder) => `packages/${folder}/src/**/*.ts`);

/** Math functions that the language specifies exactly. Pi alone of the constants is written to the last bit by it. */
const EXACT_MATH = 'abs|ceil|clz32|floor|fround|imul|max|min|round|sign|sqrt|trunc|PI';

const EVERYWHERE = [
  {
    selector:
      'CallExpression[callee.property.name=/^[gs]et(FullYear|Year|Month|Date|Day|Hours|Minutes|Seconds|Milliseconds|TimezoneOffset)$/]',
    message: "The host's time zone must not matter: use the UTC getters of Date.",
  },
  {
    selector:
      'CallExpression[callee.property.name=/^(toLocaleString|toLocaleDateString|toLocaleTimeString|toDateString|toTimeString)$/]',
    message: "The host's zone and language must not matter: name both to Intl.DateTimeFormat.",
  },
  {
    selector: "NewExpression[callee.name='Date'][arguments.length>1]",
    message: "new Date(year, month, …) reads the host's clock: use Date.UTC.",
  },
  { selector: 'ExportAllDeclaration', message: 'Name what is exported.' },
  {
    selector: "Program > VariableDeclaration[kind='let']",
    message: 'A module has no state.',
  },
  {
    selector: "Program > ExportNamedDeclaration > VariableDeclaration[kind='let']",
    message: 'A module has no state.',
  },
];
const NO_CLASS = [
  { selector: 'ClassDeclaration, ClassExpression', message: 'Only the two errors are classes.' },
];
const NO_REMAINDER = [
  {
    selector: "BinaryExpression[operator='%'][right.value=360]",
    message: 'Use wrapDegrees or angleDifference of core.',
  },
  {
    selector: "AssignmentExpression[operator='%='][right.value=360]",
    message: 'Use wrapDegrees or angleDifference of core.',
  },
];
const NO_DATE_TEXT = [
  {
    selector:
      "CallExpression[callee.object.name='Date'][callee.property.name='parse']:not([arguments.0.type='Literal'])",
    message: 'Only toInstant of core reads dates from text.',
  },
];
const SAME_BITS = [
  {
    selector: `MemberExpression[object.name='Math'][computed=false]:not([property.name=/^(${EXACT_MATH})$/])`,
    message: 'Engines differ in the last bits here: use sin, cos and atan2 of core, or arithmetic.',
  },
  {
    selector: "MemberExpression[object.name='Math'][computed=true]",
    message: 'Name the function of Math.',
  },
  {
    selector: "VariableDeclarator[init.name='Math']",
    message: 'Write Math.name at each use, so that the lint sees it.',
  },
  {
    selector:
      "BinaryExpression[operator='**']:not([right.raw=/^[0-9]+$/]):not([right.operator='-'][right.argument.raw=/^[0-9]+$/])",
    message: 'Engines differ in the last bits of fractional powers.',
  },
  {
    selector:
      "AssignmentExpression[operator='**=']:not([right.raw=/^[0-9]+$/]):not([right.operator='-'][right.argument.raw=/^[0-9]+$/])",
    message: 'Engines differ in the last bits of fractional powers.',
  },
];
const restrict = (...lists) => ({
  'no-restricted-syntax': ['error', ...EVERYWHERE, ...lists.flat()],
});

export default defineConfig(
  globalIgnores([
    '**/dist/**',
    '**/.tsc/**',
    'docs/api/**',
    'coverage/**',
    '.packed/**',
    'demo/out/**',
    'tools/examples/.made/**',
  ]),
  js.configs.recommended,
  {
    files: ['packages/*/src/**/*.ts'],
    extends: [tseslint.configs.strictTypeChecked],
    languageOptions: {
      parserOptions: { projectService: true, tsconfigRootDir: import.meta.dirname },
    },
    rules: {
      '@typescript-eslint/restrict-template-expressions': ['error', { allowNumber: true }],
      // A boundary tests what a caller without types may hand in, so a test may look needless to the types.
      '@typescript-eslint/no-unnecessary-condition': 'off',
      // Text is padded and cut by code points on purpose.
      '@typescript-eslint/no-misused-spread': ['error', { allow: ['string'] }],
      // Abort rejects with signal.reason, whatever that is.
      '@typescript-eslint/only-throw-error': 'off',
      'no-throw-literal': 'error',
      '@typescript-eslint/no-confusing-void-expression': [
        'error',
        { ignoreArrowShorthand: true, ignoreVoidReturningFunctions: true },
      ],
      ...restrict(NO_CLASS, NO_REMAINDER, NO_DATE_TEXT),
    },
  },
  {
    files: ['packages/*/src/**/*.ts'],
    ignores: ['packages/*/src/generated/**'],
    rules: { 'max-lines': ['error', 300] },
  },
  { files: ['packages/!(cli)/src/**/*.ts'], rules: { 'no-console': 'error' } },
  {
    files: sources(NUMERIC),
    rules: restrict(NO_CLASS, NO_REMAINDER, NO_DATE_TEXT, SAME_BITS),
  },
  // Each of these modules is the one place where the thing is done.
  {
    files: ['packages/core/src/errors.ts'],
    rules: restrict(NO_REMAINDER, NO_DATE_TEXT, SAME_BITS),
  },
  {
    files: ['packages/core/src/angles.ts'],
    rules: restrict(NO_CLASS, NO_DATE_TEXT, SAME_BITS),
  },
  { files: ['packages/core/src/time.ts'], rules: restrict(NO_CLASS, NO_REMAINDER, SAME_BITS) },
  {
    files: [
      'packages/*/{test,bench}/**/*.ts',
      'test-vectors/**/*.ts',
      'demo/**/*.ts',
      '**/*.config.ts',
    ],
    extends: [tseslint.configs.recommended],
  },
  {
    files: ['**/*.{js,mjs,cjs}'],
    rules: { 'no-empty': ['error', { allowEmptyCatch: true }] },
    languageOptions: {
      globals: {
        Buffer: 'readonly',
        clearTimeout: 'readonly',
        console: 'readonly',
        document: 'readonly',
        fetch: 'readonly',
        performance: 'readonly',
        process: 'readonly',
        setTimeout: 'readonly',
        structuredClone: 'readonly',
        TextDecoder: 'readonly',
        TextEncoder: 'readonly',
        URL: 'readonly',
      },
    },
  },
  {
    files: ['**/node-cjs/*.js', '**/*.cjs'],
    languageOptions: { sourceType: 'commonjs', globals: { require: 'readonly' } },
  },
);
