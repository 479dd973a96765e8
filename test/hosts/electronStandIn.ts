/**
 * A stand-in for Electron's module where its runtime is not there: as much of its behaviour as the window host leans on. Messages between
 * page and program are copied as Electron copies them, the page's files come through the scheme's handler, and the preload is the
 * built one, run in a world of its own that knows only `electron`.
 */
import { EventEmitter } from 'node:events';
import { existsSync, readFileSync } from 'node:fs';
import { isAbsolute, join } from 'node:path';
import { runInNewContext } from 'node:vm';
import type { BrowserWindowConstructorOptions, MenuItemConstructorOptions, MessageBoxOptions } from 'electron';
import type { ElectronModule } from '../../electron/window/electronModule.ts';

export interface Frame {
  readonly url: string;
  readonly parent: Frame | null;
}

/** An event of Electron that a listener may prevent. */
export interface Preventable {
  defaultPrevented: boolean;
  preventDefault(): void;
}

export function preventable<T extends object>(fields: T): Preventable & T {
  return {
    ...fields,
    defaultPrevented: false,
    preventDefault() {
      this.defaultPrevented = true;
    },
  };
}

type Handler = (event: unknown, ...words: unknown[]) => unknown;
type SchemeHandler = (request: Request) => Promise<Response>;

/** What the preload gives the page. */
export interface PageKey {
  readonly window: string;
  call(method: unknown, ask: unknown): Promise<unknown>;
  listen(listener: (event: unknown) => void): () => void;
}

/** The preload's world, run from its built file. */
export interface PreloadRun {
  /** What it exposed to the page, by key. */
  readonly exposed: Readonly<Record<string, unknown>>;
  /** Modules that it required. */
  readonly required: readonly string[];
  /** The program's end sends something. */
  deliver(channel: string, ...words: unknown[]): void;
}

export interface PreloadRequest {
  readonly file: string;
  readonly words: readonly string[];
  readonly invoke: (channel: string, ...words: unknown[]) => Promise<unknown>;
}

export function runPreload({ file, words, invoke }: PreloadRequest): PreloadRun {
  const exposed: Record<string, unknown> = {};
  const required: string[] = [];
  const ipcRenderer = Object.assign(new EventEmitter(), { invoke });
  const contextBridge = {
    exposeInMainWorld: (key: string, value: unknown) => {
      exposed[key] = value;
    },
  };
  const require = (name: string): unknown => {
    required.push(name);
    if (name !== 'electron') throw new Error(`module not found: ${name}`);
    return { contextBridge, ipcRenderer };
  };
  const module = { exports: {} };
  runInNewContext(readFileSync(file, 'utf8'), { require, module, exports: module.exports, process: { argv: words } });
  return {
    exposed,
    required,
    deliver: (channel, ...words) => void ipcRenderer.emit(channel, {}, ...words),
  };
}

export class StandInContents extends EventEmitter {
  readonly id: number;
  readonly #electron: StandIn;
  readonly #options: BrowserWindowConstructorOptions;
  mainFrame: Frame = { url: '', parent: null };
  preload: PreloadRun | undefined;
  /** The page as it was loaded last. */
  page: { readonly status: number; readonly headers: Headers; readonly text: string } | undefined;
  loads = 0;
  openHandler: ((details: { url: string }) => { action: string }) | undefined;
  /** Whether the page asks to stay when it is to go. */
  holdsOn = false;

  constructor(electron: StandIn, options: BrowserWindowConstructorOptions) {
    super();
    this.#electron = electron;
    this.#options = options;
    this.id = electron.nextId();
    electron.app.emit('web-contents-created', {}, this);
  }

  async load(url: string): Promise<void> {
    this.emit('did-navigate', {}, url);
    this.mainFrame = { url, parent: null };
    const preferences = this.#options.webPreferences ?? {};
    this.preload = runPreload({
      file: preferences.preload!,
      words: ['electron', ...(preferences.additionalArguments ?? [])],
      invoke: async (channel, ...words) => await this.#electron.invoke(this, this.mainFrame, channel, ...words),
    });
    const answer = await this.#electron.ask(url);
    this.page = { status: answer.status, headers: answer.headers, text: await answer.text() };
    this.loads += 1;
    this.emit('did-finish-load');
  }

  send(channel: string, ...words: unknown[]): void {
    this.preload?.deliver(channel, ...structuredClone(words));
  }

  setWindowOpenHandler(handler: (details: { url: string }) => { action: string }): void {
    this.openHandler = handler;
  }

  reload(): void {
    void this.load(this.mainFrame.url);
  }

  forcefullyCrashRenderer(): void {
    this.emit('render-process-gone', {}, { reason: 'killed', exitCode: 1 });
  }

  /** The page's end of the channel. */
  get key(): PageKey {
    return this.preload!.exposed['ohmwright'] as PageKey;
  }
}

export class StandInWindow extends EventEmitter {
  readonly options: BrowserWindowConstructorOptions;
  readonly webContents: StandInContents;
  readonly done: string[] = [];
  minimized = false;
  maximized = false;
  #gone = false;
  readonly #electron: StandIn;

  constructor(electron: StandIn, options: BrowserWindowConstructorOptions) {
    super();
    this.#electron = electron;
    this.options = options;
    this.webContents = new StandInContents(electron, options);
    electron.windows.push(this);
  }

  async loadURL(url: string): Promise<void> {
    await this.webContents.load(url);
    this.emit('ready-to-show');
  }

  show(): void {
    this.done.push('show');
  }
  focus(): void {
    this.done.push('focus');
  }
  maximize(): void {
    this.maximized = true;
  }
  isMaximized(): boolean {
    return this.maximized;
  }
  isMinimized(): boolean {
    return this.minimized;
  }
  restore(): void {
    this.minimized = false;
  }
  getNormalBounds(): object {
    const { x = 10, y = 20, width, height } = this.options;
    return { x, y, width, height };
  }
  isDestroyed(): boolean {
    return this.#gone;
  }

  /** As when the person closes it; true when it has gone. */
  close(): boolean {
    if (this.#gone) return true;
    const closing = preventable({});
    this.emit('close', closing);
    if (closing.defaultPrevented) return false;
    if (this.webContents.holdsOn) {
      const staying = preventable({});
      this.webContents.emit('will-prevent-unload', staying);
      if (!staying.defaultPrevented) return false;
    }
    this.#gone = true;
    this.emit('closed');
    this.#electron.windowClosed();
    return true;
  }
}

class StandInApp extends EventEmitter {
  readonly #electron: StandIn;
  readonly switches = new Set<string>();
  readonly paths: Record<string, string>;
  isPackaged = true;
  ready = true;
  sandboxed = false;
  firstInstance = true;
  exitCode: number | undefined;
  quits = 0;

  constructor(electron: StandIn, home: string) {
    super();
    this.#electron = electron;
    this.paths = { documents: join(home, 'Documents') };
  }

  readonly commandLine = { removeSwitch: (name: string) => void this.switches.delete(name) };
  getAppPath(): string {
    return '/program/resources/app.asar';
  }
  setPath(name: string, path: string): void {
    if (!isAbsolute(path) || !existsSync(path)) throw new Error(`Electron takes no path that is not there: ${path}`);
    this.paths[name] = path;
  }
  getPath(name: string): string {
    return this.paths[name]!;
  }
  requestSingleInstanceLock(): boolean {
    return this.firstInstance;
  }
  enableSandbox(): void {
    this.sandboxed = true;
  }
  async whenReady(): Promise<void> {
    await Promise.resolve();
  }
  quit(): void {
    this.quits += 1;
    this.emit('before-quit', preventable({}));
    this.#electron.quitting = true;
    const gone = this.#electron.openWindows().every((window) => window.close());
    this.#electron.quitting = false;
    if (!gone) return;
    const quitting = preventable({});
    this.emit('will-quit', quitting);
    if (!quitting.defaultPrevented) this.exit(0);
  }
  exit(code: number): void {
    this.exitCode = code;
    this.emit('stand-in-exit');
  }
}

export interface Asked {
  readonly kind: string;
  readonly options: Partial<MessageBoxOptions> & Readonly<Record<string, unknown>>;
}

export class StandIn {
  readonly windows: StandInWindow[] = [];
  readonly app: StandInApp;
  readonly handlers = new Map<string, Handler>();
  readonly schemes: object[] = [];
  readonly asked: Asked[] = [];
  readonly shown: string[] = [];
  /** Answers to the next dialogs, in order, or promises of them; where there is none the dialog is cancelled. */
  readonly answers: object[] = [];
  menu: MenuItemConstructorOptions[] = [];
  screens = [{ workArea: { x: 0, y: 0, width: 1920, height: 1080 } }];
  quitting = false;
  readonly session = Object.assign(new EventEmitter(), {
    permissionRequest: undefined as
      | ((contents: unknown, permission: string, answer: (granted: boolean) => void) => void)
      | undefined,
    permissionCheck: undefined as ((contents: unknown, permission: string) => boolean) | undefined,
    deviceCheck: undefined as ((details: object) => boolean) | undefined,
    beforeRequest: undefined as
      | ((details: { url: string }, answer: (answer: { cancel?: boolean }) => void) => void)
      | undefined,
  });
  #scheme: SchemeHandler | undefined;
  #ids = 0;

  constructor(home: string) {
    this.app = new StandInApp(this, home);
  }

  nextId(): number {
    this.#ids += 1;
    return this.#ids;
  }

  openWindows(): StandInWindow[] {
    return this.windows.filter((window) => !window.isDestroyed());
  }

  windowClosed(): void {
    if (this.openWindows().length === 0 && !this.quitting) this.app.emit('window-all-closed');
  }

  /** A request of the page, which the session may cancel before the scheme answers. */
  async ask(url: string, method = 'GET'): Promise<Response> {
    if (!this.mayRequest(url)) throw new Error(`net::ERR_BLOCKED_BY_CLIENT ${url}`);
    return await this.answered(url, method);
  }

  /** The scheme's own answer, were the session to let everything through. */
  async answered(url: string, method = 'GET'): Promise<Response> {
    return await this.#scheme!(new Request(url, { method }));
  }

  mayRequest(url: string): boolean {
    let cancelled = false;
    this.session.beforeRequest?.({ url }, ({ cancel }) => {
      cancelled = cancel === true;
    });
    return !cancelled;
  }

  /** A message of a page's frame, copied both ways; what cannot be copied is thrown, as Electron does. */
  async invoke(
    sender: StandInContents,
    senderFrame: Frame | null,
    channel: string,
    ...words: unknown[]
  ): Promise<unknown> {
    const handler = this.handlers.get(channel);
    if (handler === undefined) throw new Error(`Error invoking remote method '${channel}': no handler registered`);
    const event = { sender, senderFrame, frameId: 1, processId: 1, type: 'frame' };
    return structuredClone(await handler(event, ...structuredClone(words)));
  }

  clickMenu(label: string): void {
    const items = this.menu.flatMap((menu) => menu.submenu as MenuItemConstructorOptions[]);
    const item = items.find((each) => each.label === label)!;
    (item.click as () => void)();
  }

  /** The next end of the program. */
  async ended(): Promise<number> {
    if (this.app.exitCode === undefined) await new Promise((resolve) => this.app.once('stand-in-exit', resolve));
    return this.app.exitCode!;
  }

  /** The module as the program imports it. */
  get module(): ElectronModule {
    const { asked, answers, shown, session } = this;
    const made = (options: BrowserWindowConstructorOptions): StandInWindow => new StandInWindow(this, options);
    const box = (words: readonly unknown[]): object => {
      const options = words.at(-1) as Asked['options'];
      asked.push({ kind: 'message', options });
      return answers.shift() ?? { response: options.cancelId ?? 0 };
    };
    const file = (kind: string, words: readonly unknown[]): object => {
      asked.push({ kind, options: words.at(-1) as Asked['options'] });
      return answers.shift() ?? { canceled: true, filePaths: [], filePath: '' };
    };
    const module = {
      app: this.app,
      // A constructor that returns an object gives that object.
      BrowserWindow: function BrowserWindow(options: BrowserWindowConstructorOptions) {
        return made(options);
      },
      dialog: {
        showMessageBox: async (...words: unknown[]) => await Promise.resolve(box(words)),
        showMessageBoxSync: (...words: unknown[]) => (box(words) as { response: number }).response,
        showOpenDialog: async (...words: unknown[]) => await Promise.resolve(file('open', words)),
        showSaveDialog: async (...words: unknown[]) => await Promise.resolve(file('save', words)),
        showErrorBox: (title: string, detail: string) => void asked.push({ kind: 'error', options: { title, detail } }),
      },
      ipcMain: {
        handle: (channel: string, handler: Handler) => {
          if (this.handlers.has(channel)) throw new Error(`a second handler for '${channel}'`);
          this.handlers.set(channel, handler);
        },
        removeHandler: (channel: string) => void this.handlers.delete(channel),
      },
      Menu: {
        buildFromTemplate: (template: MenuItemConstructorOptions[]) => template,
        setApplicationMenu: (menu: MenuItemConstructorOptions[]) => {
          this.menu = menu;
        },
      },
      protocol: {
        registerSchemesAsPrivileged: (schemes: object[]) => void this.schemes.push(...schemes),
        handle: (_scheme: string, handler: SchemeHandler) => {
          this.#scheme = handler;
        },
      },
      screen: { getAllDisplays: () => this.screens },
      session: {
        defaultSession: Object.assign(session, {
          setPermissionRequestHandler: (handler: typeof session.permissionRequest) => {
            session.permissionRequest = handler;
          },
          setPermissionCheckHandler: (handler: typeof session.permissionCheck) => {
            session.permissionCheck = handler;
          },
          setDevicePermissionHandler: (handler: typeof session.deviceCheck) => {
            session.deviceCheck = handler;
          },
          webRequest: {
            onBeforeRequest: (handler: typeof session.beforeRequest) => {
              session.beforeRequest = handler;
            },
          },
        }),
      },
      shell: {
        openPath: async (path: string) => {
          shown.push(path);
          return await Promise.resolve('');
        },
        showItemInFolder: (path: string) => void shown.push(path),
      },
    };
    return module as unknown as ElectronModule;
  }
}
