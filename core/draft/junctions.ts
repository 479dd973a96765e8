/** Junctions: joined, parted, named, labelled; taps of bars. */
import { isRawObject } from '../job/field.ts';
import { dropDangling } from './dangling.ts';
import { changed, type Draft, type OpenDraft, type OpenPart, type Point } from './draft.ts';
import type { Edit } from './edit.ts';
import { freshJunction, junctionNamesOf, keep } from './naming.ts';
import { renamedKey } from './parts.ts';
import { isTerminalPath, junctionAt, putTerminal, terminalsOf, terminalWords } from './terminals.ts';

/** Gives a junction another name everywhere. A name that is in use joins the two. */
export function renameJunction(junction: string, newName: string): Edit {
  return { label: `Renamed junction ${junction} to ${newName}`, apply: (draft) => renamed(draft, junction, newName) };
}

/** Makes two junctions one, under the first name. */
export function joinJunctions(kept: string, joined: string): Edit {
  return { label: `Joined ${joined} to ${kept}`, apply: (draft) => renamed(draft, joined, kept) };
}

function renamed(draft: Draft, from: string, to: string): Draft {
  if (from === to) return draft;
  return changed(draft, (open) => {
    const names = junctionNamesOf(open);
    if (!names.has(from)) return;
    for (const part of open.parts) renameTerminals(part, from, to);
    for (const { set } of open.cases ?? []) {
      for (const fields of Object.values(set ?? {}))
        if (isRawObject(fields)) renameTerminals(fields as OpenPart, from, to);
    }
    for (const reading of open.readings ?? []) {
      if (reading.plus === from) reading.plus = to;
      if (reading.minus === from) reading.minus = to;
    }
    renameNote(open, from, to);
    dropDangling(open);
  });
}

/** Every place where a part, or what a case sets on it, can name a junction. */
const terminalPaths = ['plus', 'minus', 'from', 'to', 'from.plus', 'from.minus', 'to.plus', 'to.minus', 'midpoint'];

function renameTerminals(part: OpenPart, from: string, to: string): void {
  for (const path of terminalPaths) if (junctionAt(part, path) === from) putTerminal(part, path, to);
  const taps = part['junctions'];
  if (!Array.isArray(taps)) return;
  const at = taps.indexOf(from);
  if (at < 0) return;
  // Two taps of one bar joined are one tap.
  if (taps.includes(to)) taps.splice(at, 1);
  else taps[at] = to;
}

function renameNote(open: OpenDraft, from: string, to: string): void {
  const notes = open.junctions;
  const note = notes?.[from];
  if (notes === undefined || note === undefined || !Object.hasOwn(notes, from)) return;
  if (!Object.hasOwn(notes, to)) open.junctions = renamedKey(notes, from, to);
  else {
    // The kept junction's own words stand; what only the other one had is added, 0 V above all.
    keep(notes, to, { ...note, ...notes[to], ...(note.reference === true ? { reference: true } : {}) });
    delete notes[from];
  }
}

export interface TerminalOfPart {
  readonly part: string;
  /** As `terminalsOf` gives it. */
  readonly terminal: string;
}

/** Takes a terminal off its junction: it gets one of its own. */
export function detach({ part: id, terminal }: TerminalOfPart): Edit {
  return {
    label: `Took ${id} ${terminalWords(terminal)} off its junction`,
    apply: (draft) =>
      changed(draft, (open) => {
        const part = open.parts.find((candidate) => candidate.id === id);
        if (part === undefined || junctionAt(part, terminal) === undefined) return;
        const shared = junctionAt(part, terminal);
        const touching = open.parts
          .flatMap((other) => terminalsOf(other))
          .filter(({ junction }) => junction === shared);
        if (touching.length < 2) return;
        putTerminal(part, terminal, freshJunction(id, terminal, junctionNamesOf(open)));
        dropDangling(open);
      }),
  };
}

/** Puts a terminal at a junction. */
export function attach({ part: id, terminal, junction }: TerminalOfPart & { readonly junction: string }): Edit {
  return {
    label: `Put ${id} ${terminalWords(terminal)} at ${junction}`,
    apply: (draft) =>
      changed(draft, (open) => {
        const part = open.parts.find((candidate) => candidate.id === id);
        if (part === undefined || !isTerminalPath(terminal)) return;
        if (terminal !== 'midpoint' && junctionAt(part, terminal) === undefined) return;
        putTerminal(part, terminal, junction);
        dropDangling(open);
      }),
  };
}

/** Makes a junction 0 V; any other reference of the draft is no longer one, since an island has one. */
export function setReference(junction: string): Edit {
  return {
    label: `${junction} is 0 V`,
    apply: (draft) =>
      changed(draft, (open) => {
        if (!junctionNamesOf(open).has(junction)) return;
        for (const note of Object.values(open.junctions ?? {})) if (note.reference === true) delete note.reference;
        noteOn(open, junction).reference = true;
      }),
  };
}

/** Gives a junction a label, or takes it away. */
export function labelJunction(junction: string, label: string | undefined): Edit {
  return {
    label: label === undefined ? `Took the label off ${junction}` : `Labelled ${junction}`,
    apply: (draft) =>
      changed(draft, (open) => {
        if (!junctionNamesOf(open).has(junction)) return;
        if (label !== undefined) noteOn(open, junction).label = label;
        else delete open.junctions?.[junction]?.label;
      }),
  };
}

/** The note on a junction, made where there is none. */
export function noteOn(open: OpenDraft, junction: string): NonNullable<OpenDraft['junctions']>[string] {
  const notes = open.junctions ?? {};
  open.junctions = notes;
  // Written first and read back: what immer hands out is the one that is kept.
  if (!Object.hasOwn(notes, junction)) keep(notes, junction, {});
  return open.junctions[junction] ?? {};
}

/** Puts another tap on a bar: at a place along it (0 is the first), else at its end; the tap's own junction, else a fresh one. */
export function addTap({
  busbar,
  index,
  junction,
  at,
}: {
  readonly busbar: string;
  readonly index?: number;
  readonly junction?: string;
  readonly at?: Point;
}): Edit {
  return {
    label: `Added a tap to ${busbar}`,
    apply: (draft) =>
      changed(draft, (open) => {
        const taps = tapsOf(open, busbar);
        if (taps === undefined) return;
        const place = Math.min(Math.max(0, index ?? taps.length), taps.length);
        const name = junction ?? freshJunction(busbar, `junctions[${String(taps.length)}]`, junctionNamesOf(open));
        taps.splice(place, 0, name);
        if (at !== undefined) noteOn(open, name).at = { x: at.x, y: at.y };
      }),
  };
}

/** Takes a tap off a bar; what is connected there stays and is no longer connected to the bar. */
export function removeTap({ busbar, junction }: { readonly busbar: string; readonly junction: string }): Edit {
  return {
    label: `Removed a tap of ${busbar}`,
    apply: (draft) =>
      changed(draft, (open) => {
        const taps = tapsOf(open, busbar);
        const place = taps?.indexOf(junction) ?? -1;
        if (taps === undefined || place < 0) return;
        taps.splice(place, 1);
        dropDangling(open);
      }),
  };
}

function tapsOf(open: OpenDraft, busbar: string): string[] | undefined {
  const part = open.parts.find(({ id, kind }) => id === busbar && kind === 'busbar');
  return part?.['junctions'] as string[] | undefined;
}
