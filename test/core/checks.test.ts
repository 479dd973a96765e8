/** The list of rules, and how a report is put together. */
import { describe, expect, test } from 'vitest';
import { rules } from '../../core/checks/rules.ts';
import { runChecks } from '../../core/checks/runChecks.ts';
import type { Practice } from '../../core/job/job.ts';
import { operatingPoint } from '../../core/network/operatingPoint.ts';
import { tables } from '../../data/index.ts';
import { battery, check, found, gaps, jobOf, oneCircuit, passes, type RawJob } from './checksJob.ts';

const PRACTICES: readonly Practice[] = ['us-land', 'us-marine', 'iso-marine', 'iec-land'];
/** Words that no verdict may use. */
const FORBIDDEN = /\b(?:compliant|compliance|complies|approved|approval|safe|safely|safety)\b/i;

/** A job with something wrong in almost every way. */
const troubled: RawJob = {
  practice: 'us-land',
  site: { ambientDesignDegC: 30, ambientMinDegC: -20 },
  parts: [
    battery('B1', { maxDischargeA: 100, maxChargeA: 20, temperatureDegC: -5 }),
    battery('B2', { plus: 'N', minus: 'P' }),
    { id: 'F1', kind: 'fuse', from: 'P', to: 'Q', ratingA: 400, ratingV: 10 },
    { id: 'OUT', kind: 'cable', from: 'Q', to: 'L', lengthM: 5, size: '10 AWG' },
    {
      id: 'L1',
      kind: 'load',
      plus: 'L',
      minus: 'N',
      currentA: 90,
      maximumV: 13,
      dropClass: 'critical',
      continuous: true,
    },
    { id: 'L2', kind: 'load', plus: 'N', minus: 'L', currentA: 1, on: false },
    { id: 'I1', kind: 'inverter', plus: 'P', minus: 'N', ratedW: 2000, acPowerW: 500, surgeW: 90_000, cutoffV: 15.9 },
    { id: 'C1', kind: 'charger', plus: 'P', minus: 'N', outputA: 200, setpointV: 16 },
    { id: 'SH', kind: 'shunt', from: 'L', to: 'L3', ratingA: 10, ratingMv: 50 },
    { id: 'L3', kind: 'load', plus: 'L3', minus: 'N', currentA: 12, maximumV: 15, minimumV: 8 },
    { id: 'L4', kind: 'load', plus: 'NOWHERE', minus: 'N', currentA: 12 },
  ],
};
/** The same without the reversed string, so that it solves. */
const solvable: RawJob = { ...troubled, parts: troubled.parts.filter(({ id }) => id !== 'B2') };

describe('every rule', () => {
  test('has an id of its own, in plain words joined by hyphens', () => {
    const ids = rules.map(({ id }) => id);
    expect(new Set(ids).size).toBe(ids.length);
    for (const id of ids) expect(id).toMatch(/^[a-z]+(?:-[a-z0-9]+)+$/);
  });

  test('says what it compares, what it is about, and what to do, in one sentence', () => {
    const wanting = rules.filter(
      ({ title, compares, remedy, kinds }) =>
        !/^[A-Z].*[^.]$/.test(title) || compares.length <= 20 || !/^[A-Z][^.]*\.$/.test(remedy) || kinds.length === 0,
    );
    expect(wanting.map(({ id }) => id)).toEqual([]);
  });

  test.each(PRACTICES)('has a basis with its source and status under %s', (practice) => {
    const judge = { job: jobOf({ practice, parts: [battery('B1')] }), tables, practice: tables.practices[practice] };
    const wanting = rules.filter((rule) => {
      const { text, source, status } = rule.basisFor(judge);
      const isKnown = ['published', 'common-practice', 'from-memory'].includes(status);
      return text.length <= 10 || !/^SRC-[A-Z0-9-]+$/.test(source) || !isKnown;
    });
    expect(wanting.map(({ id }) => id)).toEqual([]);
  });

  test('of a book prints the books and editions that the job is judged by', () => {
    const job = jobOf({
      practice: 'us-land',
      practiceEdition: 'NEC 2020 as adopted by the county',
      parts: [battery('B1')],
    });
    const byBook = rules.filter(({ byPractice }) => byPractice);
    expect(byBook.length).toBeGreaterThan(4);
    for (const rule of byBook) {
      const { text } = rule.basisFor({ job, tables, practice: tables.practices['us-land'] });
      expect(`${rule.id}: ${text}`).toContain('judged by NEC 2020 as adopted by the county');
    }
  });

  test('keeps clear of words that promise what no check can', () => {
    for (const { title, compares, remedy } of rules) {
      for (const text of [title, compares, remedy]) expect(text).not.toMatch(FORBIDDEN);
    }
    for (const practice of PRACTICES) {
      for (const job of [troubled, solvable]) {
        const { findings, notChecked } = check({ ...job, practice });
        expect(findings.length).toBeGreaterThan(10);
        for (const { message, basis } of findings) expect(`${message} ${basis}`).not.toMatch(FORBIDDEN);
        for (const { missing } of notChecked) expect(missing).not.toMatch(FORBIDDEN);
      }
    }
  });
});

describe('a report', () => {
  test('a troubled job sets off most rules, and every finding has finite figures, a remedy, a basis and a known part', () => {
    const report = check(solvable);
    const fired = new Set(report.findings.map(({ rule }) => rule));
    const expected = [
      'cable-overloaded',
      'charge-too-strong',
      'charger-volts-off',
      'cold-charge',
      'drop-too-big',
      'fuse-over-cable',
      'load-overfed',
      'load-starved',
      'load-unfed',
      'no-fuse-on-source',
      'part-never-used',
      'polarity-crossed',
      'shunt-small',
      'small-wire-cap',
      'string-charge-high',
      'surge-sag',
      'volts-rating-low',
    ];
    expect([...fired]).toEqual(expect.arrayContaining(expected));
    const ids = new Set(solvable.parts.map(({ id }) => id));
    for (const finding of report.findings) {
      expect(finding.measured.value).toSatisfy(Number.isFinite);
      expect(finding.limit.value).toSatisfy(Number.isFinite);
      expect(finding.message).toMatch(/^[A-Z].*\.$/);
      expect(finding.message).not.toMatch(/not finite|undefined|NaN|null/);
      expect(finding.remedy).toMatch(/\.$/);
      expect(finding.basis).not.toBe('');
      for (const part of finding.parts) expect(ids).toContain(part);
    }
  });

  test('stands worst first', () => {
    const order = ['stop', 'fix', 'look', 'note'];
    for (const job of [troubled, solvable]) {
      const ranks = check(job).findings.map(({ severity }) => order.indexOf(severity));
      const sorted = [...ranks];
      sorted.sort((a, b) => a - b);
      expect(ranks).toEqual(sorted);
      expect(new Set(ranks).size).toBeGreaterThan(2);
    }
  });

  test('within one severity the larger excess comes first', () => {
    const cable = (id: string, to: string) => ({
      id,
      kind: 'cable',
      from: 'P',
      to,
      lengthM: 1,
      size: '16 mm2',
      insulationDegC: 70,
    });
    const load = (id: string, plus: string, currentA: number) => ({ id, kind: 'load', plus, minus: 'N', currentA });
    // 16 mm² PVC, enclosed: 69 A.
    const parts = [battery('B1'), cable('A', 'X'), load('L1', 'X', 75), cable('B', 'Y'), load('L2', 'Y', 80)];
    expect(found(check({ parts }), 'cable-overloaded').map(({ parts }) => parts[0])).toEqual(['B', 'A']);
  });

  test('is the same each time', () => {
    expect(JSON.stringify(check(solvable))).toBe(JSON.stringify(check(solvable)));
  });

  test('tells one rule and part once, of all cases the worst', () => {
    const cases = [{ id: 'a' }, { id: 'b', set: { L1: { currentA: 95 } } }];
    const report = check({ ...solvable, cases });
    const keys = report.findings.map(({ rule, parts }) => `${rule} ${parts[0]!} ${parts[1] ?? ''}`);
    expect(new Set(keys).size).toBe(keys.length);
    expect(found(report, 'cable-overloaded')[0]!.case).toBe('b');
  });

  test('a job that names no practice is judged by no book: those rules are all not done', () => {
    const report = check({ ...solvable, practice: undefined });
    const kinds = new Set(solvable.parts.map(({ kind }) => kind));
    const byBook = rules.filter((rule) => rule.byPractice && rule.kinds.some((kind) => kinds.has(kind)));
    expect(byBook.length).toBeGreaterThan(4);
    for (const { id } of byBook) {
      expect([id, found(report, id), passes(report, id), gaps(report, id)]).toEqual([
        id,
        [],
        0,
        ['practice of the job: which rule book judges it'],
      ]);
    }
    expect(found(report, 'no-fuse-on-source')).toHaveLength(1);
  });

  test('a rule says nothing about a job without the parts that it judges', () => {
    const report = check({ parts: [battery('B1'), { id: 'L1', kind: 'load', plus: 'P', minus: 'N', powerW: 90_000 }] });
    expect(report.notChecked.map(({ rule }) => rule)).not.toContain('shunt-small');
    expect(report.notChecked.map(({ rule }) => rule)).toContain('string-discharge-high');
  });

  test('a case that cannot be solved leaves the others judged, and is named as not checked', () => {
    const cases = [{ id: 'calm' }, { id: 'too-much', set: { L1: { powerW: 100_000 } } }];
    const report = check(oneCircuit({ cases, load: { powerW: 100 } }));
    expect(found(report, 'load-collapse')[0]).toMatchObject({ severity: 'stop', case: 'too-much' });
    expect(gaps(report, 'fuse-under-current')).toEqual([
      'operating point of case too-much: a load asks for more than the network can deliver',
    ]);
    expect(passes(report, 'fuse-under-current')).toBe(1);
  });
});

describe('what a report is made from', () => {
  const parts = [
    {
      id: 'B1',
      kind: 'string',
      plus: 'P',
      minus: 'N',
      chemistry: 'flooded',
      blocksInSeries: 1,
      blockNominalV: 12,
      capacityAh: 100,
    },
    { id: 'L1', kind: 'load', plus: 'P', minus: 'N', currentA: 60, minimumV: 12.69 },
  ];
  const job = jobOf({ parts });
  const starved = (report: ReturnType<typeof runChecks>) => found(report, 'load-starved')[0]!.measured.value;
  const solved = (model: 'slow' | 'fast') =>
    operatingPoint({ job, operatingCase: job.cases[0]!, tables, model }).parts.get(job.parts[1]!.id)!.voltageV;

  test('cases are solved with the resistance of minutes unless a model is asked for', () => {
    expect(solved('slow')).not.toBe(solved('fast'));
    // The load drops out, so the volts told are those of a second solve with the same model.
    const held = jobOf({ parts: [parts[0]!, { ...parts[1]!, minimumV: undefined }] });
    const volts = (model: 'slow' | 'fast') =>
      operatingPoint({ job: held, operatingCase: held.cases[0]!, tables, model }).parts.get(held.parts[1]!.id)!
        .voltageV;
    expect(starved(runChecks({ job, tables }))).toBe(volts('slow'));
    expect(starved(runChecks({ job, tables, model: 'fast' }))).toBe(volts('fast'));
  });

  test('answers that are handed in are used, whatever model they were solved with', () => {
    const points = [operatingPoint({ job, operatingCase: job.cases[0]!, tables, model: 'fast' })];
    expect(runChecks({ job, tables, points })).toEqual(runChecks({ job, tables, model: 'fast' }));
  });

  test('an answer whose proof does not hold is not judged', () => {
    const [point] = [operatingPoint({ job, operatingCase: job.cases[0]!, tables, model: 'slow' })];
    const broken = { ...point, proof: { ...point.proof, holds: false } };
    const report = runChecks({ job, tables, points: [broken] });
    expect(found(report, 'load-starved')).toEqual([]);
    expect(gaps(report, 'load-starved')).toEqual([
      'operating point of case as-drawn: its proof of balance does not hold',
    ]);
  });

  test('only the cases asked for are judged', () => {
    const two = jobOf({ parts, cases: [{ id: 'a' }, { id: 'b', set: { L1: { on: false } } }] });
    const report = runChecks({ job: two, tables, cases: two.cases.slice(1) });
    expect(found(report, 'load-starved')).toEqual([]);
  });
});
