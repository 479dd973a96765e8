import { expect, test } from 'vitest';
import { currentVersion, type Migration, migrate, migrations } from '../../core/job/migrate.ts';
import { checkJob } from '../../core/job/parseJob.ts';
import { everyKind } from './jobEveryKind.ts';

/** A made-up version 0, which never was: its parts stood under `things`, and its cables gave `feet`. */
const fromMadeUpVersion0: Migration = (job) => {
  const { things, ...rest } = job;
  if (!Array.isArray(things)) return job;
  const parts = things.map((thing: unknown) => {
    if (typeof thing !== 'object' || thing === null || !('feet' in thing)) return thing;
    const { feet, ...kept } = thing;
    return { ...kept, lengthM: `${String(feet)} ft` };
  });
  return { ...rest, parts };
};
const steps = new Map([[0, fromMadeUpVersion0]]);

const old = {
  format: 'ohmwright-job',
  version: 0,
  practice: 'us-marine',
  things: [
    {
      id: 'S',
      kind: 'string',
      plus: 'a',
      minus: 'b',
      chemistry: 'agm',
      blocksInSeries: 1,
      blockNominalV: 12,
      capacityAh: 100,
    },
    { id: 'C', kind: 'cable', from: 'a', to: 'c', feet: 10, size: '10 AWG' },
  ],
};

test('an old job walks the chain and is checked like any other', () => {
  const read = checkJob(old, { migrations: steps });
  if (!read.ok) throw new Error(JSON.stringify(read.issues));
  expect(read.value.parts[1]).toMatchObject({ id: 'C', lengthM: 3.048 });
});

test('a slip in an old job is an issue of the job as it now reads', () => {
  const read = checkJob({ ...old, things: [{ ...old.things[1], feet: -1 }] }, { migrations: steps });
  expect(read.ok ? [] : read.issues).toEqual([
    expect.objectContaining({ path: 'parts[0].lengthM', code: 'out-of-range' }),
  ]);
});

test('an old job that its step cannot make sense of gets issues, no exception', () => {
  for (const things of [undefined, null, 5, {}, [null], [5], [[]]]) {
    expect(checkJob({ ...old, things }, { migrations: steps }).ok).toBe(false);
  }
});

test('steps are walked one after the other, each with the version it leads to', () => {
  const seen: unknown[] = [];
  const chain = new Map<number, Migration>(
    [0, 1, 2].map((version) => [
      version,
      (job) => {
        seen.push(job['version']);
        return { ...job, [`step${String(version)}`]: true };
      },
    ]),
  );
  expect(migrate({ version: 0 }, { steps: chain, target: 3 })).toEqual({
    ok: true,
    value: { version: 3, step0: true, step1: true, step2: true },
  });
  expect(seen).toEqual([0, 1, 2]);
});

test('the file as given is not changed by a step', () => {
  const before = structuredClone(old);
  checkJob(old, { migrations: steps });
  expect(old).toEqual(before);
});

test.each<[unknown, string, RegExp]>([
  [currentVersion + 1, 'wrong-version', /newer program \(version 2\)/],
  [1e300, 'wrong-version', /newer program/],
  [0, 'wrong-version', /no version 0/],
  [-5e8, 'wrong-version', /no version/],
  [1.5, 'wrong-type', /whole number/],
  ['1', 'wrong-type', /whole number/],
  [null, 'wrong-type', /got null/],
  [undefined, 'missing', /needs its version/],
])('version %j is refused in words', (version, code, words) => {
  const read = checkJob({ ...everyKind(), version });
  if (read.ok) throw new Error('it was read');
  expect(read.issues).toEqual([{ path: 'version', code, message: expect.stringMatching(words) as string }]);
});

test('the program ships no step, since version 1 is the first', () => {
  expect(currentVersion).toBe(1);
  expect(migrations.size).toBe(0);
});
