import { readdirSync, readFileSync, statSync } from 'node:fs';
import { dirname, join, normalize, relative } from 'node:path';
import { fileURLToPath } from 'node:url';
import { describe, expect, test } from 'vitest';

const root = fileURLToPath(new URL('../..', import.meta.url));

/** The order inside core: a folder imports only itself and folders before it. */
const coreOrder = [
  'units',
  'job',
  'tables',
  'linear',
  'conductor',
  'battery',
  'solar',
  'network',
  'protection',
  'strings',
  'sizing',
  'season',
  'tracing',
  'checks',
  'diagram',
  'explain',
  'draft',
  'remedy',
  'lists',
  'report',
];

/** What each top folder may import: folders of ours, and outside packages. */
const mayImport: Record<string, { ours: string[]; outside: RegExp }> = {
  core: { ours: ['core'], outside: /^(immer|mathjs)$/ },
  data: { ours: ['data', 'core/api.ts'], outside: /^papaparse$/ },
  electron: {
    ours: ['electron', 'data', 'core/api.ts', 'core/host.ts'],
    outside: /^(node:|better-sqlite3$|commander$|pdfkit$|fontkit$|electron$|zod$)/,
  },
  renderer: {
    ours: ['renderer', 'data', 'core/api.ts', 'core/host.ts'],
    outside: /^(react$|react\/|react-dom$|react-dom\/|@mui\/|@emotion\/|@xyflow\/|zustand|elkjs)/,
  },
};

function sources(folder: string): string[] {
  return readdirSync(folder).flatMap((name) => {
    const path = join(folder, name);
    if (statSync(path).isDirectory()) return name === 'node_modules' ? [] : sources(path);
    return /\.tsx?$/.test(name) && !name.endsWith('.d.ts') ? [path] : [];
  });
}

interface Import {
  readonly file: string;
  readonly what: string;
  /** Path from the root for a relative import, undefined for a package. */
  readonly target: string | undefined;
}

function importsOf(path: string): Import[] {
  const text = readFileSync(path, 'utf8');
  // Statements only: a text such as "optionalNumber('from')" is no import.
  const statement = /^(?:import|export)\s(?:[\w\s{},*]*\sfrom\s+)?['"]([^'"]+)['"]|\bimport\(\s*['"]([^'"]+)['"]/gm;
  const found = [...text.matchAll(statement)].map((match) => match[1] ?? match[2]!);
  return found.map((what) => ({
    file: relative(root, path),
    what,
    target: what.startsWith('.')
      ? normalize(relative(root, join(dirname(path), what.replace(/\?raw$/, ''))))
      : undefined,
  }));
}

describe('layers', () => {
  test.each(Object.keys(mayImport))('%s imports only what it may', (folder) => {
    const rule = mayImport[folder]!;
    const wrong = sources(join(root, folder))
      .flatMap(importsOf)
      .filter(({ target, what }) =>
        target === undefined
          ? !rule.outside.test(what)
          : !rule.ours.some((allowed) => target === allowed || target.startsWith(`${allowed}/`)),
      );
    expect(wrong).toEqual([]);
  });

  test('inside core a folder imports only from folders before it', () => {
    const wrong = sources(join(root, 'core'))
      .filter((path) => relative(root, path).split('/').length > 2)
      .flatMap(importsOf)
      .filter(({ file, target }) => {
        if (target === undefined) return false;
        const from = coreOrder.indexOf(file.split('/')[1]!);
        const to = coreOrder.indexOf(target.split('/')[1]!);
        return from < 0 || to < 0 || to > from;
      });
    expect(wrong).toEqual([]);
  });

  test('every folder of core has a place in the order', () => {
    const folders = readdirSync(join(root, 'core')).filter((name) => statSync(join(root, 'core', name)).isDirectory());
    expect(folders.filter((name) => !coreOrder.includes(name))).toEqual([]);
  });

  test('core has no clock, no randomness, no ways out', () => {
    const forbidden =
      /\bDate\.now\b|\bnew Date\b|\bMath\.random\b|\bperformance\b|\bprocess\.|\bglobalThis\b|\beval\(|\bnew Function\b/;
    const wrong = sources(join(root, 'core')).filter((path) =>
      forbidden.test(stripComments(readFileSync(path, 'utf8'))),
    );
    expect(wrong.map((path) => relative(root, path))).toEqual([]);
  });

  test('no product text promises what the tool may not promise', () => {
    const promise = /\b(compliant|approved|guaranteed|certified|is safe|are safe|now safe)\b/i;
    const files = ['core', 'data', 'electron', 'renderer'].flatMap((folder) => sources(join(root, folder)));
    const wrong = files.filter((path) => promise.test(readFileSync(path, 'utf8')));
    expect(wrong.map((path) => relative(root, path))).toEqual([]);
  });
});

function stripComments(text: string): string {
  return text.replace(/\/\*[\s\S]*?\*\//g, '').replace(/(^|\s)\/\/.*$/gm, '');
}
