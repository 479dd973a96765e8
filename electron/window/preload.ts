/** What the page gets of this program: one key, `ohmwright`, with the channel to the host. Built as one file that needs only `electron`. */
import { contextBridge, ipcRenderer } from 'electron';
import { callChannel, eventChannel, windowArgument } from './channels.ts';

type Listener = (event: unknown) => void;

/** Events that come while the page is still starting are held for its first listener; a page that never listens holds no more than these. */
const mostHeld = 100;
const held: unknown[] = [];
const listeners = new Set<Listener>();

ipcRenderer.on(eventChannel, (_sender, event: unknown) => {
  for (const listener of listeners) listener(event);
  if (listeners.size === 0 && held.length < mostHeld) held.push(event);
});

contextBridge.exposeInMainWorld('ohmwright', {
  window: process.argv.find((word) => word.startsWith(windowArgument))?.slice(windowArgument.length) ?? 'window',
  call: async (method: unknown, ask: unknown): Promise<unknown> => await ipcRenderer.invoke(callChannel, method, ask),
  listen: (listener: Listener): (() => void) => {
    listeners.add(listener);
    for (const event of held.splice(0)) listener(event);
    return () => void listeners.delete(listener);
  },
});
