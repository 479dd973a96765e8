/** Solves and checks a plain job object through the command line, as a person's own script would. */
import { buildCli, runCli } from '../hosts/builtCli.ts';

export interface SolvedCase {
  volts(junction: string): number;
  amps(part: string): number;
  drop(part: string): number;
  watts(part: string): number;
}

interface SolveAnswer {
  readonly cases: readonly {
    readonly case: string;
    readonly outcome: string;
    readonly junctions: Readonly<Record<string, number | null>>;
    readonly parts: Readonly<Record<string, Readonly<Record<'currentA' | 'dropV' | 'powerW', number | null>>>>;
  }[];
}

/** The rule and severity of a finding, and the parts that it is about. */
export interface CheckedFinding {
  readonly rule: string;
  readonly severity: string;
  readonly parts: readonly string[];
}

/** What a scenario adds to an empty job; the practice is `iec-land` where it says nothing. */
type JobDraft = Readonly<Record<string, unknown>>;

/** Every case of a job through `solve - --json`. */
export async function solve(draft: JobDraft): Promise<(caseId: string) => SolvedCase> {
  const { cases } = (await answerOf('solve', draft)) as SolveAnswer;
  return (caseId) => {
    const found = cases.find((each) => each.case === caseId);
    if (found?.outcome !== 'solved') throw new Error(`case ${caseId} is ${found?.outcome ?? 'not there'}`);
    const { junctions, parts } = found;
    return {
      volts: (junction) => given(junctions[junction], junction),
      amps: (part) => given(parts[part]?.currentA, part),
      drop: (part) => given(parts[part]?.dropV, part),
      watts: (part) => given(parts[part]?.powerW, part),
    };
  };
}

/** The findings of a job through `check - --json`. */
export async function check(draft: JobDraft): Promise<readonly CheckedFinding[]> {
  const { findings } = (await answerOf('check', draft)) as { findings: readonly CheckedFinding[] };
  return findings;
}

/** The job file of a draft. */
export function jobText(draft: JobDraft): string {
  return JSON.stringify({ format: 'ohmwright-job', version: 1, practice: 'iec-land', ...draft });
}

async function answerOf(command: 'solve' | 'check', draft: JobDraft): Promise<unknown> {
  await buildCli();
  const run = await runCli([command, '-', '--json'], { input: jobText(draft) });
  // 0: done; 1: done, with something to stop or fix. Anything else is no answer.
  if (run.status !== 0 && run.status !== 1)
    throw new Error(`${command}: status ${run.status}\n${run.stdout}${run.stderr}`);
  return JSON.parse(run.stdout);
}

function given(figure: number | null | undefined, of: string): number {
  if (figure === null || figure === undefined) throw new Error(`${of} has no figure`);
  return figure;
}
