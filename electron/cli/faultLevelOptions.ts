/** The words of `faultlevel`: by which method, and against which junction. */
import { Option } from 'commander';
import {
  type CheckedJob,
  type FaultMethod,
  type JunctionId,
  junctionsOf,
  nearestNameHint,
  quoted,
} from '../../core/api.ts';
import type { CommandOptions } from './options.ts';
import { exitStatus, Refusal } from './refusal.ts';

export interface FaultLevelOptions extends CommandOptions {
  readonly method?: FaultMethod;
  readonly to?: string;
}

const methods: readonly FaultMethod[] = ['plain', 'iec-61660'];

export const faultLevelOptions: readonly Option[] = [
  new Option('--method <which>', 'plain: volts over resistance; iec-61660: the battery branch of that standard')
    .choices(methods)
    .default('plain'),
  new Option('--to <junction>', 'short every junction to this one instead of the 0 V of its own island'),
];

/** The junction that `--to` names. */
export function shortedTo(job: CheckedJob, { to }: FaultLevelOptions): JunctionId | undefined {
  if (to === undefined) return undefined;
  const known = [...new Set(job.parts.flatMap((part) => junctionsOf(part)))];
  const found = known.find((junction) => (junction as string) === to);
  if (found !== undefined) return found;
  throw new Refusal(
    exitStatus.words,
    `--to: the job has no junction ${quoted(to)}${nearestNameHint(to, known)}. It has ${known.slice(0, 20).join(', ')}.`,
  );
}
