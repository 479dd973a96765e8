/** What a hand or a key does to the drawing, as edits of the open job. */
import type { CheckedJob, Edit, JunctionId, PartFieldsGiven, PartId, Point, Positions } from '../../core/api.ts';
import {
  addPart,
  connect,
  copyParts,
  duplicateParts,
  freePlace,
  joinJunctions,
  move,
  moveBy,
  partsAdded,
  pasteParts,
  place,
  plainFields,
  positionsOf,
  removeParts,
  tidyPositions,
  together,
} from '../../core/api.ts';
import { useOpenJob } from '../state/openJob.ts';
import { useView } from './view.ts';

interface PolePair {
  readonly plus: JunctionId;
  readonly minus: JunctionId;
}

/** Makes the edit, selects what it has put in, and tells why where it cannot be. */
export function make(edit: Edit): boolean {
  const before = useOpenJob.getState().draft;
  const result = useOpenJob.getState().edit(edit);
  useView.setState({ refusal: result.ok ? null : plainFields(result.issues[0]?.message ?? 'That cannot be.') });
  if (!result.ok) return false;
  const added = partsAdded(before, useOpenJob.getState().draft) as readonly PartId[];
  if (added.length > 0) useOpenJob.getState().select({ parts: added });
  return true;
}

const asRecord = (places: ReadonlyMap<string, Point>): Readonly<Record<string, Point>> => Object.fromEntries(places);

/** Places that the drawing has found for itself are stored with the first move, so that they stay. */
function unstored(job: CheckedJob, positions: Positions): Positions {
  const parts = new Map(
    [...positions.parts].filter(([id]) => job.parts.find((part) => part.id === id)?.at === undefined),
  );
  const junctions = new Map([...positions.junctions].filter(([id]) => job.junctions.get(id)?.at === undefined));
  return { parts, junctions };
}

export function commitMove(
  positions: Positions,
  drag: { readonly parts: ReadonlySet<PartId>; readonly junctions: ReadonlySet<JunctionId>; readonly by: Point },
): void {
  if (drag.by.x === 0 && drag.by.y === 0) return;
  const { job } = useOpenJob.getState();
  const moved = moveBy(job.parts, { ...drag, positions });
  const named = move({
    parts: asRecord(new Map([...moved.parts].filter(([id]) => drag.parts.has(id)))),
    junctions: drag.parts.size === 0 ? asRecord(moved.junctions) : {},
  });
  const found = unstored(job, positions);
  make(
    together(named.label, [
      place({ parts: asRecord(found.parts), junctions: asRecord(found.junctions) }),
      move({ parts: asRecord(moved.parts), junctions: asRecord(moved.junctions) }),
    ]),
  );
}

/** Moves what is selected by a step of the grid. */
export function nudge(by: Point): void {
  const { job, selection } = useOpenJob.getState();
  if (selection.parts.length === 0 && selection.junctions.length === 0) return;
  commitMove(positionsOf(job), { parts: new Set(selection.parts), junctions: new Set(selection.junctions), by });
}

export function tidy(): void {
  const { parts, junctions } = tidyPositions(useOpenJob.getState().job);
  make(place({ parts: asRecord(parts), junctions: asRecord(junctions) }));
}

export function removeSelected(): void {
  const { selection } = useOpenJob.getState();
  if (selection.parts.length > 0) make(removeParts(selection.parts));
}

export function duplicateSelected(): void {
  const { selection } = useOpenJob.getState();
  if (selection.parts.length > 0) make(duplicateParts(selection.parts));
}

export function selectAll(): void {
  const { job, select } = useOpenJob.getState();
  select({ parts: job.parts.map(({ id }) => id), junctions: [...positionsOf(job).junctions.keys()] });
}

/** The selected parts as text for the clipboard; undefined where none is. */
export function copiedText(): string | undefined {
  const { draft, selection } = useOpenJob.getState();
  return selection.parts.length === 0 ? undefined : copyParts(draft, selection.parts);
}

export function paste(text: string, at?: Point): void {
  const edit = pasteParts(text, at === undefined ? {} : { at });
  if (isIssues(edit)) useView.setState({ refusal: 'The clipboard holds no parts of a drawing.' });
  else make(edit);
}
function isIssues(
  edit: ReturnType<typeof pasteParts>,
): edit is Extract<ReturnType<typeof pasteParts>, readonly unknown[]> {
  return Array.isArray(edit);
}

/** Puts a part on the drawing near a place, clear of others; `junction` becomes its first terminal's. */
export function putPart(part: PartFieldsGiven, wanted: Point, junction?: JunctionId): void {
  const { job } = useOpenJob.getState();
  const at = freePlace(job, positionsOf(job), wanted);
  const terminal = firstTerminal(part.kind);
  make(addPart({ part, at, ...(junction === undefined ? {} : { junctions: { [terminal]: junction } }) }));
}
function firstTerminal(kind: PartFieldsGiven['kind']): string {
  switch (kind) {
    case 'busbar':
      return 'junctions[0]';
    case 'pair':
    case 'controller':
    case 'converter':
      return 'from.plus';
    case 'string':
    case 'load':
    case 'inverter':
    case 'array':
    case 'charger':
      return 'plus';
    default:
      return 'from';
  }
}

export function connectWith(from: JunctionId, to: JunctionId, part: PartFieldsGiven): void {
  make(connect({ from, to, with: part }));
}
/** A run of two conductors between two pairs of poles. */
export function connectPair(from: PolePair, to: PolePair, part: PartFieldsGiven): void {
  make(connect({ from, to, with: part }));
}
export function makeOne(from: JunctionId, to: JunctionId): void {
  make(joinJunctions(to, from));
}

/** Goes with the keyboard to what is selected in the ledger at the right. */
export function goToLedger(): void {
  // What has just been selected must stand there first.
  requestAnimationFrame(() => {
    const ledger = document.querySelector<HTMLElement>('aside');
    const first = ledger?.querySelector<HTMLElement>('input, select, textarea, button, [tabindex="0"]');
    (first ?? ledger)?.focus();
  });
}
