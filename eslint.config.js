import js from '@eslint/js'
import tanstackQuery from '@tanstack/eslint-plugin-query'
import vitest from '@vitest/eslint-plugin'
import { defineConfig, globalIgnores } from 'eslint/config'
import prettier from 'eslint-config-prettier'
import jsxA11y from 'eslint-plugin-jsx-a11y'
import reactHooks from 'eslint-plugin-react-hooks'
import globals from 'globals'
import tseslint from 'typescript-eslint'

const TYPESCRIPT = ['**/*.{ts,tsx}']
const TESTS = ['**/*.test.{ts,tsx}']
const WEB = ['apps/web/src/**/*.{ts,tsx}']
const PURE = ['packages/{fingerprint,royalty,contracts}/src/**/*.ts']

/** Programs that talk to a person at a terminal, where console output is the product. */
const COMMAND_LINE = ['packages/launcher/**', 'packages/worker/src/scan/**', 'seeds/**', 'tests/**']

const noDefaultExport = {
  selector: 'ExportDefaultDeclaration',
  message: 'Export by name. Only lazily loaded routes and configuration files export a default.',
}

const strictness = {
  '@typescript-eslint/no-explicit-any': 'error',
  '@typescript-eslint/no-non-null-assertion': 'error',
  // Casts hide what parsing or narrowing would prove; `as const` is always allowed. A constructor of a branded
  // type is the one place a cast has no alternative: disable the rule there, on that line, with the reason.
  '@typescript-eslint/consistent-type-assertions': ['error', { assertionStyle: 'never' }],
  '@typescript-eslint/consistent-type-imports': ['error', { fixStyle: 'inline-type-imports' }],
  '@typescript-eslint/consistent-type-definitions': ['error', 'type'],
  '@typescript-eslint/switch-exhaustiveness-check': [
    'error',
    { considerDefaultExhaustiveForUnions: true, requireDefaultForNonUnion: true },
  ],
  '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_', varsIgnorePattern: '^_' }],
  eqeqeq: 'error',
  'no-console': 'error',
  'max-lines-per-function': ['error', { max: 70, skipBlankLines: true, skipComments: true }],
  'no-restricted-syntax': ['error', noDefaultExport],
}

const lessNoise = {
  // A number reads the same in a template as on its own; objects and undefined stay forbidden.
  '@typescript-eslint/restrict-template-expressions': ['error', { allowNumber: true }],
  // `() => doIt()` as a callback is idiomatic; returning void from a longer body stays forbidden.
  '@typescript-eslint/no-confusing-void-expression': ['error', { ignoreArrowShorthand: true }],
  // An implementation of an asynchronous interface need not await anything itself.
  '@typescript-eslint/require-await': 'off',
  // React runs asynchronous event handlers and Express 5 forwards rejections of asynchronous handlers.
  '@typescript-eslint/no-misused-promises': [
    'error',
    { checksVoidReturn: { arguments: false, attributes: false } },
  ],
  '@typescript-eslint/no-unnecessary-condition': [
    'error',
    { allowConstantLoopConditions: 'only-allowed-literals' },
  ],
}

export default defineConfig(
  globalIgnores(['node_modules/', 'dist/', '.data/', '.cache/', 'coverage/']),
  { linterOptions: { reportUnusedDisableDirectives: 'error' } },
  js.configs.recommended,
  {
    files: TYPESCRIPT,
    extends: [tseslint.configs.strictTypeChecked],
    languageOptions: {
      globals: globals.node,
      parserOptions: { projectService: true, tsconfigRootDir: import.meta.dirname },
    },
    rules: { ...strictness, ...lessNoise },
  },
  {
    files: ['*.{js,cjs,ts}', '**/vite.config.ts', 'apps/web/src/**/routes/**/*.tsx'],
    languageOptions: { globals: globals.node },
    rules: { 'no-restricted-syntax': 'off' },
  },
  {
    // A migration is one list of statements, a set of demo data is one list of facts: splitting either hides it.
    files: ['migrations/**/*.ts', 'seeds/**/*.ts'],
    rules: { 'max-lines-per-function': 'off' },
  },
  { files: COMMAND_LINE, rules: { 'no-console': 'off' } },
  {
    files: PURE,
    rules: { 'no-restricted-globals': ['error', 'process', 'Buffer', 'window', 'document', 'fetch'] },
  },
  {
    files: WEB,
    extends: [
      reactHooks.configs.flat['recommended-latest'],
      jsxA11y.flatConfigs.strict,
      tanstackQuery.configs['flat/recommended'],
    ],
    languageOptions: { globals: globals.browser },
    rules: { '@tanstack/query/prefer-query-options': 'error' },
  },
  {
    files: TESTS,
    extends: [vitest.configs.recommended],
    rules: {
      'vitest/expect-expect': [
        'error',
        {
          assertFunctionNames: [
            'expect',
            'expect*',
            'expectTypeOf',
            'assert',
            'assert*',
            '**.expect*',
            'fc.assert',
          ],
        },
      ],
      'vitest/no-disabled-tests': 'error',
      'vitest/no-focused-tests': 'error',
      'vitest/no-commented-out-tests': 'error',
      // Tests named in a table or built in a loop are clearer with an expectation behind a condition than without.
      'vitest/no-conditional-expect': 'off',
      // One describe block is as long as the behaviour it lists.
      'max-lines-per-function': 'off',
      // `expect(object.method)` never calls the method.
      '@typescript-eslint/unbound-method': 'off',
    },
  },
  prettier,
)
