/** The local browser host from its options to its end. */
import { join, resolve } from 'node:path';
import { dispatch } from '../channel/dispatch.ts';
import { programVersion } from '../cli/programVersion.ts';
import { staticFiles } from '../page/staticFiles.ts';
import { createServices } from '../services/services.ts';
import { openStore, type Store } from '../store/store.ts';
import { storeFolder } from '../store/storeFolder.ts';
import { type Machine, usualSaveFolder } from './folders.ts';
import { localCan, localFileDoor } from './localDoor.ts';
import type { LocalOptions } from './options.ts';
import { type LocalServer, loopback, startServer } from './server.ts';
import { hasDisplay, pageCommands, show } from './showing.ts';

/** Seconds that a host waits for its first page: a browser may have to be found by hand. */
const firstPageS = 300;

export interface LocalSurroundings {
  readonly machine: Machine;
  /** Folder of the built page unless the options name another. */
  readonly builtPage: string;
  readonly now: () => Date;
  readonly print: (line: string) => void;
  readonly complain: (line: string) => void;
}

export interface LocalHost {
  readonly server: LocalServer;
  /** Opens the file that the options name, and shows the page in a browser of the person's own. */
  welcome(): Promise<void>;
}

/** Opens the store and the door, and says where. */
export async function startLocal(options: LocalOptions, surroundings: LocalSurroundings): Promise<LocalHost> {
  const { machine, now, print, complain } = surroundings;
  const log = (line: string): void => {
    complain(`ohmwright: ${line}`);
  };
  const store = await openStore({ folder: resolve(storeFolder({ argument: options.store, ...machine })), now });
  let server: LocalServer | undefined;
  const services = createServices({
    store,
    door: localFileDoor(machine, resolve(options.saveFolder ?? usualSaveFolder(machine))),
    about: { kind: 'browser', version: programVersion, can: localCan(machine) },
    log,
    end: () => void server?.end(),
  });
  try {
    server = await startServer({
      page: staticFiles(options.page ?? surroundings.builtPage),
      answer: async (method, ask, window) => await dispatch(services, method, ask, { window }),
      closeStore: () => {
        closeQuietly(store, log);
      },
      address: loopback,
      port: options.port,
      patience: { idleS: options.idle, firstS: firstPageS },
    });
  } catch (error) {
    store.close();
    throw error;
  }
  services.onEvent((event) => server?.tell(event));
  print(server.url);
  const { url } = server;
  const welcome = async (): Promise<void> => {
    if (options.file !== undefined) await services.openPath(options.file);
    if (options.browser) await showPage(machine, url, join(store.folder, 'browser'), complain);
  };
  return { server, welcome };
}

/** What was acknowledged is on the disk already, so a store that does not close well is told of and keeps nobody from ending. */
function closeQuietly(store: Store, log: (line: string) => void): void {
  try {
    store.close();
  } catch (error) {
    log(`the store did not close well: ${error instanceof Error ? error.message : String(error)}`);
  }
}

async function showPage(
  machine: Machine,
  url: string,
  profile: string,
  complain: (line: string) => void,
): Promise<void> {
  const shown = hasDisplay(machine) && (await show(pageCommands(machine, url, profile)));
  if (!shown) complain('ohmwright: no browser could be started here; open the address above in one on this machine.');
}
