/**
 * The line of states that undo and redo walk: states of this sitting with their drafts, and before them those of earlier sittings,
 * whose text the host still holds. Undo has no end short of the job's first state.
 */
import type { CheckedJob, Draft } from '../../core/api.ts';
import type { RevisionNumber, RevisionSummary } from '../../core/host.ts';

export interface LineState {
  /** Identity on the page. */
  readonly key: number;
  /** What was done to come here. */
  readonly label: string;
  /** `null` until the host has kept it. */
  readonly revision: RevisionNumber | null;
  /** `null` where only the host has it. */
  readonly held: { readonly draft: Draft; readonly job: CheckedJob } | null;
}

export interface Line {
  readonly states: readonly LineState[];
  readonly at: number;
}

let lastKey = 0;
export function nextKey(): number {
  lastKey += 1;
  return lastKey;
}

export function lineFrom(revisions: readonly RevisionSummary[], head: RevisionNumber, held: LineState['held']): Line {
  const states = revisions.map(({ revision, label }) => ({
    key: nextKey(),
    label,
    revision,
    held: revision === head ? held : null,
  }));
  const at = states.findIndex(({ revision }) => revision === head);
  return at < 0 ? { states: [{ key: nextKey(), label: 'Opened', revision: head, held }], at: 0 } : { states, at };
}

/** A new state after the present one; what could have been redone stays in the host's history, off this line. */
export function afterEdit({ states, at }: Line, state: LineState): Line {
  return { states: [...states.slice(0, at + 1), state], at: at + 1 };
}

/** The line with a state's revision filled in, wherever that state now stands. */
export function withRevision(line: Line, key: number, revision: RevisionNumber): Line {
  return { ...line, states: line.states.map((one) => (one.key === key ? { ...one, revision } : one)) };
}

export function withHeld(line: Line, at: number, held: NonNullable<LineState['held']>): Line {
  return { at, states: line.states.map((one, index) => (index === at ? { ...one, held } : one)) };
}
