/**
 * As little of Electron as lets the built main process load in plain Node, open its window and end: it prints what it was told, makes
 * one call as the page would, and closes.
 */
import { EventEmitter } from 'node:events';

const told = { schemes: [], windows: [], channels: [] };
const handlers = new Map();
let answerScheme;

export const app = Object.assign(new EventEmitter(), {
  isPackaged: true,
  commandLine: { removeSwitch: () => {} },
  getAppPath: () => '/program',
  setPath: () => {},
  getPath: () => process.env.OHMWRIGHT_STORE,
  requestSingleInstanceLock: () => true,
  enableSandbox: () => {},
  whenReady: async () => {},
  quit: () => app.emit('will-quit', { preventDefault: () => {} }),
  exit: (code) => {
    process.stdout.write(`${JSON.stringify(told)}\n`);
    process.exit(code);
  },
});

export class BrowserWindow extends EventEmitter {
  webContents = Object.assign(new EventEmitter(), { setWindowOpenHandler: () => {}, send: () => {} });
  constructor(options) {
    super();
    told.windows.push(options.webPreferences);
  }
  isDestroyed() {
    return false;
  }
  async loadURL(url) {
    const page = await answerScheme(new Request(url));
    told.page = { status: page.status, policy: page.headers.get('content-security-policy') };
    const event = { sender: this.webContents, senderFrame: { url, parent: null } };
    told.answer = await handlers.get('ohmwright:call')(event, 'host.about', {});
    app.quit();
  }
}

export const dialog = {
  showErrorBox: (title, detail) => {
    told.error = `${title}: ${detail}`;
  },
  showMessageBox: async (options) => {
    told.error = options.detail;
    return { response: options.cancelId };
  },
};
export const ipcMain = {
  handle: (channel, handler) => {
    told.channels.push(channel);
    handlers.set(channel, handler);
  },
  removeHandler: (channel) => handlers.delete(channel),
};
export const Menu = { buildFromTemplate: (template) => template, setApplicationMenu: () => {} };
export const protocol = {
  registerSchemesAsPrivileged: (schemes) => told.schemes.push(...schemes.map(({ scheme }) => scheme)),
  handle: (_scheme, handler) => {
    answerScheme = handler;
  },
};
export const screen = { getAllDisplays: () => [] };
export const session = {
  defaultSession: Object.assign(new EventEmitter(), {
    setPermissionRequestHandler: () => {},
    setPermissionCheckHandler: () => {},
    setDevicePermissionHandler: () => {},
    webRequest: { onBeforeRequest: () => {} },
  }),
};
export const shell = { openPath: async () => '', showItemInFolder: () => {} };
