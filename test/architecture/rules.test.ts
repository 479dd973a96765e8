/** What every rule must have: a basis under each practice, a remedy, a decision about what may be tried, and a test at its limit. */
import { readFileSync, writeFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { describe, expect, test } from 'vitest';
import { rules } from '../../core/checks/rules.ts';
import type { Practice } from '../../core/job/job.ts';
import { tables } from '../../data/index.ts';
import { battery, jobOf } from '../core/checksJob.ts';
import { ruleTable, TABLE_END, TABLE_START } from './ruleTable.ts';
import { isBoundaryTest, ruleTests, testsOfRule } from './ruleTests.ts';

const PRACTICES: readonly Practice[] = ['us-land', 'us-marine', 'iso-marine', 'iec-land'];
const root = fileURLToPath(new URL('../..', import.meta.url));
const tests = ruleTests();

/** Rules that ask a yes-or-no question: there is no figure to be exactly at. Each still has its tests. */
const YES_OR_NO: readonly string[] = [
  'polarity-crossed',
  'load-collapse',
  'load-unfed',
  'group-unconnected',
  'part-never-used',
  'end-open',
  'no-fuse-on-source',
  'string-unfused',
  'both-poles-open-system',
  'fuse-in-earthed-pole',
  'starter-cable-shared',
  'source-without-isolator',
  'switch-not-breaking',
  'auto-reset',
  'wrong-metal-or-solid',
  'interrupt-unknown',
  'ac-part-on-dc',
  'pv-wrong-way',
  'spring-or-crocodile-clip',
  'bare-live-stud',
  'spark-near-gas',
  'battery-loose',
  'battery-by-fuel',
  'ring-feed',
  'two-source-box',
];

describe('every rule', () => {
  test.each(PRACTICES)('has a basis with a source and a status under %s', (practice) => {
    const judge = { job: jobOf({ practice, parts: [battery('B1')] }), tables, practice: tables.practices[practice] };
    const wanting = rules.filter((rule) => {
      const { text, source, status } = rule.basisFor(judge);
      return text.length <= 10 || !source.startsWith('SRC-') || status === undefined;
    });
    expect(wanting.map(({ id }) => id)).toEqual([]);
  });

  test('has a remedy in one sentence', () => {
    expect(rules.filter(({ remedy }) => !/^[A-Z][^.]+\.$/.test(remedy)).map(({ id }) => id)).toEqual([]);
  });

  test('has an entry among the ladders of changes, or stands there among those for which nothing can be tried', () => {
    const source = readFileSync(`${root}core/remedy/laddersFor.ts`, 'utf8');
    const wanting = rules.filter(({ id }) => !source.includes(`'${id}': `) && !source.includes(`\`${id}\``));
    expect(wanting.map(({ id }) => id)).toEqual([]);
  });

  test('has a test with a figure exactly at its limit, or asks yes or no', () => {
    const wanting = rules.filter(({ id }) => {
      const own = testsOfRule(id, tests);
      return YES_OR_NO.includes(id) ? own.length === 0 : !own.some(isBoundaryTest);
    });
    expect(wanting.map(({ id }) => id)).toEqual([]);
  });

  test('that asks yes or no is a rule, and has no figure', () => {
    const ids = rules.map(({ id }) => id);
    expect(YES_OR_NO.filter((id) => !ids.includes(id))).toEqual([]);
    expect(YES_OR_NO.filter((id) => testsOfRule(id, tests).some(isBoundaryTest))).toEqual([]);
  });
});

describe('the table of rules in DEVELOPERS.md', () => {
  test('is what the rules say; OHMWRIGHT_WRITE_GOLDEN=1 writes it anew', () => {
    const path = `${root}DEVELOPERS.md`;
    const page = readFileSync(path, 'utf8');
    const [start, end] = [page.indexOf(TABLE_START), page.indexOf(TABLE_END)];
    expect(start).toBeGreaterThan(0);
    expect(end).toBeGreaterThan(start);
    const wanted = `${TABLE_START}\n\n${ruleTable(tests)}\n\n`;
    if (process.env['OHMWRIGHT_WRITE_GOLDEN'] === '1') {
      writeFileSync(path, page.slice(0, start) + wanted + page.slice(end));
      return;
    }
    expect(page.slice(start, end)).toBe(wanted);
  });
});
