/** Builds what ships, once, when a source is newer than the build. */
import { spawnSync } from 'node:child_process';
import { mkdirSync, readdirSync, rmSync, statSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';

const root = fileURLToPath(new URL('../../', import.meta.url));
/** A build that was cut off must not lock out all later ones. */
const staleLockMs = 120_000;

/** Runs `vite build --mode MODE` where `file` is missing or older than a source; test files that run side by side wait for each other. */
export async function buildMode(mode: string, file: string): Promise<void> {
  const lock = join(root, '.cache', `${mode}-build.lock`);
  mkdirSync(join(root, '.cache'), { recursive: true });
  while (!taken(lock)) await new Promise((resolve) => setTimeout(resolve, 100));
  try {
    if (builtAt(file) > newestSource(mode)) return;
    const vite = join(root, 'node_modules', 'vite', 'bin', 'vite.js');
    const build = spawnSync(process.execPath, [vite, 'build', '--mode', mode], { cwd: root, encoding: 'utf8' });
    if (build.status !== 0) throw new Error(`the build failed:\n${build.stdout}${build.stderr}`);
  } finally {
    rmSync(lock, { recursive: true, force: true });
  }
}

function taken(lock: string): boolean {
  try {
    mkdirSync(lock);
    return true;
  } catch {
    const held = statSync(lock, { throwIfNoEntry: false });
    if (held !== undefined && Date.now() - held.mtimeMs > staleLockMs) rmSync(lock, { recursive: true, force: true });
    return false;
  }
}

function builtAt(file: string): number {
  return statSync(file, { throwIfNoEntry: false })?.mtimeMs ?? 0;
}

/** The page is made of the screens, all else of the hosts. */
function newestSource(mode: string): number {
  const folders = ['core', 'data', mode === 'page' ? 'renderer' : 'electron'].flatMap((folder) => {
    return readdirSync(join(root, folder), { recursive: true, encoding: 'utf8' }).map((file) =>
      join(root, folder, file),
    );
  });
  const files = [...folders, join(root, 'vite.config.ts'), join(root, 'package.json')];
  return Math.max(...files.map((file) => statSync(file, { throwIfNoEntry: false })?.mtimeMs ?? 0));
}
