import { defineConfig } from 'vitest/config';

/** Continuous integration names a file for the counts; a person at a terminal needs none. */
const countsFile = process.env['TEST_COUNTS'];

const common = { pool: 'forks' as const, testTimeout: 60_000, hookTimeout: 120_000 };

export default defineConfig({
  test: {
    reporters: countsFile === undefined ? ['default'] : ['default', ['json', { outputFile: countsFile }]],
    projects: [
      {
        // Pure code leaves nothing behind: its files share what they have loaded.
        test: {
          ...common,
          name: 'pure',
          include: ['test/{architecture,core,golden,hand,outside,page,physics}/**/*.test.ts'],
          isolate: false,
          sequence: { groupOrder: 0 },
        },
      },
      {
        test: {
          ...common,
          name: 'hosts',
          include: ['test/hosts/**/*.test.ts'],
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
