import { defineConfig } from 'vitest/config';

/**
 * Limits are for what hangs, never for what is slow: on a busy machine everything here may take many times
 * as long as on a calm one, and is still right.
 */
const MINUTE_MS = 60_000;

/**
 * Four projects, one a room of tests. The set-up stands on the projects that need PostgreSQL and not at
 * the root: a run of `core` or `web` alone then starts no server. It is shared inside one run.
 */
export default defineConfig({
  test: {
    pool: 'forks',
    // Vitest would leave one processor idle, which of two is half: database and commands need the other little.
    maxWorkers: '100%',
    teardownTimeout: MINUTE_MS,
    projects: [
      {
        test: {
          name: 'core',
          pool: 'forks',
          include: ['tests/core/**/*.test.ts'],
          testTimeout: 4 * MINUTE_MS,
          hookTimeout: 4 * MINUTE_MS,
        },
      },
      {
        test: {
          name: 'web',
          pool: 'forks',
          include: ['tests/web/**/*.test.{ts,tsx}'],
          testTimeout: MINUTE_MS,
          hookTimeout: MINUTE_MS,
        },
      },
      {
        test: {
          name: 'api',
          pool: 'forks',
          include: ['tests/api/**/*.test.ts'],
          globalSetup: ['tests/support/vitest-cluster.ts'],
          testTimeout: 2 * MINUTE_MS,
          hookTimeout: 4 * MINUTE_MS,
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
          // One Chromium at a time, and after everything else: a page then has the machine for itself.
          fileParallelism: false,
          sequence: { groupOrder: 1 },
          testTimeout: 4 * MINUTE_MS,
          hookTimeout: 4 * MINUTE_MS,
        },
      },
    ],
  },
});
