import { createHash } from 'node:crypto';
import {
  mkdirSync,
  mkdtempSync,
  readdirSync,
  readFileSync,
  rmSync,
  statSync,
  symlinkSync,
  writeFileSync,
} from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { buildCli, cliFile, runCli, runShell, traces } from './builtCli.ts';
import { tenAmps, thinCable, tooMuch, twoSlips } from './smallJobs.ts';

let folder = '';
const at = (name: string): string => join(folder, name);

beforeAll(async () => {
  await buildCli();
  folder = mkdtempSync(join(tmpdir(), 'ohmwright-cli-'));
  const jobs = { tenAmps, tooMuch, thinCable, twoSlips };
  for (const [name, job] of Object.entries(jobs)) writeFileSync(at(`${name}.job.json`), JSON.stringify(job));
});
afterAll(() => {
  rmSync(folder, { recursive: true, force: true });
});

interface CaseAnswer {
  case: string;
  outcome: string;
  junctions: Record<string, number | null>;
  parts: Record<
    string,
    { currentA: number | null; voltageV: number | null; powerW: number | null; dropV: number | null; state?: string }
  >;
  proof: Record<string, number>;
  collapse?: { load: string; wantedW: number; largestDeliverableW: number; message: string };
}
const solved = (stdout: string): { cases: CaseAnswer[] } => JSON.parse(stdout) as { cases: CaseAnswer[] };

describe('solve', () => {
  test('answers volts, amps and watts of every case as one JSON document, status 0', async () => {
    const run = await runCli(['solve', at('tenAmps.job.json'), '--json']);
    expect([run.status, run.stderr]).toEqual([0, '']);
    const { cases } = solved(run.stdout);
    expect(cases.map((each) => each.case)).toEqual(['on', 'off']);
    const on = cases[0]!;
    expect(on.outcome).toBe('solved');
    // By hand: 12.6 V / (0.01 + 1.25) Ω = 10 A, 12.5 V, 125 W. A linear network of two parts is solved to rounding.
    expect(on.parts['L1']?.currentA).toBeCloseTo(10, 9);
    expect(on.parts['S1']?.currentA).toBeCloseTo(10, 9);
    expect(on.junctions['B+']).toBeCloseTo(12.5, 9);
    expect(on.junctions['B-']).toBe(0);
    expect(on.parts['L1']?.powerW).toBeCloseTo(125, 8);
    expect(cases[1]?.parts['L1']).toMatchObject({ currentA: 0, state: 'off' });
    expect(Object.keys(on.proof)).toEqual(
      expect.arrayContaining([
        'worstJunctionA',
        'worstLoopV',
        'powerInW',
        'powerOutW',
        'mismatchW',
        'relativeResidual',
        'iterations',
      ]),
    );
  });

  test('prints tables and the line that proves the balance for a person', async () => {
    const run = await runCli(['solve', at('tenAmps.job.json'), '--case', 'on']);
    expect(run.status).toBe(0);
    expect(run.stdout).toMatch(/^L1 +load +10\.00 +12\.500 +125\.0/m);
    expect(run.stdout).toMatch(/^B\+ +12\.500$/m);
    expect(run.stdout).toMatch(/Balance: in 125 W = out 125 W \+ heat 0 W|Balance: in \d/);
    expect(run.stdout).not.toContain('Case off');
  });

  test('a collapse names the load and the most it could have, status 1', async () => {
    const json = await runCli(['solve', at('tooMuch.job.json'), '--json']);
    expect(json.status).toBe(1);
    const { collapse, outcome } = solved(json.stdout).cases[0]!;
    expect([outcome, collapse?.load]).toEqual(['collapse', 'L1']);
    // E² / 4R = 3969 W by hand; the continuation to the nose ends within a part in a thousand of it.
    expect(Math.abs((collapse?.largestDeliverableW ?? 0) / 3969 - 1)).toBeLessThan(1e-3);
    const text = await runCli(['solve', at('tooMuch.job.json')]);
    expect(text.status).toBe(1);
    expect(text.stdout).toContain('3.969 kW');
  });

  test('at-rest is always there by name, and only by name', async () => {
    const run = await runCli(['solve', at('tenAmps.job.json'), '--json', '--case', 'at-rest', '--case', 'on']);
    expect(solved(run.stdout).cases.map((each) => each.case)).toEqual(['at-rest', 'on']);
    expect(solved(run.stdout).cases[0]?.parts['S1']?.currentA).toBe(0);
  });

  test('the battery in its first second is another battery', async () => {
    const job = {
      ...tenAmps,
      parts: (tenAmps['parts'] as Record<string, unknown>[]).map(({ resistanceOhm, ...part }) =>
        part['kind'] === 'string' ? part : { ...part, resistanceOhm },
      ),
    };
    const amps = async (model: string): Promise<number> => {
      const run = await runCli(['solve', '-', '--json', '--model', model], { input: JSON.stringify(job) });
      return solved(run.stdout).cases[0]?.parts['L1']?.currentA ?? 0;
    };
    expect(await amps('fast')).toBeGreaterThan(await amps('slow'));
  });
});

describe('check', () => {
  test('a fuse far above its cable is found, status 1', async () => {
    const run = await runCli(['check', at('thinCable.job.json'), '--json']);
    expect(run.status).toBe(1);
    const { findings, notChecked, passed } = JSON.parse(run.stdout) as Record<
      'findings' | 'notChecked' | 'passed',
      Record<string, unknown>[]
    >;
    const fuse = findings.find((each) => each['rule'] === 'fuse-over-cable');
    expect(fuse).toMatchObject({
      severity: expect.stringMatching(/^(stop|fix)$/) as string,
      parts: expect.arrayContaining(['F1']) as string[],
      measured: { value: 300, unit: 'A' },
      limit: { value: expect.any(Number) as number, unit: 'A' },
      basisStatus: expect.stringMatching(/^(published|common-practice|from-memory)$/) as string,
    });
    for (const key of ['message', 'remedy', 'basis', 'case']) expect(typeof fuse?.[key]).toBe('string');
    expect([Array.isArray(notChecked), Array.isArray(passed)]).toEqual([true, true]);
  });
  test('for a person: what, where, measured, limit, remedy, basis', async () => {
    const run = await runCli(['check', at('thinCable.job.json')]);
    expect(run.status).toBe(1);
    expect(run.stdout).toMatch(/- fuse-over-cable at .*F1/);
    expect(run.stdout).toMatch(/Measured 300 A, limit [\d.]+ A\./);
    expect(run.stdout).toMatch(/Remedy: .+/);
    expect(run.stdout).toMatch(/Basis: .+/);
    expect(run.stdout).toContain('licensed');
    expect(run.stdout).not.toMatch(/\b(compliant|approved|safe)\b/i);
  });
  test('another practice may judge', async () => {
    const books = async (practice: string): Promise<string> =>
      (await runCli(['check', at('thinCable.job.json'), '--practice', practice])).stdout;
    expect(await books('us-marine')).toContain('Practice: us-marine');
    expect(await books('us-marine')).not.toBe(await books('iec-land'));
  });
  test('two practices may judge side by side, and what differs is told', async () => {
    const asked = ['check', at('thinCable.job.json'), '--practice', 'us-marine', '--beside', 'iso-marine'];
    const [text, json] = await Promise.all([runCli(asked), runCli([...asked, '--json'])]);
    expect(text.stdout).toContain('Where us-marine and iso-marine differ:');
    const answer = JSON.parse(json.stdout) as {
      practice: string;
      findings: { rule: string; limit: { value: number } }[];
      beside: { practice: string; findings: { rule: string; limit: { value: number } }[] };
    };
    expect([answer.practice, answer.beside.practice]).toEqual(['us-marine', 'iso-marine']);
    const limitOf = ({ findings }: Pick<typeof answer, 'findings'>) =>
      findings.find(({ rule }) => rule === 'fuse-over-cable')?.limit.value ?? 0;
    // 33 CFR 183 lets a fuse stand at half as much again as its cable below 50 V, the ISO book at its ampacity.
    expect(limitOf(answer)).toBeGreaterThan(limitOf(answer.beside));
    expect(limitOf(answer.beside)).toBeGreaterThan(0);
  });
  test('a job that names no practice is told so, and its book is not checked rather than passed', async () => {
    const input = JSON.stringify({ ...thinCable, practice: undefined });
    const run = await runCli(['check', '-', '--json'], { input });
    expect(run.stderr).toContain('names no practice');
    const { practiceAssumed, notChecked } = JSON.parse(run.stdout) as {
      practiceAssumed: boolean;
      notChecked: { rule: string }[];
    };
    expect(practiceAssumed).toBe(true);
    expect(notChecked.map((each) => each.rule)).toContain('fuse-over-cable');
    expect((await runCli(['check', '-', '--quiet'], { input })).stderr).toBe('');
  });
});

describe('strings', () => {
  /** Two blocks on 10 mΩ each, 12.6 V and 12.4 V, feed 1.25 Ω. */
  const pair = {
    ...tenAmps,
    parts: [
      ...(tenAmps['parts'] as Record<string, unknown>[]),
      { ...(tenAmps['parts'] as Record<string, unknown>[])[0], id: 'S2', emfV: 12.4 },
    ],
  };
  const asked = async (...words: string[]) =>
    await runCli(['strings', '-', '--draws', '20', ...words], { input: JSON.stringify(pair) });

  test('answers every key of the contract as one JSON document, status 0', async () => {
    const run = await asked(
      '--json',
      '--join',
      'S1,S2',
      '--lead',
      '2 mOhm',
      '--drift',
      '1',
      '--cycle',
      'on:1 h,off:1 h',
    );
    expect([run.status, run.stderr]).toEqual([0, '']);
    const answer = JSON.parse(run.stdout) as Record<string, Record<string, unknown>[]> & {
      atRest: Record<string, unknown>;
      band: Record<string, Record<string, number>>;
    };
    const keysOf = (value: unknown): string[] => Object.keys(value as object);
    expect(keysOf(answer)).toEqual(
      expect.arrayContaining(['cases', 'atRest', 'joining', 'layouts', 'oneOut', 'band', 'drift']),
    );
    expect(answer['cases']?.map((each) => [each['case'], each['model']])).toEqual([
      ['on', 'slow'],
      ['on', 'fast'],
      ['off', 'slow'],
      ['off', 'fast'],
    ]);
    const [first] = answer['cases']![0]!['strings'] as unknown[];
    expect(keysOf(first)).toEqual(
      expect.arrayContaining(['id', 'currentA', 'share', 'fairShare', 'deviation', 'cRate']),
    );
    expect(answer['cases']![0]).toHaveProperty('spread');
    // By hand: 0.2 V through 20 mΩ is 10 A.
    expect(answer.atRest).toMatchObject({ pairs: [{ from: 'S1', to: 'S2' }] });
    expect((answer.atRest['strings'] as { currentA: number }[])[0]?.currentA).toBeCloseTo(10, 9);
    expect(answer.atRest['lostW']).toBeCloseTo(2, 9);
    expect(keysOf(answer['joining']![0])).toEqual(
      expect.arrayContaining(['a', 'b', 'gapV', 'inrushA', 'safeGapV', 'settleS', 'movedAh', 'lostWh', 'resistor']),
    );
    expect(answer['joining']![0]?.['gapV']).toBeCloseTo(0.2, 9);
    expect(keysOf(answer['layouts']![0])).toEqual(
      expect.arrayContaining(['name', 'plusAt', 'minusAt', 'strings', 'spread', 'lostW', 'cableM']),
    );
    expect(keysOf(answer['oneOut']![0])).toEqual(expect.arrayContaining(['lost', 'strings']));
    expect(keysOf(answer.band['S1'])).toEqual(expect.arrayContaining(['p05A', 'p50A', 'p95A']));
  });

  test('for a person: the answer in sentences first, then the tables', async () => {
    const run = await asked('--join', 'S1,S2', '--volts', '12.8 V,12.1 V', '--limit', '20 A', '--model', 'slow');
    expect([run.status, run.stderr]).toEqual([0, '']);
    const [answer, table] = [
      run.stdout.indexOf('10 A flows between the strings'),
      run.stdout.indexOf('Sharing, battery'),
    ];
    expect(answer).toBeGreaterThan(-1);
    expect(table).toBeGreaterThan(answer);
    expect(run.stdout).toMatch(/- Joining S1 and S2 now: 0\.7 V apart, S1 gives .* beyond the 20 A/);
    expect(run.stdout).not.toContain('first second A');
    expect(run.stdout).toContain('licensed');
  });

  test('the same seed draws the same, another seed something else', async () => {
    const [one, again, other] = await Promise.all([asked('--json'), asked('--json'), asked('--json', '--seed', '2')]);
    expect(again.stdout).toBe(one.stdout);
    expect(other.stdout).not.toBe(one.stdout);
  });

  test('a collapse is status 1, and a single string is told that it shares with none', async () => {
    const run = await runCli(['strings', at('tooMuch.job.json')]);
    expect(run.status).toBe(1);
    expect(run.stdout).toContain('No two strings of the job lie side by side');
  });

  test('words that say nothing are refused in one sentence each, status 2', async () => {
    const wrong: readonly (readonly [readonly string[], RegExp])[] = [
      [['--join', 'S1,S3'], /no string "S3" \(did you mean S1\?\)/],
      [['--join', 'S1'], /two sides with a comma/],
      [['--join', 'S1,S1'], /same string on both sides/],
      [['--join', 'S1,S2', '--volts', '12.8,12.1'], /has no unit/],
      [['--join', 'S1,S2', '--charge', '0.9,1.4'], /from 0 to 1, got "1\.4"/],
      [['--join', 'S1,S2', '--join', 'S2,S1', '--volts', '12.8 V,12.1 V'], /once for each --join/],
      [['--volts', '12.8 V,12.1 V'], /name its two sides with --join/],
      [['--lead', '2 m'], /expected a resistance/],
      [['--draws', 'many'], /whole number from 1 to 1000000/],
      [['--draws', '1000001'], /whole number from 1 to 1000000/],
      [['--seed', '-1'], /whole number from 0/],
      [['--cycle', 'on:1 h'], /how many with --drift/],
      [['--drift', '2', '--cycle', 'one:1 h'], /no case "one" \(did you mean on\?\)/],
      [['--drift', '2', '--cycle', 'on'], /steps such as/],
    ];
    const runs = await Promise.all(wrong.map(async ([words]) => await asked(...words)));
    for (const [index, run] of runs.entries()) {
      expect([run.status, run.stdout]).toEqual([2, '']);
      expect(run.stderr).toMatch(wrong[index]![1]);
      expect(run.stderr).not.toMatch(traces);
    }
  });
});

describe('faultlevel', () => {
  const keyed = (stdout: string) => JSON.parse(stdout) as Record<'junctions' | 'devices', Record<string, unknown>[]>;

  test('answers every key of the contract as one JSON document, status 0', async () => {
    const run = await runCli(['faultlevel', at('thinCable.job.json'), '--json']);
    expect([run.status, run.stderr]).toEqual([0, '']);
    const { junctions, devices } = keyed(run.stdout);
    // By hand: 12.6 V / 10 mΩ = 1260 A; behind 5 m of flexible 1.5 mm2 (13.3 mΩ/m, IEC 60228) 12.6 V / 76.5 mΩ = 164.7 A.
    const bank = junctions.find(({ junction }) => junction === 'B+')!;
    expect(bank['prospectiveMaxA']).toBeCloseTo(1260, 6);
    expect(bank['sourceResistanceOhm']).toBeCloseTo(0.01, 9);
    const end = junctions.find(({ junction }) => junction === 'L+')!;
    expect(end['prospectiveMaxA']).toBeCloseTo(164.7, 1);
    expect(end['prospectiveMinA']).toBeLessThan(end['prospectiveMaxA'] as number);
    expect(devices).toHaveLength(1);
    expect(devices[0]).toMatchObject({ id: 'F1', interruptA: 20_000, ok: true });
    expect(devices[0]!['maxA']).toBeCloseTo(1260, 6);
    expect(Object.keys(devices[0]!)).toEqual(expect.arrayContaining(['clearS', 'clears']));
  });

  test('takes its method and the junction to short to, and says so to a person', async () => {
    const iec = await runCli(['faultlevel', at('thinCable.job.json'), '--json', '--method', 'iec-61660', '--to', 'L-']);
    const bank = keyed(iec.stdout).junctions.find(({ junction }) => junction === 'B-')!;
    // The return of the load has no volts against the bank's minus.
    expect([bank['to'], bank['prospectiveMaxA']]).toEqual(['L-', 0]);
    const text = await runCli(['faultlevel', at('thinCable.job.json'), '--method', 'iec-61660']);
    expect(text.status).toBe(0);
    expect(text.stdout).toContain('Method: iec-61660');
    expect(text.stdout).toMatch(/B\+ +B- +1400 +1197/);
    const lost = await runCli(['faultlevel', at('thinCable.job.json'), '--to', 'L+x']);
    expect([lost.status, lost.stdout]).toEqual([2, '']);
    expect(lost.stderr).toContain('L+');
  });
});

describe('report', () => {
  test('writes a PDF, and the tree of the document as JSON', async () => {
    const run = await runCli(['report', at('tenAmps.job.json'), '--out', at('ten.pdf'), '--json']);
    expect(run.status).toBe(0);
    expect(readFileSync(at('ten.pdf')).subarray(0, 5).toString('latin1')).toBe('%PDF-');
    expect(readFileSync(at('ten.pdf')).subarray(-7).toString('latin1')).toContain('%%EOF');
    expect(JSON.parse(run.stdout)).toMatchObject({ format: 'ohmwright-report', title: 'Invented test job' });
  });
  test('needs to be told where to', async () => {
    const run = await runCli(['report', at('tenAmps.job.json')]);
    expect([run.status, run.stdout]).toEqual([2, '']);
    expect(run.stderr).toContain('--out');
  });
});

describe('lists', () => {
  test('writes the cut list, the fuse list and the parts list as CSV into a folder', async () => {
    const out = at('lists');
    const run = await runCli(['lists', at('thinCable.job.json'), '--out', out]);
    expect([run.status, run.stdout]).toEqual([0, '']);
    expect(readdirSync(out).toSorted()).toEqual(['cables.csv', 'fuses.csv', 'parts.csv']);
    const cables = readFileSync(join(out, 'cables.csv'), 'utf8').split('\r\n');
    expect(cables[0]).toMatch(/^\ufeffId,Label,From,To,Size,/);
    expect(cables[1]).toMatch(/^C1,,F\+,L\+,1\.5 mm²,.*,5,/);
    expect(cables).toHaveLength(4);
    expect(readFileSync(join(out, 'fuses.csv'), 'utf8')).toContain('F1,,fuse,,300,32,20000,,B+,F+,C1; C2,');
    expect(readFileSync(join(out, 'parts.csv'), 'utf8').trimEnd().split('\r\n')).toHaveLength(6);
  });
  test('never writes over a list that is there, and then writes none', async () => {
    const out = at('other-lists');
    mkdirSync(out);
    writeFileSync(join(out, 'parts.csv'), 'mine');
    const run = await runCli(['lists', at('thinCable.job.json'), '--out', out]);
    expect([run.status, run.stdout]).toEqual([4, '']);
    expect(run.stderr).toContain('parts.csv cannot be written: it exists already');
    expect(readdirSync(out)).toEqual(['parts.csv']);
    expect(readFileSync(join(out, 'parts.csv'), 'utf8')).toBe('mine');
  });
  test('answers the same rows as JSON; without either it has nowhere to go', async () => {
    const run = await runCli(['lists', at('thinCable.job.json'), '--json']);
    expect(run.status).toBe(0);
    const lists = JSON.parse(run.stdout) as Record<string, { headings: string[]; rows: string[][] }>;
    expect(Object.entries(lists).map(([name, { rows }]) => [name, rows.length])).toEqual([
      ['cables', 2],
      ['fuses', 1],
      ['parts', 5],
    ]);
    const nowhere = await runCli(['lists', at('thinCable.job.json')]);
    expect([nowhere.status, nowhere.stdout]).toEqual([2, '']);
    expect((await runCli(['lists', at('thinCable.job.json'), '--out', at('thinCable.job.json')])).status).toBe(4);
  });
});

describe('new', () => {
  test('lists the starters, and writes one that solves', async () => {
    const list = await runCli(['new']);
    expect(list.status).toBe(0);
    expect(list.stdout).toContain('weekend-hut');
    const out = at('hut.job.json');
    expect((await runCli(['new', 'weekend-hut', '--out', out])).status).toBe(0);
    expect((await runCli(['solve', out, '--quiet'])).status).toBe(0);
  });
  test('never puts a starter over a job that is there', async () => {
    const out = at('mine.job.json');
    writeFileSync(out, 'mine');
    const run = await runCli(['new', 'weekend-hut', '--out', out]);
    expect(run.status).toBe(4);
    expect(readFileSync(out, 'utf8')).toBe('mine');
  });
  test('every starter is a job without issues', async () => {
    const { starters } = JSON.parse((await runCli(['new', '--json'])).stdout) as {
      starters: { name: string; title: string }[];
    };
    expect(starters.length).toBeGreaterThan(0);
    for (const { name, title } of starters) expect([name, title === '']).toEqual([name, false]);
  });
});

describe('wrong words: status 2, nothing on standard output', () => {
  test.each<[string, string[], RegExp]>([
    ['no command', [], /Usage: ohmwright/],
    ['an unknown command', ['slove', 'x.job.json'], /unknown command/],
    ['a command that is not built', ['season', 'x.job.json'], /unknown command/],
    ['no job', ['solve'], /missing required argument/],
    ['two jobs', ['solve', 'a', 'b'], /too many arguments/],
    ['an unknown option', ['solve', 'TEN', '--fast'], /unknown option '--fast'/],
    ['a model that is none', ['solve', 'TEN', '--model', 'quick'], /Allowed choices are slow, fast/],
    ['a practice that is none', ['check', 'TEN', '--practice', 'moon'], /Allowed choices are us-land/],
    ['a case that is none', ['solve', 'TEN', '--case', 'onn'], /no case "onn" \(did you mean on\?\)/],
    ['an option without its value', ['solve', 'TEN', '--case'], /argument missing/],
    ['a starter that is none', ['new', 'weekend-hat'], /did you mean weekend-hut\?/],
    ['the job itself for an answer', ['solve', 'TEN', '--out', 'TEN'], /no command changes its input/],
  ])('%s', async (_, words, says) => {
    const run = await runCli(words.map((word) => (word === 'TEN' ? at('tenAmps.job.json') : word)));
    expect([run.status, run.stdout]).toEqual([2, '']);
    expect(run.stderr).toMatch(says);
    expect(run.stderr).not.toMatch(traces);
  });
  test('help and version are no wrong words', async () => {
    for (const words of [['--help'], ['solve', '--help']]) {
      const run = await runCli(words);
      expect([run.status, run.stderr]).toEqual([0, '']);
      expect(run.stdout).toContain('Usage: ohmwright');
    }
    const { version } = JSON.parse(readFileSync(new URL('../../package.json', import.meta.url), 'utf8')) as {
      version: string;
    };
    expect(await runCli(['--version'])).toMatchObject({ status: 0, stdout: `${version}\n`, stderr: '' });
  });
});

describe('a job with issues: status 3, all of them', () => {
  test('as JSON, and as lines with their paths', async () => {
    const json = await runCli(['check', at('twoSlips.job.json'), '--json']);
    expect([json.status, json.stderr]).toEqual([3, '']);
    expect(JSON.parse(json.stdout)).toEqual({
      issues: [
        { path: 'parts[1].lengthM', code: 'wrong-unit', message: expect.stringContaining('5 kg') as string },
        { path: 'parts[1].size', code: 'wrong-unit', message: expect.stringContaining('mm2 of copper') as string },
      ],
    });
    const text = await runCli(['solve', at('twoSlips.job.json')]);
    expect([text.status, text.stdout]).toEqual([3, '']);
    expect(text.stderr).toContain('parts[1].lengthM: ');
    expect(text.stderr).toContain('parts[1].size: ');
  });
  test('bytes that are no UTF-8, and text in UTF-16', async () => {
    const bad = await runCli(['solve', '-', '--json'], { input: Buffer.from([0x7b, 0xff, 0xfe, 0x7d]) });
    expect(bad.status).toBe(3);
    expect(JSON.parse(bad.stdout)).toMatchObject({
      issues: [{ path: '', code: 'not-json', message: expect.stringContaining('not UTF-8') as string }],
    });
    const wide = await runCli(['solve', '-'], { input: Buffer.from(`\ufeff${JSON.stringify(tenAmps)}`, 'utf16le') });
    expect(wide.status).toBe(3);
    expect(wide.stderr).toContain('looks like UTF-16');
  });
  test('a mark at the head of UTF-8 text is no trouble', async () => {
    expect((await runCli(['solve', '-', '--json'], { input: `\ufeff${JSON.stringify(tenAmps)}` })).status).toBe(0);
  });
  test('two hundred megabytes are not read to the end', async () => {
    const run = runShell('set +o pipefail; head -c 200000000 /dev/zero | $CLI solve - --json', folder);
    expect(run.status).toBe(3);
    expect(JSON.parse(run.stdout)).toMatchObject({ issues: [{ path: '', code: 'too-large' }] });
    const file = runShell('truncate -s 200M huge.job.json && $CLI solve huge.job.json --json', folder);
    expect(file.status).toBe(3);
    expect(JSON.parse(file.stdout)).toMatchObject({ issues: [{ code: 'too-large' }] });
  });
});

describe('files that cannot be read or written: status 4, nothing half-written', () => {
  test('a job that is not there, a folder, a path through a file', async () => {
    writeFileSync(at('plain'), 'x');
    for (const path of [at('nowhere.job.json'), folder, join(at('plain'), 'job.json')]) {
      const run = await runCli(['solve', path, '--json']);
      expect([path, run.status, run.stdout]).toEqual([path, 4, '']);
      expect(run.stderr).toMatch(/cannot be read: .+\.$/m);
      expect(run.stderr).not.toMatch(traces);
    }
  });
  test.each<[string, (command: string) => string[]]>([
    ['a folder', () => [folder]],
    ['a folder that is not there', () => [join(folder, 'no', 'where.pdf')]],
    ['a path through a file', () => [join(folder, 'tenAmps.job.json', 'x.pdf')]],
    ['a name that is too long', () => [join(folder, 'x'.repeat(300))]],
  ])('an answer into %s', async (_, out) => {
    for (const command of ['solve', 'report']) {
      const before = new Set(readdirSync(folder));
      const run = await runCli([command, at('tenAmps.job.json'), '--out', ...out(command)]);
      expect([run.status, run.stdout]).toEqual([4, '']);
      expect(run.stderr).toMatch(/cannot be written: .+\.$/m);
      expect(new Set(readdirSync(folder))).toEqual(before);
    }
  });
  test('a full disk leaves the old file as it was', () => {
    // Standard output and --out both go to a device that is always full.
    expect(runShell('$CLI solve tenAmps.job.json > /dev/full', folder)).toMatchObject({ status: 4 });
    const run = runShell('$CLI solve tenAmps.job.json --out /dev/full', folder);
    expect(run.status).toBe(4);
    expect(run.stderr).toContain('no space left');
    expect(statSync('/dev/full').isCharacterDevice()).toBe(true);
  });
  test('an answer replaces an old one whole, keeps who may read it, and follows a link', async () => {
    writeFileSync(at('old.txt'), 'old', { mode: 0o600 });
    symlinkSync('old.txt', at('link.txt'));
    expect((await runCli(['solve', at('tenAmps.job.json'), '--out', at('link.txt')])).status).toBe(0);
    expect(readFileSync(at('old.txt'), 'utf8')).toContain('Balance:');
    expect(statSync(at('old.txt')).mode & 0o777).toBe(0o600);
    expect(readdirSync(folder).filter((name) => name.endsWith('.part'))).toEqual([]);
  });
  test('a device is written to and stays a device', () => {
    expect(runShell('$CLI solve tenAmps.job.json --out /dev/null', folder).status).toBe(0);
    expect(statSync('/dev/null').isCharacterDevice()).toBe(true);
  });
});

describe('streams', () => {
  test('- reads the job from standard input', async () => {
    const piped = await runCli(['solve', '-', '--json'], { input: JSON.stringify(tenAmps) });
    const read = await runCli(['solve', at('tenAmps.job.json'), '--json']);
    expect(piped).toEqual(read);
  });
  // The bank of this job has no fuse, so `check` ends with 1 as it would with a reader.
  test.each([
    ['solve tenAmps.job.json', 0],
    ['solve tenAmps.job.json --json', 0],
    ['check tenAmps.job.json', 1],
    ['report tenAmps.job.json --json', 0],
    ['new canal-boat', 0],
    ['--help', 0],
  ])('%s: a reader that goes away is no trouble', (words, status) => {
    const run = runShell(`$CLI ${words} | head -c 1 > head.txt; echo $PIPESTATUS`, folder);
    expect([run.stderr, run.stdout]).toEqual(['', `${String(status)}\n`]);
    expect(readFileSync(at('head.txt'))).toHaveLength(1);
  });
  test('closed streams end in a status, not in a trace', () => {
    const closedIn = runShell('$CLI solve - --json <&-', folder);
    expect([3, 4]).toContain(closedIn.status);
    const closedOut = runShell('$CLI solve tenAmps.job.json >&-', folder);
    expect([0, 4]).toContain(closedOut.status);
    for (const run of [closedIn, closedOut]) expect(run.stderr).not.toMatch(traces);
  });
  test('an answer is not written over the job that came in by redirection', () => {
    const before = readFileSync(at('tenAmps.job.json'), 'utf8');
    expect(runShell('$CLI solve - --out tenAmps.job.json < tenAmps.job.json', folder)).toMatchObject({
      status: 2,
      stdout: '',
    });
    symlinkSync('tenAmps.job.json', at('alias.json'));
    expect(runShell('$CLI report tenAmps.job.json --out alias.json', folder)).toMatchObject({ status: 2, stdout: '' });
    expect(readFileSync(at('tenAmps.job.json'), 'utf8')).toBe(before);
  });
});

test('no command changes its input file', async () => {
  const path = at('tenAmps.job.json');
  const mark = (): string =>
    `${createHash('sha256').update(readFileSync(path)).digest('hex')} ${String(statSync(path).mtimeMs)}`;
  const before = mark();
  for (const words of [
    ['solve'],
    ['check'],
    ['report', '--json'],
    ['solve', '--json', '--model', 'fast'],
    ['report', '--out', at('x.pdf')],
  ]) {
    await runCli([words[0]!, path, ...words.slice(1)]);
    expect([words, mark()]).toEqual([words, before]);
  }
});

test('the program runs from any folder and needs none of its sources', async () => {
  const elsewhere = at('elsewhere');
  mkdirSync(elsewhere);
  const run = await runCli(['report', '../tenAmps.job.json', '--out', 'x.pdf'], { cwd: elsewhere });
  expect(run).toMatchObject({ status: 0, stdout: '' });
  expect(readdirSync(elsewhere)).toEqual(['x.pdf']);
  expect(readFileSync(cliFile, 'utf8').startsWith('#!/usr/bin/env node\n')).toBe(true);
});
