/** The command line as it ships: built once when a source is newer than the build, and run as a process of its own. */
import { spawn, spawnSync } from 'node:child_process';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { buildMode } from './buildMode.ts';

const root = fileURLToPath(new URL('../../', import.meta.url));
export const cliFile = join(root, 'dist', 'cli.mjs');

/** Builds `dist/cli.mjs` where it is missing or older than a source. */
export async function buildCli(): Promise<void> {
  await buildMode('cli', cliFile);
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
