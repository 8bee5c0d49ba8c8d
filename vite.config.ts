import { defineConfig } from 'vitest/config';

export default defineConfig({
  test: {
    include: ['tests/**/*.test.{ts,tsx}'],
    benchmark: { include: ['tests/**/*.bench.ts'] },
    testTimeout: 60_000,
  },
});
