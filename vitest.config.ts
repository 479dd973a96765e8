import { defineConfig } from 'vitest/config';

/** Continuous integration names a file for the counts; a person at a terminal needs none. */
const countsFile = process.env['TEST_COUNTS'];

export default defineConfig({
  test: {
    pool: 'forks',
    include: ['test/**/*.test.ts'],
    testTimeout: 60_000,
    hookTimeout: 120_000,
    reporters: countsFile === undefined ? ['default'] : ['default', ['json', { outputFile: countsFile }]],
  },
});
