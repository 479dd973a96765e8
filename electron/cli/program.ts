/** The words of the command line. */
import { Command, type Option } from 'commander';
import { check, report, solve } from './commands.ts';
import { faultLevel } from './faultLevel.ts';
import { type FaultLevelOptions, faultLevelOptions } from './faultLevelOptions.ts';
import type { Io } from './io.ts';
import { lists } from './lists.ts';
import { newJob } from './newJob.ts';
import {
  besideOption,
  type CommandOptions,
  caseOption,
  jsonOption,
  modelOption,
  outOption,
  practiceOption,
  quietOption,
} from './options.ts';
import { programVersion } from './programVersion.ts';
import { strings } from './strings.ts';
import { type StringsOptions, stringsOptions } from './stringsOptions.ts';

const afterHelp = `
A job file is read, "-" reads it from standard input. No command changes its input.

Exit status: 0 done; 1 done, with a finding that says stop or fix, or a collapse; 2 the words of the call are wrong;
3 the job has issues; 4 a file could not be read or written; 70 a defect of the program.

This is arithmetic on the figures of the job. It does not replace the local code, the makers' instructions, the inspector
or a licensed electrician.
`;

/** What the parser of words prints goes to `printed` and not to the streams; what a command answers goes to `answered`. */
export interface ProgramSinks {
  readonly printed: (text: string) => void;
  readonly complained: (text: string) => void;
  readonly answered: (status: number) => void;
}

type JobOptions = StringsOptions & FaultLevelOptions;
type JobCommand = (path: string, options: JobOptions, io: Io) => Promise<number>;

/** The program as commander has it; it throws instead of ending the process. */
export function buildProgram(io: Io, { printed, complained, answered }: ProgramSinks): Command {
  const program = new Command('ohmwright')
    .description('Solves, checks and documents off-grid extra-low-voltage DC systems as they are really wired.')
    .version(programVersion, '--version', 'print the version')
    .helpOption('--help', 'print this help')
    .helpCommand(false)
    .configureOutput({ writeOut: printed, writeErr: complained })
    .exitOverride()
    .addHelpText('after', afterHelp);
  const onJob = (name: string, what: string, run: JobCommand, own: readonly Option[] = []): void => {
    const command = program
      .command(name)
      .description(what)
      .argument('<job>', 'the job file, or - for standard input')
      .addOption(jsonOption)
      .addOption(caseOption)
      .addOption(modelOption)
      .addOption(practiceOption)
      .addOption(outOption)
      .addOption(quietOption);
    for (const option of own) command.addOption(option);
    command.action(async (path: string, options: JobOptions) => {
      answered(await run(path, options, io));
    });
  };
  onJob('solve', 'volts, amps and watts in every operating case, with the sums that prove them', solve);
  onJob('check', 'findings by the published tables of a practice, worst first', check, [besideOption]);
  onJob('strings', 'how parallel strings share, what flows at rest, joints, layouts, losses', strings, stringsOptions);
  onJob(
    'faultlevel',
    'what a short circuit sends at every junction and through every fuse and breaker',
    faultLevel,
    faultLevelOptions,
  );
  onJob('report', 'the paper of a job as a PDF (--out file.pdf), or its document tree (--json)', report);
  onJob(
    'lists',
    'cut list, fuse list and parts list as CSV files in a folder (--out folder), or as JSON (--json)',
    lists,
  );
  program
    .command('new')
    .description('a starter job to change into your own; without a name, the names')
    .argument('[starter]', 'name of a starter')
    .addOption(jsonOption)
    .addOption(outOption)
    .addOption(quietOption)
    .action(async (name: string | undefined, options: CommandOptions) => {
      answered(await newJob(name, options, io));
    });
  return program;
}
