/**
 * The study of layouts against what is known of ladders: closed forms (`ladderForms.ts`), a published circuit solution, a published unit
 * test, a collected table of shares and of the link ratios that keep a deviation, and the general network with the same layout drawn.
 */
import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import type { Layout, LayoutStudy } from '../../core/api.ts';
import { caseById, layoutsOf, parseJob } from '../../core/api.ts';
import { readRows } from '../../data/chemistry/rows.ts';
import { tables } from '../../data/index.ts';
import { diagonalShares, sameEndShares } from './ladderForms.ts';

interface Bank {
  readonly emfV: readonly number[];
  readonly ohm: readonly number[];
  readonly linkOhm: number;
}
interface Taps {
  readonly plus: number;
  readonly minus: number;
}
const alike = (count: number, ohm: number, linkOhm: number, emfV = 12.8): Bank => ({
  emfV: Array.from({ length: count }, () => emfV),
  ohm: Array.from({ length: count }, () => ohm),
  linkOhm,
});

const link = (id: string, from: string, to: string, resistanceOhm: number) => ({
  id,
  kind: 'cable',
  from,
  to,
  lengthM: 0.25,
  resistanceOhm,
});

function stringsOf({ emfV, ohm }: Bank) {
  return emfV.map((volts, k) => ({
    id: `S${k + 1}`,
    kind: 'string',
    chemistry: 'agm',
    blocksInSeries: 1,
    blockNominalV: 12,
    capacityAh: 100,
    emfV: volts,
    resistanceOhm: ohm[k]!,
    plus: `P${k + 1}`,
    minus: `N${k + 1}`,
  }));
}

const load = (plus: string, minus: string, currentA: number) => ({ id: 'L', kind: 'load', plus, minus, currentA });

function ladder(bank: Bank, taps: Taps, loadA: number): readonly object[] {
  const links = bank.ohm
    .slice(1)
    .flatMap((_, k) => [
      link(`LP${k + 1}`, `P${k + 1}`, `P${k + 2}`, bank.linkOhm),
      link(`LN${k + 1}`, `N${k + 1}`, `N${k + 2}`, bank.linkOhm),
    ]);
  return [...stringsOf(bank), ...links, load(`P${taps.plus}`, `N${taps.minus}`, loadA)];
}

type Options = Partial<Parameters<typeof layoutsOf>[0]>;

function study(parts: readonly object[], options: Options = {}): LayoutStudy {
  const read = parseJob(JSON.stringify({ format: 'ohmwright-job', version: 1, practice: 'iec-land', parts }));
  if (!read.ok) throw new Error(JSON.stringify(read.issues));
  const operatingCase = caseById(read.value, 'as-drawn')!;
  const found = layoutsOf({ job: read.value, tables, operatingCase, model: 'slow', ...options });
  if (found === null) throw new Error('no study');
  return found;
}

function layout({ layouts }: LayoutStudy, name: string): Layout {
  const found = layouts.find((one) => one.name === name);
  if (found === undefined) throw new Error(`no layout ${name} among ${layouts.map((one) => one.name).join('; ')}`);
  return found;
}

const currents = ({ strings }: Layout) => strings.map(({ currentA }) => currentA);
const shares = ({ strings }: Layout) => strings.map(({ share }) => share);

/** Largest distance between two lists, as a fraction of what is expected. */
function apart(found: readonly number[], expected: readonly number[]): number {
  expect(found.length).toBe(expected.length);
  return Math.max(...found.map((value, k) => Math.abs(value / expected[k]! - 1)));
}
/** The same in amps, volts or per cent. */
function off(found: readonly number[], expected: readonly number[]): number {
  expect(found.length).toBe(expected.length);
  return Math.max(...found.map((value, k) => Math.abs(value - expected[k]!)));
}

const OHM = 0.005;
/** Of the count and link ratio; the drawing is tapped somewhere else than where the layouts are looked at. */
const equalBank = (count: number, x: number) =>
  study(ladder(alike(count, OHM, (x * OHM) / 2), { plus: 1, minus: 2 }, 100));
const corner = (count: number) => `plus at S1, minus at S${count} (opposite ends)`;

describe('layouts of equal strings', () => {
  const ratios = [0.02, 0.15, 0.5, 2];

  it.each([2, 3, 4, 5, 6, 7, 8])(
    '%d strings: same end, opposite ends, equal leads by the closed forms to 1e-9',
    (count) => {
      for (const x of ratios) {
        const found = equalBank(count, x);
        expect(apart(shares(layout(found, 'both taps at S1')), sameEndShares(count, x))).toBeLessThan(1e-9);
        const otherEnd = sameEndShares(count, x).toReversed();
        expect(apart(shares(layout(found, `both taps at S${count}`)), otherEnd)).toBeLessThan(1e-9);
        expect(apart(shares(layout(found, corner(count))), diagonalShares(count, x))).toBeLessThan(1e-9);
        const even = Array.from({ length: count }, () => 1 / count);
        expect(apart(shares(layout(found, 'equal leads to two bars')), even)).toBeLessThan(1e-9);
      }
    },
  );

  it.each([4, 8])('a halving tree of %d shares evenly whatever its legs', (count) => {
    for (const x of ratios) {
      const even = Array.from({ length: count }, () => 1 / count);
      expect(apart(shares(layout(equalBank(count, x), 'halving tree')), even)).toBeLessThan(1e-9);
    }
  });

  it('every pair of taps is there once, as drawn first and then by rising spread', () => {
    const { layouts, strings } = equalBank(8, 0.1);
    expect(strings).toEqual(['S1', 'S2', 'S3', 'S4', 'S5', 'S6', 'S7', 'S8']);
    expect(layouts.length).toBe(1 + 64 + 2);
    expect(new Set(layouts.map(({ name }) => name)).size).toBe(layouts.length);
    expect(layouts[0]!.kind).toBe('as-drawn');
    const spreads = layouts.slice(1).map(({ spread }) => spread);
    expect(spreads).toEqual(spreads.toSorted((a, b) => a - b));
  });

  it('of layouts that share alike the best is the one with the least cable, and the bank as drawn needs none', () => {
    // Four blocks 0.25 m apart. On each pole a tree has four legs of half a spacing and two of a whole one, a star four leads of 1.5.
    const four = equalBank(4, 0.15);
    expect(four.best).toBe('halving tree');
    expect(layout(four, 'halving tree').cableM).toBeCloseTo(2, 9);
    expect(layout(four, 'equal leads to two bars').cableM).toBeCloseTo(3, 9);
    expect(layout(four, corner(4)).cableM).toBeCloseTo(1.5, 9);
    expect(study(ladder(alike(2, OHM, 0.0005), { plus: 1, minus: 2 }, 100)).best).toBe('as drawn');
  });

  const data = (name: string) => readRows(name, readFileSync(new URL(`./data/${name}`, import.meta.url), 'utf8'));
  /** A layout by its name in the tables. */
  const byTopology = (found: LayoutStudy, topology: string): Layout => {
    if (topology === 'equal_leads_to_busbars') return layout(found, 'equal leads to two bars');
    const middle = /^both_taps_mid_k=(\d+)$/.exec(topology)?.[1] ?? '1';
    const minus = topology === 'diagonal' ? found.strings.at(-1)! : `S${middle}`;
    return found.layouts.find((one) => one.plusAt === `S${middle}` && one.minusAt === minus)!;
  };

  it('all 1400 shares of the collected table', () => {
    const studies = new Map<string, LayoutStudy>();
    for (const row of data('ladder_shares.csv')) {
      const [count, x] = [row.number('n_strings'), row.number('x_link_ratio_(rp+rn)/R')];
      const key = `${count} ${x}`;
      const found = studies.get(key) ?? equalBank(count, x);
      studies.set(key, found);
      const place = row.number('string_k_1=nearest_positive_tap') - 1;
      const share = byTopology(found, row.text('topology')).strings[place]!.share;
      // Printed to 0.001 %.
      expect(Math.abs(100 * share - row.number('share_percent'))).toBeLessThan(0.00051);
    }
    expect(studies.size).toBe(70);
  });

  it('both taps on the second of four strings, x = 0.15: 23.5 and 30.0 % on either side of it', () => {
    const found = layout(equalBank(4, 0.15), 'both taps at S3 (middle)');
    expect(
      off(
        shares(found).map((share) => 100 * share),
        [20.4, 23.5, 30, 26.1],
      ),
    ).toBeLessThan(0.05);
    expect(found.kind).toBe('middle');
  });

  it('the greatest link ratios for a given deviation give just that spread', () => {
    for (const row of data('ladder_thresholds.csv')) {
      const count = row.number('n_strings');
      const limit = row.number('max_relative_deviation_percent');
      const isUnlimited = row.text('x_max_(rp+rn)/R') === 'unlimited';
      const x = isUnlimited ? 3 : row.number('x_max_(rp+rn)/R');
      const { spread } = byTopology(equalBank(count, x), row.text('topology'));
      // x is printed to 0.00001: that much of x, as a fraction of it, is open in the deviation. No limit: no deviation at all.
      const [expected, tolerance] = isUnlimited ? [0, 1e-8] : [limit, limit * (0.0000051 / x + 1e-4)];
      expect(Math.abs(100 * spread - expected)).toBeLessThan(tolerance);
    }
  });
});

describe('published ladders through the study', () => {
  it.each([
    [0.001, [37.5, 12.5, 12.5, 37.5]],
    [0.0001, [27.3, 22.7, 22.7, 27.3]],
  ])('four strings of 1 mohm, links of %d ohm, opposite corners (T01, T02: a public forum)', (linkOhm, expected) => {
    const found = study(ladder(alike(4, 0.001, linkOhm), { plus: 1, minus: 1 }, 100));
    // Printed to 0.1 A.
    expect(off(currents(layout(found, corner(4))), expected)).toBeLessThan(0.05);
  });

  it('four strings of 20 mohm, links of 1.5 mohm: currents and volts at one end and across corners (T03, T04)', () => {
    const found = study(ladder(alike(4, 0.02, 0.0015, 12), { plus: 2, minus: 3 }, 100));
    const [sameEnd, diagonal] = [layout(found, 'both taps at S1'), layout(found, corner(4))];
    expect(off(currents(sameEnd), [35.75, 26.12, 20.4, 17.74])).toBeLessThan(0.01);
    expect(off(currents(diagonal), [26.74, 23.26, 23.26, 26.74])).toBeLessThan(0.01);
    expect(off([sameEnd.bankV, diagonal.bankV], [11.2849, 11.2401])).toBeLessThan(0.0001);
    // Bank resistance at the taps: all heat is I^2 R of it, the strings being at one EMF.
    expect(off([sameEnd.lostW, diagonal.lostW], [1e4 * 0.007151, 1e4 * 0.007599])).toBeLessThan(0.01);
  });

  it('three strings of 10 mohm, 10 mohm of links in one bar only (T05: unit test of an open battery library)', () => {
    // The share is set by both bars together: 5 mohm in each are 10 mohm in one. Behind the first segment of the test, 16.25 - 10 mohm.
    const found = layout(
      study(ladder(alike(3, 0.01, 0.001, 12), { plus: 2, minus: 2 }, 20), { linkOhm: 0.005 }),
      'both taps at S1',
    );
    expect(off(currents(found), [12.5, 5, 2.5])).toBeLessThan(1e-9);
    expect(off([found.bankV], [12 - 20 * 0.00625])).toBeLessThan(1e-9);
    // The same as it is drawn, with links in the plus bar alone.
    const drawn = ladder(alike(3, 0.01, 0.01, 12), { plus: 1, minus: 1 }, 20).filter(
      (part) => !('id' in part && String(part.id).startsWith('LN')),
    );
    const asDrawn = study([...drawn, { id: 'BAR', kind: 'busbar', junctions: ['N1', 'N2', 'N3'] }]);
    expect(off(currents(layout(asDrawn, 'as drawn')), [12.5, 5, 2.5])).toBeLessThan(1e-9);
    expect(asDrawn.assumed.join(' ')).toContain('Only the plus posts have links as drawn');
  });
});

describe('layouts of unlike strings against the general network with the same layout drawn', () => {
  const bank: Bank = {
    emfV: [12.73, 12.6, 12.68, 12.9, 12.5],
    ohm: [0.006, 0.011, 0.009, 0.005, 0.014],
    linkOhm: 0.0007,
  };
  const places = [1, 2, 3, 4, 5];
  /** Rounding of two ways to the same sums, of 12 V and of some hundred amps. */
  const SAME = 1e-8;

  function same(found: Layout, drawn: Layout): void {
    expect(off(currents(found), currents(drawn))).toBeLessThan(SAME);
    expect(off([found.bankV, found.lostW, found.spread], [drawn.bankV, drawn.lostW, drawn.spread])).toBeLessThan(SAME);
    expect(found.worst).toBe(drawn.worst);
  }

  it('every pair of taps', () => {
    const found = study(ladder(bank, { plus: 3, minus: 4 }, 150));
    for (const plus of places) {
      for (const minus of places) {
        const tapped = found.layouts.find(({ plusAt, minusAt }) => plusAt === `S${plus}` && minusAt === `S${minus}`)!;
        same(tapped, study(ladder(bank, { plus, minus }, 150)).layouts[0]!);
      }
    }
  });

  it('a fuse and a bad joint at a post go with their string wherever it is tapped', () => {
    const withDevices = (taps: Taps): readonly object[] => {
      const fuse = { id: 'F', kind: 'fuse', from: 'post', to: 'lug', ratingA: 200, resistanceOhm: 0.0006 };
      const joint = { id: 'J', kind: 'joint', from: 'lug', to: 'P5', resistanceOhm: 0.001 };
      const moved = ladder(bank, taps, 150).map((part) =>
        'id' in part && part.id === 'S5' ? { ...part, plus: 'post' } : part,
      );
      return [...moved, fuse, joint];
    };
    const found = study(withDevices({ plus: 2, minus: 3 }));
    same(layout(found, 'both taps at S5'), study(withDevices({ plus: 5, minus: 5 })).layouts[0]!);
    same(layout(found, 'both taps at S1'), study(withDevices({ plus: 1, minus: 1 })).layouts[0]!);
  });

  it('chargers at the other end', () => {
    const charger = (plus: string, minus: string) => ({
      id: 'CH',
      kind: 'charger',
      plus,
      minus,
      outputA: 40,
      // Far above: it gives its limit and nothing else.
      setpointV: 30,
    });
    const found = study([...ladder(bank, { plus: 1, minus: 1 }, 150), charger('P1', 'N1')]);
    const apart = found.layouts.find(({ plusAt, minusAt, chargePlusAt }) => {
      return plusAt === 'S1' && minusAt === 'S1' && chargePlusAt === 'S5';
    })!;
    expect(apart.name).toBe('loads: both taps at S1; chargers: both taps at S5');
    // Where two feeds leave a drawing, its volts are those of the larger, the loads.
    same(apart, study([...ladder(bank, { plus: 1, minus: 1 }, 150), charger('P5', 'N5')]).layouts[0]!);
    expect(found.bankA).toBeCloseTo(110, 9);
  });

  it('equal leads and a halving tree of five', () => {
    const options = { spacingM: 0.5, linkOhm: 0.0007 };
    const found = study(ladder(bank, { plus: 3, minus: 4 }, 150), options);
    const perM = 0.0014;
    const both = (name: string, to: (pole: string) => readonly (readonly [string, string, number])[]) =>
      ['P', 'N'].flatMap((pole) => to(pole).map(([a, b, lengthM]) => link(`${name}${pole}${a}`, a, b, perM * lengthM)));
    // Five blocks half a metre apart: the one at the end is one metre from the middle.
    const leads = both('W', (pole) => places.map((k) => [`${pole}${k}`, `${pole}B`, 1] as const));
    const star = study([...stringsOf(bank), ...leads, load('PB', 'NB', 150)]).layouts[0]!;
    same(layout(found, 'equal leads to two bars'), star);
    // ((1 2) 3) (4 5): blocks at 0, 0.5 … 2 m; pairs join at 0.25 and 1.75, 1 2 3 at 0.5, all at 1.
    const legs = both('T', (pole) => [
      [`${pole}1`, `${pole}a`, 0.25],
      [`${pole}2`, `${pole}a`, 0.25],
      [`${pole}a`, `${pole}b`, 0.5],
      [`${pole}3`, `${pole}b`, 0.5],
      [`${pole}4`, `${pole}c`, 0.25],
      [`${pole}5`, `${pole}c`, 0.25],
      [`${pole}b`, `${pole}d`, 0.75],
      [`${pole}c`, `${pole}d`, 0.75],
    ]);
    const tree = study([...stringsOf(bank), ...legs, load('Pd', 'Nd', 150)]).layouts[0]!;
    // Legs that carry two branches are not the bank's own wiring as drawn: only currents and volts across the strings are compared.
    expect(off(currents(layout(found, 'halving tree')), currents(tree))).toBeLessThan(SAME);
  });
});

describe('where there is nothing to lay out', () => {
  const draw = (parts: readonly object[]) => {
    const read = parseJob(JSON.stringify({ format: 'ohmwright-job', version: 1, practice: 'iec-land', parts }));
    if (!read.ok) throw new Error(JSON.stringify(read.issues));
    return layoutsOf({ job: read.value, tables, operatingCase: caseById(read.value, 'as-drawn')!, model: 'slow' });
  };

  it('one string, or a bank that carries less than a fiftieth of its capacity an hour, has no study', () => {
    expect(draw(ladder(alike(1, OHM, 0), { plus: 1, minus: 1 }, 50))).toBeNull();
    expect(draw(ladder(alike(2, OHM, 0.001), { plus: 1, minus: 1 }, 3.9))).toBeNull();
    expect(draw(ladder(alike(2, OHM, 0.001), { plus: 1, minus: 1 }, 4.1))).not.toBeNull();
  });
});
