/** What we use of Electron, as one object: the entry file hands in the real one, tests hand in a stand-in. Types only. */
import type * as electron from 'electron';

export type ElectronModule = Pick<
  typeof electron,
  'app' | 'BrowserWindow' | 'dialog' | 'ipcMain' | 'Menu' | 'protocol' | 'screen' | 'session' | 'shell'
>;
