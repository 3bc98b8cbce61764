import astro from 'eslint-plugin-astro';
import jsxA11y from 'eslint-plugin-jsx-a11y';
import reactHooks from 'eslint-plugin-react-hooks';
import { defineConfig } from 'eslint/config';
import tseslint from 'typescript-eslint';

const restricted = (message, ...group) => ({ 'no-restricted-imports': ['error', { patterns: [{ group, message }] }] });

export default defineConfig(
  { ignores: ['**/dist/', '**/.data*/', '**/.astro/', '**/node_modules/'] },
  {
    files: ['**/*.{ts,tsx}'],
    extends: [tseslint.configs.strictTypeChecked, tseslint.configs.stylisticTypeChecked],
    languageOptions: {
      parserOptions: { projectService: true, tsconfigRootDir: new URL('..', import.meta.url).pathname },
    },
    rules: {
      '@typescript-eslint/consistent-type-definitions': ['error', 'interface'],
      '@typescript-eslint/switch-exhaustiveness-check': 'error',
      '@typescript-eslint/restrict-template-expressions': ['error', { allowNumber: true }],
      // A model class carries its columns as declared fields and nothing else.
      '@typescript-eslint/no-extraneous-class': ['error', { allowStaticOnly: true }],
      // Two rules of the set contradict each other on `values[i]`: we write `as number` where an index is known
      // to be inside, and never `!`, which is easy to overlook.
      '@typescript-eslint/non-nullable-type-assertion-style': 'off',
      // Spreading a text into code points is what we mean where we do it.
      '@typescript-eslint/no-misused-spread': ['error', { allow: ['string'] }],
      'max-depth': ['error', 3],
    },
  },
  {
    files: ['**/*.tsx'],
    plugins: { 'react-hooks': reactHooks, 'jsx-a11y': jsxA11y },
    rules: { ...reactHooks.configs.recommended.rules, ...jsxA11y.flatConfigs.recommended.rules },
  },
  {
    files: ['src/lib/**/*.ts'],
    rules: {
      'no-restricted-globals': ['error', 'Date', 'performance', 'process', 'window', 'document', 'crypto'],
      'no-restricted-properties': [
        'error',
        { object: 'Math', property: 'random', message: 'Pass a seeded generator in.' },
      ],
      ...restricted('src/lib is pure: no Node, no server, no client.', 'node:*', '#server/*', '#client/*', '#http/*'),
    },
  },
  ...astro.configs['flat/recommended'],
  ...astro.configs['flat/jsx-a11y-recommended'],
  {
    files: ['**/*.astro'],
    rules: restricted(
      'Pages call use cases and presenters only.',
      '#server/models/*',
      '#server/database/*',
      '#worker/*',
    ),
  },
  {
    files: ['src/server/**/*.ts', 'worker/**/*.ts'],
    rules: restricted('src/server and worker are free of the framework.', 'astro:*', 'astro', '#http/*', 'react'),
  },
);
