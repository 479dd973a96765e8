/**
 * Generic parts to draw with, none of any maker: each figure a typical one, marked as a default with what it rests on. A part's own
 * label governs; whoever places a part from here replaces what the label says otherwise.
 */
import type { Basis, PartKind, Status } from '../../core/api.ts';
import { Defect } from '../../core/api.ts';
import { readRows } from '../chemistry/rows.ts';
import { sources as partSources } from '../conductors/figures.ts';
import { devices } from '../devices/devices.ts';
import loadRows from './loads.json';
import partRows from './parts.json';
import sourcesCsv from './sources.csv?raw';

export interface LibraryPart {
  readonly id: string;
  readonly label: string;
  /** How parts are grouped in a list: `block`, `fuse`, `switch`, `cable` … */
  readonly group: string;
  /** Fields of a part of a job file; its `id`, its junctions and the fields of `choices` are for whoever places it. */
  readonly part: { readonly kind: PartKind } & Readonly<Record<string, unknown>>;
  /** Fields that are chosen when the part is placed, each with the usual values. */
  readonly choices: ReadonlyMap<string, readonly (number | string)[]>;
  /** What each figure in `part` rests on. */
  readonly bases: ReadonlyMap<string, Basis>;
}

/** A usual load for a load schedule. Powers, hours and energies are low and high ends of what is usual. */
export interface LibraryLoad {
  readonly label: string;
  readonly group: string;
  /** `undefined` where only the day's energy is known. */
  readonly powerW: readonly [number, number] | undefined;
  /** `undefined` where no usual figure is held. */
  readonly hoursPerDay: readonly [number, number] | undefined;
  readonly energyWhPerDay: number | undefined;
  readonly supply: readonly ('dc' | 'ac')[];
  readonly basis: Basis;
  readonly note: string | undefined;
}

/** A row of `parts.json`. */
interface PartRow {
  readonly id: string;
  readonly label: string;
  readonly group: string;
  readonly part: { readonly kind: PartKind } & Readonly<Record<string, unknown>>;
  readonly choices?: Readonly<Record<string, readonly (number | string)[]>>;
  readonly bases: Readonly<Record<string, { readonly source: string; readonly status: Status }>>;
}

/** A row of `loads.json`. */
interface LoadRow {
  readonly group: string;
  readonly label: string;
  readonly powerW?: readonly [number, number];
  readonly hoursPerDay?: readonly [number, number];
  readonly energyWhPerDay?: number;
  readonly supply: readonly ('dc' | 'ac')[];
  readonly source: string;
  readonly status: Status;
  readonly note?: string;
}

const sources: ReadonlyMap<string, string> = new Map([
  ...partSources,
  ...readRows('library/sources.csv', sourcesCsv).map((row) => [row.text('id'), row.text('text')] as const),
]);

function basisOf({ source, status }: { readonly source: string; readonly status: Status }): Basis {
  const text = sources.get(source);
  if (text === undefined) throw new Defect(`sources of the library have ${source}`);
  return { source, text, status };
}

function libraryPart(row: PartRow): LibraryPart {
  return {
    id: row.id,
    label: row.label,
    group: row.group,
    part: row.part,
    choices: new Map(Object.entries(row.choices ?? {})),
    bases: new Map(Object.entries(row.bases).map(([field, basis]) => [field, basisOf(basis)])),
  };
}

/** What each type of fuse is called, and the series of ratings that it is made in. */
const FUSE_TYPES: ReadonlyMap<string, { readonly label: string; readonly ratings: string }> = new Map([
  ['blade', { label: 'Blade fuse', ratings: 'blade_regular' }],
  ['strip_small', { label: 'Bolted strip fuse, small', ratings: 'strip_small' }],
  ['strip_large', { label: 'Bolted strip fuse, large', ratings: 'strip_large' }],
  ['open_link', { label: 'Open link fuse', ratings: 'open_link' }],
  ['stud_block', { label: 'Fuse block on the battery stud', ratings: 'stud_block' }],
  ['class_T', { label: 'Class T fuse', ratings: 'class_T' }],
  ['gG', { label: 'gG fuse-link', ratings: 'iec_60269_gG_series' }],
  ['glass_tube', { label: 'Glass tube fuse', ratings: 'blade_regular' }],
]);

/** Fuses by type, with the typical interrupt ratings and the rating series of the device tables. */
function fuses(): readonly LibraryPart[] {
  return devices.typicalInterrupt.map(({ type, upToV, interruptA }) => {
    const named = FUSE_TYPES.get(type);
    const series = named === undefined ? undefined : devices.ratings.get(named.ratings);
    if (named === undefined || series === undefined) throw new Defect(`the library knows fuses of type ${type}`);
    return {
      id: `fuse-${type.replaceAll('_', '-').toLowerCase()}-${upToV.value}v`,
      label: `${named.label}, to ${upToV.value} V`,
      group: 'fuse',
      part: {
        kind: 'fuse',
        type,
        ratingV: upToV.value,
        interruptA: interruptA.value,
        origin: { ratingV: 'default', interruptA: 'default' },
      },
      choices: new Map([['ratingA', series.ratingsA]]),
      bases: new Map([
        ['ratingV', upToV.basis],
        ['interruptA', interruptA.basis],
      ]),
    };
  });
}

export const libraryParts: readonly LibraryPart[] = [
  ...(partRows as unknown as readonly PartRow[]).map(libraryPart),
  ...fuses(),
];

export const libraryLoads: readonly LibraryLoad[] = (loadRows as unknown as readonly LoadRow[]).map((row) => ({
  label: row.label,
  group: row.group,
  powerW: row.powerW,
  hoursPerDay: row.hoursPerDay,
  energyWhPerDay: row.energyWhPerDay,
  supply: row.supply,
  basis: basisOf(row),
  note: row.note,
}));
