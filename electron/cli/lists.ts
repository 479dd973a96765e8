/** `lists`: the cut list, the fuse list and the parts list of a job, each as a file of its own. */
import { mkdirSync } from 'node:fs';
import { join } from 'node:path';
import { buildList, type ListName } from '../../core/api.ts';
import { tables } from '../../data/index.ts';
import { csvText } from '../services/csv.ts';
import { solveCases } from '../services/solveCases.ts';
import { begin, collapsed } from './commands.ts';
import type { Io } from './io.ts';
import { jsonText } from './jsonText.ts';
import type { CommandOptions } from './options.ts';
import { exitStatus, fileRefusal, Refusal } from './refusal.ts';
import { checkPlace, writeOut } from './writeOut.ts';

const names: readonly ListName[] = ['cables', 'fuses', 'parts'];

/** A list that is there already is not written over, and then none is written. */
export async function lists(path: string, options: CommandOptions, io: Io): Promise<number> {
  const { out: folder, ...rest } = options;
  if (folder === undefined && options.json !== true) {
    throw new Refusal(exitStatus.words, 'lists needs --out <folder> for the CSV files, or --json.');
  }
  const { job, cases } = await begin(path, rest, io);
  const points = solveCases(job, cases, options.model);
  const made = names.map((list) => ({ list, ...buildList({ job, tables, points, list }) }));
  if (folder !== undefined) {
    const files = made.map(({ list, headings, rows }) => ({
      path: join(folder, `${list}.csv`),
      content: csvText([headings, ...rows]),
      keepExisting: true,
    }));
    makeFolder(folder);
    for (const file of files) checkPlace(file);
    for (const file of files) writeOut(file);
    if (options.quiet !== true) io.err(`Wrote ${files.map((file) => file.path).join(', ')}.\n`);
  }
  if (options.json === true) {
    await io.out(jsonText(Object.fromEntries(made.map(({ list, headings, rows }) => [list, { headings, rows }]))));
  }
  return collapsed(points) ? exitStatus.found : exitStatus.done;
}

function makeFolder(folder: string): void {
  try {
    mkdirSync(folder, { recursive: true });
  } catch (error) {
    throw fileRefusal(`${folder} cannot be written`, error);
  }
}
