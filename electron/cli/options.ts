/** The options that commands share, and how their words are read. */
import { Option } from 'commander';
import {
  type BatteryModel,
  type CheckedJob,
  caseById,
  nearestNameHint,
  type OperatingCase,
  type Practice,
  quoted,
  withPractice,
} from '../../core/api.ts';
import { exitStatus, Refusal } from './refusal.ts';

export interface CommandOptions {
  readonly json?: boolean;
  readonly case?: readonly string[];
  readonly model?: BatteryModel;
  readonly out?: string;
  readonly practice?: Practice;
  /** `check` only. */
  readonly beside?: Practice;
  readonly quiet?: boolean;
}

const practices: readonly Practice[] = ['us-land', 'us-marine', 'iso-marine', 'iec-land'];
const models: readonly BatteryModel[] = ['slow', 'fast'];

export const jsonOption = new Option('--json', 'print one JSON document and nothing else');
export const quietOption = new Option('--quiet', 'print no remarks on standard error');
export const outOption = new Option('--out <path>', 'write the answer to a file instead of standard output');
export const caseOption = new Option('--case <id>', 'only this operating case (may be given again)').argParser(
  (id: string, earlier: readonly string[] | undefined) => [...(earlier ?? []), id],
);
export const modelOption = new Option(
  '--model <which>',
  'battery resistance over minutes (slow) or in the first second (fast)',
).choices(models);
export const practiceOption = new Option(
  '--practice <which>',
  'judge by this practice instead of the one in the job',
).choices(practices);

export const besideOption = new Option(
  '--beside <which>',
  'judge by this practice as well, and tell what differs',
).choices(practices);

/** The job as the options want it judged. */
export function judgedJob(job: CheckedJob, { practice }: CommandOptions): CheckedJob {
  return practice === undefined ? job : withPractice(job, practice);
}

/** The cases that the options name, else all of the job. */
export function chosenCases(job: CheckedJob, options: CommandOptions): readonly OperatingCase[] {
  if (options.case === undefined) return job.cases;
  return [...new Set(options.case)].map((id) => {
    const found = caseById(job, id);
    if (found !== undefined) return found;
    const known = [...new Set([...job.cases.map((each) => each.id), 'at-rest'])];
    throw new Refusal(
      exitStatus.words,
      `The job has no case ${quoted(id)}${nearestNameHint(id, known)}. It has ${known.slice(0, 20).join(', ')}.`,
    );
  });
}
