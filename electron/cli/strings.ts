/** `strings`: does the bank work as one? Sharing, what flows at rest, joints, layouts, losses, ranges and weeks of use. */
import { type BatteryModel, studyStrings } from '../../core/api.ts';
import { tables } from '../../data/index.ts';
import { begin, print } from './commands.ts';
import type { Io } from './io.ts';
import { jsonText } from './jsonText.ts';
import { exitStatus } from './refusal.ts';
import { stringsAnswer } from './stringsAnswer.ts';
import { drawsOf, driftAsked, joinsOf, leadOf, type StringsOptions, seedOf } from './stringsOptions.ts';
import { stringsText } from './stringsText.ts';

const bothModels: readonly BatteryModel[] = ['slow', 'fast'];

export async function strings(path: string, options: StringsOptions, io: Io): Promise<number> {
  const [draws, seed, leadOhm] = [drawsOf(options), seedOf(options), leadOf(options)];
  const { read, job, cases } = await begin(path, options, io);
  const study = studyStrings({
    job,
    tables,
    cases,
    models: options.model === undefined ? bothModels : [options.model],
    joins: joinsOf(job, options),
    leadOhm,
    draws,
    seed,
    drift: driftAsked(job, options),
  });
  await print(options.json === true ? jsonText(stringsAnswer(study)) : stringsText(job, study), read, options, io);
  return study.cases.some(({ outcome }) => outcome === 'collapse') ? exitStatus.found : exitStatus.done;
}
