import eslint from '@eslint/js';
import angular from 'angular-eslint';
import { defineConfig } from 'eslint/config';
import prettier from 'eslint-config-prettier';
import tseslint from 'typescript-eslint';
import { boundaries } from './server/src/setup/dependency-table.mjs';

const NODE_GLOBALS = Object.fromEntries(
  [
    ...['process', 'Buffer', 'URL', 'AbortSignal', 'fetch', 'performance', 'globalThis'],
    ...['setTimeout', 'clearTimeout', 'setInterval', 'clearInterval', 'setImmediate'],
  ].map((name) => [name, 'readonly']),
);
const COMMONJS_GLOBALS = { require: 'readonly', module: 'writable', __dirname: 'readonly', __filename: 'readonly' };

const NAMED_EXPORTS = {
  selector: 'ExportDefaultDeclaration',
  message: 'Exports have names, so that a thing is called the same wherever it is used.',
};
const NO_DOUBLE_CAST = {
  selector: 'TSAsExpression > TSAsExpression[typeAnnotation.type="TSUnknownKeyword"]',
  message: 'A cast by way of unknown switches the checks off: parse what comes from outside with a schema.',
};
const NAMED_TOLERANCES = {
  selector: 'Literal[raw=/^[0-9.]+e[+-]?[0-9]+$/i]',
  message: 'A tolerance has a name, a unit and a meaning in tolerance.ts; take it from there or as a parameter.',
};

const UNUSED = ['error', { argsIgnorePattern: '^_', varsIgnorePattern: '^_$', ignoreRestSiblings: true }];

export default defineConfig([
  { ignores: ['dist/', '.angular/', '.data/', 'node_modules/', 'coverage/', 'test/fixtures/'] },
  {
    // A rule that is wrong for a file is changed here, with the reason, and not switched off in the file.
    linterOptions: { noInlineConfig: true, reportUnusedDisableDirectives: 'error' },
  },
  {
    files: ['**/*.mjs', '**/*.cjs'],
    extends: [eslint.configs.recommended],
    languageOptions: { globals: NODE_GLOBALS },
    rules: { 'no-unused-vars': UNUSED, 'max-lines': ['error', 400] },
  },
  { files: ['**/*.cjs'], languageOptions: { sourceType: 'commonjs', globals: COMMONJS_GLOBALS } },
  {
    files: ['**/*.ts'],
    extends: [eslint.configs.recommended, tseslint.configs.recommended],
    rules: {
      '@typescript-eslint/no-unused-vars': UNUSED,
      '@typescript-eslint/no-explicit-any': 'error',
      '@typescript-eslint/no-non-null-assertion': 'error',
      '@typescript-eslint/ban-ts-comment': [
        'error',
        { 'ts-ignore': true, 'ts-expect-error': true, 'ts-nocheck': true },
      ],
      '@typescript-eslint/consistent-type-imports': ['error', { fixStyle: 'inline-type-imports' }],
      eqeqeq: ['error', 'always', { null: 'ignore' }],
      // Types of packages are extended by declaring into their namespaces.
      '@typescript-eslint/no-namespace': ['error', { allowDeclarations: true }],
      'no-console': 'error',
      'max-lines': ['error', 400],
      'no-restricted-syntax': ['error', NAMED_EXPORTS, NO_DOUBLE_CAST],
    },
  },
  {
    files: ['shared/src/geometry/**/*.ts', 'shared/src/bending/**/*.ts'],
    ignores: ['**/tolerance.ts', '**/*.test.ts'],
    rules: { 'no-restricted-syntax': ['error', NAMED_EXPORTS, NO_DOUBLE_CAST, NAMED_TOLERANCES] },
  },
  {
    // Joints between generic types that the compiler cannot follow; both are built so that the cast is the only hole.
    files: ['server/src/database/scoped-rows.ts', 'server/src/http/route-call.ts'],
    rules: { 'no-restricted-syntax': ['error', NAMED_EXPORTS] },
  },
  {
    files: ['**/index.ts'],
    rules: {
      'no-restricted-syntax': [
        'error',
        { selector: 'Program', message: 'No file gathers others: import a thing from the file that holds it.' },
      ],
    },
  },
  {
    files: ['projects/**/*.ts'],
    extends: [angular.configs.tsRecommended],
    processor: angular.processInlineTemplates,
    rules: {
      '@angular-eslint/prefer-on-push-component-change-detection': 'error',
      '@angular-eslint/component-selector': ['error', { type: 'element', prefix: 'fw', style: 'kebab-case' }],
      '@angular-eslint/directive-selector': ['error', { type: 'attribute', prefix: 'fw', style: 'camelCase' }],
    },
  },
  {
    files: ['projects/**/*.html'],
    // The page around the application is no template.
    ignores: ['projects/*/src/index.html'],
    extends: [angular.configs.templateRecommended, angular.configs.templateAccessibility],
    rules: {
      // The content security policy blocks a style written into an attribute; a binding sets it through the DOM.
      '@angular-eslint/template/no-inline-styles': ['error', { allowNgStyle: false, allowBindToStyle: true }],
    },
  },
  ...boundaries,
  prettier,
]);
