import { defineConfig } from 'vitest/config';

/** Tests that need a database say so in their name or lie in a folder whose tests all do. */
const WITH_DATABASE = ['tests/api/**/*.test.ts', 'tests/contract/**/*.test.ts', 'tests/**/*.db.test.ts'];
const BROWSER = ['tests/e2e/**/*.test.ts'];
/** What is timed in seconds needs the machine to itself. */
const ALONE = ['tests/e2e/start/start.test.ts'];

export default defineConfig({
  test: {
    // A start of PostgreSQL or the first load of a big package on a busy machine takes much longer than the usual 5 s.
    testTimeout: 60_000,
    hookTimeout: 120_000,
    // One more than the cores: tests of the API wait for the database and for files a part of their time.
    maxWorkers: 3,
    projects: [
      {
        extends: true,
        test: {
          name: 'unit',
          include: ['tests/**/*.test.{ts,tsx}'],
          exclude: [...WITH_DATABASE, ...BROWSER],
          // Loading the same modules anew for each file took longer than the tests; none of them keeps state of its own.
          isolate: false,
        },
      },
      {
        extends: true,
        test: {
          name: 'api',
          include: WITH_DATABASE,
          globalSetup: ['tests/support/cluster.ts'],
          // As for the unit tests.
          isolate: false,
        },
      },
      {
        extends: true,
        test: {
          name: 'e2e',
          include: BROWSER,
          exclude: ALONE,
          globalSetup: ['tests/support/cluster.ts', 'tests/support/built-client.ts'],
          // One browser and one server for each core, and after the others.
          maxWorkers: 2,
          sequence: { groupOrder: 1 },
          testTimeout: 120_000,
        },
      },
      {
        extends: true,
        test: {
          name: 'start',
          include: ALONE,
          globalSetup: ['tests/support/built-client.ts'],
          sequence: { groupOrder: 2 },
          testTimeout: 120_000,
        },
      },
    ],
  },
});
