import js from '@eslint/js';
import astro from 'eslint-plugin-astro';
import reactHooks from 'eslint-plugin-react-hooks';
import tseslint from 'typescript-eslint';

export default tseslint.config(
  {
    ignores: [
      'dist/',
      '.astro/',
      '.data/',
      'node_modules/',
      'tests/reference/data/',
      'tests/fixtures/',
      // AssemblyScript, whose types and operators are not TypeScript's.
      'src/numerics/kernels/assembly/',
    ],
  },
  js.configs.recommended,
  ...tseslint.configs.strict,
  ...tseslint.configs.stylistic,
  ...astro.configs.recommended,
  {
    files: ['src/**/*.tsx', 'src/**/ui/**/*.ts'],
    plugins: { 'react-hooks': reactHooks },
    rules: { 'react-hooks/rules-of-hooks': 'error', 'react-hooks/exhaustive-deps': 'error' },
  },
  {
    rules: {
      // Indexing into typed arrays that were sized a line before is everyday work here.
      '@typescript-eslint/no-non-null-assertion': 'off',
      '@typescript-eslint/no-explicit-any': 'error',
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_', varsIgnorePattern: '^_' }],
      eqeqeq: ['error', 'always', { null: 'ignore' }],
      'no-console': 'error',
    },
  },
  { files: ['src/env.d.ts'], rules: { '@typescript-eslint/triple-slash-reference': 'off' } },
  // The compiler knows the globals of TypeScript files better than a list could.
  { files: ['**/*.ts', '**/*.tsx', '**/*.astro'], rules: { 'no-undef': 'off' } },
  {
    files: ['**/*.mjs', '*.js'],
    languageOptions: {
      globals: {
        process: 'readonly',
        console: 'readonly',
        Buffer: 'readonly',
        URL: 'readonly',
        fetch: 'readonly',
        setTimeout: 'readonly',
        clearTimeout: 'readonly',
      },
    },
  },
  {
    files: ['public/**/*.js'],
    languageOptions: {
      globals: {
        document: 'readonly',
        Element: 'readonly',
        window: 'readonly',
        matchMedia: 'readonly',
        location: 'readonly',
        CustomEvent: 'readonly',
        navigator: 'readonly',
        Event: 'readonly',
      },
    },
  },
);
