import { defineConfig } from 'vitest/config';

/** Continuous integration names a file for the counts; a person at a terminal needs none. */
const countsFile = process.env['TEST_COUNTS'];

const common = { pool: 'forks' as const, testTimeout: 60_000, hookTimeout: 120_000 };

export default defineConfig({
  test: {
    reporters: countsFile === undefined ? ['default'] : ['default', ['json', { outputFile: countsFile }]],
    projects: [
      {
        test: {
          ...common,
          name: 'node',
          include: ['test/**/*.test.ts'],
          exclude: ['test/screens/**'],
          sequence: { groupOrder: 0 },
        },
      },
      {
        // Real browsers want the machine for themselves: after all else, two at a time.
        test: {
          ...common,
          name: 'screens',
          include: ['test/screens/**/*.test.ts'],
          testTimeout: 120_000,
          maxWorkers: 2,
          sequence: { groupOrder: 1 },
        },
      },
    ],
  },
});
