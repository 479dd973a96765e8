/** `new`: a starter job from one of the invented examples. */
import { nearestNameHint, parseJob, quoted } from '../../core/api.ts';
import { starters } from '../../data/starters.ts';
import type { Io } from './io.ts';
import { jsonText } from './jsonText.ts';
import type { CommandOptions } from './options.ts';
import { exitStatus, Refusal } from './refusal.ts';
import { textTable } from './textTable.ts';
import { writeOut } from './writeOut.ts';

/** Without a name the names are listed; with one, that job is written. */
export async function newJob(name: string | undefined, options: CommandOptions, io: Io): Promise<number> {
  if (name === undefined) {
    await print(options.json === true ? jsonText({ starters: listed() }) : listText(), options, io);
    return exitStatus.done;
  }
  const text = starters.get(name);
  if (text === undefined) {
    const names = [...starters.keys()];
    throw new Refusal(
      exitStatus.words,
      `There is no starter ${quoted(name)}${nearestNameHint(name, names)}. There are ${names.join(', ')}.`,
    );
  }
  await print(text, options, io);
  if (options.out !== undefined && options.quiet !== true) io.err(`Wrote ${options.out}.\n`);
  return exitStatus.done;
}

async function print(text: string, { out }: CommandOptions, io: Io): Promise<void> {
  if (out === undefined) await io.out(text);
  else writeOut({ path: out, content: text, keepExisting: true });
}

interface Listed {
  readonly name: string;
  readonly title: string;
}

function listed(): readonly Listed[] {
  return [...starters].map(([name, text]) => {
    const read = parseJob(text);
    return { name, title: read.ok ? read.value.title : '' };
  });
}

function listText(): string {
  const rows = listed().map(({ name, title }) => [name, title]);
  const table = textTable(
    [
      { head: 'starter', align: 'left' },
      { head: 'what it is (invented)', align: 'left' },
    ],
    rows,
  );
  return `${table}\nohmwright new <starter> --out my.job.json\n`;
}
