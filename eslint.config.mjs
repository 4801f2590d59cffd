import eslint from '@eslint/js';
import angular from 'angular-eslint';
import prettier from 'eslint-config-prettier';
import { defineConfig, globalIgnores } from 'eslint/config';
import tseslint from 'typescript-eslint';

export default defineConfig(
  globalIgnores(['dist/', '.angular/', '.run/', 'coverage/', 'notebooks/', 'reference-data/']),
  {
    files: ['**/*.ts'],
    extends: [eslint.configs.recommended, ...tseslint.configs.recommendedTypeChecked],
    languageOptions: { parserOptions: { projectService: true, tsconfigRootDir: import.meta.dirname } },
    rules: {
      '@typescript-eslint/explicit-module-boundary-types': 'error',
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_', varsIgnorePattern: '^_' }],
      '@typescript-eslint/restrict-template-expressions': ['error', { allowNumber: true }],
      // Static methods, like a form library's validators, use no `this`.
      '@typescript-eslint/unbound-method': ['error', { ignoreStatic: true }],
      eqeqeq: 'error',
      'max-lines': ['error', 350],
      'no-warning-comments': ['error', { terms: ['todo', 'fixme', 'xxx'] }],
    },
  },
  {
    // The engine gives the same answer for the same input: no clock, no chance, no locale.
    files: ['shared/**/*.ts'],
    rules: {
      'no-restricted-globals': ['error', 'Date', 'process', 'fetch', 'window', 'document', 'performance'],
      'no-restricted-properties': [
        'error',
        { object: 'Math', property: 'random', message: 'Pass a seed (shared/numerics/random).' },
        { property: 'toLocaleString', message: 'Locale formatting differs between machines.' },
      ],
    },
  },
  {
    files: ['src/**/*.ts'],
    extends: [...angular.configs.tsRecommended],
    processor: angular.processInlineTemplates,
    rules: {
      '@angular-eslint/component-selector': ['error', { type: 'element', prefix: 'tm', style: 'kebab-case' }],
      '@angular-eslint/directive-selector': [
        'error',
        { type: 'attribute', prefix: 'tm', style: 'camelCase' },
      ],
      '@angular-eslint/prefer-on-push-component-change-detection': 'error',
    },
  },
  {
    files: ['src/**/*.html'],
    extends: [...angular.configs.templateRecommended, ...angular.configs.templateAccessibility],
  },
  {
    files: ['**/*.spec.ts', 'test/**/*.ts'],
    rules: {
      // A test left out, or left alone, says nothing about the rest.
      'no-restricted-properties': [
        'error',
        ...['it', 'test', 'describe'].flatMap((object) =>
          ['only', 'skip', 'todo'].map((property) => ({ object, property, message: 'Every test runs.' })),
        ),
      ],
      'no-restricted-globals': ['error', 'fit', 'fdescribe', 'xit', 'xdescribe', 'xtest'],
      '@typescript-eslint/unbound-method': 'off',
      '@typescript-eslint/explicit-module-boundary-types': 'off',
    },
  },
  {
    files: ['**/*.mjs', '**/*.cjs'],
    extends: [eslint.configs.recommended],
    languageOptions: {
      globals: {
        process: 'readonly',
        console: 'readonly',
        setTimeout: 'readonly',
        clearTimeout: 'readonly',
        setInterval: 'readonly',
        clearInterval: 'readonly',
        URL: 'readonly',
        Buffer: 'readonly',
        fetch: 'readonly',
        performance: 'readonly',
        module: 'writable',
        require: 'readonly',
        AbortSignal: 'readonly',
      },
    },
  },
  prettier,
);
