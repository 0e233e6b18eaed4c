const eslint = require('@eslint/js');
const angular = require('angular-eslint');
const prettier = require('eslint-config-prettier/flat');
const tseslint = require('typescript-eslint');
const importRule = require('./test/support/lint/import-rule');

const nodeGlobals = Object.fromEntries(
  [
    '__dirname',
    'AbortController',
    'Buffer',
    'clearInterval',
    'clearTimeout',
    'console',
    'fetch',
    'globalThis',
    'module',
    'performance',
    'process',
    'require',
    'setInterval',
    'setTimeout',
    'URL',
  ].map((name) => [name, 'readonly']),
);

const house = { rules: { imports: importRule } };

/** Attributes whose values nobody reads as a text. */
const noText = `
  accept action align alt-src appearance aria-controls aria-current aria-describedby aria-expanded
  aria-hidden aria-labelledby aria-live aria-owns ariaCurrentWhenActive autocapitalize
  cdkColumnDef clip-path clip-rule crossorigin cx cy d data-field data-kind data-state data-tone
  datetime download enterkeyhint fill-rule focusable fontFamily form formaction gradientUnits
  headers icon inputmode itemprop kind level loading mask mat-sort-header matColumnDef matSort
  matTextPrefix max method min mode novalidate offset opacity part pathLength pattern picture
  points popover popovertarget position preload preserveAspectRatio r rel rx ry scope size slot
  spellcheck state step stroke-dasharray stroke-linecap stroke-linejoin tdPageHeading tdPicture
  text-anchor tone transform translate variant wrap x x1 x2 y y1 y2
`
  .trim()
  .split(/\s+/);

const noSystemClock = [
  'error',
  {
    selector: "CallExpression[callee.object.name='Date'][callee.property.name='now']",
    message: 'The domain has no clock: the instant is handed in.',
  },
  {
    selector: "NewExpression[callee.name='Date'][arguments.length=0]",
    message: 'The domain has no clock: the instant is handed in.',
  },
  {
    selector:
      "CallExpression[callee.object.name='DateTime'][callee.property.name=/^(now|local|utc)$/][arguments.length=0]",
    message: 'The domain has no clock: the instant is handed in.',
  },
  {
    selector: "CallExpression[callee.object.name='Math'][callee.property.name='random']",
    message: 'The domain is pure: the same input gives the same answer.',
  },
];

const typed = {
  '@typescript-eslint/consistent-type-imports': ['error', { fixStyle: 'inline-type-imports' }],
  '@typescript-eslint/no-unused-vars': [
    'error',
    { argsIgnorePattern: '^_', varsIgnorePattern: '^_', ignoreRestSiblings: true },
  ],
  '@typescript-eslint/restrict-template-expressions': ['error', { allowNumber: true }],
  '@typescript-eslint/switch-exhaustiveness-check': [
    'error',
    { considerDefaultExhaustiveForUnions: true },
  ],
  'no-console': 'error',
  eqeqeq: ['error', 'always', { null: 'ignore' }],
};

module.exports = tseslint.config(
  {
    ignores: [
      'build/',
      'dist/',
      'node_modules/',
      '.data/',
      '.angular/',
      'test-results/',
      'coverage/',
      'playwright-report/',
    ],
  },
  {
    files: ['**/*.js', '**/*.mjs'],
    extends: [eslint.configs.recommended],
    languageOptions: { ecmaVersion: 2023, globals: nodeGlobals },
    rules: {
      'no-unused-vars': ['error', { argsIgnorePattern: '^_', varsIgnorePattern: '^_' }],
      eqeqeq: ['error', 'always', { null: 'ignore' }],
    },
  },
  { files: ['**/*.js'], languageOptions: { sourceType: 'commonjs' } },
  {
    files: ['server/**/*.ts', 'shared/**/*.ts', 'test/**/*.ts'],
    ignores: ['test/support/angular-setup.ts'],
    extends: [eslint.configs.recommended, tseslint.configs.recommendedTypeChecked],
    languageOptions: {
      parserOptions: { project: ['./tsconfig.test.json'], tsconfigRootDir: __dirname },
    },
    plugins: { house },
    rules: { ...typed, 'house/imports': 'error' },
  },
  {
    files: ['src/**/*.ts', 'test/support/angular-setup.ts'],
    extends: [
      eslint.configs.recommended,
      tseslint.configs.recommendedTypeChecked,
      angular.configs.tsRecommended,
    ],
    processor: angular.processInlineTemplates,
    languageOptions: {
      parserOptions: { project: ['./tsconfig.spec.json'], tsconfigRootDir: __dirname },
    },
    plugins: { house },
    rules: {
      ...typed,
      'house/imports': 'error',
      '@angular-eslint/component-class-suffix': 'off',
      '@angular-eslint/directive-class-suffix': 'off',
      '@angular-eslint/component-selector': [
        'error',
        { type: ['element', 'attribute'], prefix: 'td', style: 'kebab-case' },
      ],
      '@angular-eslint/directive-selector': [
        'error',
        { type: 'attribute', prefix: 'td', style: 'camelCase' },
      ],
      '@angular-eslint/prefer-on-push-component-change-detection': 'error',
      '@typescript-eslint/unbound-method': ['error', { ignoreStatic: true }],
    },
  },
  {
    // Only the typed clients speak to the server.
    files: ['src/**/*.ts'],
    ignores: ['src/common/api/**', '**/*.spec.ts'],
    rules: {
      'no-restricted-globals': [
        'error',
        ...['fetch', 'EventSource', 'XMLHttpRequest', 'WebSocket'].map((name) => ({
          name,
          message: 'Only src/common/api speaks to the server.',
        })),
      ],
    },
  },
  {
    files: ['src/**/*.html'],
    extends: [angular.configs.templateRecommended, angular.configs.templateAccessibility],
    rules: {
      '@angular-eslint/template/i18n': [
        'error',
        {
          checkId: true,
          checkText: true,
          checkAttributes: true,
          checkDuplicateId: false,
          boundTextAllowedPattern: '[^A-Za-z]',
          ignoreAttributes: noText,
        },
      ],
    },
  },
  { files: ['src/*/index.html'], rules: { '@angular-eslint/template/i18n': 'off' } },
  {
    files: ['shared/**/*.ts'],
    ignores: ['**/*.spec.ts'],
    rules: {
      'no-restricted-globals': [
        'error',
        ...['process', 'window', 'document', 'fetch', 'Buffer', 'setTimeout', 'setInterval'].map(
          (name) => ({ name, message: 'What is shared is pure: no runtime of one side.' }),
        ),
      ],
    },
  },
  {
    files: ['shared/domain/**/*.ts'],
    ignores: ['**/*.spec.ts'],
    rules: { 'no-restricted-syntax': noSystemClock },
  },
  {
    // Answers in tests are read as they come; their shape is what the test checks.
    files: ['**/*.spec.ts', 'test/**/*.ts'],
    rules: {
      '@typescript-eslint/no-unsafe-argument': 'off',
      '@typescript-eslint/no-unsafe-assignment': 'off',
      '@typescript-eslint/no-unsafe-call': 'off',
      '@typescript-eslint/no-unsafe-member-access': 'off',
      '@typescript-eslint/no-unsafe-return': 'off',
      '@typescript-eslint/unbound-method': 'off',
      '@angular-eslint/prefer-on-push-component-change-detection': 'off',
      '@angular-eslint/component-selector': 'off',
    },
  },
  prettier,
);
