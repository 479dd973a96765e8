/** Where the store lies when nobody says otherwise: the system's own place for a person's data. */
import { posix, win32 } from 'node:path';

export interface StorePlace {
  /** As the person named it on the command line. */
  readonly argument?: string | undefined;
  readonly env: Readonly<Record<string, string | undefined>>;
  readonly platform: NodeJS.Platform;
  readonly home: string;
}

/** The argument, else `OHMWRIGHT_STORE`, else a folder in the person's own data folder. */
export function storeFolder({ argument, env, platform, home }: StorePlace): string {
  const named = [argument, env['OHMWRIGHT_STORE']].find((each) => each !== undefined && each !== '');
  if (named !== undefined) return named;
  switch (platform) {
    case 'win32':
      return win32.join(env['APPDATA'] ?? win32.join(home, 'AppData', 'Roaming'), 'Ohmwright');
    case 'darwin':
      return posix.join(home, 'Library', 'Application Support', 'Ohmwright');
    default: {
      const data = env['XDG_DATA_HOME'];
      // A relative path is to be ignored, says the XDG base directory specification.
      return posix.join(data?.startsWith('/') === true ? data : posix.join(home, '.local', 'share'), 'ohmwright');
    }
  }
}
