/** Calls from the page: one channel, only from the main frame of a window of ours, only what can be copied. */
import type { IpcMain, IpcMainInvokeEvent, WebContents } from 'electron';
import type { HostAnswer, Trouble } from '../../core/host.ts';
import { dispatch } from '../channel/dispatch.ts';
import type { Services } from '../services/services.ts';
import { isOurPage } from './address.ts';
import { callChannel } from './channels.ts';

export interface CallsRequest {
  readonly ipcMain: IpcMain;
  readonly services: Services;
  /** Name of the window that shows these contents; undefined for contents that are none of ours. */
  readonly windowOf: (contents: WebContents) => string | undefined;
}

export interface Calls {
  /** Resolves once no call is being answered. */
  idle(): Promise<void>;
  /** From here on every call is refused. */
  close(): void;
}

export function answerCalls({ ipcMain, services, windowOf }: CallsRequest): Calls {
  const open = new Set<Promise<unknown>>();
  const answer = async (event: IpcMainInvokeEvent, method: unknown, ask: unknown): Promise<HostAnswer<unknown>> => {
    const window = isOwnPage(event) ? windowOf(event.sender) : undefined;
    if (window === undefined) return refused('This call did not come from the page of Ohmwright.');
    return copyable(await dispatch(services, method, ask, { window }), services.log);
  };
  ipcMain.handle(callChannel, async (event, method: unknown, ask: unknown) => {
    const answering = answer(event, method, ask);
    open.add(answering);
    try {
      return await answering;
    } finally {
      open.delete(answering);
    }
  });
  return {
    async idle() {
      while (open.size > 0) await Promise.allSettled(open);
    },
    close() {
      ipcMain.removeHandler(callChannel);
    },
  };
}

/** The frame is null once it has gone elsewhere; a frame with a parent is one inside the page. */
function isOwnPage({ senderFrame }: IpcMainInvokeEvent): boolean {
  return senderFrame !== null && senderFrame.parent === null && isOurPage(senderFrame.url);
}

/** What cannot be copied would fail on its way to the page as a bare exception; it is our bug and is told as one. */
function copyable(answer: HostAnswer<unknown>, log: (line: string) => void): HostAnswer<unknown> {
  try {
    return structuredClone(answer);
  } catch (trouble) {
    log(`an answer could not be copied to the page: ${String(trouble)}`);
    const message = 'Ohmwright made an answer that it cannot pass on; this is a bug. Nothing in the store was lost.';
    return { ok: false, trouble: { code: 'defect', message } };
  }
}

function refused(message: string): { readonly ok: false; readonly trouble: Trouble } {
  return { ok: false, trouble: { code: 'refused', message } };
}
