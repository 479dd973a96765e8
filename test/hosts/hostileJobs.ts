/**
 * Texts that pretend to be jobs and are not, made the same on every run. None of them is a good job, so each must be answered with
 * issues; none of them may make the program throw, hang, or print anything but sentences.
 */
import { everyKind, type RawJob } from '../core/jobEveryKind.ts';

export interface HostileJob {
  readonly name: string;
  readonly text: string;
  /** Where the trouble is; `undefined` where the text as a whole is none. */
  readonly path: string | undefined;
}

type Step = string | number;

/** Marsaglia's xorshift, 32 bits: the same numbers on every run. */
function dice(seed: number): (below: number) => number {
  let state = seed | 1;
  return (below) => {
    state ^= state << 13;
    state ^= state >>> 17;
    state ^= state << 5;
    return (state >>> 0) % below;
  };
}

/** Stands for a piece of text that JSON itself cannot write; replaced after the job is written. */
const RAW = '@@raw@@';

/** Paths to every value of the example that is read by a rule: all but the `x-` fields and free keys. */
function pathsOf(value: unknown, at: readonly Step[] = []): (readonly Step[])[] {
  if (Array.isArray(value)) return [at, ...value.flatMap((item: unknown, index) => pathsOf(item, [...at, index]))];
  if (typeof value !== 'object' || value === null) return [at];
  const fields = Object.entries(value).filter(([name]) => !name.startsWith('x-'));
  return [at, ...fields.flatMap(([name, item]) => pathsOf(item, [...at, name]))];
}

function valueAt(job: unknown, path: readonly Step[]): unknown {
  return path.reduce((value, step) => (value as Record<Step, unknown>)[step], job);
}

/** The example with one value replaced. */
function withValue(path: readonly Step[], value: unknown): RawJob {
  const job = everyKind();
  if (path.length === 0) return value as RawJob;
  const holder = valueAt(job, path.slice(0, -1)) as Record<Step, unknown>;
  holder[path.at(-1)!] = value;
  return job;
}

/** A path as the program prints it. */
function written(path: readonly Step[]): string {
  return path.reduce<string>((text, step) => {
    if (typeof step === 'number') return `${text}[${String(step)}]`;
    if (!/^[A-Za-z_][A-Za-z0-9_-]*$/.test(step)) return `${text}["${step}"]`;
    return text === '' ? step : `${text}.${step}`;
  }, '');
}

/** Values that no field of a job may hold. */
const alwaysWrong: readonly (readonly [name: string, value: unknown, raw?: string])[] = [
  ['null', null],
  ['lists in lists', [[[]]]],
  ['an object', { a: { b: [1] } }],
  ['something like a reference', { $ref: '#/parts/0' }],
  ['too large a number', RAW, '1e999'],
  ['too negative a number', RAW, '-1e999'],
  ['half a character', '\ud800'],
  ['a bell', 'a\u0007b'],
];

/** Texts that no figure of a job may be. */
const noFigure = [
  '5 furlongs per fortnight',
  'NaN',
  'Infinity',
  '-Infinity m',
  '1e999 m',
  '1e400',
  '0x10 m',
  '١٢ m',
  '3 m; process.exit()',
  '(() => 1)()',
  'sqrt(4) ohm',
  '\u0024{7*7} V',
  "'; drop table parts; --",
  '../../../etc/passwd',
  'm',
  '',
  ' ',
  '+',
  '1 kg',
  '1 mol + 1 m',
  'cos(45 deg)',
  '🔋',
  '12\u0000 V',
  'x'.repeat(100_000),
  `${'1 m+'.repeat(5000)}1 m`,
];

function wrongTypes(next: (below: number) => number, count: number): HostileJob[] {
  const paths = pathsOf(everyKind()).filter((path) => path.length > 0);
  return Array.from({ length: count }, () => {
    // `junctions` and the overrides of cases are keyed freely; any of their fields may be replaced but not they by an object.
    let path = paths[next(paths.length)]!;
    let [name, value, raw] = alwaysWrong[next(alwaysWrong.length)]!;
    const held = valueAt(everyKind(), path);
    if (Array.isArray(held) || (typeof held === 'object' && held !== null)) [name, value, raw] = alwaysWrong[0]!;
    if (path[0] === 'notes') path = ['title'];
    const text = JSON.stringify(withValue(path, value)).replaceAll(`"${RAW}"`, raw ?? '');
    return { name: `${name} at ${written(path)}`, text, path: written(path) };
  });
}

function wrongFigures(next: (below: number) => number, count: number): HostileJob[] {
  const paths = pathsOf(everyKind()).filter(
    (path) => typeof valueAt(everyKind(), path) === 'number' && path[0] !== 'version',
  );
  return Array.from({ length: count }, () => {
    const path = paths[next(paths.length)]!;
    const text = noFigure[next(noFigure.length)]!;
    return {
      name: `${JSON.stringify(text.slice(0, 30))} at ${written(path)}`,
      text: JSON.stringify(withValue(path, text)),
      path: written(path),
    };
  });
}

function truncated(next: (below: number) => number, count: number): HostileJob[] {
  const whole = JSON.stringify(everyKind(), null, 1);
  return Array.from({ length: count }, () => {
    const length = next(whole.length);
    return { name: `cut off after ${String(length)}`, text: whole.slice(0, length), path: undefined };
  });
}

/** A quotation mark too many turns texts inside out; a control character belongs nowhere; both are never JSON. */
function damaged(next: (below: number) => number, count: number): HostileJob[] {
  const whole = JSON.stringify(everyKind());
  return Array.from({ length: count }, () => {
    let at = next(whole.length);
    while (whole[at - 1] === '\\') at += 1;
    const sign = next(2) === 0 ? '"' : '\u0001';
    return {
      name: `${JSON.stringify(sign)} at ${String(at)}`,
      text: whole.slice(0, at) + sign + whole.slice(at),
      path: undefined,
    };
  });
}

function reservedNames(next: (below: number) => number, count: number): HostileJob[] {
  const holders = pathsOf(everyKind()).filter((path) => {
    const held = valueAt(everyKind(), path);
    return typeof held === 'object' && held !== null && !Array.isArray(held);
  });
  const names = ['__proto__', 'constructor', 'prototype'];
  return Array.from({ length: count }, () => {
    const path = holders[next(holders.length)]!;
    const name = names[next(names.length)]!;
    const held = { ...(valueAt(everyKind(), path) as object), [RAW]: { polluted: true } };
    const text = JSON.stringify(withValue(path, held)).replace(`"${RAW}"`, `"${name}"`);
    return { name: `${name} in ${written(path)}`, text, path: written([...path, name]) };
  });
}

function misspelt(next: (below: number) => number, count: number): HostileJob[] {
  const holders = pathsOf(everyKind()).filter((path) => {
    const held = valueAt(everyKind(), path);
    const keyedFreely = path[0] === 'junctions' && path.length === 1;
    return typeof held === 'object' && held !== null && !Array.isArray(held) && !keyedFreely;
  });
  const names = [
    'lenghtM',
    'Kind',
    'ID',
    'plus ',
    'toString',
    'hasOwnProperty',
    '',
    '\u0000',
    '😀',
    'a'.repeat(5000),
    '$where',
    'x_note',
    'length',
  ];
  return Array.from({ length: count }, () => {
    const path = holders[next(holders.length)]!;
    const name = names[next(names.length)]!;
    const held = { ...(valueAt(everyKind(), path) as object), [name]: 1 };
    return {
      name: `field ${JSON.stringify(name.slice(0, 20))} in ${written(path)}`,
      text: JSON.stringify(withValue(path, held)),
      path: written(path),
    };
  });
}

function oddIds(): HostileJob[] {
  const ids = [
    '',
    ' ',
    'a/b',
    'Ä',
    '\u0000',
    '\ud800',
    '😀',
    'a\nb',
    '<script>',
    '\u0024{x}',
    '../x',
    'x'.repeat(100_000),
    'ａ',
    'a\u200bb',
    '__proto__',
    'constructor',
    'S1',
    'P1.plus',
    7,
    null,
    {},
    [],
  ];
  return ids.map((id) => {
    const text = JSON.stringify(withValue(['parts', 20, 'id'], id));
    return { name: `id ${JSON.stringify(id).slice(0, 40)}`, text, path: 'parts[20].id' };
  });
}

function whole(): HostileJob[] {
  const job = (parts: unknown, rest: Record<string, unknown> = {}): string =>
    JSON.stringify({ format: 'ohmwright-job', version: 1, practice: 'iec-land', parts, ...rest });
  const joint = (i: number): unknown => ({
    id: `J${String(i)}`,
    kind: 'joint',
    from: `n${String(i)}`,
    to: `n${String(i + 1)}`,
    resistanceOhm: 1,
  });
  const text = (name: string, content: string): HostileJob => ({ name, text: content, path: undefined });
  return [
    text('nothing', ''),
    text('spaces', ' \n\t'),
    text('a nought byte', '\u0000'),
    text('a number', '5'),
    text('a text', '"job"'),
    text('a list', '[]'),
    text('null', 'null'),
    text('an empty object', '{}'),
    text('a page', '<!doctype html><title>no</title>'),
    text('a list of parts', '- id: C1\n  kind: cable\n'),
    text('a script', 'export default { format: "ohmwright-job" }'),
    text('a comment', '// hello\n{}'),
    text('lists a million deep', '['.repeat(1e6)),
    text('objects a million deep', '{"a":'.repeat(1e6)),
    text('parts a hundred deep', job(JSON.parse('['.repeat(100) + ']'.repeat(100)))),
    text('a quotation mark for ever', `"${'a'.repeat(1e6)}`),
    text('a million digits', '9'.repeat(1e6)),
    text('a million backslashes', `"${'\\'.repeat(1e6)}`),
    text('a hundred thousand parts', job(Array.from({ length: 100_000 }, (_, i) => joint(i)))),
    text('a hundred thousand empty parts', job(Array.from({ length: 100_000 }, () => ({})))),
    text('twenty thousand wrong parts', job(Array.from({ length: 20_000 }, () => 5))),
    text('twenty thousand parts of one id', job(Array.from({ length: 20_000 }, () => joint(1)))),
    text(
      'twenty thousand unknown references',
      job([], {
        readings: Array.from({ length: 20_000 }, (_, i) => ({
          id: `R${String(i)}`,
          quantity: 'current',
          part: `X${String(i)}`,
          valueA: 1,
        })),
      }),
    ),
    text('ten thousand cases', job([], { cases: Array.from({ length: 10_000 }, (_, i) => ({ id: `c${String(i)}` })) })),
    text('a version to come', JSON.stringify({ ...everyKind(), version: 2 })),
    text('a version that never was', JSON.stringify({ ...everyKind(), version: -1 })),
    text('another format', JSON.stringify({ ...everyKind(), format: 'other' })),
    text(
      'every field twice',
      JSON.stringify(everyKind()).replace('{', `{${JSON.stringify(everyKind()).slice(1, -1)},`),
    ),
    text('no quotes at all', JSON.stringify(everyKind()).replaceAll('"', '')),
    text('single quotes', JSON.stringify(everyKind()).replaceAll('"', "'")),
    text('NaN for every number', JSON.stringify(everyKind()).replaceAll(/:\d+/g, ':NaN')),
    text('minus every number', JSON.stringify(everyKind()).replaceAll(/:(\d)/g, ':-$1')),
    text('a case that sets itself', job([joint(1)], { cases: [{ id: 'a', set: { a: { set: { a: {} } } } }] })),
    text(
      'parts that hold each other',
      job([
        { id: 'A', kind: 'pair', from: 'B', to: 'A', lengthM: 1, size: '6 AWG' },
        { id: 'B', kind: 'pair', from: 'A', to: 'B', lengthM: 1 },
      ]),
    ),
  ];
}

/** At least 500 hostile texts, the same on every run. */
export function hostileJobs(): readonly HostileJob[] {
  const next = dice(20_240_607);
  return [
    ...whole(),
    ...oddIds(),
    ...wrongTypes(next, 160),
    ...wrongFigures(next, 120),
    ...truncated(next, 80),
    ...damaged(next, 60),
    ...reservedNames(next, 40),
    ...misspelt(next, 60),
  ];
}
