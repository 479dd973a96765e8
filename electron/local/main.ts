/** The local browser host as a program: `dist/local.mjs`. */
import { homedir } from 'node:os';
import { fileURLToPath } from 'node:url';
import { CommanderError } from 'commander';
import { readOptions } from './options.ts';
import { startLocal } from './runLocal.ts';

const print = (line: string): void => void process.stdout.write(`${line}\n`);
const complain = (line: string): void => void process.stderr.write(`${line}\n`);
// Whoever read our first line may have gone since; that is no reason to end.
process.stdout.on('error', () => {});
process.stderr.on('error', () => {});

try {
  const options = readOptions(process.argv.slice(2), {
    help: (text) => void process.stdout.write(text),
    complaint: (text) => void process.stderr.write(text),
  });
  const { server, welcome } = await startLocal(options, {
    machine: { platform: process.platform, home: homedir(), env: process.env },
    builtPage: fileURLToPath(new URL('page', import.meta.url)),
    now: () => new Date(),
    print,
    complain,
  });
  for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP'] as const) process.on(signal, () => void server.end());
  await welcome();
  await server.ended;
} catch (trouble) {
  process.exitCode = 1;
  if (trouble instanceof CommanderError) process.exitCode = trouble.exitCode === 0 ? 0 : 2;
  else complain(`ohmwright: ${trouble instanceof Error ? trouble.message : String(trouble)}`);
}
