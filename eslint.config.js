import js from '@eslint/js';
import prettier from 'eslint-config-prettier';
import vue from 'eslint-plugin-vue';
import { defineConfig } from 'eslint/config';
import globals from 'globals';
import tseslint from 'typescript-eslint';

/** Forbids imports that would point against the one-way order shared <- server <- worker, shared <- src. */
function mayNotImport(folders) {
  return {
    'no-restricted-imports': [
      'error',
      {
        patterns: [
          { regex: `^(\\.\\./)+(${folders.join('|')})/|^@/(${folders.join('|')})/`, message: 'Imports flow one way.' },
        ],
      },
    ],
  };
}

export default defineConfig(
  { ignores: ['dist', 'coverage', '.overfold', 'node_modules'] },
  js.configs.recommended,
  tseslint.configs.strict,
  vue.configs['flat/recommended'],
  prettier,
  {
    languageOptions: { globals: { ...globals.node }, parserOptions: { parser: tseslint.parser } },
    rules: {
      'no-console': 'error',
      eqeqeq: 'error',
      '@typescript-eslint/no-explicit-any': 'error',
      '@typescript-eslint/no-extraneous-class': ['error', { allowWithDecorator: true, allowEmpty: true }],
      '@typescript-eslint/ban-ts-comment': ['error', { 'ts-expect-error': 'allow-with-description' }],
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_', varsIgnorePattern: '^_' }],
      '@typescript-eslint/consistent-type-imports': [
        'error',
        { fixStyle: 'inline-type-imports', prefer: 'type-imports' },
      ],
      'vue/no-v-html': 'error',
      'vue/block-order': ['error', { order: ['script', 'template', 'style'] }],
    },
  },
  { files: ['src/**', 'tests/src/**', 'tests/e2e/**'], languageOptions: { globals: globals.browser } },
  { files: ['shared/**'], rules: mayNotImport(['src', 'server', 'worker']) },
  { files: ['src/**'], rules: mayNotImport(['server', 'worker']) },
  { files: ['server/**'], rules: mayNotImport(['src', 'worker']) },
  {
    files: ['worker/**'],
    rules: mayNotImport(['src', 'server/(routes|controllers|middleware|services|policies|presenters|openapi)']),
  },
  {
    files: ['server/entities/**'],
    rules: {
      'no-restricted-syntax': [
        'error',
        {
          selector:
            "Decorator > CallExpression[callee.name='Column']:not(:has(ObjectExpression > Property[key.name='type']))",
          message: 'Every column states its database type: the build must not depend on decorator metadata.',
        },
      ],
    },
  },
  {
    files: ['docker-dev/**', 'tests/bench/**', 'worker/screen.ts', 'server/user.ts', 'server/migrate.ts'],
    rules: { 'no-console': 'off' },
  },
);
