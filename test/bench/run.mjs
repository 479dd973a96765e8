/**
 * Builds every *.bench.ts here with vite, runs them one after another and prints a Markdown report.
 *
 *   node test/bench/run.mjs [name …] [--quick]
 *
 * Each bench file exports `run(report)`. Ratios within one run are what counts; times depend on the machine.
 */
import { mkdirSync, readdirSync } from 'node:fs';
import { cpus } from 'node:os';
import { basename, dirname, join } from 'node:path';
import { fileURLToPath, pathToFileURL } from 'node:url';
import { build } from 'vite';

const here = dirname(fileURLToPath(import.meta.url));
const root = join(here, '..', '..');
const folder = join(root, '.cache', 'bench');
const wanted = process.argv.slice(2).filter((a) => !a.startsWith('--'));
const quick = process.argv.includes('--quick');

const files = readdirSync(here)
  .filter((f) => f.endsWith('.bench.ts'))
  .filter((f) => wanted.length === 0 || wanted.includes(basename(f, '.bench.ts')))
  .toSorted();

const missing = [];
const report = {
  seconds: quick ? 0.02 : 0.05,
  rounds: quick ? 3 : 7,
  folder,
  table(title, head, rows) {
    console.log(`\n### ${title}\n`);
    console.log(`| ${head.join(' | ')} |`);
    console.log(`|${head.map((_, i) => (i === 0 ? '---' : '---:')).join('|')}|`);
    for (const row of rows) console.log(`| ${row.join(' | ')} |`);
  },
  remark(text) {
    console.log(`\n${text}`);
  },
  missing(what, why) {
    if (!missing.some((m) => m[0] === what)) missing.push([what, why]);
  },
};

mkdirSync(folder, { recursive: true });
console.log('# Benchmarks\n');
console.log(
  `- machine: ${cpus()[0]?.model ?? 'unknown'}, ${cpus().length} processors, ${process.platform} ${process.arch}`,
);
console.log(`- Node ${process.version}, V8 ${process.versions.v8}`);
console.log(`- date: ${new Date().toISOString().slice(0, 16)}Z`);
console.log(`- medians over ${report.rounds} rounds, each thing about ${report.seconds} s a round, in turn`);

for (const file of files) {
  const name = basename(file, '.ts');
  await build({
    root,
    configFile: false,
    logLevel: 'error',
    ssr: { noExternal: [/^(?!mathjs|ml-matrix|node:)/] },
    build: {
      ssr: join(here, file),
      outDir: folder,
      emptyOutDir: false,
      minify: false,
      target: 'es2022',
      rollupOptions: { output: { entryFileNames: `${name}.mjs`, format: 'es' }, external: ['mathjs', 'ml-matrix'] },
    },
  });
  const bench = await import(pathToFileURL(join(folder, `${name}.mjs`)).href);
  await bench.run(report);
}

if (missing.length > 0) {
  console.log('\n## Not measured\n');
  for (const [what, why] of missing) console.log(`- ${what}: ${why}`);
}
