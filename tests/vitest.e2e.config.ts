import { defineConfig } from 'vitest/config';

/** User journeys in Chromium against the application that `npm test` has started; one browser at a time. */
export default defineConfig({
  test: {
    root: new URL('..', import.meta.url).pathname,
    include: ['tests/e2e/**/*.test.ts'],
    testTimeout: 120_000,
    hookTimeout: 60_000,
    fileParallelism: false,
  },
});
