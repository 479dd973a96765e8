/** The command line as it ships: built once when a source is newer than the build, and run as a process of its own. */
import { spawn, spawnSync } from 'node:child_process';
import { mkdirSync, readdirSync, rmSync, statSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';

const root = fileURLToPath(new URL('../../', import.meta.url));
export const cliFile = join(root, 'dist', 'cli.mjs');
const lock = join(root, '.cache', 'cli-build.lock');
/** A build that was cut off must not lock out all later ones. */
const staleLockMs = 120_000;

/** Builds `dist/cli.mjs` where it is missing or older than a source; test files that run side by side wait for each other. */
export async function buildCli(): Promise<void> {
  mkdirSync(join(root, '.cache'), { recursive: true });
  while (!taken()) await new Promise((resolve) => setTimeout(resolve, 100));
  try {
    if (builtAt() > newestSource()) return;
    const vite = join(root, 'node_modules', 'vite', 'bin', 'vite.js');
    const build = spawnSync(process.execPath, [vite, 'build', '--mode', 'cli'], { cwd: root, encoding: 'utf8' });
    if (build.status !== 0) throw new Error(`the build failed:\n${build.stdout}${build.stderr}`);
  } finally {
    rmSync(lock, { recursive: true, force: true });
  }
}

function taken(): boolean {
  try {
    mkdirSync(lock);
    return true;
  } catch {
    const held = statSync(lock, { throwIfNoEntry: false });
    if (held !== undefined && Date.now() - held.mtimeMs > staleLockMs) rmSync(lock, { recursive: true, force: true });
    return false;
  }
}

function builtAt(): number {
  return statSync(cliFile, { throwIfNoEntry: false })?.mtimeMs ?? 0;
}

function newestSource(): number {
  const folders = ['core', 'data', 'electron'].flatMap((folder) => {
    return readdirSync(join(root, folder), { recursive: true, encoding: 'utf8' }).map((file) =>
      join(root, folder, file),
    );
  });
  const files = [...folders, join(root, 'vite.config.ts'), join(root, 'package.json')];
  return Math.max(...files.map((file) => statSync(file, { throwIfNoEntry: false })?.mtimeMs ?? 0));
}

export interface CliRun {
  readonly status: number | null;
  readonly signal: NodeJS.Signals | null;
  readonly stdout: string;
  readonly stderr: string;
}

export interface RunOptions {
  readonly input?: string | Uint8Array;
  readonly cwd?: string;
}

/** Runs the built program and waits for its end. */
export async function runCli(words: readonly string[], { input, cwd }: RunOptions = {}): Promise<CliRun> {
  return await new Promise((resolve, reject) => {
    const child = spawn(process.execPath, [cliFile, ...words], { cwd: cwd ?? root });
    const pieces: { stdout: Buffer[]; stderr: Buffer[] } = { stdout: [], stderr: [] };
    child.stdout.on('data', (piece: Buffer) => pieces.stdout.push(piece));
    child.stderr.on('data', (piece: Buffer) => pieces.stderr.push(piece));
    child.on('error', reject);
    child.on('close', (status, signal) => {
      const [stdout, stderr] = [pieces.stdout, pieces.stderr].map((each) => Buffer.concat(each).toString('utf8'));
      resolve({ status, signal, stdout: stdout!, stderr: stderr! });
    });
    // The program may stop reading before the end of its input; that is its right and no trouble of the test.
    child.stdin.on('error', () => {});
    child.stdin.end(input ?? '');
  });
}

/** Runs a line of the shell with the program as `$CLI`, for pipes and redirections. */
export function runShell(line: string, cwd: string): CliRun {
  const run = spawnSync('bash', ['-o', 'pipefail', '-c', line], {
    cwd,
    encoding: 'utf8',
    env: { ...process.env, CLI: `${process.execPath} ${cliFile}` },
    maxBuffer: 64 * 1024 * 1024,
  });
  return { status: run.status, signal: run.signal, stdout: run.stdout, stderr: run.stderr };
}

/** What no answer of the program may ever hold: the trace of an exception, or the insides of an object. */
export const traces = /\n\s+at .+:\d+:\d+|node:internal|\[object Object\]|UnhandledPromise|file:\/\/\//;
