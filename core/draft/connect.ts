/** Parts put between junctions, into a line, or beside a string that is there. */
import { freeShift } from '../diagram/freeShift.ts';
import { positionsOf } from '../diagram/positions.ts';
import { checkJob } from '../job/parseJob.ts';
import type { JunctionId, PartId } from '../job/part.ts';
import { changed, type Draft, type OpenDraft, type OpenPart, type Point, type RawPart, rawParts } from './draft.ts';
import type { Edit } from './edit.ts';
import { noteOn } from './junctions.ts';
import { freshJunction, idLike, idsOf, junctionNamesOf } from './naming.ts';
import { type PartFieldsGiven, putIn, structuredCopy } from './parts.ts';
import { junctionAt, putTerminal, terminalsOf, touchOf } from './terminals.ts';

export interface PolesNamed {
  readonly plus: string;
  readonly minus: string;
}

/**
 * Puts a part between two junctions: a two-ended part between two names, a run of two conductors (or a controller, a converter)
 * between two pairs of poles.
 */
export function connect(connection: {
  readonly from: string | PolesNamed;
  readonly to: string | PolesNamed;
  readonly with: PartFieldsGiven;
  readonly id?: string;
  readonly at?: Point;
}): Edit {
  const { from, to, with: part, id, at } = connection;
  const name = (end: string | PolesNamed) => (typeof end === 'string' ? end : end.plus);
  const junctions = { ...ends('from', from), ...ends('to', to) };
  return {
    label: `Connected ${name(from)} to ${name(to)} with a ${part.kind}`,
    apply: (draft) =>
      changed(draft, (open) => {
        putIn(open, { part, junctions, ...(id === undefined ? {} : { id }), ...(at === undefined ? {} : { at }) });
      }),
  };
}

function ends(path: 'from' | 'to', end: string | PolesNamed): Readonly<Record<string, string>> {
  return typeof end === 'string' ? { [path]: end } : { [`${path}.plus`]: end.plus, [`${path}.minus`]: end.minus };
}

/**
 * Puts a two-ended part in line at one end of a conductor: of a cable, or of one conductor of a pair (`W1.plus`, `W1.minus`;
 * `W1` alone is its plus). The end is that from which or to which the conductor runs, a return running back to the source.
 */
export function insertInto(insertion: {
  readonly cable: string;
  readonly end: 'from' | 'to';
  readonly part: PartFieldsGiven;
  readonly id?: string;
  readonly at?: Point;
}): Edit {
  const { cable, end, part: fields, id, at } = insertion;
  return {
    label: `Put a ${fields.kind} into ${cable}`,
    apply: (draft) =>
      changed(draft, (open) => {
        const found = conductorEnd(open, cable, end);
        if (found === undefined || touchOf(fields.kind) !== 'ends') return;
        const outer = junctionAt(found.part, found.path);
        if (outer === undefined) return;
        const inner = freshJunction(found.part.id, `${found.path} side`, junctionNamesOf(open));
        putTerminal(found.part, found.path, inner);
        const junctions = end === 'from' ? { from: outer, to: inner } : { from: inner, to: outer };
        putIn(open, {
          part: fields,
          junctions,
          ...(id === undefined ? {} : { id }),
          ...(at === undefined ? {} : { at }),
        });
      }),
  };
}

function conductorEnd(
  open: OpenDraft,
  cable: string,
  end: 'from' | 'to',
): { readonly part: OpenPart; readonly path: string } | undefined {
  const single = open.parts.find(({ id }) => id === cable);
  if (single !== undefined && touchOf(single.kind) === 'ends') return { part: single, path: end };
  const [, pairId = cable, pole = 'plus'] = /^(.*)\.(plus|minus)$/.exec(cable) ?? [];
  const pair = open.parts.find(({ id, kind }) => id === pairId && kind === 'pair');
  if (pair === undefined) return undefined;
  const port = pole === 'plus' ? end : end === 'from' ? 'to' : 'from';
  return { part: pair, path: `${port}.${pole}` };
}

/** Longest lead that is followed, in parts. */
const mostInLead = 8;
/** A lead ends with its cable; what may stand in line with it. */
const inLine: ReadonlySet<string> = new Set(['cable', 'fuse', 'breaker', 'switch', 'shunt', 'joint']);

/**
 * Adds another string like this one, with leads like its own, joined at the junctions where those of the first end. A lead is
 * what stands in line from the post up to its cable and any fuse behind the post; where a pole has no cable of its own, one is
 * put in with marked guesses.
 */
export function parallelString(id: string): Edit {
  return {
    label: `Added a string like ${id}`,
    apply: (draft) => {
      const string = (draft['parts'] as readonly RawPart[]).find((part) => part.id === id);
      if (string?.kind !== 'string') return draft;
      const leads = (['plus', 'minus'] as const).map((pole) => ({ pole, ...leadOf(draft, string, pole) }));
      const beside = placeBesideOnce(draft, string, leads);
      return changed(draft, (open) => {
        const taken = junctionNamesOf(open);
        const added = copyBeside(open, string, beside);
        for (const { junction, path } of terminalsOf(string)) {
          if (junction === '') continue;
          const fresh = freshJunction(added.id, path, taken);
          putTerminal(added, path, fresh);
          placeJunction(open, fresh, beside?.junction(junction));
        }
        open.parts.push(added);
        for (const lead of leads) putLead(open, junctionAt(added, lead.pole) ?? '', { ...lead, beside });
      });
    },
  };
}

/** Where copies of parts and junctions go. */
interface Beside {
  readonly part: (id: string) => Point | undefined;
  readonly junction: (id: string) => Point | undefined;
}

/** Remedies try the same step on the same draft again and again. */
const placesBeside = new WeakMap<Draft, Map<string, Beside | undefined>>();
function placeBesideOnce(draft: Draft, string: RawPart, leads: readonly Lead[]): Beside | undefined {
  const known = placesBeside.get(draft) ?? new Map<string, Beside | undefined>();
  placesBeside.set(draft, known);
  if (!known.has(string.id)) known.set(string.id, placeBeside(draft, string, leads));
  return known.get(string.id);
}

/** A place where the string and what stands in line with it lie on nothing; none where nothing has a place yet. */
function placeBeside(draft: Draft, string: RawPart, leads: readonly Lead[]): Beside | undefined {
  if (!rawParts(draft).some(({ at }) => at !== undefined)) return undefined;
  const checked = checkJob(draft);
  if (!checked.ok) return undefined;
  const positions = positionsOf(checked.value);
  const copied = new Set([string.id, ...leads.flatMap(({ parts }) => parts.map(({ part }) => part.id))]);
  const hasCable = (lead: Lead): boolean => lead.parts.at(-1)?.part.kind === 'cable';
  // A cable runs on from the last junction of its lead that is copied.
  const cables = leads.flatMap((lead) => {
    const last = lead.parts.at(-1);
    const from = hasCable(lead) && last !== undefined ? junctionAt(last.part, last.near) : lead.far;
    return from === undefined ? [] : [{ from: from as JunctionId, to: lead.far as JunctionId }];
  });
  const inside = leads.flatMap(({ parts }) => parts.flatMap(({ part, near }) => junctionAt(part, near) ?? []));
  const junctions = new Set([
    ...terminalsOf(string).map(({ junction }) => junction),
    ...inside,
    ...cables.map(({ from }) => from),
  ]) as Set<JunctionId>;
  const by = freeShift(checked.value, positions, { parts: copied as Set<PartId>, junctions, cables });
  const shifted = (at: Point | undefined): Point | undefined =>
    at === undefined ? undefined : { x: at.x + by.x, y: at.y + by.y };
  return {
    part: (id) => shifted(positions.parts.get(id as PartId)),
    junction: (id) => shifted(positions.junctions.get(id as JunctionId)),
  };
}

function placeJunction(open: OpenDraft, junction: string, at: Point | undefined): void {
  if (at !== undefined) noteOn(open, junction).at = at;
}

interface Lead {
  /** From the post outwards. */
  readonly parts: readonly { readonly part: RawPart; readonly near: 'from' | 'to' }[];
  readonly far: string;
}

function leadOf(draft: Draft, string: RawPart, pole: 'plus' | 'minus'): Lead {
  const all = draft['parts'] as readonly RawPart[];
  const parts: { part: RawPart; near: 'from' | 'to' }[] = [];
  let [at, last] = [junctionAt(string, pole) ?? '', string];
  while (parts.length < mostInLead) {
    const meeting = all.flatMap((part) =>
      part === last ? [] : terminalsOf(part).flatMap(({ path, junction }) => (junction === at ? [{ part, path }] : [])),
    );
    const [only, ...others] = meeting;
    if (only === undefined || others.length > 0 || !inLine.has(only.part.kind)) break;
    const near = only.path === 'from' ? 'from' : 'to';
    parts.push({ part: only.part, near });
    at = junctionAt(only.part, near === 'from' ? 'to' : 'from') ?? '';
    last = only.part;
    if (only.part.kind === 'cable') break;
  }
  return { parts, far: at };
}

/** Copies the lead from the new post to the same far junction. */
function putLead(
  open: OpenDraft,
  post: string,
  { parts, far, pole, beside }: Lead & { readonly pole: 'plus' | 'minus'; readonly beside: Beside | undefined },
): void {
  const hasCable = parts.some(({ part }) => part.kind === 'cable');
  let at = post;
  parts.forEach(({ part, near }, index) => {
    const copy = copyBeside(open, part, beside);
    const away = near === 'from' ? 'to' : 'from';
    const isLast = hasCable && index === parts.length - 1;
    const next = isLast ? far : freshJunction(copy.id, away, junctionNamesOf(open));
    putTerminal(copy, near, at);
    putTerminal(copy, away, next);
    open.parts.push(copy);
    if (!isLast) placeJunction(open, next, beside?.junction(junctionAt(part, away) ?? ''));
    at = next;
  });
  if (hasCable) return;
  const junctions = pole === 'plus' ? { from: at, to: far } : { from: far, to: at };
  putIn(open, { part: { kind: 'cable' }, junctions });
}

/** A cable's name finds its own place on its route. */
function copyBeside(open: OpenDraft, model: RawPart, beside: Beside | undefined): OpenPart {
  const copy = structuredCopy(model) as unknown as OpenPart;
  copy.id = idLike(model.id, model.kind, idsOf(open));
  delete copy['at'];
  const at = model.kind === 'cable' ? undefined : beside?.part(model.id);
  if (at !== undefined) copy['at'] = at;
  return copy;
}
