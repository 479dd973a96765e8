/** `npm start`: the desktop window where its runtime is installed, else the same app in the browser. `dist/launch.mjs`. */
import { spawn } from 'node:child_process';
import { existsSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';

const dist = fileURLToPath(new URL('.', import.meta.url));
const electronFolder = join(dist, '..', 'node_modules', 'electron');

/** The runtime's program, found without loading its package, which would try to download what is missing. */
function electronProgram(): string | undefined {
  const pathFile = join(electronFolder, 'path.txt');
  if (!existsSync(pathFile)) return undefined;
  const program = join(electronFolder, 'dist', readFileSync(pathFile, 'utf8').trim());
  return existsSync(program) ? program : undefined;
}

/** Runs a program in this one's place: same streams, same end. */
function become(program: string, words: readonly string[]): void {
  const child = spawn(program, words, { stdio: 'inherit' });
  for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP'] as const) process.on(signal, () => void child.kill(signal));
  child.on('error', (error) => {
    process.stderr.write(`ohmwright: ${program} does not start: ${error.message}\n`);
    process.exitCode = 1;
  });
  child.on('exit', (status, signal) => {
    process.exitCode = status ?? (signal === null ? 0 : 1);
  });
}

const words = process.argv.slice(2);
const electron = electronProgram();
if (electron === undefined) {
  process.stderr.write(
    'ohmwright: the runtime of the desktop window is not installed, so the app opens in your browser.\n',
  );
  become(process.execPath, [join(dist, 'local.mjs'), ...words]);
} else become(electron, [join(dist, 'main.mjs'), ...words]);
