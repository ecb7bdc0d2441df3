import js from '@eslint/js';
import globals from 'globals';
import prettier from 'eslint-config-prettier';
import vue from 'eslint-plugin-vue';
import tseslint from 'typescript-eslint';

/** Imports point one way (see DEVELOPERS.md): each folder may not reach into these. */
const forbid = (...patterns) => ({
  'no-restricted-imports': ['error', { patterns: patterns.map((group) => ({ group: [group] })) }],
});

export default tseslint.config(
  { ignores: ['dist', '.local', 'node_modules', 'coverage', 'tests/artifacts', 'components.d.ts'] },
  js.configs.recommended,
  ...tseslint.configs.recommended,
  ...vue.configs['flat/recommended'],
  {
    files: ['**/*.{ts,vue,mts}'],
    languageOptions: {
      globals: { ...globals.browser, ...globals.node },
      parserOptions: {
        parser: tseslint.parser,
        projectService: true,
        tsconfigRootDir: import.meta.dirname,
        extraFileExtensions: ['.vue'],
      },
    },
    rules: {
      '@typescript-eslint/no-floating-promises': 'error',
      '@typescript-eslint/no-misused-promises': ['error', { checksVoidReturn: false }],
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_' }],
      '@typescript-eslint/consistent-type-imports': ['error', { fixStyle: 'inline-type-imports' }],
      'vue/multi-word-component-names': 'off',
      'vue/block-order': ['error', { order: ['script', 'template', 'style'] }],
      'vue/component-api-style': ['error', ['script-setup']],
      'vue/require-default-prop': 'off',
      'no-undef': 'off',
    },
  },
  {
    files: ['shared/**/*.ts'],
    rules: forbid(
      'node:*',
      'vue*',
      '@/*',
      '**/server/**',
      '**/src/**',
      'express*',
      'pg*',
      'sequelize*',
    ),
  },
  {
    files: ['src/**/*.{ts,vue}'],
    rules: forbid('node:*', '**/server/**', '**/seeders/**', '**/tests/**'),
  },
  {
    files: ['server/**/*.ts'],
    rules: forbid('@/*', '**/src/**', '**/tests/**', 'vue*'),
  },
  { files: ['public/**/*.js'], languageOptions: { globals: globals.browser } },
  { files: ['**/*.mjs', '*.js'], languageOptions: { globals: globals.node } },
  prettier,
);
