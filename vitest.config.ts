import { defineConfig } from 'vitest/config';

export default defineConfig({
  test: {
    projects: [
      { test: { name: 'engine', include: ['tests/engine/**/*.test.ts'], testTimeout: 60_000 } },
      { test: { name: 'client', include: ['tests/client/**/*.test.ts'], testTimeout: 60_000 } },
      { test: { name: 'outside', include: ['tests/outside/**/*.test.ts'], testTimeout: 120_000 } },
      {
        test: {
          name: 'api',
          include: ['tests/api/**/*.test.ts'],
          globalSetup: 'tests/support/test-database.ts',
          // One database and one machine: a test that kills a server must not meet one that measures time.
          fileParallelism: false,
          pool: 'forks',
          testTimeout: 60_000,
          hookTimeout: 120_000,
        },
      },
    ],
  },
});
