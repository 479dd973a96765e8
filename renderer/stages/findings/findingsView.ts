/** What the person has filtered and opened among the findings; it lasts while they look at another stage. */
import { create } from 'zustand';
import type { FaultMethod, Finding, PartId, Practice } from '../../../core/api.ts';
import { useOpenJob } from '../../state/openJob.ts';
import { useSession } from '../../state/session.ts';
import { drawnPart, type FindingFilter, findingName, NO_FILTER } from './findingList.ts';

/** The tabs of the stage: verdicts, fuses and faults, and the same job under two rule books. */
export const findingsTabs = ['verdicts', 'protection', 'practices'] as const;
export type FindingsTab = (typeof findingsTabs)[number];

export interface FindingsView {
  /** The job that filter and opened finding belong to. */
  readonly of: string | null;
  readonly filter: FindingFilter;
  readonly openKey: string | null;
  readonly tab: FindingsTab;
  readonly method: FaultMethod;
  /** The fuse or breaker whose time–current picture is open. */
  readonly openDevice: PartId | null;
  readonly isProposing: boolean;
  /** Runs whose proposals are ticked. */
  readonly ticked: ReadonlySet<string>;
  /** The second rule book; null until one is chosen. */
  readonly otherPractice: Practice | null;
}

const NOTHING: Omit<FindingsView, 'of'> = {
  filter: NO_FILTER,
  openKey: null,
  tab: 'verdicts',
  method: 'plain',
  openDevice: null,
  isProposing: false,
  ticked: new Set(),
  otherPractice: null,
};
const useView = create<FindingsView>()(() => ({ of: null, ...NOTHING }));

/** The view of the open job; another job begins with nothing filtered and nothing open. */
export function useFindingsView(): Omit<FindingsView, 'of'> {
  const key = useOpenJob((open) => open.key);
  const view = useView();
  return view.of === key ? view : NOTHING;
}

type Change = Partial<Omit<FindingsView, 'of'>>;

export function changeView(change: Change | ((view: Omit<FindingsView, 'of'>) => Change)): void {
  const of = useOpenJob.getState().key;
  useView.setState((before) => {
    const view = before.of === of ? before : NOTHING;
    return { ...view, ...(typeof change === 'function' ? change(view) : change), of };
  });
}

/** Goes to the stage Findings with this one open, its parts lit. */
export function goToFinding(finding: Finding): void {
  const { job, light } = useOpenJob.getState();
  light(finding.parts.map((id) => drawnPart(job, id)));
  changeView({ tab: 'verdicts', filter: NO_FILTER, openKey: findingName(finding) });
  useSession.getState().goStage('findings');
}

/** Goes to the stage Findings with only those that name the part. */
export function goToFindingsOf(part: PartId): void {
  changeView({ tab: 'verdicts', filter: { ...NO_FILTER, part }, openKey: null });
  useSession.getState().goStage('findings');
}
