import { defineConfig } from 'vitest/config';

/**
 * Four projects, one a room of tests. The set-up stands on the projects that need PostgreSQL and not at
 * the root: a run of `core` or `web` alone then starts no server. It is shared inside one run.
 */
export default defineConfig({
  test: {
    pool: 'forks',
    projects: [
      {
        test: {
          name: 'core',
          pool: 'forks',
          include: ['tests/core/**/*.test.ts'],
          testTimeout: 60_000,
        },
      },
      {
        test: {
          name: 'web',
          pool: 'forks',
          include: ['tests/web/**/*.test.{ts,tsx}'],
        },
      },
      {
        test: {
          name: 'api',
          pool: 'forks',
          include: ['tests/api/**/*.test.ts'],
          globalSetup: ['tests/support/vitest-cluster.ts'],
          testTimeout: 30_000,
          hookTimeout: 60_000,
        },
      },
      {
        test: {
          name: 'browser',
          pool: 'forks',
          include: ['tests/browser/**/*.test.ts'],
          globalSetup: [
            'tests/support/vitest-cluster.ts',
            'tests/support/vitest-web-build.ts',
            'tests/support/vitest-demo.ts',
          ],
          fileParallelism: false,
          testTimeout: 120_000,
          hookTimeout: 180_000,
        },
      },
    ],
  },
});
