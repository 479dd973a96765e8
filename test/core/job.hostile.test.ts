import { describe, expect, test } from 'vitest';
import { parseJob } from '../../core/job/parseJob.ts';
import { hostileJobs } from '../hosts/hostileJobs.ts';

const corpus = hostileJobs();

test('the corpus holds at least 500 different texts', () => {
  expect(corpus.length).toBeGreaterThanOrEqual(500);
  // The dice may fall alike now and then.
  expect(new Set(corpus.map((each) => each.text)).size).toBeGreaterThanOrEqual(500);
});

describe('each hostile text is answered with sentences, at the right place', () => {
  test.each(corpus.map((each, index): [string, number] => [each.name.slice(0, 80), index]))('%s', (_, index) => {
    const { text, path } = corpus[index]!;
    const read = parseJob(text);
    const issues = read.ok ? [] : read.issues;
    expect(issues.length).toBeGreaterThan(0);
    expect(issues.length).toBeLessThanOrEqual(201);
    for (const issue of issues) {
      // A sentence: begins with a word, ends with a stop, holds nothing that a terminal obeys, and is not a page long.
      expect(issue.message).toMatch(/^[\p{L}\p{N}$_(/"-].*[.?)]$/su);
      expect(issue.message).not.toMatch(/[\p{Cc}\p{Cs}\u202a-\u202e]/u);
      expect(issue.message).not.toMatch(/undefined|\[object|NaN (?!is no number)|node:internal| at .*:\d+:\d+/);
      expect(issue.message.length).toBeLessThan(700);
      expect(issue.path.length).toBeLessThan(400);
      expect(issue.path).not.toMatch(/[\p{Cc}\p{Cs}]/u);
    }
    // The trouble itself, something in it, or the field that holds it.
    const near = (reported: string): boolean =>
      reported !== '' && (reported.startsWith(path ?? '') || (path ?? '').startsWith(reported));
    expect(path === undefined || issues.some((issue) => near(issue.path))).toBe(true);
  });
  test('and nothing of it reached the objects of the program', () => {
    expect(({} as Record<string, unknown>)['polluted']).toBeUndefined();
  });
});
