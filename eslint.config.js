import js from '@eslint/js';
import boundaries from 'eslint-plugin-boundaries';
import { createTypeScriptImportResolver } from 'eslint-import-resolver-typescript';
import jsxA11y from 'eslint-plugin-jsx-a11y';
import reactHooks from 'eslint-plugin-react-hooks';
import globals from 'globals';
import tseslint from 'typescript-eslint';
import { boundarySettings, dependencyRule, enginePurity } from './eslint.boundaries.js';

const tests = ['tests/**/*.{ts,tsx}', '**/*.test.{ts,tsx}'];

export default tseslint.config(
  { ignores: ['dist/', 'data/', 'coverage/', 'drizzle/', 'node_modules/', 'public/'] },
  {
    // A rule that does not fit is changed here, for everybody and in the open; comments in a file change nothing.
    linterOptions: { noInlineConfig: true, reportUnusedDisableDirectives: 'error' },
  },
  js.configs.recommended,
  {
    files: ['**/*.{ts,tsx}'],
    extends: [...tseslint.configs.strictTypeChecked],
    languageOptions: {
      parserOptions: { projectService: true, tsconfigRootDir: import.meta.dirname },
    },
    rules: {
      '@typescript-eslint/no-explicit-any': 'error',
      '@typescript-eslint/no-non-null-assertion': 'error',
      '@typescript-eslint/no-unused-vars': [
        'error',
        { args: 'all', argsIgnorePattern: '^_', caughtErrors: 'all', ignoreRestSiblings: true },
      ],
      '@typescript-eslint/consistent-type-imports': 'error',
      '@typescript-eslint/switch-exhaustiveness-check': [
        'error',
        { considerDefaultExhaustiveForUnions: true },
      ],
      // numbers and booleans read well inside a sentence; objects do not, and stay forbidden
      '@typescript-eslint/restrict-template-expressions': [
        'error',
        { allowNumber: true, allowBoolean: true },
      ],
      // `onClick={() => setOpen(true)}` says what it does
      '@typescript-eslint/no-confusing-void-expression': [
        'error',
        { ignoreArrowShorthand: true, ignoreVoidReturningFunctions: true },
      ],
      '@typescript-eslint/no-misused-promises': ['error', { checksVoidReturn: { attributes: false } }],
      // spreading text into its code points is what reading feet and inches needs
      '@typescript-eslint/no-misused-spread': ['error', { allow: ['string'] }],
      eqeqeq: 'error',
      'no-console': 'error',
      'max-lines': ['error', { max: 400 }],
      'no-restricted-syntax': [
        'error',
        { selector: 'ExportDefaultDeclaration', message: 'Export by name: a thing has one name everywhere.' },
        { selector: 'TSEnumDeclaration', message: 'Use a union of strings; it is the same in JSON.' },
      ],
    },
  },
  {
    files: ['**/*.{ts,tsx}'],
    plugins: { boundaries },
    settings: {
      ...boundarySettings,
      'import/resolver-next': [createTypeScriptImportResolver({ project: './tsconfig.json' })],
      'import/resolver': { typescript: { project: './tsconfig.json' } },
    },
    rules: { 'boundaries/dependencies': dependencyRule, 'boundaries/no-unknown-files': 'error' },
  },
  {
    files: ['src/**/*.{ts,tsx}'],
    extends: [reactHooks.configs.flat.recommended, jsxA11y.flatConfigs.strict],
    languageOptions: { globals: globals.browser },
  },
  {
    // Behind the edges, what parsing returned has its type already. Requests and repos are edges.
    files: ['shared/**/*.ts', 'server/engine/**/*.ts', 'src/{app,components,features}/**/*.{ts,tsx}'],
    ignores: [...tests, 'src/features/*/api/**'],
    rules: {
      '@typescript-eslint/consistent-type-assertions': ['error', { assertionStyle: 'never' }],
    },
  },
  {
    // The calculation runs anywhere and gives the same answer every time.
    files: ['server/engine/**/*.ts'],
    ignores: tests,
    rules: enginePurity,
  },
  {
    // What these print is what they are for.
    files: ['server/cli/**/*.ts', 'server/index.ts', 'bench/**/*.ts'],
    rules: { 'no-console': 'off' },
  },
  {
    files: tests,
    rules: {
      // bodies of HTTP answers and rows of published tables come in without a type
      '@typescript-eslint/no-unsafe-argument': 'off',
      '@typescript-eslint/no-unsafe-assignment': 'off',
      '@typescript-eslint/no-unsafe-call': 'off',
      '@typescript-eslint/no-unsafe-member-access': 'off',
      '@typescript-eslint/no-unsafe-return': 'off',
      'no-restricted-syntax': [
        'error',
        {
          selector:
            'MemberExpression[object.name=/^(it|test|describe)$/][property.name=/^(only|skip|todo|skipIf|runIf|fails)$/]',
          message: 'A test that does not run, or runs alone, checks nothing.',
        },
      ],
    },
  },
  {
    files: ['*.config.ts'],
    rules: { 'no-restricted-syntax': 'off' },
  },
  {
    files: ['**/*.js'],
    extends: [tseslint.configs.disableTypeChecked],
    languageOptions: { globals: globals.node },
  },
);
