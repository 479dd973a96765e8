/**
 * How current really splits between parallel strings, through the reader of jobs and the general network, against closed
 * forms, a published circuit solution, a published unit test and a collected table of 1400 shares.
 *
 * N equal strings of resistance R, links r_p (plus) and r_n (minus) between neighbours, x = (r_p + r_n)/R, cosh th = 1 + x/2:
 * both taps at string 1: share_k = 2 sinh(th/2) cosh((N - k + 1/2) th)/sinh(N th); taps on opposite corners with r_p = r_n:
 * share_k = sinh(th/2) cosh((k - (N + 1)/2) th)/sinh(N th/2).
 */
import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import type { JunctionId, OperatingPoint, PartId } from '../../core/api.ts';
import { caseById, operatingPoint, parseJob } from '../../core/api.ts';
import { readRows } from '../../data/chemistry/rows.ts';
import { tables } from '../../data/index.ts';
import { diagonalShares, sameEndShares } from './ladderForms.ts';

interface Branch {
  readonly emfV: number;
  readonly ohm: number;
}
interface Taps {
  readonly plus: number;
  readonly minus: number;
}

const branches = (count: number, branch: Branch) => Array.from({ length: count }, () => branch);

function joint(id: string, from: string, to: string, resistanceOhm: number) {
  return { id, kind: 'joint', from, to, resistanceOhm };
}

function stringsOf(strings: readonly Branch[]) {
  return strings.map(({ emfV, ohm }, index) => ({
    id: `S${index + 1}`,
    kind: 'string',
    chemistry: 'agm',
    blocksInSeries: 1,
    blockNominalV: 12,
    capacityAh: 100,
    emfV,
    resistanceOhm: ohm,
    plus: `P${index + 1}`,
    minus: `N${index + 1}`,
  }));
}

/** A ladder: links between neighbours in both bars, the load tapped at one string's plus and one string's minus. */
function ladder(strings: readonly Branch[], link: { plusOhm: number; minusOhm: number }, taps: Taps, loadA: number) {
  const links = strings
    .slice(1)
    .flatMap((_, index) => [
      ...(link.plusOhm > 0 ? [joint(`LP${index + 1}`, `P${index + 1}`, `P${index + 2}`, link.plusOhm)] : []),
      ...(link.minusOhm > 0 ? [joint(`LN${index + 1}`, `N${index + 1}`, `N${index + 2}`, link.minusOhm)] : []),
    ]);
  const load = { id: 'L', kind: 'load', plus: `P${taps.plus}`, minus: `N${taps.minus}`, currentA: loadA };
  return [...stringsOf(strings), ...links, load];
}

/** A star: every string on its own pair of leads to two common bars; `loadA` 0 leaves the load switched off. */
function star(strings: readonly Branch[], leadOhm: number, loadA: number) {
  const leads = strings.flatMap((_, index) => [
    joint(`AP${index + 1}`, `P${index + 1}`, 'BP', leadOhm / 2),
    joint(`AN${index + 1}`, `N${index + 1}`, 'BN', leadOhm / 2),
  ]);
  const load = { id: 'L', kind: 'load', plus: 'BP', minus: 'BN', currentA: loadA > 0 ? loadA : 1, on: loadA > 0 };
  return [...stringsOf(strings), ...leads, load];
}

function solve(parts: readonly object[]): OperatingPoint {
  const job = { format: 'ohmwright-job', version: 1, title: 'parallel strings', practice: 'iec-land', parts };
  const read = parseJob(JSON.stringify(job));
  if (!read.ok) throw new Error(JSON.stringify(read.issues));
  const operatingCase = caseById(read.value, 'as-drawn')!;
  const point = operatingPoint({ job: read.value, operatingCase, tables, model: 'slow' });
  expect(point.outcome).toBe('solved');
  expect(point.proof.holds).toBe(true);
  return point;
}

function currents(point: OperatingPoint, count: number): readonly number[] {
  return Array.from({ length: count }, (_, index) => point.parts.get(`S${index + 1}` as PartId)!.currentA!);
}

function voltsBetween(point: OperatingPoint, plus: string, minus: string): number {
  return point.junctions.get(plus as JunctionId)! - point.junctions.get(minus as JunctionId)!;
}

/** Largest distance between two lists. */
function apart(found: readonly number[], expected: readonly number[]): number {
  expect(found.length).toBe(expected.length);
  return Math.max(...found.map((value, index) => Math.abs(value - expected[index]!)));
}

/** Shares by closed form; `undefined` where both taps are on a string in the middle. */
function closedForm(count: number, x: number, layout: string): readonly number[] | undefined {
  switch (layout) {
    case 'same_end':
      return sameEndShares(count, x);
    case 'diagonal':
      return diagonalShares(count, x);
    case 'equal_leads_to_busbars':
      return branches(count, STRING).map(() => 1 / count);
    default:
      return undefined;
  }
}

const STRING: Branch = { emfV: 12.8, ohm: 0.005 };
const LOAD_A = 100;

/** A bank of equal strings in one of the table's layouts, and the shares that its strings carry. */
function sharesOf(count: number, x: number, layout: string): readonly number[] {
  const strings = branches(count, STRING);
  const linkOhm = (x * STRING.ohm) / 2;
  const middle = /^both_taps_mid_k=(\d+)$/.exec(layout);
  const tapsByLayout: Readonly<Record<string, Taps>> = {
    same_end: { plus: 1, minus: 1 },
    diagonal: { plus: 1, minus: count },
  };
  const taps = middle === null ? tapsByLayout[layout] : { plus: Number(middle[1]), minus: Number(middle[1]) };
  if (taps === undefined && layout !== 'equal_leads_to_busbars') throw new Error(`no layout ${layout}`);
  const parts =
    taps === undefined
      ? star(strings, 2 * linkOhm, LOAD_A)
      : ladder(strings, { plusOhm: linkOhm, minusOhm: linkOhm }, taps, LOAD_A);
  return currents(solve(parts), count).map((ampere) => ampere / LOAD_A);
}

const data = (name: string) => readRows(name, readFileSync(new URL(`./data/${name}`, import.meta.url), 'utf8'));

interface Bank {
  readonly count: number;
  readonly x: number;
  readonly layout: string;
  readonly percents: number[];
}

function banksOfTable(): readonly Bank[] {
  const banks = new Map<string, Bank>();
  for (const row of data('ladder_shares.csv')) {
    const bank = {
      count: row.number('n_strings'),
      x: row.number('x_link_ratio_(rp+rn)/R'),
      layout: row.text('topology'),
      percents: [],
    };
    const key = `${bank.count} ${bank.x} ${bank.layout}`;
    if (!banks.has(key)) banks.set(key, bank);
    banks.get(key)!.percents.push(row.number('share_percent'));
  }
  return [...banks.values()];
}

describe('shares of equal strings in a ladder', () => {
  const banks = banksOfTable();

  it('the table has 1400 shares of 280 banks of 2 to 8 strings', () => {
    expect(banks.length).toBe(280);
    expect(banks.reduce((sum, { percents }) => sum + percents.length, 0)).toBe(1400);
    for (const { count, percents } of banks) expect(percents.length).toBe(count);
  });

  it('the network gives every share of the table, and the closed forms where there is one', () => {
    for (const { count, x, layout, percents } of banks) {
      const shares = sharesOf(count, x, layout);
      // The table is printed to 0.001 %.
      const printed = shares.map((share) => 100 * share);
      expect(apart(printed, percents)).toBeLessThan(0.00051);
      const closed = closedForm(count, x, layout);
      expect(closed === undefined ? 0 : apart(shares, closed)).toBeLessThan(1e-9);
    }
  });

  it('the greatest link ratios for a given deviation give just that deviation', () => {
    for (const row of data('ladder_thresholds.csv')) {
      const count = row.number('n_strings');
      const limit = row.number('max_relative_deviation_percent');
      const unlimited = row.text('x_max_(rp+rn)/R') === 'unlimited';
      const x = unlimited ? 3 : row.number('x_max_(rp+rn)/R');
      const shares = sharesOf(count, x, row.text('topology'));
      const deviation = 100 * Math.max(...shares.map((share) => Math.abs(share * count - 1)));
      // x is printed to 0.00001: that much of x, as a fraction of it, is open in the deviation. No limit: no deviation at all.
      const [expected, tolerance] = unlimited ? [0, 1e-8] : [limit, limit * (0.0000051 / x + 1e-4)];
      expect(Math.abs(deviation - expected)).toBeLessThan(tolerance);
    }
  });

  it.each([
    [0.001, [37.5, 12.5, 12.5, 37.5]],
    [0.0001, [27.3, 22.7, 22.7, 27.3]],
  ])(
    'four strings of 1 mohm, links of %d ohm, taps on opposite corners (T01, T02: an electrical engineer in a public forum)',
    (linkOhm, expected) => {
      const parts = ladder(
        branches(4, { emfV: 12.8, ohm: 0.001 }),
        { plusOhm: linkOhm, minusOhm: linkOhm },
        { plus: 1, minus: 4 },
        100,
      );
      // Printed to 0.1 A.
      expect(apart(currents(solve(parts), 4), expected)).toBeLessThan(0.05);
    },
  );

  const four = branches(4, { emfV: 12, ohm: 0.02 });
  const links = { plusOhm: 0.0015, minusOhm: 0.0015 };

  it('four strings of 20 mohm, links of 1.5 mohm, taps at one end (T03; a trade article prints 35.9, 26.2, 20.4, 17.8 at 100.3 A)', () => {
    const point = solve(ladder(four, links, { plus: 1, minus: 1 }, 100));
    expect(apart(currents(point, 4), [35.75, 26.12, 20.4, 17.74])).toBeLessThan(0.01);
    expect(Math.abs(voltsBetween(point, 'P1', 'N1') - 11.2849)).toBeLessThan(0.0001);
    // The article, from memory, to its printed digits.
    const article = solve(ladder(four, links, { plus: 1, minus: 1 }, 100.3));
    expect(apart(currents(article, 4), [35.9, 26.2, 20.4, 17.8])).toBeLessThan(0.1);
  });

  it('the same with taps on opposite corners (T04)', () => {
    const point = solve(ladder(four, links, { plus: 1, minus: 4 }, 100));
    expect(apart(currents(point, 4), [26.74, 23.26, 23.26, 26.74])).toBeLessThan(0.01);
    expect(Math.abs(voltsBetween(point, 'P1', 'N1') - 11.4651)).toBeLessThan(0.0001);
    expect(Math.abs(voltsBetween(point, 'P1', 'N4') - 11.2401)).toBeLessThan(0.0001);
  });

  it('a ladder with links in one bar only, first segment included (T05: unit test of an open battery library)', () => {
    // N = 3, Rs = Rc = 10 mohm: Rq = Rc + Rs (Rs + Rc)/(Rc + 2 Rs), R = Rc + Rs Rq/(Rs + Rq) = 16.25 mohm.
    const [rs, rc, loadA] = [0.01, 0.01, 20];
    const parts = [
      ...ladder(branches(3, { emfV: 12, ohm: rs }), { plusOhm: rc, minusOhm: 0 }, { plus: 1, minus: 1 }, loadA),
      joint('LP0', 'P0', 'P1', rc),
      // One minus bar of no resistance.
      { id: 'BAR', kind: 'busbar', junctions: ['N1', 'N2', 'N3'] },
    ].map((part) => ('kind' in part && part.kind === 'load' ? { ...part, plus: 'P0' } : part));
    const point = solve(parts);
    const rq = rc + (rs * (rs + rc)) / (rc + 2 * rs);
    const total = rc + (rs * rq) / (rs + rq);
    expect(total).toBeCloseTo(0.01625, 12);
    expect(apart(currents(point, 3), [12.5, 5, 2.5])).toBeLessThan(1e-6);
    expect(Math.abs(voltsBetween(point, 'P0', 'N1') - (12 - loadA * total))).toBeLessThan(1e-6);
  });
});

describe('unlike strings on common bars', () => {
  const strings: readonly Branch[] = [
    { emfV: 12.73, ohm: 0.005 },
    { emfV: 12.73, ohm: 0.005 },
    { emfV: 12.3, ohm: 0.008 },
  ];
  const leadOhm = 0.001;

  it('at rest the full strings feed the low one with 35.8 A (T23, Kirchhoff)', () => {
    const point = solve(star(strings, leadOhm, 0));
    expect(apart(currents(point, 3), [17.917, 17.917, -35.833])).toBeLessThan(1e-3);
    expect(Math.abs(voltsBetween(point, 'BP', 'BN') - 12.6225)).toBeLessThan(1e-4);
  });

  it('under 100 A the low string is still being charged with 10.8 A (T24, Kirchhoff)', () => {
    const point = solve(star(strings, leadOhm, 100));
    expect(apart(currents(point, 3), [55.417, 55.417, -10.833])).toBeLessThan(1e-3);
    expect(Math.abs(voltsBetween(point, 'BP', 'BN') - 12.3975)).toBeLessThan(1e-4);
  });

  it('5 and 7 mohm with 1 mohm of leads each share 57.1 to 42.9 %', () => {
    const pair = [
      { emfV: 12.8, ohm: 0.005 },
      { emfV: 12.8, ohm: 0.007 },
    ];
    expect(apart(currents(solve(star(pair, 0.001, 100)), 2), [57.1, 42.9])).toBeLessThan(0.05);
  });
});
