/** The open job: its drawing, its answers, what is selected, and the line that undo and redo walk. */
import { create } from 'zustand';
import type { CheckedJob, Draft, Edit, Issue, JunctionId, PartId, Result } from '../../core/api.ts';
import { applyEdit, draftOf } from '../../core/api.ts';
import type { HostChannel, KeptJob, RevisionSummary, Trouble } from '../../core/host.ts';
import { tables } from '../../data/index.ts';
import type { SolveReply } from '../workers/solveMessages.ts';
import { Solver } from '../workers/solver.ts';
import type { Answers } from './answers.ts';
import { Keeper, type KeepStatus } from './keeper.ts';
import { afterEdit, type Line, lineFrom, nextKey, withHeld, withRevision } from './line.ts';

export interface Selection {
  readonly parts: readonly PartId[];
  readonly junctions: readonly JunctionId[];
}

export interface OpenJob {
  /** Key of the job in the host's store; null where no job is open. */
  readonly key: string | null;
  readonly file: string | null;
  readonly draft: Draft;
  readonly job: CheckedJob;
  /** Counts the states shown; answers carry the number of the state that they belong to. */
  readonly generation: number;
  /** The last answers, perhaps of an earlier state: compare `generation`. */
  readonly answers: Answers | null;
  /** Why there are no answers: a bug of ours, in its own words. */
  readonly solverTrouble: string | null;
  readonly caseId: string;
  readonly selection: Selection;
  /** Parts that a finding or a walk points at. */
  readonly lit: readonly PartId[];
  readonly line: Line;
  readonly kept: KeepStatus;
  /** What was last done, for screen readers and the history: `Undone: fuse F3 removed`. */
  readonly said: string;

  /** Makes a change, or returns why it cannot be; then nothing has changed. */
  readonly edit: (edit: Edit) => Result<CheckedJob, readonly Issue[]>;
  readonly undo: () => Promise<void>;
  readonly redo: () => Promise<void>;
  readonly select: (selection: Partial<Selection>) => void;
  readonly light: (parts: readonly PartId[]) => void;
  readonly chooseCase: (caseId: string) => void;
}

const NOTHING: Selection = { parts: [], junctions: [] };

let channel: HostChannel | null = null;
let keeper: Keeper | null = null;
let solver: Solver | null = null;

export const useOpenJob = create<OpenJob>()((set, get) => ({
  key: null,
  file: null,
  draft: {} as Draft,
  job: {} as CheckedJob,
  generation: 0,
  answers: null,
  solverTrouble: null,
  caseId: 'at-rest',
  selection: NOTHING,
  lit: [],
  line: { states: [], at: 0 },
  kept: { status: 'kept' },
  said: '',

  edit: (edit) => {
    performance.mark(EDIT);
    const { draft } = get();
    const edited = applyEdit(draft, edit, tables);
    if (!edited.ok) return edited;
    if (edited.value.draft === draft) return { ok: true, value: get().job };
    const key = nextKey();
    const state = { key, label: edit.label, revision: null, held: edited.value };
    show({ ...edited.value, line: afterEdit(get().line, state), said: edit.label });
    keeper?.keep({ key, label: edit.label, draft: edited.value.draft });
    return { ok: true, value: edited.value.job };
  },
  undo: async () => {
    const { line } = get();
    const from = line.states[line.at];
    if (line.at > 0 && from !== undefined) await walk(line.at - 1, `Undone: ${from.label}`);
  },
  redo: async () => {
    const { line } = get();
    const to = line.states[line.at + 1];
    if (to !== undefined) await walk(line.at + 1, `Done again: ${to.label}`);
  },
  select: (selection) => set({ selection: { ...NOTHING, ...selection } }),
  light: (lit) => set({ lit }),
  chooseCase: (caseId) => set({ caseId }),
}));

/** Shows a state of the job: what is gone is no longer selected, and the solver gets to work. */
function show(state: {
  readonly draft: Draft;
  readonly job: CheckedJob;
  readonly line: Line;
  readonly said: string;
}): void {
  const before = useOpenJob.getState();
  const parts = new Set<string>(state.job.parts.map(({ id }) => id));
  const generation = before.generation + 1;
  useOpenJob.setState({
    ...state,
    generation,
    caseId: caseFor(state.job, before.caseId),
    selection: { ...before.selection, parts: before.selection.parts.filter((id) => parts.has(id)) },
    lit: before.lit.filter((id) => parts.has(id)),
  });
  wakeSolver();
  solver?.ask({ generation, draft: state.draft });
}

function caseFor(job: CheckedJob, wanted: string): string {
  if (wanted === 'at-rest' && job.cases.length > 0) return wanted;
  return job.cases.some(({ id }) => id === wanted) ? wanted : (job.cases[0]?.id ?? 'at-rest');
}

function receive(reply: SolveReply): void {
  const { generation, job } = useOpenJob.getState();
  if (!reply.ok) {
    useOpenJob.setState({ solverTrouble: reply.message });
    return;
  }
  // Answers to a state that has been left are of no use: the next are on their way.
  if (reply.generation !== generation) return;
  const { points, report, ms } = reply;
  useOpenJob.setState({ answers: { generation, job, points, report, ms }, solverTrouble: null });
  measureToScreen(ms);
}

/** Marks of the browser's own performance record: how long from an edit to its answer on the screen. */
const EDIT = 'ohmwright edit';
const SHOWN = 'ohmwright edit to answer';

function measureToScreen(engineMs: Answers['ms']): void {
  if (performance.getEntriesByName(EDIT).length === 0) return;
  requestAnimationFrame(() => {
    // The next task begins after the frame has been painted.
    setTimeout(() => {
      if (performance.getEntriesByName(EDIT).length > 0) performance.measure(SHOWN, { start: EDIT, detail: engineMs });
      performance.clearMarks(EDIT);
    });
  });
}

/** Walks to another state of the line; its draft is fetched where only the host has it. */
async function walk(to: number, said: string): Promise<void> {
  const { line, key } = useOpenJob.getState();
  const state = line.states[to];
  if (state === undefined || key === null) return;
  const held = state.held ?? (await fetchState(key, state.revision));
  if (held === null || useOpenJob.getState().line !== line) return;
  show({ ...held, line: withHeld(line, to, held), said });
  keeper?.go(state.key);
}

async function fetchState(job: string, revision: number | null): Promise<{ draft: Draft; job: CheckedJob } | null> {
  if (channel === null || revision === null) return null;
  const answer = await channel.call('jobs.revision', { job, revision });
  if (!answer.ok) {
    useOpenJob.setState({ said: answer.trouble.message });
    return null;
  }
  const read = draftOf(answer.value.text);
  return read.ok ? read.value : null;
}

/** Starts the solver before it is needed. */
export function wakeSolver(): void {
  solver ??= new Solver(receive);
}

/** Opens a job that the host has handed over; returns its issues where this program cannot read it. */
export async function openJob(host: HostChannel, kept: KeptJob): Promise<Result<null, readonly Issue[]>> {
  const read = draftOf(kept.text);
  if (!read.ok) return read;
  const line = await host.call('jobs.line', { job: kept.job, most: 1000 });
  begin(host, kept, read.value, line.ok ? line.value.line : []);
  return { ok: true, value: null };
}

function begin(
  host: HostChannel,
  kept: KeptJob,
  held: { readonly draft: Draft; readonly job: CheckedJob },
  revisions: readonly RevisionSummary[],
): void {
  keeper?.end();
  channel = host;
  keeper = new Keeper(host, kept.job, kept.head, {
    onStatus: (status) => useOpenJob.setState({ kept: status }),
    onKept: (key, revision) => useOpenJob.setState(({ line }) => ({ line: withRevision(line, key, revision) })),
  });
  const line = lineFrom(revisions, kept.head, held);
  for (const { key, revision } of line.states) if (revision !== null) keeper.know(key, revision);
  const same = useOpenJob.getState().key === kept.job;
  useOpenJob.setState({
    key: kept.job,
    file: kept.file,
    kept: { status: 'kept' },
    ...(same ? {} : { answers: null, selection: NOTHING, lit: [], caseId: held.job.cases[0]?.id ?? 'at-rest' }),
  });
  show({ ...held, line, said: same ? 'Read again.' : `Opened ${kept.title}.` });
}

export function closeJob(): void {
  keeper?.end();
  keeper = null;
  useOpenJob.setState({ key: null, answers: null, selection: NOTHING, lit: [] });
}

/** True while a change has not been kept by the host. */
export function hasUnkept(): boolean {
  return (keeper?.pending ?? 0) > 0;
}

/** The job changed elsewhere: read it again, unless changes of this page are still on their way. */
export async function readAgain(): Promise<Trouble | null> {
  const { key } = useOpenJob.getState();
  if (channel === null || key === null || hasUnkept()) return null;
  const answer = await channel.call('jobs.open', { job: key });
  if (!answer.ok) return answer.trouble;
  if (answer.value.head === keeper?.keptHead) return null;
  await openJob(channel, answer.value);
  return null;
}

/** After a conflict: what was done here goes on top of what was done elsewhere; both stay in the history. */
export function keepOnTop(head: number): void {
  void keeper?.continueFrom(head);
}

/** After a conflict: shows the job as it is elsewhere. What was done here is put into the history first, so that it can be gone back to. */
export async function takeTheirs(): Promise<Trouble | null> {
  const { key } = useOpenJob.getState();
  if (channel === null || key === null || keeper === null) return null;
  const theirs = await channel.call('jobs.open', { job: key });
  if (!theirs.ok) return theirs.trouble;
  await keeper.continueFrom(theirs.value.head);
  // Changed there once more, or the disk full: the mark of what is kept tells.
  if (hasUnkept()) return null;
  return goToRevision(theirs.value.head);
}

export function tryKeepingAgain(): void {
  keeper?.tryAgain();
}

/** Goes to any revision of the open job. */
export async function goToRevision(revision: number): Promise<Trouble | null> {
  const { key } = useOpenJob.getState();
  if (channel === null || key === null || keeper === null) return null;
  const answer = await channel.call('jobs.go', { job: key, from: keeper.keptHead, to: revision });
  if (!answer.ok) return answer.trouble;
  await openJob(channel, answer.value);
  return null;
}
