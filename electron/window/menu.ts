/** The menu of the window. What concerns the job is told to the page as a command; what concerns the window is done here. */
import type { MenuItemConstructorOptions } from 'electron';
import type { MenuCommand } from '../../core/host.ts';

export interface MenuDoes {
  readonly command: (command: MenuCommand) => void;
  readonly about: () => void;
  readonly showStore: () => void;
}

export interface MenuFor {
  readonly platform: NodeJS.Platform;
  readonly developerTools: boolean;
}

/** The menus in their order; macOS wants the program's own menu first. */
export function menuTemplate(does: MenuDoes, { platform, developerTools }: MenuFor): MenuItemConstructorOptions[] {
  const own: MenuItemConstructorOptions[] = platform === 'darwin' ? [{ role: 'appMenu' }] : [];
  return [...own, fileMenu(does), editMenu(does), viewMenu(developerTools), helpMenu(does)];
}

function fileMenu(does: MenuDoes): MenuItemConstructorOptions {
  return {
    label: '&File',
    submenu: [
      item(does, 'new', 'New job', 'CmdOrCtrl+N'),
      item(does, 'open', 'Open…', 'CmdOrCtrl+O'),
      { type: 'separator' },
      item(does, 'save', 'Save', 'CmdOrCtrl+S'),
      item(does, 'save-as', 'Save as…', 'CmdOrCtrl+Shift+S'),
      { type: 'separator' },
      item(does, 'handover', 'Hand over…', 'CmdOrCtrl+P'),
      { type: 'separator' },
      { role: 'quit' },
    ],
  };
}

function editMenu(does: MenuDoes): MenuItemConstructorOptions {
  return {
    label: '&Edit',
    submenu: [
      // The page hears these keys itself: in a text field they undo typing, elsewhere a change of the job. The menu only shows them.
      { ...item(does, 'undo', 'Undo', 'CmdOrCtrl+Z'), registerAccelerator: false },
      { ...item(does, 'redo', 'Redo', 'CmdOrCtrl+Shift+Z'), registerAccelerator: false },
      { type: 'separator' },
      { role: 'cut' },
      { role: 'copy' },
      { role: 'paste' },
      { role: 'selectAll' },
      { type: 'separator' },
      item(does, 'find', 'Find…', 'CmdOrCtrl+K'),
    ],
  };
}

function viewMenu(developerTools: boolean): MenuItemConstructorOptions {
  const forDevelopers: MenuItemConstructorOptions[] = [{ type: 'separator' }, { role: 'toggleDevTools' }];
  return {
    label: '&View',
    submenu: [
      { role: 'zoomIn' },
      { role: 'zoomOut' },
      { role: 'resetZoom' },
      { type: 'separator' },
      { role: 'togglefullscreen' },
      ...(developerTools ? forDevelopers : []),
    ],
  };
}

function helpMenu(does: MenuDoes): MenuItemConstructorOptions {
  return {
    role: 'help',
    label: '&Help',
    submenu: [
      { label: 'Show where jobs are kept', click: () => does.showStore() },
      { label: 'About Ohmwright', click: () => does.about() },
    ],
  };
}

function item(does: MenuDoes, command: MenuCommand, label: string, accelerator: string): MenuItemConstructorOptions {
  return { id: command, label, accelerator, click: () => does.command(command) };
}
