import { defineConfig } from 'vitest/config';

export default defineConfig({
  test: {
    root: new URL('..', import.meta.url).pathname,
    include: ['test/**/*.test.ts'],
    // Full counts, coverage and a loaded machine together take minutes where everyday runs take seconds.
    testTimeout: process.env.RATEWRIGHT_FULL === '1' ? 600_000 : 60_000,
    coverage: {
      provider: 'v8',
      include: ['server/src/**/*.ts'],
      reporter: ['text-summary', 'json-summary'],
      thresholds: { lines: 95 },
    },
  },
});
