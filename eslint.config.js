import js from '@eslint/js';
import astro from 'eslint-plugin-astro';
import jsxA11y from 'eslint-plugin-jsx-a11y';
import tseslint from 'typescript-eslint';

/** Forbids imports of whole rooms; tests/architecture checks the same on resolved paths. */
const noImportsFrom = (...groups) => ({
  'no-restricted-imports': [
    'error',
    { patterns: groups.map(([group, message]) => ({ group, message })) },
  ],
});

const SERVER = ['**/server/**', '~/server/**'];
const OUTER = [
  '**/pages/**',
  '**/actions/**',
  '**/worker/**',
  '**/cli/**',
  '~/pages/**',
  '~/actions/**',
];
const VIEW = ['**/components/**', '**/layouts/**', '~/components/**', '~/layouts/**'];
const NODE = ['node:*', 'fs', 'path', 'crypto', 'os', 'http', 'https', 'worker_threads'];
const FRAMEWORKS = ['astro', 'astro:*', 'react', 'react-dom', 'kysely', 'better-sqlite3'];

export default tseslint.config(
  { ignores: ['dist/', '.astro/', 'db/data/', 'playwright-report/', 'test-results/', 'pictures/'] },
  js.configs.recommended,
  {
    files: ['**/*.{ts,tsx}'],
    extends: [...tseslint.configs.strictTypeChecked],
    languageOptions: {
      parserOptions: { projectService: true, tsconfigRootDir: import.meta.dirname },
    },
    rules: {
      // Numbers in messages are fine; objects are not.
      '@typescript-eslint/restrict-template-expressions': ['error', { allowNumber: true }],
      '@typescript-eslint/no-confusing-void-expression': [
        'error',
        { ignoreArrowShorthand: true, ignoreVoidReturningFunctions: true },
      ],
      '@typescript-eslint/no-misused-promises': [
        'error',
        { checksVoidReturn: { attributes: false } },
      ],
      // tsconfig's noPropertyAccessFromIndexSignature asks for the brackets that this forbids.
      '@typescript-eslint/dot-notation': 'off',
      '@typescript-eslint/no-invalid-void-type': [
        'error',
        { allowAsThisParameter: true, allowInGenericTypeArguments: true },
      ],
      '@typescript-eslint/consistent-type-imports': [
        'error',
        { fixStyle: 'inline-type-imports', disallowTypeAnnotations: false },
      ],
      '@typescript-eslint/unified-signatures': 'off',
      // noUncheckedIndexedAccess is on; in loops over a known length "!" is the honest way to say so.
      '@typescript-eslint/no-non-null-assertion': 'off',
      '@typescript-eslint/no-misused-spread': ['error', { allow: ['string'] }],
      '@typescript-eslint/no-unused-vars': [
        'error',
        { argsIgnorePattern: '^_', varsIgnorePattern: '^_' },
      ],
    },
  },
  {
    files: ['**/*.{js,mjs}'],
    languageOptions: {
      globals: Object.fromEntries(
        [
          'process',
          'console',
          'setTimeout',
          'clearTimeout',
          'setInterval',
          'clearInterval',
          'fetch',
          'URL',
          'AbortSignal',
          'AbortController',
          'performance',
          'Buffer',
        ].map((name) => [name, 'readonly']),
      ),
    },
  },
  {
    // Service workers, served as they are.
    files: ['public/**/*.js'],
    languageOptions: {
      globals: Object.fromEntries(
        ['self', 'caches', 'Response', 'Headers'].map((name) => [name, 'readonly']),
      ),
    },
  },
  ...astro.configs.recommended,
  ...astro.configs['jsx-a11y-recommended'],
  {
    files: ['src/components/**/*.tsx'],
    // The plugin itself is registered by eslint-plugin-astro above.
    rules: jsxA11y.flatConfigs.recommended.rules,
    languageOptions: { parserOptions: { ecmaFeatures: { jsx: true } } },
  },
  {
    rules: {
      eqeqeq: 'error',
      'no-console': 'error',
      'prefer-const': 'error',
      'no-else-return': 'error',
    },
  },
  {
    files: ['src/cli/**', 'db/seed/**', 'mail-fake/**', 'tests/**', '*.config.*'],
    rules: { 'no-console': 'off' },
  },

  // Imports go one way: domain ← server ← pages, actions, worker; components see domain and paths only.
  {
    files: ['src/domain/**'],
    rules: {
      ...noImportsFrom(
        [[...SERVER, ...OUTER, ...VIEW], 'The domain imports the domain only.'],
        [[...NODE, ...FRAMEWORKS], 'The domain runs in the browser too: no Node, no frameworks.'],
      ),
      'no-restricted-globals': [
        'error',
        { name: 'process', message: 'The domain has no environment; pass what it needs.' },
        { name: 'Buffer', message: 'The domain runs in the browser too.' },
      ],
      'no-restricted-properties': [
        'error',
        { object: 'Date', property: 'now', message: 'Pass the time in.' },
        { object: 'Math', property: 'random', message: 'Pass the random source in.' },
      ],
      'no-restricted-syntax': [
        'error',
        {
          selector: "NewExpression[callee.name='Date'][arguments.length=0]",
          message: 'Pass the time in.',
        },
      ],
    },
  },
  {
    files: ['src/server/**'],
    rules: noImportsFrom([
      [...OUTER, ...VIEW],
      'The server knows nothing of pages, actions or components.',
    ]),
  },
  {
    files: ['src/components/**'],
    rules: noImportsFrom([
      [...SERVER, ...OUTER, ...NODE, 'kysely', 'better-sqlite3'],
      'Components import the domain, paths and other components only.',
    ]),
  },
  {
    files: ['db/migrations/**'],
    rules: noImportsFrom([
      ['**/src/**', '~/**'],
      'A migration is frozen and imports nothing that may change.',
    ]),
  },
  {
    files: ['tests/**', '**/*.test.ts'],
    rules: {
      '@typescript-eslint/no-unsafe-assignment': 'off',
      '@typescript-eslint/no-unsafe-member-access': 'off',
      '@typescript-eslint/no-unsafe-argument': 'off',
      '@typescript-eslint/no-unsafe-call': 'off',
      '@typescript-eslint/no-unsafe-return': 'off',
    },
  },
);
