/** Small pure geometry of the drawing: how parts stand, how wires run, what moves along, how thick a line is. */
import { describe, expect, test } from 'vitest';
import { drawPart, freeSide, lineWeight } from '../../core/diagram/drawPart.ts';
import { minusSide, returnOf } from '../../core/diagram/minusSide.ts';
import { moveBy } from '../../core/diagram/moveWith.ts';
import { kindSymbol, partSymbol } from '../../core/diagram/partSymbol.ts';
import { placeShapes } from '../../core/diagram/placeShapes.ts';
import type { Point } from '../../core/diagram/point.ts';
import { poseOf, terminalPlaces } from '../../core/diagram/pose.ts';
import { positionsOf } from '../../core/diagram/positions.ts';
import { routeWire } from '../../core/diagram/routeWire.ts';
import type { CheckedJob } from '../../core/job/job.ts';
import type { JunctionId, Part, PartId } from '../../core/job/part.ts';
import { checked } from './reportInput.ts';

const small = checked({
  format: 'ohmwright-job',
  version: 1,
  title: 'Invented',
  practice: 'iec-land',
  junctions: {
    P: { at: { x: 100, y: 100 } },
    Q: { at: { x: 220, y: 100 } },
    R: { at: { x: 400, y: 100 } },
    N: { at: { x: 100, y: 180 } },
  },
  parts: [
    {
      id: 'S',
      kind: 'string',
      plus: 'P',
      minus: 'N',
      chemistry: 'agm',
      blocksInSeries: 1,
      blockNominalV: 12,
      capacityAh: 100,
      at: { x: 100, y: 140 },
    },
    { id: 'F', kind: 'fuse', from: 'P', to: 'Q', ratingA: 30, at: { x: 160, y: 100 } },
    { id: 'C', kind: 'cable', from: 'Q', to: 'R', lengthM: 1, size: '6 mm2', at: { x: 310, y: 100 } },
    { id: 'L', kind: 'load', plus: 'R', minus: 'M', powerW: 20, at: { x: 400, y: 140 } },
    { id: 'B', kind: 'cable', from: 'M', to: 'N', lengthM: 1, size: '6 mm2' },
  ],
});
function partOf(job: CheckedJob, id: string): Part {
  const part = job.parts.find((each) => each.id === id);
  if (part === undefined) throw new Error(`the job has ${id}`);
  return part;
}
const at = (places: Readonly<Record<string, Point>>) => (junction: JunctionId) => places[junction];

describe('how a part stands', () => {
  test('a fuse between junctions side by side lies level, from at the left', () => {
    const place = at({ P: { x: 0, y: 0 }, Q: { x: 120, y: 0 } });
    expect(poseOf(partOf(small, 'F'), place, { x: 60, y: 0 })).toEqual({ isUpright: false, isTurned: false });
  });
  test('between junctions one above the other it stands upright', () => {
    const place = at({ P: { x: 0, y: 120 }, Q: { x: 0, y: 0 } });
    expect(poseOf(partOf(small, 'F'), place, { x: 0, y: 60 })).toEqual({ isUpright: true, isTurned: true });
  });
  test('in line with one end it stays in line, wherever the other end lies', () => {
    const place = at({ P: { x: -50, y: -200 }, Q: { x: 60, y: 0 } });
    expect(poseOf(partOf(small, 'F'), place, { x: 0, y: 0 }).isUpright).toBe(false);
  });
  test('a battery whose plus lies below its minus is turned', () => {
    const place = at({ P: { x: 0, y: 80 }, N: { x: 0, y: 0 } });
    const terminals = terminalPlaces(partOf(small, 'S'), { x: 0, y: 40 }, place);
    expect(terminals.find(({ role }) => role === 'plus')).toMatchObject({ x: 0, y: 80, way: 'down' });
  });
});

describe('a wire', () => {
  test('is straight where it can be', () => {
    expect(routeWire({ x: 0, y: 0, way: 'right' }, { x: 50, y: 0 })).toEqual([
      { x: 0, y: 0 },
      { x: 50, y: 0 },
    ]);
  });
  test('has one corner into a plain junction', () => {
    expect(routeWire({ x: 0, y: 0, way: 'right' }, { x: 50, y: 30 })).toEqual([
      { x: 0, y: 0 },
      { x: 50, y: 0 },
      { x: 50, y: 30 },
    ]);
  });
  test('comes into an upright bar across it', () => {
    const route = routeWire({ x: 0, y: 0, way: 'right' }, { x: 100, y: 40 }, 'level');
    expect(route).toEqual([
      { x: 0, y: 0 },
      { x: 50, y: 0 },
      { x: 50, y: 40 },
      { x: 100, y: 40 },
    ]);
  });
  test('that must turn back goes clear of its symbol first', () => {
    const route = routeWire({ x: 30, y: 0, way: 'right' }, { x: -100, y: 60 });
    expect(Math.max(...route.map(({ x }) => x))).toBeGreaterThan(30);
  });
  test('runs level and upright only, from its terminal to its junction, whatever the way and the entry', () => {
    for (const way of ['left', 'right', 'up', 'down'] as const) {
      for (const entry of ['any', 'level', 'upright'] as const) {
        for (const end of [
          { x: 70, y: 40 },
          { x: -70, y: 40 },
          { x: 70, y: -40 },
          { x: -70, y: -40 },
          { x: 0, y: 60 },
        ]) {
          const route = routeWire({ x: 0, y: 0, way }, end, entry);
          const slanted = route.filter((point, index) => {
            const before = route[index - 1];
            return before !== undefined && before.x !== point.x && before.y !== point.y;
          });
          expect([way, entry, slanted]).toEqual([way, entry, []]);
          expect([route[0], route.at(-1)]).toEqual([{ x: 0, y: 0 }, end]);
        }
      }
    }
  });
});

describe('what is drawn for a part', () => {
  const around = {
    placeOf: (junction: JunctionId) => positionsOf(small).junctions.get(junction),
    entryOf: () => 'any' as const,
  };

  test('a cable is one line from end to end', () => {
    const { wires } = drawPart(partOf(small, 'C'), { x: 310, y: 100 }, around);
    expect(wires.map(({ points }) => points)).toEqual([
      [
        { x: 220, y: 100 },
        { x: 400, y: 100 },
      ],
    ]);
  });
  test('current into a load runs towards it on the plus side and away on the minus side', () => {
    const { wires } = drawPart(partOf(small, 'L'), { x: 500, y: 140 }, around);
    const [plus, minus] = wires;
    expect(plus?.points[0]).toEqual({ x: 400, y: 100 });
    expect(minus?.points[0]).toEqual({ x: 500, y: 180 });
  });
  test('words of a device stand away from what it leads to', () => {
    expect(freeSide({ x: 0, y: 0 }, [{ x: 100, y: 0 }])).toBe('left');
    expect(freeSide({ x: 0, y: 0 }, [{ x: -100, y: 0 }])).toBe('right');
  });
  test('an open switch shows a gap in its line, a closed one none', () => {
    const off = { ...partOf(small, 'F'), kind: 'switch', loadBreak: true } as unknown as Part;
    const pose = { isUpright: false, isTurned: false };
    const crossing = (isClosed: boolean) =>
      partSymbol(off, pose, { isClosed }).some(
        (shape) => shape.shape === 'line' && shape.y1 === 0 && shape.y2 === 0 && shape.x1 < -20 && shape.x2 > 20,
      );
    expect([crossing(true), crossing(false)]).toEqual([true, false]);
  });
  test('every kind has a picture for the palette', () => {
    for (const kind of new Set(small.parts.map((part) => part.kind)))
      expect(kindSymbol(kind).length).toBeGreaterThan(0);
  });
});

test('a quarter turn takes a point on the right to below', () => {
  const [turned] = placeShapes([{ shape: 'line', x1: 0, y1: 0, x2: 10, y2: 0, stroke: 'line', tone: 'ink' }], {
    scale: 2,
    quarters: 1,
    to: { x: 5, y: 5 },
  });
  expect(turned).toMatchObject({ x1: 5, y1: 5, x2: 5, y2: 25 });
});

describe('a move', () => {
  const positions = positionsOf(small);
  const moved = moveBy(small.parts, {
    parts: new Set(['L' as PartId]),
    junctions: new Set(),
    by: { x: 60, y: 0 },
    positions,
  });

  test('takes along the junctions that only conductors touch besides', () => {
    expect(moved.junctions.get('R' as JunctionId)).toEqual({ x: 460, y: 100 });
    expect(moved.junctions.has('Q' as JunctionId)).toBe(false);
  });
  test('lets a conductor with one end moving keep its middle and stay straight', () => {
    expect(moved.parts.get('C' as PartId)).toEqual({ x: 340, y: 100 });
  });
  test('leaves everything else where it is', () => {
    expect([...moved.parts.keys()].toSorted()).toEqual(['B', 'C', 'L']);
  });
});

test('the minus side is what conductors join to the minus of something', () => {
  expect([...minusSide(small)].toSorted()).toEqual(['M', 'N']);
});

test('a run from the plus of a battery returns to its minus', () => {
  expect(returnOf(small, 'P' as JunctionId)).toBe('N');
  expect(returnOf(small, 'Q' as JunctionId)).toBeUndefined();
});

describe('the weight of a line', () => {
  test('rises with the current, from a hair to the largest of the drawing', () => {
    expect([lineWeight(0, 100), lineWeight(25, 100), lineWeight(100, 100)]).toEqual([1.5, 4.25, 7]);
  });
  test('does not tell the direction, and a drawing without current has thin lines', () => {
    expect(lineWeight(-25, 100)).toBe(4.25);
    expect(lineWeight(0, 0)).toBe(1.5);
  });
});
