/**
 * Collected check values of protection (T-numbers name the row; each computed by its author from the stated law, or printed by the source
 * named) that no other file here holds: the breaker table of ABYC E-11 as a supplier reproduces it, strings side by side, constant powers,
 * a midpoint, charge volts by temperature.
 */
import { describe, expect, it } from 'vitest';
import { caseById, chargeWindow, type OperatingPoint, operatingPoint, type PartId } from '../../core/api.ts';
import { tables } from '../../data/index.ts';
import { battery, check, found, jobOf, passes, type RawJob } from '../core/checksJob.ts';

function solved(raw: RawJob): OperatingPoint {
  const job = jobOf(raw);
  return operatingPoint({ job, operatingCase: caseById(job, 'as-drawn')!, tables, model: 'slow' });
}
const amps = (point: OperatingPoint, id: string) => point.parts.get(id as PartId)!.currentA!;
const volts = (point: OperatingPoint, id: string) => point.parts.get(id as PartId)!.voltageV!;

describe('T7: least interrupting capacity by cranking amperes (ABYC E-11, older edition, as reproduced by a supplier)', () => {
  const boat = (crankingA: number, main: number, branch: number) =>
    check({
      practice: 'us-marine',
      parts: [
        battery('B1', { chemistry: 'flooded', blockNominalV: 12, emfV: 12.7, crankingA }),
        { id: 'MAIN', kind: 'breaker', from: 'P', to: 'Q', ratingA: 50, interruptA: main },
        { id: 'BRANCH', kind: 'breaker', from: 'Q', to: 'L', ratingA: 10, interruptA: branch },
        { id: 'L1', kind: 'load', plus: 'L', minus: 'N', currentA: 5 },
      ],
    });

  it.each([
    [650, 1500, 750],
    [800, 3000, 1500],
    [1100, 3000, 1500],
    [1101, 5000, 2500],
  ])(
    '%f cranking amperes: main exactly %f A and branch exactly %f A pass breaker-under-table, a little less does not',
    (crankingA, main, branch) => {
      expect(passes(boat(crankingA, main, branch), 'breaker-under-table')).toBe(2);
      const short = found(boat(crankingA, main - 1, branch - 1), 'breaker-under-table');
      expect(short.map(({ severity }) => severity)).toEqual(['fix', 'fix']);
      expect(new Map(short.map(({ parts, limit }) => [parts[0] as string, limit.value]))).toEqual(
        new Map([
          ['MAIN', main],
          ['BRANCH', branch],
        ]),
      );
    },
  );

  it('breaker-under-table judges nothing of batteries without cranking amperes, and is a look where the book has no such table', () => {
    const house = boat(800, 100, 100);
    expect(found(house, 'breaker-under-table')).toHaveLength(2);
    const land = check({
      practice: 'us-land',
      parts: [
        battery('B1', { chemistry: 'flooded', blockNominalV: 12, emfV: 12.7, crankingA: 800 }),
        { id: 'MAIN', kind: 'breaker', from: 'P', to: 'Q', ratingA: 50, interruptA: 2000 },
        { id: 'L1', kind: 'load', plus: 'Q', minus: 'N', currentA: 5 },
      ],
    });
    expect(found(land, 'breaker-under-table').map(({ severity }) => severity)).toEqual(['look']);
    const deep = check({
      practice: 'us-marine',
      parts: [
        battery('B1'),
        { id: 'MAIN', kind: 'breaker', from: 'P', to: 'Q', ratingA: 50, interruptA: 100 },
        { id: 'L1', kind: 'load', plus: 'Q', minus: 'N', currentA: 5 },
      ],
    });
    expect([found(deep, 'breaker-under-table'), passes(deep, 'breaker-under-table')]).toEqual([[], 0]);
  });

  it('breaker-under-table is not checked without the interrupting rating', () => {
    const report = check({
      practice: 'us-marine',
      parts: [
        battery('B1', { chemistry: 'flooded', blockNominalV: 12, emfV: 12.7, crankingA: 800 }),
        { id: 'MAIN', kind: 'breaker', from: 'P', to: 'Q', ratingA: 50 },
        { id: 'L1', kind: 'load', plus: 'Q', minus: 'N', currentA: 5 },
      ],
    });
    const missing = report.notChecked.filter(({ rule }) => rule === 'breaker-under-table');
    expect(missing.map((gap) => gap.missing)).toEqual(['interruptA of breaker MAIN']);
  });
});

describe('strings side by side, by Kirchhoff', () => {
  const string = (id: string, emfV: number, resistanceOhm: number) => battery(id, { emfV, resistanceOhm });
  const load = (currentA: number, on = true) => ({ id: 'L', kind: 'load', plus: 'P', minus: 'N', currentA, on });

  it('T15: 13.4 V and 12.6 V behind 6 mΩ each exchange 66.67 A at rest, the bus at 13.000 V', () => {
    const point = solved({ parts: [string('A', 13.4, 0.006), string('B', 12.6, 0.006), load(1, false)] });
    expect(amps(point, 'A')).toBeCloseTo(66.67, 2);
    expect(amps(point, 'B')).toBeCloseTo(-66.67, 2);
    expect(volts(point, 'A')).toBeCloseTo(13, 9);
  });

  it('T16: 13.2, 13.2 and 12.4 V: 44.44, 44.44 and −88.89 A, the bus at 12.9333 V', () => {
    const strings = [string('A', 13.2, 0.006), string('B', 13.2, 0.006), string('C', 12.4, 0.006)];
    const point = solved({ parts: [...strings, load(1, false)] });
    expect(['A', 'B', 'C'].map((id) => Number(amps(point, id).toFixed(2)))).toEqual([44.44, 44.44, -88.89]);
    expect(volts(point, 'A')).toBeCloseTo(12.9333, 4);
  });

  it('T17: 5.5 and 7.5 mΩ under 200 A: 115.38 and 84.62 A at 12.1654 V, and share-uneven tells it', () => {
    const raw = { parts: [string('A', 12.8, 0.0055), string('B', 12.8, 0.0075), load(200)] };
    const point = solved(raw);
    expect([amps(point, 'A'), amps(point, 'B')].map((a) => Number(a.toFixed(2)))).toEqual([115.38, 84.62]);
    expect(volts(point, 'A')).toBeCloseTo(12.1654, 4);
    // Largest over mean 1.154: 15.4 % off, more than the 10 % that are worth a look.
    const [finding] = found(check(raw), 'share-uneven');
    expect(finding!.measured.value).toBeCloseTo(0.154, 3);
  });
});

describe('constant powers', () => {
  const feed = (emfV: number, resistanceOhm: number, powerW: number, more: object = {}) => ({
    parts: [
      battery('B', { emfV, resistanceOhm, blockNominalV: 12.8, blocksInSeries: emfV > 20 ? 2 : 1 }),
      { id: 'L', kind: 'load', plus: 'P', minus: 'N', powerW, ...more },
    ],
  });

  it('T18: 6666.7 W behind 25.2 V and 6 mΩ: 23.498 V, 283.7 A; the most that can be had is 26 460 W', () => {
    const point = solved(feed(25.2, 0.006, 6666.7));
    expect(volts(point, 'L')).toBeCloseTo(23.498, 3);
    expect(amps(point, 'L')).toBeCloseTo(283.7, 1);
    const { outcome, collapse } = solved(feed(25.2, 0.006, 26_500));
    expect(outcome).toBe('collapse');
    expect(collapse!.largestDeliverableW).toBeCloseTo(26_460, -1);
  });

  it('T19: behind 12.6 V 3333.3 W leave 10.737 V at 310.4 A, 4000 W leave 10.261 V at 389.8 A: below a cut-off of 10.5 V', () => {
    const [mild, hard] = [solved(feed(12.6, 0.006, 3333.3)), solved(feed(12.6, 0.006, 4000))];
    expect(volts(mild, 'L')).toBeCloseTo(10.737, 3);
    expect(amps(mild, 'L')).toBeCloseTo(310.4, 1);
    expect(volts(hard, 'L')).toBeCloseTo(10.261, 3);
    expect(amps(hard, 'L')).toBeCloseTo(389.8, 1);
    expect(solved(feed(12.6, 0.006, 4000, { minimumV: 10.5 })).parts.get('L' as PartId)!.state).toBe('dropped-out');
    expect(solved(feed(12.6, 0.006, 3333.3, { minimumV: 10.5 })).parts.get('L' as PartId)!.state).toBeUndefined();
  });
});

it('T27: 13.05 V over 12.75 V: 0.15 V off centre, 0.58 % of 25.8 V, a watch of midpoint-off', () => {
  const report = check({
    parts: [
      battery('B', { blocksInSeries: 2, emfV: 25.8, midpoint: 'MID' }),
      { id: 'L', kind: 'load', plus: 'P', minus: 'N', currentA: 5 },
    ],
    readings: [
      { id: 'upper', quantity: 'voltage', plus: 'P', minus: 'MID', valueV: 13.05 },
      { id: 'lower', quantity: 'voltage', plus: 'MID', minus: 'N', valueV: 12.75 },
    ],
  });
  const [finding] = found(report, 'midpoint-off');
  expect(finding!.severity).toBe('look');
  expect(finding!.message).toContain('150 mV');
  expect(finding!.message).toMatch(/0\.58/);
});

it('T28: charge volts of six lead cells at −4 mV a kelvin and cell: 14.4 V at 25 °C is 14.16 V at 35 °C and 14.88 V at 5 °C', () => {
  const at = (temperatureDegC: number) =>
    chargeWindow({ chemistry: 'agm', cells: 6, temperatureDegC }, tables.chemistry).absorptionV!.value;
  expect(14.4 + at(35) - at(25)).toBeCloseTo(14.16, 9);
  expect(14.4 + at(5) - at(25)).toBeCloseTo(14.88, 9);
});
