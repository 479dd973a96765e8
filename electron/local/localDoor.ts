/** Files of the local browser host: it cannot ask in a dialog of the system, so it saves into its own folder. */
import { Defect } from '../../core/api.ts';
import type { HostCan } from '../../core/host.ts';
import type { FileDoor } from '../services/fileDoor.ts';
import type { Machine } from './folders.ts';
import { hasDisplay, opener, show } from './showing.ts';

export function localCan(machine: Machine): HostCan {
  return { askForFile: false, askWhereToSave: false, showFile: hasDisplay(machine) };
}

export function localFileDoor(machine: Machine, saveFolder: string): FileDoor {
  return {
    saveFolder,
    askOpen: async () => await cannotAsk(),
    askSave: async () => await cannotAsk(),
    show: async (path) => {
      if (!(await show([opener(machine, path)]))) throw new Error(`No program was found that shows ${path}.`);
    },
  };
}

async function cannotAsk(): Promise<never> {
  throw new Defect('a host is never asked for what its `can` denies');
}
