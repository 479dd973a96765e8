/** The one set of services that all hosts offer. */
import type { HostAnswer, HostAsk, HostEvent, HostMethod, HostValue, Trouble } from '../../core/host.ts';
import { Refused } from '../store/refused.ts';
import type { Store } from '../store/store.ts';
import type { Bench } from './bench.ts';
import type { FileDoor, HostFacts } from './fileDoor.ts';
import { FileDesk, fileServices } from './fileServices.ts';
import { jobServices } from './jobServices.ts';
import { paperServices } from './paperServices.ts';
import { personServices } from './personServices.ts';

export interface CallContext {
  /** The name that the calling page gave itself. */
  readonly window: string;
}

export type ServiceMethods = {
  readonly [M in HostMethod]: (ask: HostAsk<M>, context: CallContext) => Promise<HostAnswer<HostValue<M>>>;
};

/** A service from inside: its value, or a thrown `Refused`. */
export type Doing<M extends HostMethod> = (
  ask: HostAsk<M>,
  context: CallContext,
) => HostValue<M> | Promise<HostValue<M>>;

export interface Services {
  readonly methods: ServiceMethods;
  /** Listens until the returned function is called. */
  onEvent(listener: (event: HostEvent) => void): () => void;
  /** The person opened a file with the system: ends in the event `open-job` or `file-trouble`. */
  openPath(path: string): Promise<void>;
  /** Takes a line about a defect, for the host's own log. */
  readonly log: (line: string) => void;
}

export interface ServicesRequest {
  readonly store: Store;
  readonly door: FileDoor;
  readonly about: HostFacts;
  /** Takes a line about a defect, for the host's own log. */
  readonly log: (line: string) => void;
  /** Ends the host; called once the store is closed and the page has its answer. */
  readonly end: () => void;
}

/** A method answers trouble in words; what it throws is a defect and for `dispatch` to catch. */
export function createServices({ store, door, about, log, end }: ServicesRequest): Services {
  const listeners = new Set<(event: HostEvent) => void>();
  const tell = (event: HostEvent): void => {
    for (const listener of listeners) listener(event);
  };
  const bench: Bench = { store, door, about, tell };
  const desk = new FileDesk(bench);
  let hasEnded = false;
  const ending = (): void => {
    hasEnded = true;
    store.close();
    // After the answer is on its way.
    setImmediate(end);
  };
  const doings: { readonly [M in HostMethod]: Doing<M> } = {
    ...hostServices(bench, ending),
    ...jobServices(bench),
    ...fileServices(bench, desk),
    ...paperServices(bench, desk),
    ...personServices(bench),
  };
  return {
    methods: answeringAll(doings, () => hasEnded),
    onEvent: (listener) => {
      listeners.add(listener);
      return () => {
        listeners.delete(listener);
      };
    },
    openPath: async (path) => {
      const opened = await answering(() => desk.jobOf(path, ''));
      if (opened.ok) tell({ event: 'open-job', job: opened.value.job });
      else tell({ event: 'file-trouble', file: path, trouble: opened.trouble });
    },
    log,
  };
}

function hostServices(
  { store, door, about }: Bench,
  ending: () => void,
): { readonly [M in 'host.about' | 'host.end']: Doing<M> } {
  return {
    'host.about': () => ({
      kind: about.kind,
      version: about.version,
      can: about.can,
      storeFolder: store.folder,
      saveFolder: door.saveFolder,
      notices: [...store.notices],
    }),
    'host.end': () => {
      ending();
      return null;
    },
  };
}

function answeringAll(doings: { readonly [M in HostMethod]: Doing<M> }, hasEnded: () => boolean): ServiceMethods {
  const entries = Object.entries(doings).map(([method, doing]) => [
    method,
    async (ask: never, context: CallContext) =>
      await answering(() => {
        if (hasEnded()) throw new Refused({ code: 'no-host', message: 'The program has ended; nothing was written.' });
        return doing(ask, context);
      }),
  ]);
  return Object.fromEntries(entries) as ServiceMethods;
}

async function answering<T>(work: () => T | Promise<T>): Promise<HostAnswer<T>> {
  try {
    return { ok: true, value: await work() };
  } catch (error) {
    if (error instanceof Refused) return { ok: false, trouble: plainTrouble(error.trouble) };
    throw error;
  }
}

/** Without fields that are there and hold nothing, which not every channel carries alike. */
function plainTrouble({ code, message, issues, head }: Trouble): Trouble {
  return { code, message, ...(issues === undefined ? {} : { issues }), ...(head === undefined ? {} : { head }) };
}
