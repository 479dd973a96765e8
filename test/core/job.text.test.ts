import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { parseJob } from '../../core/job/parseJob.ts';
import { largestTextLength, readJson } from '../../core/job/readJson.ts';
import { everyKind } from './jobEveryKind.ts';

function issueOf(text: string): { path: string; code: string; message: string } {
  const read = readJson(text);
  if (read.ok) throw new Error(`${text.slice(0, 60)} was read`);
  expect(read.issues).toHaveLength(1);
  return read.issues[0]!;
}

describe("the reader agrees with the language's own on what JSON is", () => {
  type Verdict = { read: true; value: unknown } | { read: false };
  function languageVerdict(text: string): Verdict {
    try {
      return { read: true, value: JSON.parse(text) as unknown };
    } catch {
      return { read: false };
    }
  }
  /** Where the only thing wrong is a field given twice, which the language reads, the language's own verdict. */
  function verdict(text: string): Verdict {
    const ours = readJson(text);
    if (ours.ok) return { read: true, value: ours.value };
    return ours.issues.every((issue) => issue.code === 'duplicate-field') ? languageVerdict(text) : { read: false };
  }

  test('on every value that can be written', () => {
    const names = fc
      .string({ unit: 'binary', maxLength: 8 })
      .filter((name) => !['__proto__', 'constructor', 'prototype'].includes(name));
    const values = fc.letrec((tie) => ({
      value: fc.oneof(
        { maxDepth: 5 },
        fc.double({ noNaN: true, noDefaultInfinity: true }),
        fc.string({ unit: 'binary', maxLength: 20 }),
        fc.boolean(),
        fc.constant(null),
        fc.array(tie('value'), { maxLength: 5 }),
        fc.dictionary(names, tie('value'), { maxKeys: 5, noNullPrototype: true }),
      ),
    })).value;
    fc.assert(
      fc.property(values, fc.constantFrom(undefined, 1, '\t'), (value, indent) => {
        const text = JSON.stringify(value, null, indent);
        expect(readJson(text)).toEqual({ ok: true, value: JSON.parse(text) as unknown });
      }),
      { seed: 41, numRuns: 1000 },
    );
  });

  test('on texts that have been damaged', () => {
    const whole = JSON.stringify(
      { a: [1, -2.5e-3, 'x\n\u00e9"\\', true, false, null, {}], b: { c: [[], [0]] } },
      null,
      1,
    );
    const signs = [
      ...Array.from('{}[]",:\\ \n\ttfn0129.eE+-u\u0000\u001f\u2028/\'#'),
      'null',
      'NaN',
      '\\u12',
      '\ud800',
      '\u00a0',
      '\ufeff',
    ];
    fc.assert(
      fc.property(fc.nat(whole.length), fc.nat(3), fc.constantFrom(...signs), (at, cut, sign) => {
        const text = whole.slice(0, at) + sign + whole.slice(at + cut);
        expect(verdict(text)).toEqual(languageVerdict(text));
      }),
      { seed: 42, numRuns: 5000 },
    );
  });

  test('on short texts of JSON signs', () => {
    const pieces = fc.constantFrom(
      '{',
      '}',
      '[',
      ']',
      ',',
      ':',
      '"a"',
      '"b"',
      '1',
      '-',
      '0',
      '.5',
      'e3',
      'true',
      'null',
      ' ',
      '\n',
      '"',
      '\\',
    );
    fc.assert(
      fc.property(fc.array(pieces, { maxLength: 9 }), (list) => {
        const text = list.join('');
        expect(verdict(text)).toEqual(languageVerdict(text));
      }),
      { seed: 43, numRuns: 20_000 },
    );
  });
});

describe('a text that is no JSON is told where', () => {
  test.each<[string, string, string]>([
    ['', 'the text is empty', 'line 1, column 1'],
    ['   \n', 'the text is empty', 'line 2, column 1'],
    ['{"a": 1,\n "b" 2}', 'expected ":" after the field name "b", found "2"', 'line 2, column 6'],
    ['{"a": 1 "b": 2}', 'expected "," or "}" after a field, found', 'line 1, column 9'],
    ['[1, 2', 'expected "," or "]" after an item of a list, found the end of the text', 'line 1, column 6'],
    ['{"a": NaN}', 'NaN is no number that a job can hold', 'line 1, column 7'],
    ['[-Infinity]', '-Infinity is no number', 'line 1, column 2'],
    ['{a: 1}', 'expected a field name in double quotes, found "a"', 'line 1, column 2'],
    ["{'a': 1}", 'expected a field name in double quotes', 'line 1, column 2'],
    ['[1,]', 'expected a value, found "]"', 'line 1, column 4'],
    ['[01]', 'expected a number, found "01"', 'line 1, column 2'],
    ['[1.]', 'expected a number', 'line 1, column 2'],
    ['["abc', 'no closing quote', 'line 1, column 2'],
    ['["a\nb"]', 'a closing quote is missing', 'line 1, column 4'],
    ['["\\q"]', 'a backslash in a text must be followed by', 'line 1, column 3'],
    ['{} {}', 'expected the end of the text after the job', 'line 1, column 4'],
    ['// job\n{}', 'expected a value', 'line 1, column 1'],
  ])('%j', (text, what, where) => {
    const issue = issueOf(text);
    expect(issue).toMatchObject({ path: '', code: 'not-json' });
    expect(issue.message).toContain(what);
    expect(issue.message).toContain(where);
  });

  test('a number that is too large to be one is read and then refused by its field', () => {
    expect(readJson('[1e999]')).toEqual({ ok: true, value: [Number.POSITIVE_INFINITY] });
    const job = JSON.stringify(everyKind()).replace('"blocksInSeries":2', '"blocksInSeries":1e999');
    const read = parseJob(job);
    expect(read.ok ? [] : read.issues).toEqual([
      expect.objectContaining({ path: 'parts[0].blocksInSeries', code: 'out-of-range' }),
    ]);
  });

  test('a byte order mark is passed over', () => {
    expect(readJson('\ufeff[1]')).toEqual({ ok: true, value: [1] });
  });
});

describe('what the language would let pass is refused', () => {
  test('a field that is given twice', () => {
    const issue = issueOf('{"parts": [{"lengthM": 1, "lengthM": 2}]}');
    expect(issue).toMatchObject({ path: 'parts[0].lengthM', code: 'duplicate-field' });
  });
  test.each(['__proto__', 'constructor', 'prototype', '\\u005f_proto__'])('a field called %s', (name) => {
    const issue = issueOf(`{"parts": [{"${name}": {"polluted": true}}]}`);
    expect(issue.code).toBe('forbidden-field');
    expect(issue.path).toMatch(/^parts\[0\]\./);
    expect(({} as Record<string, unknown>)['polluted']).toBeUndefined();
  });
});

describe('limits', () => {
  test('a million lists in each other do not overflow the stack', () => {
    for (const text of ['['.repeat(1e6), '{"a":'.repeat(1e6), '['.repeat(1e6) + ']'.repeat(1e6)]) {
      expect(issueOf(text)).toMatchObject({ code: 'too-deep' });
    }
  });
  test('a text over the limit is refused before it is read', () => {
    expect(issueOf(' '.repeat(largestTextLength + 1))).toMatchObject({ path: '', code: 'too-large' });
  });
  test('one text or number of millions of signs is no trouble', () => {
    const long = 'x'.repeat(3e7);
    expect(readJson(JSON.stringify([long]))).toEqual({ ok: true, value: [long] });
    expect(issueOf('['.concat('9'.repeat(3e7), ']'))).toMatchObject({ code: 'not-json' });
    expect(issueOf(`[${'n'.repeat(3e7)}]`)).toMatchObject({ code: 'not-json' });
    expect(issueOf(`["${'\\n'.repeat(1e7)}`)).toMatchObject({ code: 'not-json' });
  });

  function jointsInARow(count: number): string {
    const parts: unknown[] = [
      {
        id: 'S',
        kind: 'string',
        plus: 'J0',
        minus: `J${String(count)}`,
        chemistry: 'lfp',
        blocksInSeries: 4,
        blockNominalV: 3.2,
        capacityAh: '100 Ah',
      },
    ];
    for (let i = 0; i < count; i += 1) {
      parts.push({
        id: `C${String(i)}`,
        kind: 'cable',
        from: `J${String(i)}`,
        to: `J${String(i + 1)}`,
        lengthM: `${String(i)} cm`,
        size: '35 mm2',
        endOhm: '0.1 mOhm',
      });
    }
    return JSON.stringify({ format: 'ohmwright-job', version: 1, practice: 'iec-land', parts });
  }
  test('five thousand parts are read', () => {
    const read = parseJob(jointsInARow(4999));
    expect(read.ok && read.value.parts.length).toBe(5000);
  });
  test('a hundred thousand parts are refused with the limit', () => {
    const read = parseJob(jointsInARow(99_999));
    expect(read.ok ? [] : read.issues).toEqual([
      { path: 'parts', code: 'too-many', message: 'A job may have 20000 parts, this one has 100000.' },
    ]);
  });
  test('a small file cannot ask for millions of changed parts', () => {
    const string = (i: number): unknown => ({
      id: `S${String(i)}`,
      kind: 'string',
      plus: 'a',
      minus: 'b',
      chemistry: 'lfp',
      blocksInSeries: 4,
      blockNominalV: 3.2,
      capacityAh: 100,
    });
    const job = {
      format: 'ohmwright-job',
      version: 1,
      parts: Array.from({ length: 5000 }, (_, i) => string(i)),
      cases: Array.from({ length: 900 }, (_, i) => ({ id: `c${String(i)}`, stateOfCharge: 0.5 })),
    };
    const read = parseJob(JSON.stringify(job));
    expect(read.ok ? [] : read.issues).toEqual([expect.objectContaining({ path: 'cases', code: 'too-many' })]);
  });
});
