/** What Help → About says, and the two texts that it opens. */
import { join } from 'node:path';
import type { BrowserWindow } from 'electron';
import { programVersion } from '../cli/programVersion.ts';
import type { ElectronModule } from './electronModule.ts';

export interface AboutRequest {
  readonly electron: Pick<ElectronModule, 'app' | 'dialog' | 'shell'>;
  readonly parent: BrowserWindow;
  /** Where the build lies: the program's own texts are beside it unless it is packaged. */
  readonly builtFolder: string;
  /** Where a packaged program keeps its extra files. */
  readonly resourcesFolder: string;
}

export async function showAbout({ electron, parent, builtFolder, resourcesFolder }: AboutRequest): Promise<void> {
  const { app, dialog, shell } = electron;
  const texts = app.isPackaged
    ? { licence: join(resourcesFolder, 'LICENSE.txt'), sources: join(resourcesFolder, 'SOURCES.txt') }
    : { licence: join(builtFolder, '..', 'LICENSE'), sources: join(builtFolder, '..', 'data', 'SOURCES.md') };
  const { response } = await dialog.showMessageBox(parent, {
    type: 'info',
    title: 'About Ohmwright',
    message: `Ohmwright ${programVersion}`,
    detail: [
      'Plans, proves and traces off-grid extra-low-voltage DC systems.',
      'A planning aid: local code and licensed practice decide.',
      '',
      'Every published figure names its source beside it; the list of sources says which are published, which are common practice and which are from memory.',
      'Licence: MIT. Nothing is sent anywhere.',
    ].join('\n'),
    buttons: ['Close', 'Sources', 'Licence'],
    defaultId: 0,
    cancelId: 0,
    noLink: true,
  });
  const wanted = response === 1 ? texts.sources : response === 2 ? texts.licence : undefined;
  if (wanted === undefined) return;
  // Where no program is set for such a text, its folder is shown.
  if ((await shell.openPath(wanted)) !== '') shell.showItemInFolder(wanted);
}
