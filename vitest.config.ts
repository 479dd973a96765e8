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
        // A real browser wants the machine for itself: one file at a time, after all else.
        test: {
          ...common,
          name: 'screens',
          include: ['test/screens/**/*.test.ts'],
          testTimeout: 120_000,
          fileParallelism: false,
          sequence: { groupOrder: 1 },
        },
      },
    ],
  },
});
