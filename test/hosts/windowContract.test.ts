/** The contract of all hosts, kept by the window: the page's own end of the channel, the built preload, the calls as Electron copies them. */
import { windowChannel } from '../../renderer/host/windowChannel.ts';
import { buildPreload } from './builtWindow.ts';
import { hostContract } from './hostContract.ts';
import { startWindow } from './windowStarted.ts';

hostContract('the desktop window', {
  kind: 'window',
  pages: 1,
  start: async () => {
    await buildPreload();
    const started = await startWindow();
    return {
      channel: windowChannel(started.contents.key),
      dialogs: {
        open: (path) => void started.electron.answers.push(chosen(path)),
        save: (path) => void started.electron.answers.push(chosen(path)),
      },
      stop: started.end,
    };
  },
});

function chosen(path: string | null): object {
  if (path === null) return { canceled: true, filePaths: [], filePath: '' };
  return { canceled: false, filePaths: [path], filePath: path };
}
