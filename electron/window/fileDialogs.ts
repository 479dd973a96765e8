/** Files are chosen in the system's own dialogs and shown with the person's own programs. */
import { mkdirSync } from 'node:fs';
import { join } from 'node:path';
import type { BrowserWindow, FileFilter } from 'electron';
import type { FileDoor, FileKind } from '../services/fileDoor.ts';
import type { ElectronModule } from './electronModule.ts';

export interface FileDialogsRequest {
  readonly electron: Pick<ElectronModule, 'dialog' | 'shell'>;
  /** The window that a dialog belongs to. */
  readonly parent: () => BrowserWindow;
  readonly saveFolder: string;
}

/** A system dialog knows only the last part of a name's ending, so a job file shows up as `.json`. */
const filters: Readonly<Record<FileKind, readonly FileFilter[]>> = {
  job: [{ name: 'Ohmwright job', extensions: ['json'] }],
  pdf: [{ name: 'PDF', extensions: ['pdf'] }],
};
const anyFile: FileFilter = { name: 'Any file', extensions: ['*'] };

export function fileDialogs({ electron: { dialog, shell }, parent, saveFolder }: FileDialogsRequest): FileDoor {
  return {
    saveFolder,
    async askOpen() {
      const { canceled, filePaths } = await dialog.showOpenDialog(parent(), {
        title: 'Open a job',
        filters: [...filters.job, anyFile],
        properties: ['openFile'],
      });
      return canceled ? null : (filePaths[0] ?? null);
    },
    async askSave({ suggestedName, kind }) {
      makeFolder(saveFolder);
      const { canceled, filePath } = await dialog.showSaveDialog(parent(), {
        title: kind === 'job' ? 'Save the job' : 'Save the report',
        defaultPath: join(saveFolder, suggestedName),
        filters: [...filters[kind], anyFile],
        properties: ['createDirectory', 'showOverwriteConfirmation'],
      });
      return canceled || filePath === '' ? null : filePath;
    },
    async show(path) {
      // Where no program is set for the kind of file, its folder with the file marked is the next best thing.
      const trouble = await shell.openPath(path);
      if (trouble !== '') shell.showItemInFolder(path);
    },
  };
}

/** A dialog opens only in a folder that is there. Where it cannot be made, the person chooses another. */
function makeFolder(folder: string): void {
  try {
    mkdirSync(folder, { recursive: true });
  } catch {
    // The dialog then opens where the system thinks best.
  }
}
