import { describe, expect, test } from 'vitest';
import { type CheckedJob, caseById, partsInCase, withPractice } from '../../core/job/job.ts';
import { checkJob, parseJob } from '../../core/job/parseJob.ts';
import { originOf, type Part, type PartKind } from '../../core/job/part.ts';
import { partFields } from '../../core/job/partFields.ts';
import { everyKind, type RawJob, rawPart } from './jobEveryKind.ts';

function good(job: unknown): CheckedJob {
  const read = checkJob(job);
  if (!read.ok) throw new Error(JSON.stringify(read.issues, null, 1));
  return read.value;
}
function part<K extends PartKind>(job: CheckedJob, id: string, kind: K): Extract<Part, { kind: K }> {
  const found = job.parts.find((candidate) => candidate.id === id);
  if (found?.kind !== kind) throw new Error(`no ${kind} ${id}`);
  return found as Extract<Part, { kind: K }>;
}

describe('a job with every kind of part and every field', () => {
  test('the example leaves out no kind and no field of the job file', () => {
    const job = everyKind();
    const seen = new Map<string, Set<string>>();
    for (const raw of job.parts) {
      const names = seen.get(String(raw['kind'])) ?? new Set();
      for (const name of Object.keys(raw)) names.add(name);
      seen.set(String(raw['kind']), names);
    }
    for (const [kind, fields] of partFields) {
      for (const name of Object.keys(fields))
        expect([kind, name, seen.get(kind)?.has(name)]).toEqual([kind, name, true]);
    }
  });

  test('it is read without an issue, and from text as from a value', () => {
    expect(parseJob(JSON.stringify(everyKind()))).toEqual(checkJob(everyKind()));
    expect(good(everyKind()).parts).toHaveLength(everyKind().parts.length);
  });

  test('quantities are numbers in the units of their names', () => {
    const job = good(everyKind());
    expect(part(job, 'S1', 'string')).toMatchObject({
      capacityAh: 220,
      stateOfCharge: 0.9,
      temperatureDegC: 25,
      ageYears: 1.5,
      resistanceOhm: 0.005,
      linkOhm: 0.0001,
      linkSize: { system: 'awg', gauge: -1 },
      shortCircuitA: 2100,
    });
    expect(part(job, 'C1', 'cable')).toMatchObject({
      lengthM: 3.2004,
      size: { system: 'awg', gauge: -1 },
      insulationDegC: 105,
      ambientDegC: 50,
      endOhm: 0.0002,
    });
    expect(part(job, 'F1', 'fuse')).toMatchObject({ ratingV: 58, interruptA: 20_000, distanceFromSourceM: 0.1778 });
    expect(part(job, 'SH', 'shunt').ratingMv).toBe(50);
    expect(part(job, 'INV1', 'inverter').efficiency).toEqual([
      [0, 0],
      [0.1, 0.85],
      [0.5, 0.93],
      [1, 0.88],
    ]);
    expect(part(job, 'PV', 'array').vocPerDegC).toBe(-0.0029);
    expect(job.site.ambientMinDegC).toBe(-10);
    expect(job.demand[0]?.hoursPerDay).toEqual(Array.from({ length: 12 }, () => 8));
    expect(job.targets.autonomyDays).toBe(3);
    expect(job.readings.map((reading) => reading.id)).toEqual(['R1', 'R2', 'R3']);
    expect(job.readings[0]).toMatchObject({ valueV: 12.62, standardUncertainty: 0.02 });
    expect(job.readings[2]).toMatchObject({ valueDegC: 20 });
  });

  test('the hours of a profile are shares of the day and sum to one', () => {
    const profile = good(everyKind()).demand[1]?.hourProfile ?? [];
    // 24 rounded shares: a sum within 1e-12 of one is their rounding alone.
    expect(Math.abs(profile.reduce((sum, share) => sum + share, 0) - 1)).toBeLessThan(1e-12);
  });

  test('where a figure comes from is stated, label if given, default if not', () => {
    const string = part(good(everyKind()), 'S1', 'string');
    expect(originOf(string, 'resistanceOhm')).toBe('measured');
    expect(originOf(string, 'emfV')).toBe('label');
    expect(originOf(part(good(everyKind()), 'S2', 'string'), 'resistanceOhm')).toBe('default');
    expect(string.range.get('resistanceOhm')).toEqual([0.004, 0.006]);
  });

  test('x- fields are carried along untouched', () => {
    const job = good(everyKind());
    expect(job.extra.get('x-workshop')).toEqual({ ticket: 7 });
    expect(part(job, 'S1', 'string').extra?.get('x-shelf')).toEqual({ row: [1, 2, null] });
  });
});

describe('defaults', () => {
  function least(): RawJob {
    return {
      ...everyKind(),
      site: undefined,
      junctions: undefined,
      settings: undefined,
      cases: [],
      readings: [],
      demand: [],
      targets: undefined,
    };
  }
  test('the contract states a full string, one conductor, closed devices and loads that are on', () => {
    const job = good({
      format: 'ohmwright-job',
      version: 1,
      practice: 'iec-land',
      parts: [
        rawPart(everyKind(), 'S2'),
        { id: 'C', kind: 'cable', from: 'B2+', to: 'a', lengthM: 1, size: '35 mm2' },
        { id: 'F', kind: 'fuse', from: 'a', to: 'b', ratingA: 10 },
        { id: 'B', kind: 'busbar', junctions: ['b', 'c'] },
        { id: 'L', kind: 'load', plus: 'c', minus: 'B-', powerW: 1 },
      ],
    });
    expect(part(job, 'S2', 'string')).toMatchObject({
      stateOfCharge: 1,
      linkOhm: 0,
      linkSize: undefined,
      resistanceOhm: undefined,
    });
    expect(part(job, 'C', 'cable')).toMatchObject({ inParallel: 1, endOhm: 0, metal: undefined });
    expect(part(job, 'F', 'fuse')).toMatchObject({ state: 'closed', resistanceOhm: undefined });
    expect(part(job, 'B', 'busbar').segmentOhm).toBe(0);
    expect(part(job, 'L', 'load').on).toBe(true);
    expect(job.title).toBe('Untitled job');
    expect(job.cases).toHaveLength(1);
    expect(job.cases[0]).toMatchObject({ id: 'as-drawn', surge: undefined });
  });
  test('settings have the defaults that the types state', () => {
    expect(good(least()).settings).toEqual({
      dropCritical: undefined,
      dropOrdinary: undefined,
      nominalV: undefined,
      cableStopFactor: 1.2,
      continuousFactor: 1.25,
      shareLimit: 0.1,
      maxParallelStrings: 4,
      ageGapYears: 1,
      midpointWatch: 0.005,
      midpointAct: 0.01,
      faultClearS: 5,
    });
  });
  test('a job that names no practice is said to have an assumed one', () => {
    const job = good({ ...least(), practice: undefined });
    expect(job.practiceAssumed).toBe(true);
    expect(withPractice(job, 'us-land')).toMatchObject({ practice: 'us-land', practiceAssumed: false });
    expect(good(everyKind()).practiceAssumed).toBe(false);
  });
  test('an empty list of parts is a job that has just been begun', () => {
    expect(good({ ...least(), parts: [] }).parts).toEqual([]);
  });
});

describe('cases are applied to whole parts', () => {
  const inCase = (id: string, raw: unknown = everyKind()): ReadonlyMap<string, Part> => {
    const job = good(raw);
    const operatingCase = caseById(job, id);
    if (operatingCase === undefined) throw new Error(`no case ${id}`);
    return new Map(partsInCase(job, operatingCase).map((each) => [each.id, each]));
  };
  test('one state of charge for all strings, another for the one that is named', () => {
    const day = inCase('day');
    expect(day.get('S1')).toMatchObject({ stateOfCharge: 0.6 });
    expect(day.get('S2')).toMatchObject({ stateOfCharge: 0.4, emfV: undefined });
    expect(day.get('S2')?.given.has('stateOfCharge')).toBe(true);
    // The drawing's own range of 0.8 to 1 does not speak of this case.
    expect(day.get('S1')?.range.has('stateOfCharge')).toBe(false);
  });
  test('set changes the fields it names and leaves the rest', () => {
    const night = inCase('night');
    expect(night.get('K1')).toMatchObject({ kind: 'breaker', state: 'open', ratingA: 200 });
    expect(night.get('L2')).toMatchObject({ on: false, currentA: 2 });
    expect(night.get('Q1')).toMatchObject({ state: 'closed' });
  });
  test('set wins over the state of charge of the case', () => {
    const raw = everyKind();
    raw.cases = [
      {
        id: 'a',
        stateOfCharge: 0.5,
        stateOfChargeByString: { S1: 0.45 },
        set: { S1: { stateOfCharge: 0.3 }, S2: { ageYears: 3 } },
      },
    ];
    raw.readings = [];
    const parts = inCase('a', raw);
    expect(parts.get('S1')).toMatchObject({ stateOfCharge: 0.3 });
    expect(parts.get('S2')).toMatchObject({ stateOfCharge: 0.5, ageYears: 3 });
  });
  test('the ways to state a load replace each other', () => {
    const raw = everyKind();
    raw.cases = [{ id: 'day', set: { L1: { currentA: '4 A' } } }];
    expect(inCase('day', raw).get('L1')).toMatchObject({ currentA: 4, powerW: undefined });
  });
  test('set takes quantities with units and sizes, as the part does', () => {
    const raw = everyKind();
    raw.cases = [{ id: 'day', set: { C1: { lengthM: '12 ft', size: '35 mm2' } } }];
    expect(inCase('day', raw).get('C1')).toMatchObject({ lengthM: 3.6576, size: { system: 'mm2', areaMm2: 35 } });
  });
  test('what was known of a figure does not outlive it', () => {
    const raw = everyKind();
    raw.cases = [{ id: 'day', set: { S1: { resistanceOhm: '9 mOhm' } } }];
    const string = inCase('day', raw).get('S1')!;
    expect(string.range.has('resistanceOhm')).toBe(false);
    expect(originOf(string, 'resistanceOhm')).toBe('label');
  });
  test('the part that starts up is named; its drawn power stays', () => {
    const job = good(everyKind());
    expect(caseById(job, 'night')?.surge).toBe('L1');
    expect(inCase('night').get('L1')).toMatchObject({ powerW: 60 });
  });
});

describe('at rest', () => {
  test('every job has the case: loads, inverters, chargers and converters off, no sun', () => {
    const job = good(everyKind());
    const rest = caseById(job, 'at-rest');
    expect(rest?.irradianceWPerM2).toBe(0);
    const running = partsInCase(job, rest!).filter((each) => 'on' in each && each.on);
    expect(running).toEqual([]);
    expect(job.cases.map((each) => each.id)).toEqual(['day', 'night']);
  });
  test('a job may list it to say more, and everything is still off unless it says otherwise', () => {
    const raw = everyKind();
    raw.cases = [{ id: 'at-rest', stateOfChargeByString: { S1: 0.5 }, set: { L1: { on: true }, L2: { currentA: 1 } } }];
    raw.readings = [];
    const job = good(raw);
    const rest = caseById(job, 'at-rest')!;
    const parts = new Map(partsInCase(job, rest).map((each): [string, Part] => [each.id, each]));
    expect(parts.get('S1')).toMatchObject({ stateOfCharge: 0.5 });
    expect(parts.get('L1')).toMatchObject({ on: true });
    expect(parts.get('L2')).toMatchObject({ on: false, currentA: 1 });
    expect(parts.get('INV1')).toMatchObject({ on: false });
    expect(rest.irradianceWPerM2).toBe(0);
  });
});

test('the checked job shares nothing with the value it was read from', () => {
  const raw = everyKind();
  const job = good(raw);
  rawPart(raw, 'C1')['lengthM'] = 99;
  (rawPart(raw, 'P1')['from'] as Record<string, unknown>)['plus'] = 'elsewhere';
  (rawPart(raw, 'BB')['junctions'] as unknown[]).length = 0;
  expect(part(job, 'C1', 'cable').lengthM).toBe(3.2004);
  expect(part(job, 'P1', 'pair').from.plus).toBe('D+');
  expect(part(job, 'BB', 'busbar').junctions).toHaveLength(3);
});
