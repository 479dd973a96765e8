/** What fuses and breakers meet in a fault, which of them part it from all sources, and faults of less usual networks. */
import { describe, expect, it } from 'vitest';
import { type FaultStudy, faultLevel, type Isolation, partsThatIsolate } from '../../core/api.ts';
import { tables } from '../../data/index.ts';
import type { PartValue } from '../physics/jobDraft.ts';
import { checked, jobOf, stringOf } from '../physics/solveValue.ts';

const string = (id: string, plus: string, minus = 'minus'): PartValue =>
  stringOf(id, { plus, minus, emfV: 12.8, resistanceOhm: 0.01 });
const fuse = (id: string, from: string, to: string): PartValue => ({ id, kind: 'fuse', from, to, ratingA: 100 });
const joint = (id: string, from: string, to: string, resistanceOhm: number): PartValue => ({
  id,
  kind: 'joint',
  from,
  to,
  resistanceOhm,
});
const charger = (plus: string, outputA: number): PartValue => ({
  id: 'CHG',
  kind: 'charger',
  plus,
  minus: 'minus',
  outputA,
  setpointV: 14.4,
});

const study = (parts: readonly PartValue[]): FaultStudy =>
  faultLevel({ ...checked(jobOf(parts)), tables, method: 'plain' });
const isolation = (parts: readonly PartValue[]): readonly Isolation[] =>
  partsThatIsolate({ ...checked(jobOf(parts)), tables, method: 'plain' });
function named<Item>(items: readonly Item[], is: (item: Item) => boolean): Item {
  const found = items.find(is);
  if (found === undefined) throw new Error('not in the answer');
  return found;
}
const device = ({ devices }: FaultStudy, id: string) => named(devices, (each) => (each.device as string) === id);
const highestAt = ({ junctions }: FaultStudy, junction: string, to = 'minus') =>
  junctions.find((each) => (each.junction as string) === junction && (each.to as string) === to)?.highest?.firstA;

describe('a fuse or breaker in a fault', () => {
  it('meets the whole of its bank where all of it flows through, and its own side left out where it does not', () => {
    // Two strings of 1280 A; the fuse of one meets either that string's own 1280 A, or the other's.
    const bank = [
      string('A', 'a'),
      string('B', 'b'),
      fuse('FA', 'a', 'bar'),
      fuse('FB', 'b', 'bar'),
      fuse('F', 'bar', 'out'),
    ];
    const found = study(bank);
    expect(highestAt(found, 'bar')).toBeCloseTo(2560, 8);
    expect(device(found, 'F').highestA).toBeCloseTo(2560, 8);
    expect(device(found, 'FA').highestA).toBeCloseTo(1280, 8);
    expect([device(found, 'F').fromBothSides, device(found, 'FA').fromBothSides]).toEqual([false, true]);
  });

  it('between a bank and a charger meets the bank on one side and no more than the charger’s output on the other', () => {
    const found = study([
      string('A', 'a'),
      fuse('F', 'a', 'lead'),
      joint('C', 'lead', 'chg', 0.01),
      charger('chg', 40),
    ]);
    const { sides, at, highestA, fromBothSides } = device(found, 'F');
    expect(sides.map((side) => [side.at, Math.round(side.highestA * 1e6) / 1e6])).toEqual([
      ['lead', 1280],
      ['a', 40],
    ]);
    expect([at, fromBothSides]).toEqual(['lead', true]);
    expect(highestA).toBeCloseTo(1280, 8);
  });

  it('in the minus lead meets the same as one in the plus lead', () => {
    const found = study([
      string('A', 'a', 'm'),
      fuse('FM', 'm', 'minus'),
      joint('C', 'a', 'end', 0.01),
      joint('R', 'back', 'minus', 0.01),
      { id: 'L', kind: 'load', plus: 'end', minus: 'back', powerW: 10 },
    ]);
    // Right behind it a fault from the plus terminal: the bank alone. At the load's terminals: 10 mΩ more each way, EMF and
    // resistance at the low side of a label figure (1 % and 25 %).
    expect(device(found, 'FM').highestA).toBeCloseTo(1280, 6);
    expect(device(found, 'FM').lowestA).toBeCloseTo((12.8 * 0.99) / (0.01 * 1.25 + 0.02), 6);
  });

  it('has its least fault at the far end of what it protects, up to the next device', () => {
    const found = study([
      string('A', 'a'),
      fuse('MAIN', 'a', 'f'),
      joint('C1', 'f', 'panel', 0.02),
      fuse('BRANCH', 'panel', 'b'),
      joint('C2', 'b', 'lamp', 0.3),
      { id: 'L', kind: 'load', plus: 'lamp', minus: 'minus', powerW: 10 },
    ]);
    expect([device(found, 'MAIN').lowestAt, device(found, 'BRANCH').lowestAt]).toEqual(['panel', 'lamp']);
    expect(device(found, 'BRANCH').lowestA).toBeCloseTo((12.8 * 0.99) / (0.0125 + 0.32), 6);
  });

  it('before a diode that blocks has its least fault there: behind it the fuse is fed by nobody', () => {
    const diode: PartValue = { id: 'D', kind: 'diode', from: 'alternator', to: 'lead', forwardV: 0.8 };
    const found = study([
      string('A', 'a'),
      fuse('F', 'a', 'near'),
      joint('C', 'near', 'lead', 0.02),
      diode,
      charger('alternator', 90),
    ]);
    expect(device(found, 'F').lowestAt).toBe('lead');
    expect(device(found, 'F').lowestA).toBeCloseTo((12.8 * 0.99) / 0.0325, 6);
    const before = named(found.junctions, ({ junction }) => (junction as string) === 'alternator');
    expect([before.highest!.firstA, before.lowest]).toEqual([90, null]);
  });

  it('that is open is in no fault', () => {
    const found = study([string('A', 'a'), { ...fuse('F', 'a', 'out'), state: 'open' }]);
    expect(found.devices).toEqual([]);
    expect(found.junctions.map(({ junction }) => junction)).toEqual(['a']);
  });
});

describe('faults of less usual networks', () => {
  it('a charger alone gives its output, and no more, whatever lies between', () => {
    const found = study([charger('p', 30), joint('C', 'p', 'end', 0.2)]);
    expect(highestAt(found, 'p')).toBeCloseTo(30, 9);
    expect(highestAt(found, 'end')).toBeCloseTo(30, 9);
    expect(found.junctions.every(({ lowest }) => lowest === null)).toBe(true);
  });

  it('a diode feeds a fault beyond it and none before it', () => {
    const diode: PartValue = { id: 'D', kind: 'diode', from: 'a', to: 'b', forwardV: 0.8, slopeOhm: 0.002 };
    const found = study([string('A', 'a'), diode, string('B', 'b')]);
    // Before it: its own 1280 A alone. Beyond: 1280 A, and (12.8 - 0.8) V behind 12 mΩ.
    expect(highestAt(found, 'a')).toBeCloseTo(1280, 6);
    expect(highestAt(found, 'b')).toBeCloseTo(1280 + 1000, 6);
  });

  it('of two banks that a switch joins, the lowest has the one that sends less, the highest both', () => {
    const strong = stringOf('STRONG', { plus: 's', minus: 'minus', emfV: 12.8, resistanceOhm: 0.005 });
    const link: PartValue = { id: 'LINK', kind: 'switch', from: 's', to: 'w' };
    const found = study([strong, string('WEAK', 'w'), link]);
    const atLink = named(found.junctions, ({ junction }) => (junction as string) === 's');
    expect(atLink.highest!.firstA).toBeCloseTo(2560 + 1280, 6);
    expect(atLink.lowest!.firstA).toBeCloseTo((12.8 * 0.99) / 0.0125, 6);
    expect(atLink.lowest!.shares.map(({ part }) => part)).toEqual(['WEAK']);
  });

  it('with a bond to earth every junction has a fault to earth too, through the bond', () => {
    const bond: PartValue = { id: 'E', kind: 'bond', from: 'minus', to: 'earth', size: '10 mm2', lengthM: 2 };
    const found = study([string('A', 'a'), bond]);
    const earth = found.junctions.filter(({ to }) => (to as string) === 'earth');
    expect(earth.map(({ junction }) => junction)).toContain('a');
    const [toMinus, toEarth] = [highestAt(found, 'a')!, highestAt(found, 'a', 'earth')!];
    expect(toEarth).toBeLessThan(toMinus);
    // 2 m of 10 mm2 is 3.66 mΩ (1.83 mΩ/m, IEC 60228); flexible strands up to 5 % more.
    expect(12.8 / toEarth - 0.01).toBeGreaterThan(0.00365);
    expect(12.8 / toEarth - 0.01).toBeLessThan(0.00366 * 1.08);
  });
});

describe('what parts a fault from all sources', () => {
  const bank = [
    string('A', 'a'),
    string('B', 'b'),
    fuse('FA', 'a', 'bar'),
    fuse('FB', 'b', 'bar'),
    fuse('FC', 'bar', 'lead'),
    joint('C', 'lead', 'chg', 0.01),
    charger('chg', 40),
    fuse('FL', 'bar', 'lamp'),
    { id: 'L', kind: 'load', plus: 'lamp', minus: 'minus', powerW: 10 },
  ];
  const at = (junction: string) => named(isolation(bank), (each) => (each.junction as string) === junction);

  it('on the bar: the fuses of both strings and of the charger, not the one towards a lamp', () => {
    const { devices, bare } = at('bar');
    expect(devices.map(({ device: id }) => id)).toEqual(['FA', 'FB', 'FC']);
    expect(bare).toEqual([]);
    // The charger's fuse carries its 40 A at most, and in the least fault nothing that would make it open.
    const [fa, , fc] = devices;
    expect([fa!.highestA, fc!.highestA].map(Math.round)).toEqual([1280, 40]);
    expect(fc!.lowestA).toBeNull();
    expect(fa!.lowestA).toBeCloseTo((12.8 * 0.99) / 0.0125, 6);
  });

  it('at a string’s own terminal: its fuse parts the others, nothing parts the string itself', () => {
    const { devices, bare } = at('a');
    expect(devices.map(({ device: id }) => id)).toEqual(['FA']);
    expect(bare).toEqual(['A']);
  });

  it('behind a fuse towards a lamp: that fuse alone', () => {
    const { devices, bare } = at('lamp');
    expect([devices.map(({ device: id }) => id), bare]).toEqual([['FL'], []]);
  });
});
