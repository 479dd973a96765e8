/** The machine that the host runs on, and where the person's documents lie there. */
import { existsSync, readFileSync } from 'node:fs';
import { join } from 'node:path';

export interface Machine {
  readonly platform: NodeJS.Platform;
  readonly home: string;
  readonly env: Readonly<Record<string, string | undefined>>;
}

/** Saved files, where the person looks for documents. */
export function usualSaveFolder(machine: Machine): string {
  return join(documentsFolder(machine), 'Ohmwright');
}

function documentsFolder({ platform, home, env }: Machine): string {
  const named = platform === 'linux' ? documentsOfDesktop(home, env) : undefined;
  const found = [named, join(home, 'Documents')].find((folder) => folder !== undefined && existsSync(folder));
  return found ?? home;
}

/** Linux desktops write the folder's name, which may be in any language, into a file. */
function documentsOfDesktop(home: string, env: Machine['env']): string | undefined {
  try {
    const text = readFileSync(join(env['XDG_CONFIG_HOME'] ?? join(home, '.config'), 'user-dirs.dirs'), 'utf8');
    const written = /^XDG_DOCUMENTS_DIR="(.+)"$/m.exec(text)?.[1];
    return written?.replace(/^\$HOME(?=\/|$)/, home);
  } catch {
    return undefined; // no desktop has written one
  }
}
