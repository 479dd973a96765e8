/** Solves a plain job object and answers in the shape of the command line's `solve --json`. */
import { caseById, type OperatingPoint, operatingPoint, parseJob } from '../../core/api.ts';
import { tables } from '../../data/index.ts';

export interface SolvedCase {
  volts(junction: string): number;
  amps(part: string): number;
  drop(part: string): number;
  watts(part: string): number;
}

/** Every case of a job solved; a case that is not solved, or an answer without a proof that holds, fails the test. */
export function solve(job: object): (caseId: string) => SolvedCase {
  const parsed = parseJob(JSON.stringify({ format: 'ohmwright-job', version: 1, practice: 'iec-land', ...job }));
  if (!parsed.ok) throw new Error(parsed.issues.map((issue) => `${issue.path}: ${issue.message}`).join('\n'));
  return (caseId) => {
    const operatingCase = caseById(parsed.value, caseId);
    if (operatingCase === undefined) throw new Error(`the job has no case ${caseId}`);
    const point = operatingPoint({ job: parsed.value, operatingCase, tables, model: 'slow' });
    if (point.outcome !== 'solved' || !point.proof.holds) throw new Error(`case ${caseId} is ${point.outcome}`);
    return solvedCase(point);
  };
}

function solvedCase(point: OperatingPoint): SolvedCase {
  const parts = new Map<string, { currentA: number | null; dropV: number | null; powerW: number | null }>(point.parts);
  const volts = new Map<string, number | null>(point.junctions);
  const given = (figure: number | null | undefined, of: string): number => {
    if (figure === null || figure === undefined) throw new Error(`${of} has no figure`);
    return figure;
  };
  return {
    volts: (junction) => given(volts.get(junction), junction),
    amps: (part) => given(parts.get(part)?.currentA, part),
    drop: (part) => given(parts.get(part)?.dropV, part),
    watts: (part) => given(parts.get(part)?.powerW, part),
  };
}
