import { defineConfig } from 'vitest/config';

/** Unit tests need neither servers nor Astro. */
export default defineConfig({
  test: {
    root: new URL('..', import.meta.url).pathname,
    include: ['tests/unit/**/*.test.{ts,tsx}'],
    setupFiles: ['tests/support/failOnConsole.ts'],
    testTimeout: 30_000,
    pool: 'threads',
  },
});
