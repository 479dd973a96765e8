/** What the person has chosen and opened in the stage Strings; it lasts while they look at another stage. */
import { create } from 'zustand';
import type { BatteryModel, DriftRequest } from '../../../core/api.ts';
import { useOpenJob } from '../../state/openJob.ts';
import type { JoinForm } from './joinForm.ts';

export type FoldName = 'rest' | 'joining' | 'layouts' | 'changes' | 'one-out' | 'band' | 'drift' | 'readings';

export interface StringsView {
  readonly model: BatteryModel;
  readonly open: ReadonlySet<FoldName>;
  /** Label of the change that is shown as proposed; null for the best. */
  readonly picked: string | null;
  /** Null until the person changes the usual cycle. */
  readonly drift: DriftRequest | null;
  /** Null until the person chooses what to join. */
  readonly joining: JoinForm | null;
}

const AT_FIRST: StringsView = { model: 'slow', open: new Set(), picked: null, drift: null, joining: null };
const useView = create<{ readonly of: string | null; readonly view: StringsView }>()(() => ({
  of: null,
  view: AT_FIRST,
}));

/** The view of the open job; another job begins with everything folded. */
export function useStringsView(): StringsView {
  const key = useOpenJob((open) => open.key);
  const { of, view } = useView();
  return of === key ? view : AT_FIRST;
}

export function changeStringsView(change: Partial<StringsView>): void {
  const of = useOpenJob.getState().key;
  useView.setState((now) => ({ of, view: { ...(now.of === of ? now.view : AT_FIRST), ...change } }));
}

export function turnFold(fold: FoldName, isOpen: boolean): void {
  const of = useOpenJob.getState().key;
  useView.setState((now) => {
    const view = now.of === of ? now.view : AT_FIRST;
    const open = new Set(view.open);
    if (isOpen) open.add(fold);
    else open.delete(fold);
    return { of, view: { ...view, open } };
  });
}
