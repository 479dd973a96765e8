/** Opens the store at the start; where it cannot be opened the person reads why and has a way out. */
import { openStore, type Store } from '../store/store.ts';
import type { ElectronModule } from './electronModule.ts';

export interface StoreStart {
  readonly electron: Pick<ElectronModule, 'dialog' | 'shell'>;
  readonly folder: string;
  readonly log: (line: string) => void;
}

/** `undefined` where the person gave up. */
export async function openStoreOrAsk({ electron, folder, log }: StoreStart): Promise<Store | undefined> {
  for (;;) {
    try {
      return await openStore({ folder, now: () => new Date() });
    } catch (trouble) {
      const message = trouble instanceof Error ? trouble.message : String(trouble);
      log(`the store could not be opened: ${message}`);
      if (!(await tryAgain(electron, folder, message))) return undefined;
    }
  }
}

async function tryAgain({ dialog, shell }: StoreStart['electron'], folder: string, detail: string): Promise<boolean> {
  for (;;) {
    const { response } = await dialog.showMessageBox({
      type: 'error',
      title: 'Ohmwright',
      message: 'The store of jobs could not be opened.',
      detail: `${detail}\n\nIt lies in ${folder}`,
      buttons: ['Try again', 'Open the folder', 'Quit'],
      defaultId: 0,
      cancelId: 2,
      noLink: true,
    });
    if (response !== 1) return response === 0;
    await shell.openPath(folder);
  }
}
