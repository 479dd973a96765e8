/**
 * A volt walk and its working by hand. 12 V at rest behind 10 mOhm, a 20 mOhm lead out, a 30 mOhm lead back, a load of 1.14 Ohm:
 *
 *   I = 12 V / (0.010 + 0.020 + 0.030 + 1.140) Ohm = 12 / 1.2 = 10 A
 *   sag 10 A x 0.010 Ohm = 0.1 V; out 0.2 V; load 11.4 V; back 0.3 V;  12 - 0.1 - 0.2 - 11.4 - 0.3 = 0
 */
import { describe, expect, it } from 'vitest';
import {
  type JunctionId,
  junctionBalance,
  operatingPoint,
  type PartId,
  parseJob,
  partWorking,
  voltWalk,
} from '../../core/api.ts';
import { tables } from '../../data/index.ts';

const parsed = parseJob(
  JSON.stringify({
    format: 'ohmwright-job',
    version: 1,
    title: 'One loop, by hand',
    practice: 'iec-land',
    junctions: { N: { reference: true } },
    parts: [
      {
        id: 'B',
        kind: 'string',
        plus: 'P',
        minus: 'N',
        chemistry: 'agm',
        blocksInSeries: 1,
        blockNominalV: 12,
        capacityAh: 100,
        emfV: 12,
        resistanceOhm: 0.01,
      },
      { id: 'OUT', kind: 'cable', from: 'P', to: 'A', lengthM: 2, resistanceOhm: 0.02 },
      { id: 'L', kind: 'load', plus: 'A', minus: 'M', resistanceOhm: 1.14 },
      { id: 'BACK', kind: 'cable', from: 'M', to: 'N', lengthM: 3, resistanceOhm: 0.03 },
    ],
  }),
);
if (!parsed.ok) throw new Error(JSON.stringify(parsed.issues));
const job = parsed.value;
const operatingCase = job.cases[0]!;
const point = operatingPoint({ job, operatingCase, tables, model: 'slow' });
const id = (text: string) => text as PartId;

/** A dozen sums of figures near 12 V: each is good to some 1e-15 V. */
const DIGITS = 12;

describe('one loop walked through', () => {
  const walk = voltWalk({ job, operatingCase, point, load: id('L') });
  if (!walk.ok) throw new Error(walk.reason);

  it('rises by the rest volts and falls by sag, lead, load and lead back to where it began', () => {
    const changes = walk.steps.map(({ kind, side, part, changeV }) => [kind, side, part, Number(changeV.toFixed(9))]);
    expect(changes).toStrictEqual([
      ['source', 'source', 'B', 12],
      ['sag', 'source', 'B', -0.1],
      ['part', 'out', 'OUT', -0.2],
      ['load', 'load', 'L', -11.4],
      ['part', 'back', 'BACK', -0.3],
    ]);
    expect(walk.closureV).toBeCloseTo(0, DIGITS);
  });

  it('names the volts lost out, back, inside and at the load, and the watts of each step', () => {
    expect(walk.emfV).toBe(12);
    expect(walk.totals.outV).toBeCloseTo(0.2, DIGITS);
    expect(walk.totals.backV).toBeCloseTo(0.3, DIGITS);
    expect(walk.totals.sagV).toBeCloseTo(0.1, DIGITS);
    expect(walk.totals.loadV).toBeCloseTo(11.4, DIGITS);
    expect(walk.totals.otherSourcesV).toBe(0);
    const watts = walk.steps.map(({ powerW }) => Number(powerW!.toFixed(9)));
    // 12 V x 10 A = 120 W, of which 1 W warms the battery, 2 W and 3 W the leads, 114 W reach the load.
    expect(watts).toStrictEqual([120, 1, 2, 114, 3]);
  });

  it('stands at the potential of each junction, 0 V at the reference', () => {
    const ends = walk.steps.map(({ to, endV }) => [to, Number(endV.toFixed(9))]);
    expect(ends).toStrictEqual([
      [null, 12],
      ['P', 11.9],
      ['A', 11.7],
      ['M', 0.3],
      ['N', 0],
    ]);
  });
});

describe('the working of the loop', () => {
  it('of a cable: resistance, drop, heat', () => {
    const lines = partWorking({ job, part: id('OUT'), operatingCase, point, tables });
    const said = lines.map(({ formula, withValues }) => `${formula}: ${withValues}`);
    expect(said.slice(1)).toStrictEqual([
      'R = R_measured + R_ends / n: 0.02 Ω + 0 Ω / 1 = 0.02 Ω',
      'V = I · R: 10 A × 0.02 Ω = 0.2 V',
      'P = I² · R: (10 A)² × 0.02 Ω = 2 W',
    ]);
  });

  it('of the string: rest volts less current times resistance', () => {
    const lines = partWorking({ job, part: id('B'), operatingCase, point, tables });
    const terminals = lines.find(({ answers }) => answers === 'voltageV')!;
    expect(terminals.withValues).toBe('12 V − 10 A × 0.01 Ω = 11.9 V');
    const rate = lines.find(({ name }) => name === 'Rate')!;
    expect(rate.result).toStrictEqual({ value: expect.closeTo(0.1, DIGITS) as number, unit: '1/h' });
  });

  it('of a junction: what the lead brings, the load takes', () => {
    const balance = junctionBalance({ job, operatingCase, point, junction: 'A' as JunctionId });
    expect(balance.currents.map(({ part, currentA }) => [part, Number(currentA.toFixed(9))])).toStrictEqual([
      ['OUT', 10],
      ['L', -10],
    ]);
    expect(balance.sumA).toBeCloseTo(0, DIGITS);
    expect(balance.group).toStrictEqual(['A']);
  });
});

describe('zero-ohm parts side by side', () => {
  const twin = parseJob(
    JSON.stringify({
      format: 'ohmwright-job',
      version: 1,
      title: 'Two closed switches side by side',
      practice: 'iec-land',
      parts: [
        {
          id: 'B',
          kind: 'string',
          plus: 'P',
          minus: 'N',
          chemistry: 'agm',
          blocksInSeries: 1,
          blockNominalV: 12,
          capacityAh: 100,
          emfV: 12,
          resistanceOhm: 0.2,
        },
        { id: 'S1', kind: 'switch', from: 'P', to: 'A' },
        { id: 'S2', kind: 'switch', from: 'P', to: 'A' },
        { id: 'L', kind: 'load', plus: 'A', minus: 'N', resistanceOhm: 1 },
      ],
    }),
  );
  if (!twin.ok) throw new Error(JSON.stringify(twin.issues));
  const twinCase = twin.value.cases[0]!;
  const at = {
    job: twin.value,
    operatingCase: twinCase,
    point: operatingPoint({ job: twin.value, operatingCase: twinCase, tables, model: 'slow' }),
  };

  it('count as one junction, with the parts named whose share is open', () => {
    const balance = junctionBalance({ ...at, junction: 'P' as JunctionId });
    expect(balance.group).toStrictEqual(['P', 'A']);
    expect(balance.undetermined).toStrictEqual(['S1', 'S2']);
    // 12 V / 1.2 Ohm = 10 A in by the string, out by the load.
    expect(balance.currents.map(({ part, currentA }) => [part, Number(currentA.toFixed(9))])).toStrictEqual([
      ['B', 10],
      ['L', -10],
    ]);
    expect(balance.sumA).toBeCloseTo(0, DIGITS);
  });

  it('are walked through at no volts, with no current claimed', () => {
    const walk = voltWalk({ ...at, load: id('L') });
    if (!walk.ok) throw new Error(walk.reason);
    const step = walk.steps.find(({ side }) => side === 'out')!;
    expect([step.changeV, step.currentA, step.powerW]).toStrictEqual([0, null, 0]);
  });

  it('say in their working why their current is not determined', () => {
    const [current, ...others] = partWorking({ ...at, part: id('S1'), tables });
    expect(current!.result.value).toBeNull();
    expect(current!.notDetermined).toMatch(/side by side/);
    expect(others.map(({ result }) => result.value)).toStrictEqual([0, 0, 0]);
  });
});
