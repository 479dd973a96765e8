/**
 * Builds every *.bench.ts here with vite, runs each in a process of its own and prints a Markdown report.
 *
 *   node test/bench/run.mjs [name …] [--quick]
 *
 * Each bench file exports `run(report)`. Ratios within one run are what counts; times depend on the machine.
 */
import { spawnSync } from 'node:child_process';
import { mkdirSync, readdirSync } from 'node:fs';
import { cpus } from 'node:os';
import { basename, dirname, join } from 'node:path';
import { fileURLToPath, pathToFileURL } from 'node:url';

const here = dirname(fileURLToPath(import.meta.url));
const root = join(here, '..', '..');
const folder = join(root, '.cache', 'bench');
const quick = process.argv.includes('--quick');
const names = process.argv.slice(2).filter((a) => !a.startsWith('--'));
const seconds = quick ? 0.02 : 0.05;
const rounds = quick ? 3 : 7;

if (process.argv.includes('--built')) await runBuilt(names[0]);
else await buildAndRun();

/** In the parent: what the bundler leaves in memory would burden what is measured, so each file gets a fresh process. */
async function buildAndRun() {
  mkdirSync(folder, { recursive: true });
  console.log('# Benchmarks\n');
  console.log(`- ${cpus()[0]?.model ?? 'unknown'}, ${cpus().length} processors, ${process.platform} ${process.arch}`);
  console.log(`- Node ${process.version}, V8 ${process.versions.v8}`);
  console.log(`- ${new Date().toISOString().slice(0, 16)}Z`);
  console.log(`- medians over ${rounds} rounds, each thing about ${seconds} s a round, in turn`);
  const files = readdirSync(here)
    .filter((f) => f.endsWith('.bench.ts'))
    .filter((f) => names.length === 0 || names.includes(basename(f, '.bench.ts')))
    .toSorted();
  for (const file of files) {
    const bundle = await bundled(file);
    const { status } = spawnSync(
      process.execPath,
      [fileURLToPath(import.meta.url), '--built', bundle, ...(quick ? ['--quick'] : [])],
      { stdio: 'inherit', cwd: root },
    );
    if (status !== 0) process.exitCode = 1;
  }
}

/** Bundles one bench file with the core it measures; returns the path. */
async function bundled(file) {
  const { build } = await import('vite');
  const name = basename(file, '.ts');
  await build({
    root,
    configFile: false,
    logLevel: 'error',
    ssr: { noExternal: [/^(?!mathjs|ml-matrix|playwright-core|@axe-core|node:)/] },
    build: {
      ssr: join(here, file),
      outDir: folder,
      emptyOutDir: false,
      minify: false,
      target: 'es2022',
      rollupOptions: {
        output: { entryFileNames: `${name}.mjs`, format: 'es' },
        external: ['mathjs', 'ml-matrix', 'playwright-core', '@axe-core/playwright'],
      },
    },
  });
  return join(folder, `${name}.mjs`);
}

async function runBuilt(bundle) {
  const missing = new Map();
  const { run } = await import(pathToFileURL(bundle).href);
  await run({
    seconds,
    rounds,
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
      missing.set(what, why);
    },
  });
  for (const [what, why] of missing) console.log(`\nNot measured: ${what}: ${why}.`);
}
