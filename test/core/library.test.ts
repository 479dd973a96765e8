import { describe, expect, it } from 'vitest';
import { parseJob } from '../../core/api.ts';
import { tables } from '../../data/index.ts';
import { type LibraryPart, libraryLoads, libraryParts } from '../../data/library/index.ts';
import sourcesPage from '../../data/SOURCES.md?raw';

const listedSources = new Set([...sourcesPage.matchAll(/^\| (SRC-[A-Z0-9-]+) \|/gm)].map(([, id]) => id));

/** Junctions for a part of any kind, and what a person must add to a cable. */
const PLACED: Readonly<Record<string, object>> = {
  string: { plus: 'a', minus: 'b' },
  array: { plus: 'a', minus: 'b' },
  load: { plus: 'a', minus: 'b' },
  busbar: { junctions: ['a', 'b'] },
  cable: { from: 'a', to: 'b', lengthM: 1 },
};

/** The part placed in a job, with one value for each field that is left to choose. */
function placed({ id, part, choices }: LibraryPart, pick: 'first' | 'last'): string {
  const chosen = Object.fromEntries(
    [...choices].map(([field, values]) => [field, pick === 'first' ? values[0] : values.at(-1)]),
  );
  const touches = PLACED[part.kind] ?? { from: 'a', to: 'b' };
  return JSON.stringify({ format: 'ohmwright-job', version: 1, parts: [{ id, ...part, ...touches, ...chosen }] });
}

/** Fields of a part that are figures or stand for one: everything but its kind and the words about it. */
function figuresOf({ part }: LibraryPart): readonly string[] {
  const counts = ['blocksInSeries', 'modulesInSeries', 'stringsInParallel'];
  const words = new Set(['kind', 'origin', 'range', 'chemistry', 'type', 'state', ...counts]);
  return Object.keys(part).filter((field) => !words.has(field));
}

describe('library parts', () => {
  it('have ids of their own', () => {
    expect(new Set(libraryParts.map(({ id }) => id)).size).toBe(libraryParts.length);
  });

  it.each(libraryParts.map((entry) => [entry.id, entry] as const))('%s is a part that a job takes', (_id, entry) => {
    for (const pick of ['first', 'last'] as const) {
      const parsed = parseJob(placed(entry, pick));
      expect(parsed.ok ? [] : parsed.issues).toStrictEqual([]);
    }
  });

  it.each(libraryParts.map((entry) => [entry.id, entry] as const))(
    '%s says what each figure rests on',
    (_id, entry) => {
      const origin = entry.part['origin'] as Readonly<Record<string, string>>;
      for (const field of figuresOf(entry)) {
        expect([field, origin[field]]).toStrictEqual([field, 'default']);
        expect(listedSources).toContain(entry.bases.get(field)?.source);
      }
    },
  );

  it('have ranges that hold the figure between them', () => {
    for (const { part } of libraryParts) {
      const ranges = (part['range'] ?? {}) as Readonly<Record<string, readonly [number, number]>>;
      for (const [field, [low, high]] of Object.entries(ranges)) {
        const figure = part[field] as number;
        expect(low <= figure && figure <= high).toBe(true);
      }
    }
  });

  it('offer a fuse for every type that the device tables hold', () => {
    const offered = libraryParts.filter(({ group }) => group === 'fuse').map(({ part }) => part['type']);
    expect(new Set(offered)).toStrictEqual(new Set(tables.devices.typicalInterrupt.map(({ type }) => type)));
  });
});

describe('library loads', () => {
  it('have a power or an energy, low before high', () => {
    for (const { powerW, hoursPerDay, energyWhPerDay } of libraryLoads) {
      expect(powerW !== undefined || energyWhPerDay !== undefined).toBe(true);
      for (const [low, high] of [powerW, hoursPerDay].filter((pair) => pair !== undefined)) {
        expect(low).toBeGreaterThan(0);
        expect(low).toBeLessThanOrEqual(high);
      }
    }
  });

  it('name listed sources', () => {
    for (const { basis } of libraryLoads) expect(listedSources).toContain(basis.source);
  });

  it('make rows of demand that a job takes', () => {
    const demand = libraryLoads.flatMap(({ label, powerW, hoursPerDay, supply }) =>
      powerW === undefined || hoursPerDay === undefined
        ? []
        : [{ label, powerW: powerW[1], hoursPerDay: hoursPerDay[1], supply: supply[0] }],
    );
    const parsed = parseJob(JSON.stringify({ format: 'ohmwright-job', version: 1, parts: [], demand }));
    expect(parsed.ok ? [] : parsed.issues).toStrictEqual([]);
    // All rows but three: two without hours, one with an energy only.
    expect(demand).toHaveLength(libraryLoads.length - 3);
  });
});
