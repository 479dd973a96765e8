/** Places on the drawing: everything has one, no symbol stands on another, and what was placed by hand stays. */
import { describe, expect, test } from 'vitest';
import type { Positions } from '../../core/diagram/point.ts';
import { EARTH, POLES } from '../../core/diagram/point.ts';
import { boxAround, boxesOverlap } from '../../core/diagram/pose.ts';
import { positionsOf } from '../../core/diagram/positions.ts';
import { tidyPositions } from '../../core/diagram/tidy.ts';
import type { CheckedJob } from '../../core/job/job.ts';
import { junctionsOf } from '../../core/job/part.ts';
import { examples } from '../../data/examples/index.ts';
import { wiringJob } from '../bench/wiringJob.ts';
import { checked } from './reportInput.ts';

const job = (parts: readonly object[], junctions: object = {}) =>
  checked({ format: 'ohmwright-job', version: 1, title: 'Invented', practice: 'iec-land', junctions, parts });
const string = (id: string, plus: string, minus: string, more: object = {}) => ({
  id,
  kind: 'string',
  plus,
  minus,
  chemistry: 'agm',
  blocksInSeries: 1,
  blockNominalV: 12,
  capacityAh: 100,
  ...more,
});
const cable = (id: string, from: string, to: string, more: object = {}) => ({
  id,
  kind: 'cable',
  from,
  to,
  lengthM: 1,
  size: '16 mm2',
  ...more,
});
const load = (id: string, plus: string, minus: string, more: object = {}) => ({
  id,
  kind: 'load',
  plus,
  minus,
  powerW: 50,
  ...more,
});

/** Pairs of parts whose symbols overlap. */
function overlaps({ parts }: CheckedJob, positions: Positions): readonly string[] {
  const boxes = parts.flatMap((part) => {
    const at = positions.parts.get(part.id);
    return at === undefined ? [] : [{ id: part.id, box: boxAround(part, at, (each) => positions.junctions.get(each)) }];
  });
  return boxes.flatMap((one, index) =>
    boxes
      .slice(index + 1)
      .filter(({ box }) => boxesOverlap(one.box, box))
      .map(({ id }) => `${one.id} over ${id}`),
  );
}
function missing({ parts }: CheckedJob, positions: Positions): readonly string[] {
  return [
    ...parts.filter(({ id }) => !positions.parts.has(id)).map(({ id }) => id),
    ...parts.flatMap(junctionsOf).filter((each) => each !== EARTH && !positions.junctions.has(each)),
  ];
}
function shared({ junctions }: Positions): readonly string[] {
  const places = [...junctions].map(([id, { x, y }]) => ({ id, key: `${x},${y}` }));
  return places
    .filter(({ key }, index) => places.findIndex((other) => other.key === key) !== index)
    .map(({ id }) => id);
}
function offGrid({ parts, junctions }: Positions, grid: number): readonly string[] {
  return [...parts, ...junctions].filter(([, { x, y }]) => x % grid !== 0 || y % grid !== 0).map(([id]) => id);
}

describe.each(examples)('the example $name', ({ text }) => {
  const example = checked(JSON.parse(text) as object);

  test('laid out tidily has a place for everything, on the grid, and no symbol on another', () => {
    const positions = tidyPositions(example);
    expect(missing(example, positions)).toEqual([]);
    expect(overlaps(example, positions)).toEqual([]);
    expect(shared(positions)).toEqual([]);
    expect(offGrid(positions, 10)).toEqual([]);
  });

  test('keeps the places that it stores', () => {
    const positions = positionsOf(example);
    expect(missing(example, positions)).toEqual([]);
    const stored = new Map([...example.parts].flatMap(({ id, at }) => (at === undefined ? [] : [[id, at]])));
    expect(new Map([...positions.parts].filter(([id]) => stored.has(id)))).toEqual(stored);
    const noted = new Map([...example.junctions].flatMap(([id, { at }]) => (at === undefined ? [] : [[id, at]])));
    expect(new Map([...positions.junctions].filter(([id]) => noted.has(id)))).toEqual(noted);
  });
});

test('a job of 500 parts is laid out without a symbol on another', () => {
  const large = checked(wiringJob(500));
  const positions = tidyPositions(large);
  expect(missing(large, positions)).toEqual([]);
  expect(overlaps(large, positions)).toEqual([]);
  expect(shared(positions)).toEqual([]);
});

describe('tidy rows', () => {
  const small = job([
    string('S', 'P', 'N'),
    { id: 'F', kind: 'fuse', from: 'P', to: 'Q', ratingA: 30 },
    load('L', 'Q', 'N'),
  ]);
  const { parts, junctions } = tidyPositions(small);

  test('plus lies above minus by the height of a row of poles', () => {
    const battery = parts.get(small.parts[0]!.id)!;
    expect(junctions.get('P' as never)).toEqual({ x: battery.x, y: battery.y - POLES / 2 });
  });

  test('a fuse sits midway between its junctions, on their line', () => {
    const [from, to] = [junctions.get('P' as never)!, junctions.get('Q' as never)!];
    expect(parts.get(small.parts[1]!.id)).toEqual({ x: (from.x + to.x) / 2, y: from.y });
    expect(from.y).toBe(to.y);
  });
});

describe('what the plan of the paper refuses is laid out all the same', () => {
  test('strings in series, point by point', () => {
    const series = job([string('S1', 'M', 'N'), string('S2', 'P', 'M'), load('L', 'P', 'N')]);
    const positions = tidyPositions(series);
    expect(missing(series, positions)).toEqual([]);
    expect(overlaps(series, positions)).toEqual([]);
  });

  test('a cable that leads nowhere, and a fuse alone', () => {
    const loose = job([
      string('S', 'P', 'N'),
      load('L', 'P', 'N'),
      cable('C', 'X', 'Y'),
      { id: 'F', kind: 'fuse', from: 'U', to: 'V', ratingA: 30 },
    ]);
    const positions = tidyPositions(loose);
    expect(missing(loose, positions)).toEqual([]);
    expect(overlaps(loose, positions)).toEqual([]);
    // The system comes first, the loose ends below it.
    expect(positions.parts.get('C' as never)!.y).toBeGreaterThan(positions.parts.get('L' as never)!.y);
  });
});

describe('places that are missing', () => {
  test('the poles of a placed device are above and below it', () => {
    const placed = job([string('S', 'P', 'N', { at: { x: 200, y: 200 } })]);
    const { junctions } = positionsOf(placed);
    expect(junctions.get('P' as never)).toEqual({ x: 200, y: 160 });
    expect(junctions.get('N' as never)).toEqual({ x: 200, y: 240 });
  });

  test('a new cable stands between its two junctions', () => {
    const placed = job(
      [
        string('S', 'P', 'N', { at: { x: 200, y: 200 } }),
        load('L', 'Q', 'N', { at: { x: 500, y: 200 } }),
        cable('C', 'P', 'Q'),
      ],
      { P: { at: { x: 200, y: 160 } }, N: { at: { x: 200, y: 240 } }, Q: { at: { x: 500, y: 160 } } },
    );
    expect(positionsOf(placed).parts.get('C' as never)).toEqual({ x: 350, y: 160 });
  });

  test('parts that touch nothing placed are laid out below the rest', () => {
    const placed = job([string('S', 'P', 'N', { at: { x: 200, y: 200 } }), load('M', 'U', 'V')]);
    const positions = positionsOf(placed);
    expect(missing(placed, positions)).toEqual([]);
    expect(positions.parts.get('M' as never)!.y).toBeGreaterThan(240);
  });
});
