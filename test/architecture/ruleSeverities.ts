/** How grave a rule's findings can be, read from the code that it reaches. */
import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { SEVERITY_ORDER } from '../../core/checks/tally.ts';

const folder = fileURLToPath(new URL('../../core/checks', import.meta.url));

interface Declaration {
  readonly name: string;
  readonly text: string;
  /** The id, where it is a rule. */
  readonly rule: string | undefined;
}

/** Top-level declarations of every file of rules, by file. */
const files = new Map(
  readdirSync(folder)
    // What gathers the verdicts names every severity.
    .filter((name) => name.endsWith('.ts') && name !== 'tally.ts')
    .map((name) => [name, declarationsOf(readFileSync(join(folder, name), 'utf8'))]),
);

function declarationsOf(source: string): {
  readonly imports: ReadonlyMap<string, string>;
  readonly own: readonly Declaration[];
} {
  const own = source
    .split(/\n(?=(?:export )?(?:const|function|class|interface|type) )/)
    .flatMap((text): Declaration[] => {
      const name = /^(?:export )?(?:const|function|class) (\w+)/.exec(text)?.[1];
      return name === undefined ? [] : [{ name, text, rule: /^ {2}id: '([a-z0-9-]+)',$/m.exec(text)?.[1] }];
    });
  const imports = new Map<string, string>();
  for (const [, names, file] of source.matchAll(/import \{([^}]*)\} from '\.\/(\w+\.ts)'/g)) {
    for (const name of names!.matchAll(/\w+/g)) imports.set(name[0], file!);
  }
  return { imports, own };
}

/** From the gravest to the least, e.g. `stop, fix`; what a helper shared by several rules can give counts for each of them. */
export function severitiesOf(id: string): string {
  const found = new Set<string>();
  const seen = new Set<Declaration>();
  const visit = (file: string, { text }: Declaration): void => {
    for (const [, word] of text.matchAll(/'(stop|fix|look|note)'/g)) found.add(word!);
    const { imports } = files.get(file)!;
    for (const name of new Set(text.match(/\b[a-z]\w+\b/gi))) {
      const from = files.get(file)!.own.some((each) => each.name === name) ? file : imports.get(name);
      const next = from === undefined ? undefined : files.get(from)?.own.find((each) => each.name === name);
      if (next === undefined || next.rule !== undefined || seen.has(next)) continue;
      seen.add(next);
      visit(from!, next);
    }
  };
  for (const [file, { own }] of files) for (const each of own) if (each.rule === id) visit(file, each);
  return SEVERITY_ORDER.filter((severity) => found.has(severity)).join(', ');
}
