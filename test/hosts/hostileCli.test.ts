import { beforeAll, describe, expect, test } from 'vitest';
import type { Io } from '../../electron/cli/io.ts';
import { main } from '../../electron/cli/main.ts';
import { buildCli, runCli, traces } from './builtCli.ts';
import { hostileJobs } from './hostileJobs.ts';

const corpus = hostileJobs();
const commands = ['solve', 'check', 'report', 'strings'] as const;

interface Recorded {
  readonly status: number;
  readonly stdout: string;
  readonly stderr: string;
}

/** One call in this process, its streams recorded. */
async function call(words: readonly string[], input: string): Promise<Recorded> {
  const written = { stdout: '', stderr: '' };
  const io: Io = {
    readStdin: async (limitBytes) => Promise.resolve(Buffer.from(input, 'utf8').subarray(0, limitBytes + 1)),
    stdinFile: () => undefined,
    out: async (text) => {
      written.stdout += text;
      await Promise.resolve();
    },
    err: (text) => {
      written.stderr += text;
    },
    today: () => '2024-01-01',
  };
  return { status: await main(words, io), ...written };
}

/** Half a character alone cannot be written as UTF-8; on the way to the program it becomes the replacement sign. */
const judged = corpus.filter(({ text }) => !/\p{Surrogate}/u.test(text));

describe('every hostile job is answered with status 3, as sentences and as one JSON document', () => {
  test.each(judged.map((each, index): [string, number] => [each.name.slice(0, 70), index]))('%s', async (_, index) => {
    const { text } = judged[index]!;
    const command = commands[index % commands.length]!;
    const json = await call([command, '-', '--json'], text);
    expect([json.status, json.stderr]).toEqual([3, '']);
    const { issues } = JSON.parse(json.stdout) as { issues: { path: string; code: string; message: string }[] };
    expect(issues.length).toBeGreaterThan(0);
    for (const issue of issues) expect(Object.keys(issue)).toEqual(['path', 'code', 'message']);
    const words = await call([command, '-', ...(command === 'report' ? ['--out', '/nowhere/x.pdf'] : [])], text);
    expect([words.status, words.stdout]).toEqual([3, '']);
    expect(words.stderr).not.toMatch(traces);
    expect(words.stderr).not.toMatch(/[^\P{Cc}\n]/u);
  });
});

describe('the built program answers alike', () => {
  beforeAll(async () => {
    await buildCli();
  });
  // Every ninth of the corpus, so that each kind of trouble is among them; a process each, a few at a time.
  const sample = corpus.filter((_, index) => index % 9 === 0);
  test(`${String(sample.length)} of them through a process of its own`, { timeout: 300_000 }, async () => {
    expect(sample.length).toBeGreaterThanOrEqual(60);
    const queue = [...sample.entries()];
    const worker = async (): Promise<void> => {
      for (let next = queue.shift(); next !== undefined; next = queue.shift()) {
        const [index, { name, text }] = next;
        const run = await runCli([commands[index % commands.length]!, '-', '--json'], { input: text });
        expect([name, run.status, run.signal, run.stderr]).toEqual([name, 3, null, '']);
        expect(run.stdout).not.toMatch(traces);
        expect(JSON.parse(run.stdout)).toMatchObject({ issues: expect.any(Array) as unknown });
      }
    };
    await Promise.all([worker(), worker(), worker()]);
  });
});

describe('hostile words', () => {
  test.each<[string, string[]]>([
    ['a word of a hundred thousand signs', ['x'.repeat(100_000)]],
    ['options for ever', ['solve', ...Array.from({ length: 2000 }, () => '--json'), '-']],
    ['a case of signs', ['solve', '-', '--case', '\u001b[2J\u202e']],
    ['names of insides', ['__proto__']],
    ['names of insides as options', ['solve', '-', '--constructor']],
    ['names of insides as cases', ['solve', '-', '--case', '__proto__']],
    ['a file name with a nought byte', ['solve', 'a\u0000b']],
    ['an empty file name', ['solve', '']],
    ['two dashes', ['--']],
    ['a number', ['5']],
  ])('%s', async (_, words) => {
    const run = await call(
      words,
      JSON.stringify({ format: 'ohmwright-job', version: 1, practice: 'iec-land', parts: [] }),
    );
    expect(run.status).toBeGreaterThanOrEqual(0);
    expect([0, 2, 4]).toContain(run.status);
    expect(run.stderr).not.toMatch(traces);
  });
});
