/** One call of the command line, from its words to its exit status. Ends no process and throws nothing. */
import { CommanderError } from 'commander';
import type { Io } from './io.ts';
import { issueText } from './issueText.ts';
import { jsonText } from './jsonText.ts';
import { buildProgram } from './program.ts';
import { programVersion } from './programVersion.ts';
import { exitStatus, JobRefusal, Refusal } from './refusal.ts';

/** `argv` holds the words after the program's name. */
export async function main(argv: readonly string[], io: Io): Promise<number> {
  try {
    return await run(argv, io);
  } catch (trouble) {
    if (trouble instanceof Refusal) {
      io.err(`ohmwright: ${trouble.message}\n`);
      return trouble.status;
    }
    const what = trouble instanceof Error ? trouble.message : String(trouble);
    io.err(`ohmwright: a defect of the program, please report it with the job: ${what.slice(0, 2000)}\n`);
    return exitStatus.defect;
  }
}

async function run(argv: readonly string[], io: Io): Promise<number> {
  if (argv.includes('--version')) {
    await io.out(`${programVersion}\n`);
    return exitStatus.done;
  }
  let printed = '';
  let status: number = exitStatus.done;
  const program = buildProgram(io, {
    printed: (text) => {
      printed += text;
    },
    complained: (text) => {
      io.err(text);
    },
    answered: (answer) => {
      status = answer;
    },
  });
  try {
    await program.parseAsync([...argv], { from: 'user' });
  } catch (trouble) {
    status = await refused(trouble, argv, io);
  }
  if (printed !== '') await io.out(printed);
  return status;
}

/** Help and wrong words come as errors of the parser, issues as errors of a command; anything else is thrown on. */
async function refused(trouble: unknown, argv: readonly string[], io: Io): Promise<number> {
  if (trouble instanceof CommanderError) return trouble.exitCode === 0 ? exitStatus.done : exitStatus.words;
  if (!(trouble instanceof JobRefusal)) throw trouble;
  if (argv.includes('--json')) await io.out(jsonText({ issues: trouble.issues }));
  else io.err(issueText(trouble.file, trouble.issues));
  return exitStatus.issues;
}
