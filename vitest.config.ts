import { defineConfig } from 'vitest/config';

const SECOND_MS = 1000;

export default defineConfig({
  test: {
    projects: [
      {
        test: {
          name: 'unit',
          include: ['tests/{optics,reference,protocol,cabinet}/**/*.test.ts', 'tests/*.test.ts'],
          environment: 'node',
          // One process and one document for all files: starting both anew for each took twice as long as the tests.
          isolate: false,
          testTimeout: 60 * SECOND_MS,
        },
      },
      {
        test: {
          name: 'client',
          include: ['tests/client/**/*.test.{ts,tsx}'],
          environment: 'jsdom',
          isolate: false,
          testTimeout: 20 * SECOND_MS,
        },
      },
      {
        test: {
          name: 'api',
          include: ['tests/{api,faults}/**/*.test.ts'],
          environment: 'node',
          globalSetup: ['tests/setup/cluster.ts'],
          isolate: false,
          testTimeout: 60 * SECOND_MS,
          hookTimeout: 60 * SECOND_MS,
        },
      },
      {
        test: {
          name: 'browser',
          include: ['tests/browser/**/*.test.ts'],
          environment: 'node',
          globalSetup: ['tests/setup/cluster.ts'],
          // One browser at a time: two would share two cores and time each other out.
          fileParallelism: false,
          testTimeout: 120 * SECOND_MS,
          hookTimeout: 120 * SECOND_MS,
        },
      },
    ],
  },
});
