/** Drift runs against an independent integration, and against themselves: order, books, determinism. */
import { all, create } from 'mathjs';
import { describe, expect, it } from 'vitest';
import { type CheckedJob, checkJob, type DriftStudy, driftOf, parseJob, usualCycle } from '../../core/api.ts';
import { examples } from '../../data/examples/index.ts';
import { tables } from '../../data/index.ts';
import { type BankString, drifted, driftJob, stringPart } from './driftBank.ts';
import { randomJob, seeds } from './randomJob.ts';

/** Books are asked to balance to 1e-9 of the throughput, or a billionth of an hour's amp or watt where nothing flows. */
function expectBalance({ books }: DriftStudy): void {
  expect(books.mismatchAh).toBeLessThanOrEqual(1e-9 * books.throughputAh + 1e-9);
  expect(books.mismatchWh).toBeLessThanOrEqual(1e-9 * books.throughputWh + 1e-9);
}

const charger = { id: 'charger', kind: 'charger', plus: 'P', minus: 'N', outputA: 20, setpointV: 60 };

describe('a drift run converges with the square of its step', () => {
  // Between 0.5 and 0.75 of charge every table of an AGM block is one straight line: no corner hides the order.
  const bank = (stateOfCharge: number) => [
    stringPart({ id: 'A', capacityAh: 80, stateOfCharge }),
    stringPart({ id: 'B', capacityAh: 200, stateOfCharge, resistanceOhm: 0.03 }),
  ];
  const endOf = (job: CheckedJob, stepS: number) =>
    drifted(job, [{ case: 'on', hours: 8000 / 3600 }], { stepS }).cycleEnds[0]![0]!;

  it.each([
    ['on discharge', [...bank(0.74), { id: 'load', kind: 'load', plus: 'P', minus: 'N', powerW: 150 }]],
    ['on charge, polarisation and gassing at work', [...bank(0.52), charger]],
  ])('%s', (_way, parts) => {
    const job = driftJob(parts, [{ id: 'on' }]);
    const exact = endOf(job, 1600 / 64);
    const errors = [1600, 800, 400, 200].map((stepS) => Math.abs(endOf(job, stepS) - exact));
    // Above rounding, so that there is something to measure.
    expect(errors[3]).toBeGreaterThan(1e-10);
    for (let k = 1; k < errors.length; k++) {
      const ratio = errors[k - 1]! / errors[k]!;
      expect(ratio).toBeGreaterThan(3.4);
      expect(ratio).toBeLessThan(4.6);
    }
  });
});

describe('a drift run agrees with a Runge-Kutta integration of its equations, written from the contract, to 0.1 %', () => {
  const math = create(all!) as unknown as { solveODE: (...given: unknown[]) => { readonly y: number[][] } };
  const between = (points: readonly { readonly at: number; readonly value: number }[], x: number): number => {
    const k = Math.max(
      1,
      points.findIndex(({ at }) => at >= x),
    );
    const [p, q] = [points[k - 1]!, points[k]!];
    return p.value + ((q.value - p.value) * (x - p.at)) / (q.at - p.at);
  };
  const restV = (chemistry: 'agm' | 'lfp', cells: number, s: number) =>
    cells *
    between(
      tables.chemistry.emf[chemistry].points.map(({ stateOfCharge, value }) => ({ at: stateOfCharge, value })),
      s,
    );

  /** Charge at the end, by mathjs; `rate` is ds/dt, 1/h. */
  function integrated(start: readonly number[], hours: number, rate: (s: readonly number[]) => number[]): number[] {
    const solved = math.solveODE((_t: number, s: number[]) => rate(s), [0, hours], [...start], {
      method: 'RK45',
      tol: 1e-6,
      maxStep: 0.25,
    });
    return solved.y.at(-1)!;
  }

  const strings: readonly (BankString & { resistanceOhm: number })[] = [
    { id: 'A', capacityAh: 60, resistanceOhm: 0.03, stateOfCharge: 0.95, chemistry: 'lfp' },
    { id: 'B', capacityAh: 150, resistanceOhm: 0.012, stateOfCharge: 0.75, chemistry: 'lfp' },
  ];

  it('two unlike iron phosphate strings at unlike charge, emptied into a resistance', () => {
    const ohm = 0.7;
    const job = driftJob(
      [...strings.map(stringPart), { id: 'load', kind: 'load', plus: 'P', minus: 'N', resistanceOhm: ohm }],
      [{ id: 'on' }],
    );
    // V (1/R + 1/R1 + 1/R2) = E1/R1 + E2/R2. Corners of the curve and an exchange at first: steps of a minute.
    const found = drifted(job, [{ case: 'on', hours: 6 }], { stepS: 60 }).cycleEnds[0]!;
    const expected = integrated([0.95, 0.75], 6, (s) => {
      const emf = strings.map((_, k) => restV('lfp', 4, s[k]!));
      const siemens = strings.map(({ resistanceOhm }) => 1 / resistanceOhm);
      const v = (emf[0]! * siemens[0]! + emf[1]! * siemens[1]!) / (1 / ohm + siemens[0]! + siemens[1]!);
      return strings.map(({ capacityAh }, k) => {
        const currentA = (emf[k]! - v) * siemens[k]!;
        return -(currentA < 0 ? 0.995 * currentA : currentA) / capacityAh;
      });
    });
    for (const [k, s] of expected.entries()) expect(Math.abs(found[k]! / s - 1)).toBeLessThan(1e-3);
  });

  it('two lead strings under a constant charge current, with Shepherd polarisation and gassing', () => {
    const lead = [
      { id: 'A', capacityAh: 80, resistanceOhm: 0.05, stateOfCharge: 0.4 },
      { id: 'B', capacityAh: 120, resistanceOhm: 0.02, stateOfCharge: 0.5 },
    ];
    const job = driftJob([...lead.map(stringPart), charger], [{ id: 'on' }]);
    const found = drifted(job, [{ case: 'on', hours: 4 }], { stepS: 300 }).cycleEnds[0]!;
    const kept = tables.chemistry.chargeKept.agm;
    const expected = integrated([0.4, 0.5], 4, (s) => {
      const emf = lead.map((_, k) => restV('agm', 6, s[k]!));
      const ohm = lead.map(({ resistanceOhm }, k) => resistanceOhm * (1 + (0.888 * s[k]!) / (1.001 - s[k]!)));
      const first = (20 * ohm[1]! + emf[1]! - emf[0]!) / (ohm[0]! + ohm[1]!);
      return [first, 20 - first].map((chargeA, k) => (between(kept, s[k]!) * chargeA) / lead[k]!.capacityAh);
    });
    for (const [k, s] of expected.entries()) expect(Math.abs(found[k]! / s - 1)).toBeLessThan(1e-3);
  });
});

describe('the books of a drift run balance to 1e-9 of the throughput', () => {
  it.each(examples.map(({ name, text }) => [name, text] as const))('on the usual days of %s', (_name, text) => {
    const parsed = parseJob(text);
    if (!parsed.ok) throw new Error('an example is read');
    const job = parsed.value;
    const request = usualCycle({ job, tables })!;
    expect(request.cycle.reduce((sum, { hours }) => sum + hours, 0)).toBe(24);
    const study = driftOf({ job, tables, request: { ...request, cycles: 3 } });
    expect(study.hours).toBeCloseTo(72, 6);
    expect(study.books.throughputAh).toBeGreaterThan(1);
    expect(study.moments.length).toBeLessThanOrEqual(1300);
    expect(study.moments.at(-1)!.hours).toBeCloseTo(72, 6);
    for (const { lowestCharge, highestCharge, endCharge } of study.strings) {
      expect(lowestCharge).toBeGreaterThanOrEqual(0);
      expect(highestCharge).toBeLessThanOrEqual(1);
      expect(endCharge).toBeGreaterThanOrEqual(lowestCharge);
    }
    expectBalance(study);
  });

  it('on random networks of all kinds of parts', () => {
    let ran = 0;
    for (const seed of seeds({ first: 4000, count: 40 })) {
      const checked = checkJob(randomJob({ seed, partCount: 24 }));
      if (!checked.ok) throw new Error(`job ${seed} is a job`);
      const job = checked.value;
      if (!job.parts.some(({ kind }) => kind === 'string')) continue;
      const cycle = [
        { case: 'drawn', hours: 5 },
        { case: 'at-rest', hours: 3 },
      ];
      expectBalance(driftOf({ job, tables, request: { cycle, cycles: 2, stepS: 1800 } }));
      ran += 1;
    }
    expect(ran).toBeGreaterThan(30);
  });
});

it('the same run twice is the same run, and tells its progress cycle by cycle', () => {
  const parsed = parseJob(examples.find(({ name }) => name === 'ridge-cabin')!.text);
  if (!parsed.ok) throw new Error('an example is read');
  const job = parsed.value;
  const request = { ...usualCycle({ job, tables })!, cycles: 2 };
  const told: number[] = [];
  const first = driftOf({ job, tables, request, progress: (done, of) => told.push(done / of) });
  expect(told).toEqual([0.5, 1]);
  expect(driftOf({ job, tables, request })).toEqual(first);
});

it('a long run is thinned by whole cycles, the last one kept', () => {
  const job = driftJob(
    [
      stringPart({ id: 'A', capacityAh: 100, stateOfCharge: 0.8 }),
      { id: 'load', kind: 'load', plus: 'P', minus: 'N', currentA: 0.3, on: false },
    ],
    [{ id: 'on', set: { load: { on: true } } }],
  );
  const cycle = [
    { case: 'on', hours: 1 },
    { case: 'at-rest', hours: 2 },
  ];
  const { moments, cycleEnds, steps, strings } = drifted(job, cycle, { cycles: 200 });
  expect(steps).toBeGreaterThan(2600);
  expect(moments.length).toBeLessThanOrEqual(1300);
  expect(moments.length).toBeGreaterThan(300);
  expect(moments[0]!.hours).toBeLessThan(0.1);
  expect(moments.at(-1)!.hours).toBeCloseTo(600, 6);
  expect(cycleEnds).toHaveLength(200);
  // 200 x 0.3 Ah of 100 Ah.
  expect(strings[0]!.endCharge).toBeCloseTo(0.2, 9);
});
