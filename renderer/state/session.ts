/** Where the person is: the host, the list of jobs or an open job, the stage, and what there is to tell. */
import { create } from 'zustand';
import type { AboutHost, HostChannel, Trouble } from '../../core/host.ts';

/** The stages that work, in the order in which the work is done. */
export const stages = ['site', 'wiring', 'strings', 'findings', 'handover'] as const;
export type Stage = (typeof stages)[number];

export interface Session {
  readonly channel: HostChannel | null;
  readonly about: AboutHost | null;
  /** False while the program behind the page does not answer. */
  readonly isHostThere: boolean;
  readonly stage: Stage;
  /** Which field of the stage to go to first, as `site.ambientMinDegC` or `F3.ratingV`. */
  readonly focusField: string | null;
  /** What went wrong last, until it is read. */
  readonly trouble: Trouble | null;
  /** Where there is no room for it beside the stage, the ledger is shown only when called. */
  readonly isLedgerCalled: boolean;
  readonly callLedger: (isCalled: boolean) => void;
  readonly goStage: (stage: Stage, focusField?: string) => void;
  readonly tell: (trouble: Trouble | null) => void;
}

export const useSession = create<Session>()((set) => ({
  channel: null,
  about: null,
  isHostThere: true,
  stage: 'wiring',
  focusField: null,
  trouble: null,
  isLedgerCalled: false,
  callLedger: (isLedgerCalled) => set({ isLedgerCalled }),
  goStage: (stage, focusField) => set({ stage, focusField: focusField ?? null }),
  tell: (trouble) => set({ trouble }),
}));

/** The channel to the host; to be called only below the frame, which waits for it. */
export function useChannel(): HostChannel {
  const channel = useSession((session) => session.channel);
  if (channel === null) throw new Error('the frame waits for the channel before it shows a stage');
  return channel;
}
