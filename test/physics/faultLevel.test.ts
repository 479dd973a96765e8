/** Fault currents against the same network solved with a real short in it, and the laws that every fault keeps. */
import { describe, expect, it } from 'vitest';
import { caseById, type FaultStudy, faultLevel, operatingPoint } from '../../core/api.ts';
import { tables } from '../../data/index.ts';
import type { JobValue, PartValue } from './jobDraft.ts';
import { randomJob, seeds } from './randomJob.ts';
import { seededRandom } from './seededRandom.ts';
import { checked, jobOf, stringOf } from './solveValue.ts';

function study(value: JobValue): FaultStudy {
  return faultLevel({ ...checked(value), tables, method: 'plain' });
}

/** The current in a closed switch without resistance between two junctions, loads off; null where the sums leave it open. */
function shortedA(value: JobValue, ends: { readonly from: string; readonly to: string }): number | null {
  const parts = value.parts.map((part) => (part.kind === 'load' ? { ...part, on: false } : part));
  const short: PartValue = { id: 'the short', kind: 'switch', ratingA: 1e4, ...ends };
  const { job, operatingCase } = checked({ ...value, parts: [...parts, short] });
  const { parts: answers } = operatingPoint({ job, operatingCase, tables, model: 'fast' });
  const { currentA } = new Map<string, { readonly currentA: number | null }>(answers).get('the short')!;
  return currentA === null ? null : Math.abs(currentA);
}

/** How far a study is from solves with a real short, in parts of the current; and how many faults were compared. */
function heldAgainstShort(value: JobValue): { readonly worst: number; readonly compared: number } {
  let worst = 0;
  let compared = 0;
  for (const { junction, to, highest } of study(value).junctions) {
    const expected = shortedA(value, { from: junction, to });
    if (expected === null) continue;
    compared++;
    worst = Math.max(worst, Math.abs((highest?.firstA ?? 0) - expected) / Math.max(1, expected));
  }
  return { worst, compared };
}

/** Only what conducts and drives: the wiring, its diodes, the strings, and the limited sources of `withLimited`. */
function wiringOnly(value: JobValue): JobValue {
  const electronic = ['load', 'inverter', 'charger', 'array', 'controller', 'converter'];
  const parts = value.parts.filter(({ id, kind }) => !electronic.includes(kind) || id.startsWith('limited'));
  return { ...value, parts, cases: [{ id: 'drawn' }] };
}

/** With chargers here and there whose set point no bank comes near: each gives its limit, whatever the volts. */
function withLimited(value: JobValue, seed: number): JobValue {
  const random = seededRandom(seed);
  const loads = value.parts.filter(({ kind }) => kind === 'load');
  const chargers = Array.from({ length: 2 }, (_, k): PartValue => {
    const { plus, minus } = random.pick(loads) as unknown as { readonly plus: string; readonly minus: string };
    return { id: `limited ${k}`, kind: 'charger', plus, minus, outputA: random.between([5, 60]), setpointV: 1000 };
  });
  return { ...value, parts: [...value.parts, ...chargers] };
}

// 1e-9 of the current: two solves of the same sums by different ways, both to about 1e-13 of their largest figures.
const ROUNDING = 1e-9;
/** Two solves of much the same network may differ in the last digits of what has not changed. */
const SAME = 1 + 1e-12;

describe('a fault at every junction', () => {
  it('sends what a real short there carries, in 60 random networks with limited sources', () => {
    const found = seeds({ first: 71_001, count: 60 }).map((seed) =>
      heldAgainstShort(withLimited(randomJob({ seed, partCount: 6 + (seed % 14), linear: true }), seed)),
    );
    expect(Math.max(...found.map(({ worst }) => worst))).toBeLessThan(ROUNDING);
    expect(found.reduce((sum, { compared }) => sum + compared, 0)).toBeGreaterThan(400);
  });

  it('sends nothing backwards through a diode: as a real short does, in 40 networks with diodes', () => {
    const values = seeds({ first: 72_001, count: 260 })
      .map((seed) => wiringOnly(withLimited(randomJob({ seed, partCount: 10 + (seed % 16) }), seed)))
      .filter(({ parts }) => parts.some(({ kind }) => kind === 'diode') && parts.some(({ kind }) => kind === 'string'))
      .slice(0, 40);
    expect(values).toHaveLength(40);
    const found = values.map(heldAgainstShort);
    expect(Math.max(...found.map(({ worst }) => worst))).toBeLessThan(ROUNDING);
    expect(found.reduce((sum, { compared }) => sum + compared, 0)).toBeGreaterThan(300);
  });

  it('is shared among the sources so that each string sends what it does in a real short', () => {
    const parts = [
      stringOf('A', { plus: 'a', minus: 'minus', emfV: 13.1, resistanceOhm: 0.004 }),
      stringOf('B', { plus: 'b', minus: 'minus', emfV: 12.4, resistanceOhm: 0.009 }),
      { id: 'CA', kind: 'cable', from: 'a', to: 'bus', lengthM: 1, resistanceOhm: 0.001 },
      { id: 'CB', kind: 'cable', from: 'b', to: 'bus', lengthM: 1, resistanceOhm: 0.002 },
      { id: 'CF', kind: 'cable', from: 'bus', to: 'far', lengthM: 1, resistanceOhm: 0.003 },
    ];
    const short = { id: 'short', kind: 'switch', from: 'far', to: 'minus' };
    const { job, operatingCase } = checked(jobOf([...parts, short]));
    const solved = operatingPoint({ job, operatingCase, tables, model: 'fast' });
    const far = study(jobOf(parts)).junctions.find(({ junction }) => (junction as string) === 'far')!;
    for (const { part, currentA } of far.highest!.shares) {
      expect(currentA).toBeCloseTo(solved.parts.get(part)!.currentA!, 8);
    }
    expect(far.highest!.shares).toHaveLength(2);
  });
});

describe('the highest and the lowest', () => {
  it('never change places, by either method and with either figures, in 30 random networks of every kind of part', () => {
    const wrong: string[] = [];
    for (const seed of seeds({ first: 73_001, count: 30 })) {
      const base = checked(randomJob({ seed, partCount: 8 + (seed % 18), sized: true }));
      for (const method of ['plain', 'iec-61660'] as const) {
        for (const figures of ['entered', 'bounds'] as const) {
          const { junctions, devices } = faultLevel({ ...base, tables, method, figures });
          for (const { junction, highest, lowest } of junctions) {
            const gap = (lowest?.firstA ?? 0) - (highest?.firstA ?? 0);
            if (gap > 1e-9 || (lowest?.settledA ?? 0) - (highest?.settledA ?? 0) > 1e-9)
              wrong.push(`${seed} ${junction}`);
          }
          for (const each of devices) if ((each.lowestA ?? 0) > each.highestA) wrong.push(`${seed} ${each.device}`);
        }
      }
    }
    expect(wrong).toEqual([]);
  });

  /** Strings of one voltage on a bar, a feeder of three cables with two fuses, a load at its end. */
  function feeder(figures: {
    readonly strings: number;
    readonly lengthM: number;
    readonly stringOhm: number;
  }): JobValue {
    const { strings, lengthM, stringOhm } = figures;
    const bank = Array.from({ length: strings }, (_, k) => [
      stringOf(`S${k}`, { plus: `p${k}`, minus: 'minus', emfV: 12.8, resistanceOhm: stringOhm }),
      { id: `F${k}`, kind: 'fuse', from: `p${k}`, to: 'bar', ratingA: 200 },
    ]).flat();
    const run = { kind: 'pair', size: '10 mm2', lengthM };
    return jobOf([
      ...bank,
      { id: 'MAIN', kind: 'fuse', from: 'bar', to: 'fused', ratingA: 100 },
      { id: 'R1', ...run, from: { plus: 'fused', minus: 'minus' }, to: { plus: 'panel+', minus: 'panel-' } },
      { id: 'BR', kind: 'breaker', from: 'panel+', to: 'branch', ratingA: 20 },
      { id: 'R2', ...run, from: { plus: 'branch', minus: 'panel-' }, to: { plus: 'end+', minus: 'end-' } },
      { id: 'LOAD', kind: 'load', plus: 'end+', minus: 'end-', powerW: 60 },
    ]);
  }

  const common = ['bar', 'fused', 'panel+', 'branch', 'end+'];
  const currents = (value: JobValue, side: 'highest' | 'lowest') => {
    const found = new Map<string, number>(
      study(value).junctions.map((fault) => [fault.junction, fault[side]?.firstA ?? 0] as const),
    );
    return common.map((junction) => found.get(junction)!);
  };
  const pairs = (values: readonly JobValue[]) => values.slice(1).map((value, k) => [values[k]!, value] as const);

  it('the highest never falls when a source is added', () => {
    const grown = [1, 2, 3, 4, 5].map((strings) => feeder({ strings, lengthM: 4, stringOhm: 0.006 }));
    for (const [before, after] of pairs(grown)) {
      const more = currents(after, 'highest');
      currents(before, 'highest').forEach((amps, k) => {
        expect(more[k]).toBeGreaterThanOrEqual(amps / SAME);
      });
    }
  });

  it.each([
    ['a cable grows longer', [1, 2, 5, 10, 30].map((lengthM) => feeder({ strings: 2, lengthM, stringOhm: 0.006 }))],
    ['a battery ages', [0.004, 0.006, 0.01, 0.03].map((stringOhm) => feeder({ strings: 2, lengthM: 4, stringOhm }))],
  ])('neither rises when %s', (_, values) => {
    for (const [before, after] of pairs(values)) {
      for (const side of ['highest', 'lowest'] as const) {
        const less = currents(after, side);
        currents(before, side).forEach((amps, k) => {
          expect(less[k]).toBeLessThanOrEqual(amps * SAME);
        });
      }
      const [was, is] = [study(before).devices, study(after).devices];
      was.forEach((fault, k) => {
        expect(is[k]!.highestA).toBeLessThanOrEqual(fault.highestA * SAME);
        expect(is[k]!.lowestA).toBeLessThanOrEqual(fault.lowestA! * SAME);
      });
    }
  });

  it('a case at rest has the strings alone: chargers and controllers that are off add nothing', () => {
    const value = feeder({ strings: 1, lengthM: 4, stringOhm: 0.006 });
    const charger = { id: 'CHG', kind: 'charger', plus: 'bar', minus: 'minus', outputA: 40, setpointV: 14.4 };
    const { job, operatingCase } = checked({ ...value, parts: [...value.parts, charger] });
    const ask = (one: typeof operatingCase) => faultLevel({ job, operatingCase: one, tables, method: 'plain' });
    const bar = ({ junctions }: FaultStudy) => junctions.find(({ junction }) => (junction as string) === 'bar')!;
    const [on, off] = [bar(ask(operatingCase)), bar(ask(caseById(job, 'at-rest')!))];
    // Beside a bank of 6 mΩ the whole of the charger's 40 A goes into the short.
    expect(on.highest!.firstA).toBeCloseTo(12.8 / 0.006 + 40, 8);
    expect(off.highest!.firstA).toBeCloseTo(12.8 / 0.006, 8);
    expect(on.lowest!.firstA).toBeCloseTo(off.lowest!.firstA, 8);
  });
});
