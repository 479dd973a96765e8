import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { checkJob, parseJob } from '../../core/job/parseJob.ts';
import { hostileJobs } from '../hosts/hostileJobs.ts';
import { everyKind } from './jobEveryKind.ts';

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

describe('values that are no JSON at all, as a screen might hand them over', () => {
  const anyValue = fc.anything({
    withBigInt: true,
    withDate: true,
    withMap: true,
    withNullPrototype: true,
    withObjectString: true,
    withSet: true,
    withSparseArray: true,
    withTypedArray: true,
  });
  type Holder = Record<string, unknown>;
  /** Puts a value somewhere into the job: goes down by the steps as far as there is something to go into. */
  function put(job: Holder, steps: readonly number[], value: unknown): void {
    let holder = job;
    let name = '';
    for (const step of steps) {
      const names = Object.keys(holder);
      name = names[step % names.length] ?? 'x';
      const below = holder[name];
      if (typeof below !== 'object' || below === null || Object.keys(below).length === 0) break;
      if (step % 5 !== 0) holder = below as Holder;
    }
    holder[Object.hasOwn(holder, name) ? name : Object.keys(holder)[0]!] = value;
  }
  test('never make it throw, and what is refused is refused with a sentence', () => {
    fc.assert(
      fc.property(fc.array(fc.nat(1000), { minLength: 1, maxLength: 6 }), anyValue, (steps, value) => {
        const job = everyKind();
        put(job, steps, value);
        const read = checkJob(job);
        const messages = read.ok ? [] : read.issues.map((issue) => issue.message);
        expect(messages.filter((message) => !/[.?)]$/.test(message) || message.length > 700)).toEqual([]);
      }),
      { seed: 51, numRuns: 3000 },
    );
  });
  test('a job that holds itself is refused, not followed for ever', () => {
    const job = everyKind();
    job['site'] = job;
    job.parts[0]!['range'] = job.parts[0];
    job.cases[0]!['set'] = { S1: job };
    expect(checkJob(job).ok).toBe(false);
  });
});
