/** The one window: made hidden, shown when it has something to show, put back where it was; what goes wrong in it is told in words. */
import { randomUUID } from 'node:crypto';
import type { BrowserWindow, MessageBoxOptions, WebContents } from 'electron';
import type { HostEvent } from '../../core/host.ts';
import { pageAddress } from './address.ts';
import { eventChannel } from './channels.ts';
import type { ElectronModule } from './electronModule.ts';
import { pagePreferences } from './policy.ts';
import { keepPlace, readPlace, smallest, usual } from './windowBounds.ts';

export interface WindowRequest {
  readonly electron: Pick<ElectronModule, 'app' | 'BrowserWindow' | 'dialog' | 'screen'>;
  readonly preloadFile: string;
  /** Where the window's place on the screen is kept. */
  readonly placeFile: string;
  readonly developerTools: boolean;
}

export interface PageWindow {
  /** The name by which changes made in this window are known. */
  readonly name: string;
  readonly browserWindow: BrowserWindow;
  /** What shows the page; still to be told apart from others when the window has gone. */
  readonly contents: WebContents;
  tell(event: HostEvent): void;
  /** Brings the window to the front. */
  show(): void;
  load(): Promise<void>;
}

/** How long a page that still has changes to send may take before the person is asked, ms. */
const lastWordsMs = 1500;
/** The page's paper colour, so that the first moment is not white. */
const paper = '#f7f3ea';

export function openWindow(request: WindowRequest): PageWindow {
  const { BrowserWindow, screen } = request.electron;
  const name = `window-${randomUUID().slice(0, 8)}`;
  const place = readPlace(
    request.placeFile,
    screen.getAllDisplays().map((display) => display.workArea),
  );
  const window = new BrowserWindow({
    ...usual,
    ...place.bounds,
    minWidth: smallest.width,
    minHeight: smallest.height,
    show: false,
    title: 'Ohmwright',
    backgroundColor: paper,
    webPreferences: pagePreferences(request.preloadFile, name, request.developerTools),
  });
  window.once('ready-to-show', () => {
    if (place.maximized) window.maximize();
    window.show();
  });
  window.on('close', () => {
    keepPlace(request.placeFile, { bounds: window.getNormalBounds(), maximized: window.isMaximized() });
  });
  tellOfTrouble(window, request.electron);
  letThePageFinish(window, request.electron);
  return {
    name,
    browserWindow: window,
    contents: window.webContents,
    tell: eventsTo(window),
    show() {
      if (window.isDestroyed()) return;
      if (window.isMinimized()) window.restore();
      window.focus();
    },
    async load() {
      try {
        await window.loadURL(pageAddress);
      } catch (trouble) {
        // Whoever closes the window at once has not met with trouble.
        if (!window.isDestroyed()) throw trouble;
      }
    },
  };
}

/** Events for the page. While it is loading, those that must not be lost wait; the rest the new page reads for itself. */
function eventsTo(window: BrowserWindow): (event: HostEvent) => void {
  const waiting: HostEvent[] = [];
  let loaded = false;
  const contents = window.webContents;
  contents.on('did-navigate', () => {
    loaded = false;
  });
  contents.on('render-process-gone', () => {
    loaded = false;
  });
  contents.on('did-finish-load', () => {
    loaded = true;
    for (const event of waiting.splice(0)) contents.send(eventChannel, event);
  });
  return (event) => {
    if (window.isDestroyed()) return;
    if (loaded) contents.send(eventChannel, event);
    else if (event.event === 'open-job' || event.event === 'file-trouble') waiting.push(event);
  };
}

function tellOfTrouble(window: BrowserWindow, { app, dialog }: WindowRequest['electron']): void {
  window.webContents.on('render-process-gone', (_event, { reason }) => {
    if (reason === 'clean-exit' || window.isDestroyed()) return;
    const box = choice(
      'The page of Ohmwright has stopped.',
      `Reason given by the system: ${reason}. Every change that was shown as kept is in the store; a change made in the last moment before may be missing.`,
      ['Start the page again', 'Quit'],
    );
    void dialog.showMessageBox(window, box).then(({ response }) => {
      if (response === 0) window.webContents.reload();
      else app.quit();
    });
  });
  window.on('unresponsive', () => {
    const box = choice(
      'The page of Ohmwright does not answer.',
      'It may be working on something long. Stopping it loses no change that was shown as kept.',
      ['Wait', 'Stop the page'],
    );
    void dialog.showMessageBox(window, box).then(({ response }) => {
      if (response === 1) window.webContents.forcefullyCrashRenderer();
    });
  });
}

/** A page that still has changes to send holds its window back: it gets a moment, then the person decides. */
function letThePageFinish(window: BrowserWindow, { dialog }: WindowRequest['electron']): void {
  let closing: 'no' | 'asked' | 'waited' = 'no';
  window.on('close', () => {
    if (closing === 'no') closing = 'asked';
  });
  window.webContents.on('will-prevent-unload', (event) => {
    if (closing === 'asked') {
      closing = 'waited';
      setTimeout(() => {
        if (!window.isDestroyed()) window.close();
      }, lastWordsMs);
      return;
    }
    const box = choice(
      'Some changes have not been kept yet.',
      'The store has not taken them, for example because the disk is full. If you leave now, they are lost.',
      ['Stay', 'Leave all the same'],
    );
    // Preventing the prevention lets the page go.
    if (dialog.showMessageBoxSync(window, box) === 1) event.preventDefault();
    else closing = 'no';
  });
}

/** The first button is what the Enter key chooses, and what closing the box means. */
export function choice(message: string, detail: string, buttons: string[]): MessageBoxOptions {
  return { type: 'warning', title: 'Ohmwright', message, detail, buttons, defaultId: 0, cancelId: 0, noLink: true };
}
