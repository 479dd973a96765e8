/** What can be put on the drawing: the kinds of parts, generic parts of the library, and the person's own. */

import { KIND_WORDS, type PartFieldsGiven, type PartKind } from '../../core/api.ts';
import type { OwnPart } from '../../core/host.ts';
import { libraryParts } from '../../data/library/index.ts';

export interface PaletteEntry {
  readonly id: string;
  readonly words: string;
  readonly kind: PartKind;
  readonly part: PartFieldsGiven;
}
export interface PaletteGroup {
  readonly name: string;
  readonly entries: readonly PaletteEntry[];
}

/** Short words for the narrow palette. */
export const SHORT_WORDS: Readonly<Record<PartKind, string>> = {
  string: 'Battery',
  array: 'Array',
  charger: 'Charger',
  cable: 'Cable',
  pair: 'Run',
  busbar: 'Busbar',
  joint: 'Joint',
  bond: 'Bond',
  fuse: 'Fuse',
  breaker: 'Breaker',
  switch: 'Switch',
  shunt: 'Shunt',
  diode: 'Diode',
  load: 'Load',
  inverter: 'Inverter',
  controller: 'Solar ctrl.',
  converter: 'DC conv.',
};

/** In the order in which a system is built, from the bank to what it feeds. */
const KINDS: readonly { readonly name: string; readonly kinds: readonly PartKind[] }[] = [
  { name: 'Sources', kinds: ['string', 'array', 'charger'] },
  { name: 'Conductors', kinds: ['cable', 'pair', 'busbar', 'joint', 'bond'] },
  { name: 'Devices in the line', kinds: ['fuse', 'breaker', 'switch', 'shunt', 'diode'] },
  { name: 'Loads and converters', kinds: ['load', 'inverter', 'controller', 'converter'] },
];

export const kindGroups: readonly PaletteGroup[] = KINDS.map(({ name, kinds }) => ({
  name,
  entries: kinds.map((kind) => ({ id: kind, words: capital(KIND_WORDS[kind]), kind, part: { kind } })),
}));

const GROUP_WORDS: Readonly<Record<string, string>> = {
  block: 'Battery blocks',
  module: 'Solar modules',
  cable: 'Cables',
  fuse: 'Fuses',
  breaker: 'Breakers',
  switch: 'Switches',
  busbar: 'Busbars',
  shunt: 'Shunts',
  joint: 'Joints',
  diode: 'Diodes',
  load: 'Loads',
};

export const libraryGroups: readonly PaletteGroup[] = [...new Set(libraryParts.map(({ group }) => group))].map(
  (group) => ({
    name: GROUP_WORDS[group] ?? capital(group),
    entries: libraryParts
      .filter((each) => each.group === group)
      .map(({ id, label, part, choices }) => ({
        id,
        words: label,
        kind: part.kind,
        part: named(withChoices(part, choices), label),
      })),
  }),
);

/** A load goes by what it is; of a device the figures say enough. */
function named(part: PartFieldsGiven, label: string): PartFieldsGiven {
  return part.kind === 'load' ? { ...part, label } : part;
}

/** Figures that a label would settle are taken from the middle of the usual ones; the ledger asks for the right one. */
function withChoices(
  part: PartFieldsGiven,
  choices: ReadonlyMap<string, readonly (number | string)[]>,
): PartFieldsGiven {
  const chosen = [...choices].flatMap(([field, values]) => {
    const value = values[Math.floor(values.length / 2)];
    return value === undefined ? [] : [[field, value] as const];
  });
  const origin = {
    ...(part['origin'] as Record<string, unknown> | undefined),
    ...Object.fromEntries(chosen.map(([field]) => [field, 'guess'])),
  };
  return { ...part, ...Object.fromEntries(chosen), ...(Object.keys(origin).length === 0 ? {} : { origin }) };
}

export function ownGroup(own: readonly OwnPart[]): PaletteGroup {
  const entries = own.map(({ id, label, part }) => ({
    id: `own ${id}`,
    words: label,
    kind: part['kind'] as PartKind,
    part: part as PartFieldsGiven,
  }));
  return { name: 'Your own parts', entries };
}

/** Entries in whose words all the words asked for occur. */
export function found(groups: readonly PaletteGroup[], asked: string): readonly PaletteGroup[] {
  const wanted = asked
    .toLowerCase()
    .split(/\s+/)
    .filter((word) => word !== '');
  return groups
    .map(({ name, entries }) => ({
      name,
      entries: entries.filter(({ words, kind }) =>
        wanted.every((word) => `${words} ${KIND_WORDS[kind]} ${name}`.toLowerCase().includes(word)),
      ),
    }))
    .filter(({ entries }) => entries.length > 0);
}

function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}
