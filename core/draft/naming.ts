/** Names for what an edit puts in: ids of parts by the letters of their kind, junctions by the terminal that they belong to. */
import { isForbiddenName } from '../job/readJson.ts';
import type { Draft, OpenDraft, RawPart } from './draft.ts';
import { terminalsOf, terminalWords } from './terminals.ts';

/** Room is left for a number behind a name; a name may be 100 signs long. */
const longestStem = 80;

/** Letters that ids of each kind begin with. Our own choice, after the words of the trade. */
const letters: ReadonlyMap<string, string> = new Map(
  Object.entries({
    string: 'B',
    cable: 'C',
    pair: 'W',
    busbar: 'BAR',
    fuse: 'F',
    breaker: 'CB',
    switch: 'S',
    shunt: 'SH',
    joint: 'J',
    diode: 'D',
    load: 'L',
    inverter: 'INV',
    array: 'PV',
    controller: 'SC',
    charger: 'CH',
    converter: 'DC',
    bond: 'E',
  }),
);

/** Every id in use, the two cables of each pair included. */
export function idsOf(draft: Pick<OpenDraft, 'parts'>): Set<string> {
  const ids = new Set<string>();
  for (const { id, kind } of draft.parts) addId(ids, id, kind);
  return ids;
}

export function addId(ids: Set<string>, id: string, kind: string): void {
  ids.add(id);
  if (kind === 'pair') for (const cable of derivedIds(id)) ids.add(cable);
}

/** The ids of the two cables that a pair stands for. */
export function derivedIds(pair: string): readonly [string, string] {
  return [`${pair}.plus`, `${pair}.minus`];
}

/** The first free id of a kind: F1, F2 … */
export function freshId(kind: string, ids: ReadonlySet<string>): string {
  return firstFree(kind, (number) => `${letters.get(kind) ?? 'P'}${String(number)}`, 1, ids);
}

/** An id like another: F3 makes F4, SW-MAIN makes SW-MAIN-2. */
export function idLike(id: string, kind: string, ids: ReadonlySet<string>): string {
  const [, stem = id, digits] = /^(.*?)(\d{1,6})$/.exec(id) ?? [];
  if (digits !== undefined) return firstFree(kind, (number) => `${stem}${String(number)}`, Number(digits) + 1, ids);
  return firstFree(kind, (number) => `${id.slice(0, longestStem).trimEnd()}-${String(number)}`, 2, ids);
}

function firstFree(kind: string, name: (number: number) => string, from: number, ids: ReadonlySet<string>): string {
  for (let number = from; ; number += 1) {
    const id = name(number);
    const wanted = kind === 'pair' ? [id, ...derivedIds(id)] : [id];
    if (!wanted.some((one) => ids.has(one))) return id;
  }
}

/** Every junction that a part touches, as drawn or in some case. */
export function junctionNamesOf(draft: Draft | OpenDraft): Set<string> {
  const open = draft as OpenDraft;
  const names = new Set<string>();
  const byId = new Map(open.parts.map((part) => [part.id, part]));
  for (const part of open.parts) addJunctions(part, names);
  for (const { set } of open.cases ?? []) {
    for (const id of Object.keys(set ?? {})) {
      const part = byId.get(id);
      if (part !== undefined) addJunctions({ ...part, ...set?.[id] }, names);
    }
  }
  return names;
}

function addJunctions(part: RawPart, names: Set<string>): void {
  for (const { junction } of terminalsOf(part)) names.add(junction);
}

/** A junction of a terminal's own: `F1 from`, with a number behind it where that name is taken. The name is added to those taken. */
export function freshJunction(id: string, path: string, taken: Set<string>): string {
  return freeName(`${id.slice(0, longestStem).trimEnd()} ${terminalWords(path)}`, taken);
}

/** The name itself, or the name with the first free number behind it; added to those taken. */
export function freeName(stem: string, taken: Set<string>): string {
  const short = stem.slice(0, longestStem + 15).trimEnd();
  let name = short;
  for (let number = 2; taken.has(name); number += 1) name = `${short} ${String(number)}`;
  taken.add(name);
  return name;
}

/** Writes a field unless its name would reach into the program's own objects; the check refuses what is then missing. */
export function keep<T>(record: Record<string, T>, name: string, value: T): void {
  if (!isForbiddenName(name)) record[name] = value;
}
