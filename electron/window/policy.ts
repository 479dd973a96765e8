/**
 * What the page in the window may not do, whatever it was talked into: go elsewhere, open windows, hold other pages, ask for devices,
 * reach a network. Everything is refused but the few things named here.
 */
import type { App, Session, WebContents, WebPreferences } from 'electron';
import { isOurAddress, isOurBlob, isOurPage } from './address.ts';
import { windowArgument } from './channels.ts';

/** How every window of ours is made: the page gets the one key of the preload and nothing of Node. */
export function pagePreferences(preloadFile: string, windowName: string, developerTools: boolean): WebPreferences {
  return {
    preload: preloadFile,
    additionalArguments: [`${windowArgument}${windowName}`],
    contextIsolation: true,
    sandbox: true,
    nodeIntegration: false,
    nodeIntegrationInWorker: false,
    nodeIntegrationInSubFrames: false,
    webSecurity: true,
    allowRunningInsecureContent: false,
    experimentalFeatures: false,
    webviewTag: false,
    navigateOnDragDrop: false,
    safeDialogs: true,
    spellcheck: false,
    devTools: developerTools,
  };
}

/** Guards every web contents that will ever be made, ours and any that should not exist. Before the first window. */
export function guardApp(app: App): void {
  app.on('web-contents-created', (_event, contents) => guardContents(contents));
}

function guardContents(contents: WebContents): void {
  // The page may load itself again; a frame inside it may load nothing.
  contents.on('will-navigate', (details) => {
    if (!details.isMainFrame || !isOurPage(details.url)) details.preventDefault();
  });
  contents.on('will-frame-navigate', (details) => {
    if (!details.isMainFrame || !isOurPage(details.url)) details.preventDefault();
  });
  contents.on('will-redirect', (details) => details.preventDefault());
  contents.on('will-attach-webview', (event) => event.preventDefault());
  contents.setWindowOpenHandler(() => ({ action: 'deny' }));
}

/** Refuses every permission, every device, every download but what the page made itself, and every request that leaves the program. */
export function guardSession(session: Session, { developerTools }: { readonly developerTools: boolean }): void {
  session.setPermissionRequestHandler((_contents, _permission, answer) => answer(false));
  session.setPermissionCheckHandler(() => false);
  session.setDevicePermissionHandler(() => false);
  session.on('will-download', (event, item) => {
    if (!isOurBlob(item.getURL())) event.preventDefault();
  });
  session.webRequest.onBeforeRequest((details, answer) => {
    answer({ cancel: !mayBeAsked(details.url, developerTools) });
  });
}

/** Our own files, what the page holds in memory, and the developer tools' own files while we develop. */
function mayBeAsked(address: string, developerTools: boolean): boolean {
  if (isOurAddress(address) || isOurBlob(address) || address.startsWith('data:')) return true;
  return developerTools && address.startsWith('devtools:');
}

/** Takes away, before Chromium reads them, the switches that would let another program steer the page. */
export function refuseRemoteControl(app: App): void {
  for (const name of ['remote-debugging-port', 'remote-debugging-pipe', 'remote-debugging-address']) {
    app.commandLine.removeSwitch(name);
  }
}
