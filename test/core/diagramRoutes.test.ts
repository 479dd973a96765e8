/** Routes keep clear: no wire through a symbol where another way is free, whatever was laid out by hand or tidily. */
import { describe, expect, test } from 'vitest';
import { draftOf, parallelString, startSmall } from '../../core/api.ts';
import { type DrawnPart, drawPart, entriesOf } from '../../core/diagram/drawPart.ts';
import type { Point, Positions } from '../../core/diagram/point.ts';
import { type Box, isConductor } from '../../core/diagram/pose.ts';
import { positionsOf } from '../../core/diagram/positions.ts';
import { drawParts, surroundingsOf, symbolBox } from '../../core/diagram/surroundings.ts';
import { tidyPositions } from '../../core/diagram/tidy.ts';
import type { CheckedJob } from '../../core/job/job.ts';
import type { JunctionId, PartId } from '../../core/job/part.ts';
import { examples } from '../../data/examples/index.ts';
import { tables } from '../../data/index.ts';
import { wiringJob } from '../bench/wiringJob.ts';
import { checked } from './reportInput.ts';

type Drawn = ReadonlyMap<PartId, DrawnPart>;

function symbolsOf({ parts }: CheckedJob, positions: Positions): readonly Box[] {
  return parts.flatMap((part) => {
    const at = positions.parts.get(part.id);
    if (at === undefined || part.kind === 'busbar' || isConductor(part)) return [];
    return [symbolBox(part, at, (junction) => positions.junctions.get(junction))];
  });
}
function isThrough(points: readonly Point[], box: Box): boolean {
  return points.some((b, index) => {
    const a = points[index - 1];
    if (a === undefined) return false;
    const isBeside = Math.min(a.x, b.x) >= box.x2 || Math.max(a.x, b.x) <= box.x1;
    return !isBeside && Math.min(a.y, b.y) < box.y2 && Math.max(a.y, b.y) > box.y1;
  });
}
/** Wires that cross a symbol, with their two ends. */
function crossings(job: CheckedJob, positions: Positions, drawn: Drawn): readonly (readonly Point[])[] {
  const symbols = symbolsOf(job, positions);
  const wires = [...drawn.values()].flatMap((part) => part.wires.map(({ points }) => points));
  return wires.filter((points) => symbols.some((box) => isThrough(points, box)));
}
/** Each wire by itself, as it runs with nothing to look at but its own ends. */
function drawnAlone({ parts }: CheckedJob, positions: Positions): Drawn {
  const placeOf = (junction: JunctionId) => positions.junctions.get(junction);
  const entries = entriesOf(parts, placeOf);
  const around = { placeOf, entryOf: (junction: JunctionId) => entries.get(junction) ?? 'any' } as const;
  return new Map(
    parts.flatMap((part) => {
      const at = positions.parts.get(part.id);
      return at === undefined ? [] : [[part.id, drawPart(part, at, around)] as const];
    }),
  );
}
/** Whether an end of a wire lies inside a symbol: then no route is free. */
function hasNoFreeRoute(job: CheckedJob, positions: Positions, points: readonly Point[]): boolean {
  const isInside = (point: Point | undefined): boolean =>
    point !== undefined && symbolsOf(job, positions).some((box) => isThrough([point, point], box));
  return isInside(points[0]) || isInside(points.at(-1));
}

const jobs = [
  ...examples.map(({ name, text }) => [name, checked(JSON.parse(text) as object)] as const),
  ['500 parts', checked(wiringJob(500))] as const,
];
const layouts = jobs.flatMap(([name, job]) => [
  [name, 'as it lies', job, positionsOf(job)] as const,
  [name, 'laid out tidily', job, tidyPositions(job)] as const,
]);

test.each(layouts)('%s, %s: no wire crosses a symbol where a way around is free', (name, how, job, positions) => {
  const before = crossings(job, positions, drawnAlone(job, positions));
  const after = crossings(job, positions, drawParts(job.parts, positions));
  console.info(`${name}, ${how}: ${before.length} wires through a symbol by themselves, ${after.length} laid together`);
  expect(after.length).toBeLessThanOrEqual(before.length);
  // Strings in series are laid out by distance, which puts junctions into the way: there, going around is only tried.
  const isDense = name === 'estuary-ketch' && how === 'laid out tidily';
  const left = after.filter((points) => !hasNoFreeRoute(job, positions, points));
  expect(left.length).toBeLessThanOrEqual(isDense ? 3 : 0);
});

test('a cable from a minus to the minus of the string below goes around that string', () => {
  const string = (id: string, y: number) => ({
    id,
    kind: 'string',
    plus: `${id}+`,
    minus: `${id}-`,
    chemistry: 'agm',
    blocksInSeries: 1,
    blockNominalV: 12,
    capacityAh: 100,
    at: { x: 200, y },
  });
  const cable = { id: 'C', kind: 'cable', from: 'B1-', to: 'B2-', lengthM: 1, size: '16 mm2' };
  const job = checked({
    format: 'ohmwright-job',
    version: 1,
    title: 'Invented',
    practice: 'iec-land',
    parts: [string('B1', 160), string('B2', 320), cable],
  });
  const positions = positionsOf(job);
  const points = drawParts(job.parts, positions).get('C' as PartId)?.wires[0]?.points ?? [];
  expect([points[0], points.at(-1)]).toEqual([
    { x: 200, y: 200 },
    { x: 200, y: 360 },
  ]);
  // Clear of the symbol and of the dot of its plus.
  const dot = { x1: 195, x2: 205, y1: 275, y2: 285 };
  expect([...symbolsOf(job, positions), dot].filter((box) => isThrough(points, box))).toEqual([]);
});

test('laying anew only near what has moved gives the same drawing as laying everything', () => {
  const job = checked(wiringJob(200));
  let positions = tidyPositions(job);
  let last = surroundingsOf(job.parts, positions);
  for (let step = 0; step < 25; step += 1) {
    const { id } = job.parts[(step * 37) % job.parts.length]!;
    const { x, y } = positions.parts.get(id)!;
    positions = { ...positions, parts: new Map([...positions.parts, [id, { x: x + 10, y: y + 20 * (step % 3) }]]) };
    last = surroundingsOf(job.parts, positions, last);
    const points = (laid: typeof last) => new Map([...laid.laid.routes].map(([name, wire]) => [name, wire.points]));
    expect(points(last)).toEqual(points(surroundingsOf(job.parts, positions)));
  }
});

describe('a string added beside another', () => {
  const small = startSmall(
    {
      title: 'Hut',
      practice: 'iec-land',
      systemV: 12,
      chemistry: 'agm',
      blockNominalV: 12,
      blocksInParallel: 1,
      capacityAh: 100,
      loadW: 60,
      supply: 'dc',
      bankToMainM: 2,
      mainToLoadM: 5,
    },
    tables,
  );
  if (!small.ok) throw new Error('the small job can be made');
  const drafts = examples
    .filter(({ name }) => name === 'ridge-cabin' || name === 'canal-boat')
    .flatMap(({ name, text }) => {
      const edited = draftOf(text);
      return edited.ok ? [[name, edited.value.draft] as const] : [];
    });

  test.each([['a small job', small.value.draft] as const, ...drafts])('%s: lies on nothing', (_name, draft) => {
    const before = checked(draft);
    for (const { id } of before.parts.filter(({ kind }) => kind === 'string')) {
      const job = checked(parallelString(id).apply(draft));
      expect(job.parts.length).toBeGreaterThan(before.parts.length + 1);
      const positions = positionsOf(job);
      const added = new Set(job.parts.slice(before.parts.length).map((part) => part.id));
      const drawn = drawParts(job.parts, positions);
      const own = job.parts.filter((part) => added.has(part.id));
      const others = symbolsOf({ ...job, parts: before.parts }, positions);
      for (const box of symbolsOf({ ...job, parts: own }, positions)) {
        expect(
          others.filter((other) => box.x1 < other.x2 && other.x1 < box.x2 && box.y1 < other.y2 && other.y1 < box.y2),
        ).toEqual([]);
        // No wire runs through it, its own or another's.
        expect(
          [...drawn.values()].flatMap(({ wires }) => wires).filter(({ points }) => isThrough(points, box)),
        ).toEqual([]);
      }
      for (const part of own)
        for (const { points } of drawn.get(part.id)?.wires ?? [])
          expect(others.filter((box) => isThrough(points, box))).toEqual([]);
    }
  });
});
