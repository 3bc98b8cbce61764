import { fileURLToPath } from 'node:url';

/** @type {import('prettier').Config} */
export default {
  singleQuote: true,
  printWidth: 120,
  trailingComma: 'all',
  plugins: ['prettier-plugin-astro', 'prettier-plugin-tailwindcss'],
  overrides: [{ files: '*.astro', options: { parser: 'astro' } }],
  // Absolute: the plugin takes a relative path from the folder of this file for some files and not for others.
  tailwindStylesheet: fileURLToPath(new URL('../src/styles/global.css', import.meta.url)),
};
