/** The desktop program from its start to its end: one instance, one window, one store. */
import { existsSync, mkdirSync } from 'node:fs';
import { homedir } from 'node:os';
import { dirname, join, resolve } from 'node:path';
import { fileURLToPath } from 'node:url';
import type { HostCan, MenuCommand } from '../../core/host.ts';
import { programVersion } from '../cli/programVersion.ts';
import { staticFiles } from '../page/staticFiles.ts';
import { createServices, type Services } from '../services/services.ts';
import type { Store } from '../store/store.ts';
import { storeFolder } from '../store/storeFolder.ts';
import { showAbout } from './about.ts';
import type { ElectronModule } from './electronModule.ts';
import { fileDialogs } from './fileDialogs.ts';
import { answerCalls, type Calls } from './ipc.ts';
import { menuTemplate } from './menu.ts';
import { listenForFiles, type OpenFiles } from './openFiles.ts';
import { openStoreOrAsk } from './openStoreOrAsk.ts';
import { registerPageScheme, servePage } from './pageProtocol.ts';
import { guardApp, guardSession, refuseRemoteControl } from './policy.ts';
import { readWords, type Start } from './startWords.ts';
import { openWindow, type PageWindow } from './window.ts';

export interface WindowSurroundings {
  readonly start: Start;
  readonly platform: NodeJS.Platform;
  readonly home: string;
  readonly env: Readonly<Record<string, string | undefined>>;
  /** Where the build lies: `page/`, `preload.cjs`, `main.mjs`. */
  readonly builtFolder: string;
  /** Where a packaged program keeps its extra files. */
  readonly resourcesFolder: string;
  /** Takes a line about a defect. */
  readonly log: (line: string) => void;
}

/** What this host is able to do: all that a host can. */
const can: HostCan = { askForFile: true, askWhereToSave: true, showFile: true };

/** Never rejects. What stands before the first `await` must have run before Electron is ready. */
export async function start(electron: ElectronModule, here: WindowSurroundings = thisProcess()): Promise<void> {
  const { app, dialog, protocol } = electron;
  const programPaths = [
    app.getAppPath(),
    here.builtFolder,
    dirname(here.builtFolder),
    join(here.builtFolder, 'main.mjs'),
  ];
  const words = readWords(here.start, programPaths);
  const named = storeFolder({ argument: words.store, env: here.env, platform: here.platform, home: here.home });
  const folder = resolve(here.start.folder, named);
  keepOwnFilesIn(join(folder, 'window'), electron, here);
  if (!app.requestSingleInstanceLock()) {
    app.quit();
    return;
  }
  app.enableSandbox();
  refuseRemoteControl(app);
  registerPageScheme(protocol);
  guardApp(app);
  const files = listenForFiles(app, { first: words.files, read: (again) => readWords(again, programPaths).files });
  try {
    await app.whenReady();
    await run(electron, here, folder, files);
  } catch (trouble) {
    here.log(`the program could not start: ${String(trouble)}`);
    dialog.showErrorBox('Ohmwright could not start', trouble instanceof Error ? trouble.message : String(trouble));
    app.exit(1);
  }
}

/**
 * Chromium's own files beside the store, not among its files; so there is one running program for one store. Where the folder cannot be
 * made they go where Electron thinks best, and the store will tell what is wrong.
 */
function keepOwnFilesIn(folder: string, { app }: ElectronModule, { log }: WindowSurroundings): void {
  try {
    mkdirSync(folder, { recursive: true }); // Electron takes only a folder that is there.
    app.setPath('userData', folder);
  } catch (trouble) {
    log(`the folder ${folder} could not be made: ${String(trouble)}`);
  }
}

async function run(
  electron: ElectronModule,
  here: WindowSurroundings,
  folder: string,
  files: OpenFiles,
): Promise<void> {
  const { app, ipcMain, protocol, session } = electron;
  const page = join(here.builtFolder, 'page');
  if (!existsSync(join(page, 'index.html'))) throw new Error(`The page is missing from ${page}; build it first.`);
  const developerTools = !app.isPackaged;
  guardSession(session.defaultSession, { developerTools });
  servePage(protocol, staticFiles(page));
  const store = await openStoreOrAsk({ electron, folder, log: here.log });
  if (store === undefined) {
    app.exit(0);
    return;
  }

  const window = openWindow({
    electron,
    preloadFile: join(here.builtFolder, 'preload.cjs'),
    placeFile: join(folder, 'window-place.json'),
    developerTools,
  });
  const end = (): void => void calls.idle().then(() => app.quit());
  const services = createServices({
    store,
    door: fileDialogs({ electron, parent: () => window.browserWindow, saveFolder: saveFolder(electron) }),
    about: { kind: 'window', version: programVersion, can },
    log: here.log,
    end,
  });
  const calls = answerCalls({
    ipcMain,
    services,
    windowOf: (contents) => (contents === window.contents ? window.name : undefined),
  });
  services.onEvent((event) => window.tell(event));
  endWithTheWindow(electron, { calls, store });
  setMenu(electron, here, window, folder);
  deliverFiles(files, services, window);
  await window.load();
}

function saveFolder({ app }: ElectronModule): string {
  return join(app.getPath('documents'), 'Ohmwright');
}

/** One window, so its end is the program's on every system. When all windows are closed no call can come any more; the last are answered. */
function endWithTheWindow({ app }: ElectronModule, { calls, store }: { calls: Calls; store: Store }): void {
  let closed = false;
  app.on('window-all-closed', () => app.quit());
  app.on('will-quit', (event) => {
    if (closed) return;
    event.preventDefault();
    closed = true;
    calls.close();
    void calls.idle().then(() => {
      store.close();
      app.exit(0);
    });
  });
}

function setMenu(electron: ElectronModule, here: WindowSurroundings, window: PageWindow, folder: string): void {
  const does = {
    command: (command: MenuCommand) => window.tell({ event: 'menu', command }),
    about: () =>
      void showAbout({
        electron,
        parent: window.browserWindow,
        builtFolder: here.builtFolder,
        resourcesFolder: here.resourcesFolder,
      }),
    showStore: () => void electron.shell.openPath(folder),
  };
  const template = menuTemplate(does, { platform: here.platform, developerTools: !electron.app.isPackaged });
  electron.Menu.setApplicationMenu(electron.Menu.buildFromTemplate(template));
}

function deliverFiles(files: OpenFiles, services: Services, window: PageWindow): void {
  files.deliverTo(
    async (path) => {
      try {
        await services.openPath(path);
      } catch (trouble) {
        services.log(`a file could not be opened: ${String(trouble)}`);
      }
    },
    () => window.show(),
  );
}

function thisProcess(): WindowSurroundings {
  return {
    start: { words: process.argv, folder: process.cwd() },
    platform: process.platform,
    home: homedir(),
    env: process.env,
    builtFolder: dirname(fileURLToPath(import.meta.url)),
    resourcesFolder: (process as { readonly resourcesPath?: string }).resourcesPath ?? '',
    log: (line) => void process.stderr.write(`ohmwright: ${line}\n`),
  };
}
