/** What the person has filtered and opened among the findings; it lasts while they look at another stage. */
import { create } from 'zustand';
import type { Finding, PartId } from '../../../core/api.ts';
import { useOpenJob } from '../../state/openJob.ts';
import { useSession } from '../../state/session.ts';
import { drawnPart, type FindingFilter, findingName, NO_FILTER } from './findingList.ts';

export interface FindingsView {
  /** The job that filter and opened finding belong to. */
  readonly of: string | null;
  readonly filter: FindingFilter;
  readonly openKey: string | null;
}

const NOTHING = { filter: NO_FILTER, openKey: null } as const;
const useView = create<FindingsView>()(() => ({ of: null, ...NOTHING }));

/** The view of the open job; another job begins with nothing filtered and nothing open. */
export function useFindingsView(): Omit<FindingsView, 'of'> {
  const key = useOpenJob((open) => open.key);
  const view = useView();
  return view.of === key ? view : NOTHING;
}

export function changeView(change: Partial<Omit<FindingsView, 'of'>>): void {
  const of = useOpenJob.getState().key;
  useView.setState((view) => ({ ...(view.of === of ? view : NOTHING), ...change, of }));
}

/** Goes to the stage Findings with this one open, its parts lit. */
export function goToFinding(finding: Finding): void {
  const { job, light } = useOpenJob.getState();
  light(finding.parts.map((id) => drawnPart(job, id)));
  changeView({ filter: NO_FILTER, openKey: findingName(finding) });
  useSession.getState().goStage('findings');
}

/** Goes to the stage Findings with only those that name the part. */
export function goToFindingsOf(part: PartId): void {
  changeView({ filter: { ...NO_FILTER, part }, openKey: null });
  useSession.getState().goStage('findings');
}
