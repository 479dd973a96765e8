/** Which tests speak of which rule, read from the titles in the test sources. */
import { readdirSync, readFileSync } from 'node:fs';
import { join, relative } from 'node:path';
import { fileURLToPath } from 'node:url';

const root = fileURLToPath(new URL('../..', import.meta.url));
const FOLDERS = ['core', 'hand', 'outside', 'physics'];

export interface RuleTest {
  /** From the folder `test`. */
  readonly file: string;
  /** The title of the group that it stands in, then its own. */
  readonly group: string;
  readonly title: string;
  /** The rows of a test that is run for each of them, as they are written. */
  readonly rows: string;
}

/** Every test of the folders in which rules are tested. */
export function ruleTests(): readonly RuleTest[] {
  return FOLDERS.flatMap((folder) => {
    const path = join(root, 'test', folder);
    const files = readdirSync(path).filter((name) => name.endsWith('.test.ts'));
    return files.flatMap((name) => testsOf(join(path, name)));
  });
}

function testsOf(path: string): readonly RuleTest[] {
  const file = relative(join(root, 'test'), path);
  const titled =
    /\b(describe|test|it)(?:\.each\(((?:[^`'"]|'[^']*'|"[^"]*")*?)\))?\(\s*(?:'((?:[^'\\]|\\.)*)'|"((?:[^"\\]|\\.)*)"|`((?:[^`\\]|\\.)*)`)/g;
  const found: RuleTest[] = [];
  let group = '';
  for (const [, kind, rows = '', single, double, quasi] of readFileSync(path, 'utf8').matchAll(titled)) {
    const title = single ?? double ?? quasi ?? '';
    if (kind === 'describe') group = `${title} ${rows}`;
    else found.push({ file, group, title, rows });
  }
  return found;
}

/** Tests of a rule: its id stands in their own title, in that of their group, or in a row. */
export function testsOfRule(id: string, tests: readonly RuleTest[]): readonly RuleTest[] {
  const named = new RegExp(`(?<![a-z-])${id}(?![a-z-])`);
  return tests.filter(({ group, title, rows }) => named.test(group) || named.test(title) || named.test(rows));
}

/** A test that puts a figure right at its limit says so in its title. */
export function isBoundaryTest({ title }: RuleTest): boolean {
  return /\bexactly\b/.test(title);
}
