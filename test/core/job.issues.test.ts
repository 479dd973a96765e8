import { describe, expect, test } from 'vitest';
import type { Issue, IssueCode } from '../../core/job/issue.ts';
import { checkJob } from '../../core/job/parseJob.ts';
import { everyKind, type RawJob, rawPart } from './jobEveryKind.ts';

function issuesOf(job: unknown): readonly Issue[] {
  const read = checkJob(job);
  return read.ok ? [] : read.issues;
}
/** The issues of the example after it was spoilt in one way. */
function spoilt(spoil: (job: RawJob) => void): readonly Issue[] {
  const job = everyKind();
  spoil(job);
  return issuesOf(job);
}
const index = (id: string): number => everyKind().parts.findIndex((part) => part['id'] === id);
const setOn =
  (id: string, fields: Record<string, unknown>) =>
  (job: RawJob): void => {
    Object.assign(rawPart(job, id), fields);
  };

interface Slip {
  readonly what: string;
  readonly spoil: (job: RawJob) => void;
  readonly path: string;
  readonly code: IssueCode;
  readonly says: string;
}

/** A slip in one field of one part. */
function slip(id: string, field: string, value: unknown, code: IssueCode, says: string): Slip {
  const path = `parts[${String(index(id))}].${field}`;
  return { what: `${field} ${JSON.stringify(value)}`, spoil: setOn(id, { [field]: value }), path, code, says };
}
function jobSlip(what: string, spoil: (job: RawJob) => void, path: string, code: IssueCode, says: string): Slip {
  return { what, spoil, path, code, says };
}

const slips: readonly Slip[] = [
  slip(
    'C1',
    'lengthM',
    '5 kg',
    'wrong-unit',
    'lengthM of cable C1: expected a length such as 3.2 m or 10 ft, got "5 kg".',
  ),
  slip('C1', 'lengthM', -1, 'out-of-range', 'lengthM of cable C1: must be 0 m or more, got -1 m.'),
  slip('C1', 'lengthM', '-3 ft', 'out-of-range', 'must be 0 m or more'),
  slip('C1', 'lengthM', true, 'wrong-type', 'a number in m or a text such as 3.2 m or 10 ft, got true'),
  slip('C1', 'lengthM', null, 'wrong-type', 'got null; leave the field out'),
  slip('C1', 'lengthM', [], 'wrong-type', 'got a list of 0'),
  slip('C1', 'lengthM', {}, 'wrong-type', 'got an object'),
  slip('C1', 'lengthM', Number.NaN, 'out-of-range', 'expected a finite number'),
  slip('C1', 'lengthM', Number.POSITIVE_INFINITY, 'out-of-range', 'expected a finite number'),
  slip('C1', 'size', 35, 'wrong-unit', 'is that mm2 of copper, AWG, SAE gauge'),
  slip('C1', 'size', '35', 'wrong-unit', 'is that mm2 of copper, AWG, SAE gauge'),
  slip('C1', 'size', {}, 'wrong-type', 'expected a conductor size'),
  slip('C1', 'inParallel', 1.5, 'out-of-range', 'expected a whole number, got 1.5'),
  slip('C1', 'inParallel', 0, 'out-of-range', 'must be 1 or more'),
  slip('C1', 'inParallel', '2', 'wrong-type', 'expected a whole number, got "2"'),
  slip('C1', 'run', 'conduct', 'not-in-list', 'did you mean conduit?'),
  slip('C1', 'run', 3, 'wrong-type', 'expected one of free-air'),
  slip('C1', 'sheathed', 'true', 'wrong-type', 'expected true or false, got "true"'),
  slip('C1', 'from', '', 'out-of-range', 'must not be empty'),
  slip('C1', 'from', 'B\u200b+', 'out-of-range', 'cannot be seen'),
  slip('C1', 'from', 'e\u0301', 'out-of-range', 'composed letters'),
  slip('C1', 'from', '\ud800', 'out-of-range', 'cannot be seen'),
  slip('C1', 'from', ' B+', 'out-of-range', 'must not begin or end with a space'),
  slip('C1', 'from', '__proto__', 'out-of-range', 'reserved word'),
  slip('C1', 'to', 'B+', 'contradiction', 'to of cable C1: both ends are at junction B+.'),
  slip('C1', 'lenghtM', 2, 'unknown-field', 'Cable C1 has no field "lenghtM" (did you mean lengthM?).'),
  slip('C1', 'label', 'a\u0007b', 'out-of-range', 'control characters'),
  slip('C1', 'label', '\udc00', 'out-of-range', 'half of a pair'),
  slip('C1', 'label', 'x'.repeat(201), 'out-of-range', 'longer than 200'),
  slip('C1', 'label', '\u202egpj.exe', 'out-of-range', 'direction'),
  slip('C1', 'at', 1, 'wrong-type', 'expected an object { "x"'),
  slip('S1', 'chemistry', 'lipo', 'not-in-list', 'expected one of flooded, agm'),
  slip('S1', 'stateOfCharge', 1.01, 'out-of-range', 'must be 1 or less, got 1.01'),
  slip('S1', 'stateOfCharge', 90, 'out-of-range', 'must be 1 or less'),
  slip('S1', 'capacityAh', 0, 'out-of-range', 'must be more than 0 Ah'),
  slip('S1', 'capacityAh', '220 Wh', 'wrong-unit', 'expected a charge such as 200 Ah'),
  slip('S1', 'temperatureDegC', '77 ft', 'wrong-unit', 'expected a temperature'),
  slip('S1', 'midpoint', 'B+', 'contradiction', 'is an end of the string'),
  slip('S1', 'minus', 'B+', 'contradiction', 'both ends'),
  slip('P1', 'from', 'D+', 'wrong-type', 'expected an object { "plus": junction, "minus": junction }'),
  slip('P1', 'to', { plus: 'L+', minus: 'L+' }, 'contradiction', 'both ends'),
  slip('P1', 'minusSize', 'thick', 'wrong-unit', 'expected a conductor size'),
  slip('BB', 'junctions', ['D+'], 'out-of-range', 'expected 2 to 500 junctions, got 1'),
  slip('BB', 'junctions', ['D+', 'D2+', 'D+'], 'contradiction', 'junction D+ stands twice'),
  slip('BB', 'junctions', 'D+', 'wrong-type', 'a list of two or more junctions'),
  slip('F1', 'state', 'blown', 'not-in-list', 'expected one of closed, open'),
  slip('F1', 'ratingA', 0, 'out-of-range', 'must be more than 0 A'),
  slip('SH', 'ratingMv', '50 A', 'wrong-unit', 'expected a voltage such as 50 mV'),
  slip('J1', 'resistanceOhm', '8 mOhms per metre', 'wrong-unit', 'expected a resistance'),
  slip(
    'L1',
    'currentA',
    5,
    'contradiction',
    'give only one of powerW, currentA and resistanceOhm, got powerW and currentA',
  ),
  slip('L1', 'minimumV', 16, 'contradiction', 'must be less than maximumV (15 V)'),
  slip('L3', 'resistanceOhm', 0, 'out-of-range', 'must be more than 0 ohm'),
  slip('INV1', 'efficiency', 1.2, 'out-of-range', 'must be 1 or less'),
  slip('INV1', 'efficiency', 0, 'out-of-range', 'must be more than 0'),
  slip('INV1', 'efficiency', [], 'out-of-range', 'expected 1 to 100 points'),
  slip('F1', 'curvePoints', [], 'out-of-range', 'expected 1 to 100 points'),
  slip(
    'F1',
    'curvePoints',
    400,
    'wrong-type',
    'a list of points [current in A, melting time in s, clearing time in s]',
  ),
  slip(
    'INV1',
    'efficiency',
    [
      [0.5, 0.9],
      [0.5, 0.8],
    ],
    'contradiction',
    'must rise',
  ),
  slip('PV', 'vmpV', 23, 'contradiction', 'vmpV of array PV: must be less than vocV (22.5 V), got 23 V.'),
  slip('PV', 'impA', 6.1, 'contradiction', 'must be less than iscA'),
  slip('PV', 'vocPerDegC', -0.29, 'out-of-range', 'must be -0.02 per kelvin or more'),
  slip('MP', 'type', 'mpp', 'not-in-list', 'did you mean mppt?'),
  slip('MP', 'to', { plus: 'N', minus: 'N' }, 'contradiction', 'both ends'),
  jobSlip(
    'a part without a required field',
    (job) => delete rawPart(job, 'J1')['resistanceOhm'],
    `parts[${String(index('J1'))}].resistanceOhm`,
    'missing',
    'Joint J1 needs resistanceOhm: a resistance, a number in ohm',
  ),
  jobSlip(
    'a cable without size or resistance',
    (job) => delete rawPart(job, 'C2')['resistanceOhm'],
    `parts[${String(index('C2'))}].size`,
    'missing',
    'give a size such as "35 mm2" or "2/0 AWG", or a measured resistanceOhm',
  ),
  jobSlip(
    'a load without a figure',
    (job) => delete rawPart(job, 'L2')['currentA'],
    `parts[${String(index('L2'))}].powerW`,
    'missing',
    'one of powerW, currentA and resistanceOhm',
  ),
  jobSlip(
    'a string of no resistance',
    setOn('S1', { resistanceOhm: 0, linkOhm: 0, range: {} }),
    'parts[0].resistanceOhm',
    'contradiction',
    'every real battery has some resistance',
  ),
  jobSlip('a part that is no object', (job) => (job.parts[2] = 'C1' as never), 'parts[2]', 'wrong-type', 'got "C1"'),
  jobSlip(
    'a part without an id',
    (job) => delete rawPart(job, 'L4')['id'],
    `parts[${String(index('L4'))}].id`,
    'missing',
    'needs an id of its own',
  ),
  jobSlip(
    'a part with an odd id',
    setOn('L4', { id: 'Lämpchen' }),
    `parts[${String(index('L4'))}].id`,
    'out-of-range',
    'may hold only the letters',
  ),
  jobSlip(
    'a part with a number for an id',
    setOn('L4', { id: 7 }),
    `parts[${String(index('L4'))}].id`,
    'wrong-type',
    'must be a text, got 7',
  ),
  jobSlip(
    'a reserved id',
    setOn('L4', { id: 'constructor' }),
    `parts[${String(index('L4'))}].id`,
    'out-of-range',
    'reserved word',
  ),
  jobSlip(
    'an id with an escape sequence',
    setOn('L4', { id: '\u001b[2J' }),
    `parts[${String(index('L4'))}].id`,
    'out-of-range',
    '\\u001b[2J',
  ),
  jobSlip(
    'an unknown kind',
    setOn('L4', { kind: 'lamp' }),
    `parts[${String(index('L4'))}].kind`,
    'not-in-list',
    'expected one of string, cable',
  ),
  jobSlip(
    'no kind',
    (job) => delete rawPart(job, 'L4')['kind'],
    `parts[${String(index('L4'))}].kind`,
    'missing',
    'needs a kind',
  ),
  jobSlip(
    'the same id twice',
    setOn('L4', { id: 'L2' }),
    `parts[${String(index('L4'))}].id`,
    'duplicate-id',
    `is already used by parts[${String(index('L2'))}]`,
  ),
  jobSlip(
    'the id of a cable of a pair',
    setOn('L4', { id: 'P1.minus' }),
    `parts[${String(index('L4'))}].id`,
    'duplicate-id',
    'one cable of the pair',
  ),
  jobSlip(
    'an origin that is none',
    setOn('S1', { origin: { capacityAh: 'hearsay' } }),
    'parts[0].origin.capacityAh',
    'not-in-list',
    'expected one of measured, label',
  ),
  jobSlip(
    'an origin of no field',
    setOn('S1', { origin: { capacity: 'label' } }),
    'parts[0].origin.capacity',
    'unknown-field',
    'did you mean capacityAh?',
  ),
  jobSlip(
    'a range upside down',
    setOn('S1', { range: { emfV: [13, '12 V'] } }),
    'parts[0].range.emfV',
    'contradiction',
    'from low to high, got 13 to 12',
  ),
  jobSlip(
    'a range of a text',
    setOn('S1', { range: { chemistry: [1, 2] } }),
    'parts[0].range.chemistry',
    'wrong-type',
    'is no figure',
  ),
  jobSlip(
    'a range beside its value',
    setOn('S1', { range: { emfV: [13, 14] } }),
    'parts[0].range.emfV',
    'contradiction',
    'leaves out its value 12.8',
  ),
  jobSlip(
    'a range with a wrong unit',
    setOn('S1', { range: { emfV: ['12 V', '14 A'] } }),
    'parts[0].range.emfV[1]',
    'wrong-unit',
    'expected a voltage',
  ),
  jobSlip('a case that is no object', (job) => job.cases.push(5 as never), 'cases[2]', 'wrong-type', 'got 5'),
  jobSlip(
    'the same case twice',
    (job) => job.cases.push({ id: 'day' }),
    'cases[2].id',
    'duplicate-id',
    'already used by cases[0]',
  ),
  jobSlip(
    'set on an unknown part',
    (job) => job.cases.push({ id: 'x', set: { F2: { state: 'open' } } }),
    'cases[2].set.F2',
    'unknown-reference',
    'There is no part "F2" (did you mean F1?)',
  ),
  jobSlip(
    'set on a cable of a pair',
    (job) => job.cases.push({ id: 'x', set: { 'P1.plus': { lengthM: 2 } } }),
    'cases[2].set["P1.plus"]',
    'unknown-reference',
    'is one cable of pair P1',
  ),
  jobSlip(
    'set of an unknown field',
    (job) => job.cases.push({ id: 'x', set: { F1: { stat: 'open' } } }),
    'cases[2].set.F1.stat',
    'unknown-field',
    'did you mean state?',
  ),
  jobSlip(
    'set out of range',
    (job) => job.cases.push({ id: 'x', set: { S1: { stateOfCharge: 2 } } }),
    'cases[2].set.S1.stateOfCharge',
    'out-of-range',
    'must be 1 or less',
  ),
  jobSlip(
    'set of the id',
    (job) => job.cases.push({ id: 'x', set: { F1: { id: 'F9' } } }),
    'cases[2].set.F1.id',
    'forbidden-field',
    'cannot change the id',
  ),
  jobSlip(
    'set that contradicts the part',
    (job) => job.cases.push({ id: 'x', set: { PV: { vmpV: 30 } } }),
    'cases[2].set.PV.vmpV',
    'contradiction',
    'must be less than vocV',
  ),
  jobSlip(
    'a state of charge of no string',
    (job) => job.cases.push({ id: 'x', stateOfChargeByString: { L1: 0.5 } }),
    'cases[2].stateOfChargeByString.L1',
    'contradiction',
    'no battery string',
  ),
  jobSlip(
    'a surge of a cable',
    (job) => job.cases.push({ id: 'x', surge: 'C1' }),
    'cases[2].surge',
    'contradiction',
    'only a load or an inverter',
  ),
  jobSlip(
    'a surge without surge power',
    (job) => job.cases.push({ id: 'x', surge: 'L2' }),
    'cases[2].surge',
    'missing',
    'has no surgeW',
  ),
  jobSlip(
    'a surge of a part that is off',
    (job) => job.cases.push({ id: 'x', surge: 'L1', set: { L1: { on: false } } }),
    'cases[2].surge',
    'contradiction',
    'is off in case x',
  ),
  jobSlip(
    'a surge of no part',
    (job) => job.cases.push({ id: 'x', surge: 'INV2' }),
    'cases[2].surge',
    'unknown-reference',
    'did you mean INV1?',
  ),
  jobSlip(
    'a reading at no junction',
    (job) => (job.readings[0]!['plus'] = 'B'),
    'readings[0].plus',
    'unknown-reference',
    'there is no junction "B"',
  ),
  jobSlip(
    'a reading of no part',
    (job) => (job.readings[1]!['part'] = 'C9'),
    'readings[1].part',
    'unknown-reference',
    'there is no part "C9"',
  ),
  jobSlip(
    'a reading of a pair',
    (job) => (job.readings[1]!['part'] = 'P1'),
    'readings[1].part',
    'unknown-reference',
    'P1.plus or P1.minus',
  ),
  jobSlip(
    'a reading in no case',
    (job) => (job.readings[0]!['case'] = 'noon'),
    'readings[0].case',
    'unknown-reference',
    'there is no case "noon"',
  ),
  jobSlip(
    'a reading of another quantity',
    (job) => (job.readings[0]!['quantity'] = 'pressure'),
    'readings[0].quantity',
    'not-in-list',
    'voltage, current, temperature',
  ),
  jobSlip(
    'a reading with the value of another',
    (job) => (job.readings[0]!['valueA'] = 3),
    'readings[0].valueA',
    'unknown-field',
    'did you mean valueV?',
  ),
  jobSlip(
    'two readings of one id',
    (job) => (job.readings[1]!['id'] = 'R1'),
    'readings[1].id',
    'duplicate-id',
    'already used by readings[0]',
  ),
  jobSlip(
    'both probes at one junction',
    (job) => (job.readings[0]!['minus'] = 'B+'),
    'readings[0].minus',
    'contradiction',
    'Both probes',
  ),
  jobSlip(
    'a note on no junction',
    (job) => (job['junctions'] = { 'B--': {} }),
    'junctions.B--',
    'unknown-reference',
    'did you mean B-?',
  ),
  jobSlip(
    'eleven months',
    (job) => (job['site'] = { irradiationKWhPerM2Day: Array.from({ length: 11 }, () => 1) }),
    'site.irradiationKWhPerM2Day',
    'out-of-range',
    'expected 12 numbers, got 11',
  ),
  ...(
    [
      [
        'currents that fall',
        [
          [400, 2, 10],
          [300, 1, 2],
        ],
        'the currents must rise',
      ],
      ['a fuse that clears before it melts', [[400, 2, 1]], 'it cannot clear (1 s) before it has melted (2 s)'],
      [
        'a larger current that takes longer',
        [
          [400, 2, 10],
          [800, 3, 4],
        ],
        'must not take longer',
      ],
      ['a point of two figures', [[400, 2]], 'expected [current in A, melting time in s, clearing time in s]'],
    ] as const
  ).map(([name, points, words]) =>
    jobSlip(
      name,
      (job) => (rawPart(job, 'F1')['curvePoints'] = points),
      `parts[6].curvePoints[${String(points.length - 1)}]`,
      name === 'a point of two figures' ? 'wrong-type' : 'contradiction',
      words,
    ),
  ),
  jobSlip(
    'a bad month',
    (job) => (job['site'] = { irradiationKWhPerM2Day: [...Array.from({ length: 11 }, () => 1), -1] }),
    'site.irradiationKWhPerM2Day[11]',
    'out-of-range',
    'item 12 in irradiationKWhPerM2Day of the site: must be 0',
  ),
  jobSlip(
    'a coldest day warmer than the hottest',
    (job) => (job['site'] = { ambientMinDegC: 30, ambientMaxDegC: 20 }),
    'site.ambientMaxDegC',
    'contradiction',
    'is below ambientMinDegC',
  ),
  jobSlip(
    'a row without power',
    (job) => delete job.demand[0]!['powerW'],
    'demand[0].powerW',
    'missing',
    'Row 1 of the demand needs powerW',
  ),
  jobSlip(
    'a day of 25 hours',
    (job) => (job.demand[0]!['hoursPerDay'] = 25),
    'demand[0].hoursPerDay',
    'out-of-range',
    'must be 24 h or less',
  ),
  jobSlip(
    'a profile of nothing',
    (job) => (job.demand[0]!['hourProfile'] = Array.from({ length: 24 }, () => 0)),
    'demand[0].hourProfile',
    'out-of-range',
    'at least one hour',
  ),
  jobSlip(
    'a target above one',
    (job) => (job['targets'] = { maxDepthOfDischarge: 50 }),
    'targets.maxDepthOfDischarge',
    'out-of-range',
    'must be 1 or less',
  ),
  jobSlip(
    'settings the wrong way round',
    (job) => (job['settings'] = { midpointWatch: 0.02 }),
    'settings.midpointWatch',
    'contradiction',
    'must not be more than midpointAct',
  ),
  jobSlip(
    'an unknown setting',
    (job) => (job['settings'] = { sharelimit: 0.2 }),
    'settings.sharelimit',
    'unknown-field',
    'did you mean shareLimit?',
  ),
  jobSlip('an unknown field of the job', (job) => (job['part'] = []), 'part', 'unknown-field', 'did you mean parts?'),
  jobSlip(
    'another practice',
    (job) => (job['practice'] = 'uk-land'),
    'practice',
    'not-in-list',
    'us-land, us-marine, iso-marine, iec-land',
  ),
  jobSlip('no parts', (job) => delete (job as Record<string, unknown>)['parts'], 'parts', 'missing', 'needs parts'),
  jobSlip(
    'parts that are an object',
    (job) => ((job as Record<string, unknown>)['parts'] = {}),
    'parts',
    'wrong-type',
    'must be a list, got an object',
  ),
  jobSlip(
    'cases that are an object',
    (job) => ((job as Record<string, unknown>)['cases'] = {}),
    'cases',
    'wrong-type',
    'must be a list',
  ),
];

test('the example itself has no issue', () => {
  expect(issuesOf(everyKind())).toEqual([]);
});

describe('one slip gives an issue with its path, its kind and a sentence', () => {
  test.each(slips.map((each): [string, Slip] => [`${each.path}: ${each.what}`, each]))('%s', (_, each) => {
    const issues = spoilt(each.spoil);
    const found = issues.find((issue) => issue.path === each.path);
    expect(issues.map((issue) => issue.path)).toContain(each.path);
    expect(found?.code).toBe(each.code);
    expect(found?.message).toContain(each.says);
    expect(found?.message).toMatch(/[.?)]$/);
  });
});

test('every issue is reported at once', () => {
  const issues = spoilt((job) => {
    setOn('C1', { lengthM: -1, size: 35 })(job);
    setOn('S1', { capacityAh: '1 kg', chemistry: 'x' })(job);
    job.cases.push({ id: 'x', set: { C1: { endOhm: -1 }, F1: { state: 'ajar' } } });
    job.readings[0]!['plus'] = 'nowhere';
    job['practice'] = 3;
  });
  expect(new Set(issues.map((issue) => issue.path))).toEqual(
    new Set([
      'practice',
      'parts[0].capacityAh',
      'parts[0].chemistry',
      'parts[2].lengthM',
      'parts[2].size',
      'cases[2].set.C1.endOhm',
      'cases[2].set.F1.state',
      'readings[0].plus',
    ]),
  );
});

test('a slip in a part does not make its junctions and its id unknown to others', () => {
  const issues = spoilt((job) => {
    setOn('S1', { capacityAh: -1 })(job);
  });
  expect(issues.map((issue) => issue.path)).toEqual(['parts[0].capacityAh']);
});

test('the issues listed are at most 200, and the rest are counted', () => {
  const issues = spoilt((job) => {
    for (let i = 0; i < 500; i += 1)
      job.parts.push({ id: `X${String(i)}`, kind: 'joint', from: 'B+', to: 'N', resistanceOhm: -1 });
  });
  expect(issues).toHaveLength(201);
  expect(issues.at(-1)).toEqual({ path: '', code: 'too-many', message: 'And 300 more issues that are not listed.' });
});

test('what is no job at all is said so', () => {
  for (const value of [null, undefined, 5, 'job', [], true]) {
    expect(issuesOf(value)).toEqual([expect.objectContaining({ path: '', code: 'wrong-type' })]);
  }
  expect(issuesOf({})).toEqual([expect.objectContaining({ path: 'format', code: 'missing' })]);
  expect(issuesOf({ format: 'other' })).toEqual([expect.objectContaining({ path: 'format', code: 'wrong-format' })]);
});

test('fields that an object inherits are not fields of the file', () => {
  const job = Object.create(everyKind()) as unknown;
  expect(issuesOf(job)).toEqual([expect.objectContaining({ path: 'format', code: 'missing' })]);
});
