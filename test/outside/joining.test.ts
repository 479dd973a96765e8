/**
 * Two strings joined, against published and collected values and against an independent integration by a general solver of
 * differential equations (mathjs, Dormand and Prince's Runge-Kutta pair, adaptive). T-numbers are those of the collected list of
 * check values.
 */
import { all, create } from 'mathjs';
import { describe, expect, it } from 'vitest';
import { type RcElement, rcModel } from '../../core/battery/rc.ts';
import { joiningOf } from '../../core/strings/joining/joining.ts';
import { chargeLine, Settling, type SettlingSide } from '../../core/strings/joining/settling.ts';
import { type StraightLine, valueAt } from '../../core/strings/joining/straightLine.ts';
import { tables } from '../../data/index.ts';
import { makeString } from '../core/batteryMaker.ts';
import { jobOf } from '../core/joiningJobs.ts';

/** The solver, which mathjs' own types leave out. */
interface Solver {
  solveODE(
    slopes: (t: number, y: readonly number[]) => readonly number[],
    span: readonly [number, number],
    start: readonly number[],
    options: { readonly method: 'RK45'; readonly tol: number; readonly minStep: number },
  ): { readonly t: readonly number[]; readonly y: readonly (readonly number[])[] };
}
const { solveODE } = create(all!) as unknown as Solver;

const CAPACITY_AH = 100;

interface Block {
  readonly curve: StraightLine;
  readonly ohm: number;
  readonly elements: readonly RcElement[];
}

/** A 100 Ah block at a state of charge. */
function block({ curve, ohm, elements }: Block, stateOfCharge: number): SettlingSide {
  return {
    instantOhm: ohm,
    elements,
    emf: chargeLine(curve, { capacityAh: CAPACITY_AH, stateOfCharge }),
    givesC: stateOfCharge * CAPACITY_AH * 3600,
  };
}

const parameter = (name: string) => tables.chemistry.parameterSets.get('LFP-4S-100Ah')!.get(name)!.value;
/** Taborelli and Onori 2013, four cells of 100 Ah. */
const published: readonly RcElement[] = [
  { resistanceOhm: parameter('Rct'), tauS: parameter('tau_ct') },
  { resistanceOhm: parameter('Rdiff'), tauS: parameter('tau_diff') },
];
const ironPhosphate = tables.chemistry.otherEmf.get('lfp_pseudo_c32')!.points.map(({ stateOfCharge, value }) => ({
  x: stateOfCharge,
  y: 4 * value,
}));
const lfp: Block = { curve: ironPhosphate, ohm: 0.004, elements: published };
const lfpInstantOnly: Block = { ...lfp, elements: [] };
/** dE/dSoC 1.25 V, as T28 has it. */
const lead: Block = {
  curve: [
    { x: 0, y: 11.4 },
    { x: 1, y: 12.65 },
  ],
  ohm: 0.005,
  elements: [],
};

const joined = (kind: Block, [high, low]: readonly [number, number], leadOhm = 0) =>
  new Settling({ a: block(kind, high), b: block(kind, low), leadOhm });

/** |figure / expected - 1| within a fraction. */
function expectWithin(figure: number, expected: number, fraction: number): void {
  expect(Math.abs(figure / expected - 1)).toBeLessThan(fraction);
}

describe('collected values of two blocks joined', () => {
  it('T28: lead-acid full to half, loop 12 mohm: 52.1 A, 1728 s, 25 Ah', () => {
    const settling = joined(lead, [1, 0.5], 0.002);
    expectWithin(settling.inrushA, 52.1, 0.005);
    expectWithin(settling.movedAh, 25, 0.005);
    // One time constant leaves 1/e of the current; ln 20 of them move 95 %.
    expectWithin(settling.currentAt(1728), settling.inrushA / Math.E, 0.005);
    expectWithin(settling.settleS, 1728 * Math.log(20), 0.005);
    // Section 2.4 prints 50 A at 60 s, 6.5 A and 22 Ah at one hour, and 28 kJ of heat: its last digits.
    expect(settling.currentAt(60)).toBeCloseTo(50.3, 1);
    expect(settling.currentAt(3600)).toBeCloseTo(6.5, 1);
    expect(settling.movedAhAt(3600)).toBeCloseTo(21.9, 1);
    expectWithin(3.6 * settling.lostWh, 28, 0.02);
  });

  it('T29: iron phosphate 98 % to 20 % with the published elements: 53.4 A, 18.9 A at 60 s, 8.8 A at one hour', () => {
    const settling = joined(lfp, [0.98, 0.2]);
    expectWithin(settling.inrushA, 53.4, 0.02);
    expectWithin(settling.currentAt(60), 18.9, 0.02);
    expectWithin(settling.currentAt(3600), 8.8, 0.02);
    expectWithin(settling.movedAhAt(3600), 11.5, 0.02);
  });

  it('T29 with the first-instant resistance alone: 49.8 A at 60 s, 12.7 A at one hour', () => {
    const settling = joined(lfpInstantOnly, [0.98, 0.2]);
    expectWithin(settling.currentAt(60), 49.8, 0.02);
    expectWithin(settling.currentAt(3600), 12.7, 0.02);
    expectWithin(settling.movedAhAt(3600), 26, 0.02);
  });

  it('iron phosphate 98 % to 2 %: 242 A, 59 A at 60 s, 12 A and 21 Ah at one hour', () => {
    // Tolerance: the last digit that the table of section 2.4 prints.
    const settling = joined(lfp, [0.98, 0.02]);
    expect(settling.inrushA).toBeCloseTo(242, -0.3);
    expect(settling.currentAt(60)).toBeCloseTo(59, -0.3);
    expect(settling.currentAt(3600)).toBeCloseTo(12, -0.3);
    expect(settling.movedAhAt(3600)).toBeCloseTo(21, -0.3);
  });

  it('T30: iron phosphate at 60 % and 40 % is 33 mV apart, 4 A at first and 1.2 Ah after an hour of 10 Ah in all', () => {
    const apartV = valueAt(ironPhosphate, 0.6) - valueAt(ironPhosphate, 0.4);
    expect(Math.abs(1000 * apartV - 33)).toBeLessThan(1);
    const settling = joined(lfp, [0.6, 0.4]);
    expect(Math.abs(settling.inrushA - 4)).toBeLessThan(0.5);
    expect(Math.abs(settling.currentAt(60) - 1.5)).toBeLessThan(0.1);
    expect(Math.abs(settling.currentAt(3600) - 1)).toBeLessThan(0.1);
    expect(Math.abs(settling.movedAhAt(3600) - 1.2)).toBeLessThan(0.05);
    expectWithin(settling.movedAh, 10, 1e-9);
  });
});

/** Current at each time by the general solver: state is the charge moved and the volts of every element of both sides. */
function integrated(sides: { a: SettlingSide; b: SettlingSide; leadOhm: number }, times: readonly number[]): number[] {
  const { a, b, leadOhm } = sides;
  const elements = [...a.elements, ...b.elements];
  const ohm = a.instantOhm + b.instantOhm + leadOhm;
  const currentOf = ([movedC = 0, ...elementV]: readonly number[]) =>
    (valueAt(a.emf, movedC) - valueAt(b.emf, -movedC) - elementV.reduce((sum, volts) => sum + volts, 0)) / ohm;
  const slopes = (_: number, y: readonly number[]) => {
    const currentA = currentOf(y);
    return [currentA, ...elements.map(({ resistanceOhm, tauS }, k) => (currentA * resistanceOhm - y[k + 1]!) / tauS)];
  };
  let y: readonly number[] = [0, ...elements.map(() => 0)];
  let from = 0;
  return times.map((to) => {
    if (to > from) {
      const run = solveODE(slopes, [from, to], y, { method: 'RK45', tol: 1e-7, minStep: 1e-9 });
      y = run.y.at(-1)!;
      from = to;
    }
    return currentOf(y);
  });
}

describe('the settling curve is that of a general solver of differential equations', () => {
  const bare = jobOf([]);
  // The low knee of iron phosphate, where it settles within the hour: the solver's steps are held small by the fastest element.
  it.each([
    ['lead-acid', 'agm', 12, [1, 0.4]],
    ['iron phosphate', 'lfp', 12.8, [0.12, 0.04]],
  ] as const)(
    '%s: every time that is printed, direct and through the resistor, to 0.1 %%',
    (_, chemistry, volts, at) => {
      const blockOf = { chemistry, blocksInSeries: 1, blockNominalV: volts, capacityAh: CAPACITY_AH };
      const sides = { a: { block: blockOf, charge: at[0] }, b: { block: blockOf, charge: at[1] } };
      const answer = joiningOf({ job: bare, tables, ...sides });
      if ('missing' in answer) throw new Error(answer.missing);
      const { curve, resistor } = answer;
      // The same two blocks, from the tables: rest voltages at their points, resistances of the battery model.
      const side = (stateOfCharge: number): SettlingSide => {
        const string = makeString({ chemistry, blockNominalV: volts, stateOfCharge });
        const model = rcModel(string, { ambientDegC: 25, tables: tables.chemistry });
        const cells = chemistry === 'lfp' ? 4 : 6;
        const points = tables.chemistry.emf[chemistry].points.map((point) => ({
          x: point.stateOfCharge,
          y: cells * point.value,
        }));
        return block({ curve: points, ohm: model.instantOhm, elements: model.elements }, stateOfCharge);
      };
      const times = curve.map(({ seconds }) => seconds);
      const pair = { a: side(at[0]), b: side(at[1]) };
      const direct = integrated({ ...pair, leadOhm: 0.002 }, times);
      const slowed = integrated({ ...pair, leadOhm: 0.002 + resistor!.ohm }, times);
      expect(times).toHaveLength(60);
      curve.forEach(({ currentA, withResistorA }, k) => {
        expectWithin(currentA, direct[k]!, 0.001);
        expectWithin(withResistorA!, slowed[k]!, 0.001);
      });
    },
  );

  it.each([0.001, 0.05])('iron phosphate from knee to knee over its plateau, lead of %d ohm, to 0.1 %%', (leadOhm) => {
    const sides = { a: block(lfp, 0.99), b: block(lfp, 0.15), leadOhm };
    const settling = new Settling(sides);
    const times = [0.1, 1, 3, 10, 30, 100, 300, 1000, 3000, 10_000];
    integrated(sides, times).forEach((currentA, k) => {
      expectWithin(settling.currentAt(times[k]!), currentA, 0.001);
    });
  });
});
