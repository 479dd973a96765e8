/**
 * A plain layout for wiring that does not go into two poles: junctions in layers by their distance from a source, sorted so that
 * neighbours stand near each other, and each part between its junctions.
 */
import type { JunctionId, Part, PartId } from '../job/part.ts';
import { junctionsOf } from '../job/part.ts';
import type { Point, Positions } from './point.ts';
import { EARTH, middleOf, onGrid, POLES } from './point.ts';

const LAYER = 200;
const STEP = 120;
const LEFT = 120;
const TOP = 120;
/** Sweeps of sorting layers by the middle of their neighbours; more change little. */
const SWEEPS = 6;

export function layeredPositions(parts: readonly Part[]): Positions {
  const neighbours = neighboursOf(parts);
  const layers = layersOf(parts, neighbours);
  sortLayers(layers, neighbours);
  const junctions = new Map<JunctionId, Point>();
  for (const [layer, row] of layers.entries()) {
    for (const [index, junction] of row.entries()) {
      junctions.set(junction, { x: LEFT + layer * LAYER, y: TOP + index * STEP });
    }
  }
  const places = new Map<PartId, Point>(parts.map((part) => [part.id, placeBetween(part, junctions)]));
  return { parts: places, junctions };
}

/** Where a part stands among junctions that have their places. */
export function placeBetween(part: Part, junctions: ReadonlyMap<JunctionId, Point>): Point {
  const ends = junctionsOf(part).flatMap((each) => junctions.get(each) ?? []);
  if (ends.length === 0) return { x: LEFT, y: TOP };
  const middle = middleOf(ends);
  if (part.kind === 'bond' && ends.length === 1) return onGrid({ x: middle.x, y: middle.y + 60 });
  if (part.kind === 'busbar') return onGrid(middle);
  // A device over a single junction would hide it: it stands beside.
  return onGrid(ends.length === 1 ? { x: middle.x, y: middle.y + POLES / 2 } : middle);
}

function neighboursOf(parts: readonly Part[]): ReadonlyMap<JunctionId, readonly JunctionId[]> {
  const neighbours = new Map<JunctionId, JunctionId[]>();
  for (const part of parts) {
    const touched = [...new Set(junctionsOf(part))].filter((each) => each !== EARTH);
    for (const junction of touched) {
      const list = neighbours.get(junction) ?? [];
      neighbours.set(junction, list);
      list.push(...touched.filter((other) => other !== junction));
    }
  }
  return neighbours;
}

function layersOf(parts: readonly Part[], neighbours: ReadonlyMap<JunctionId, readonly JunctionId[]>): JunctionId[][] {
  const sources = parts.flatMap((part) => (part.kind === 'string' ? [part.plus, part.minus] : []));
  const layerOf = new Map<JunctionId, number>();
  const queue: JunctionId[] = [];
  for (const start of [...sources, ...neighbours.keys()]) {
    // Sources share the first layer; what no source reaches begins there too.
    if (layerOf.has(start)) continue;
    layerOf.set(start, 0);
    queue.push(start);
    if (sources.includes(start) && start !== sources.at(-1)) continue;
    for (let next = queue.shift(); next !== undefined; next = queue.shift()) {
      for (const far of neighbours.get(next) ?? []) {
        if (layerOf.has(far)) continue;
        layerOf.set(far, (layerOf.get(next) ?? 0) + 1);
        queue.push(far);
      }
    }
  }
  const layers: JunctionId[][] = [];
  for (const [junction, layer] of layerOf) {
    while (layers.length <= layer) layers.push([]);
    layers[layer]?.push(junction);
  }
  return layers;
}

function sortLayers(layers: JunctionId[][], neighbours: ReadonlyMap<JunctionId, readonly JunctionId[]>): void {
  const rank = new Map<JunctionId, number>();
  for (const layer of layers) for (const [index, junction] of layer.entries()) rank.set(junction, index);
  for (let sweep = 0; sweep < SWEEPS; sweep += 1) {
    const walked = [...layers];
    if (sweep % 2 === 1) walked.reverse();
    for (const layer of walked) {
      const wanted = new Map(
        layer.map((junction) => {
          const near = (neighbours.get(junction) ?? []).map((each) => rank.get(each) ?? 0);
          return [
            junction,
            near.length === 0 ? (rank.get(junction) ?? 0) : near.reduce((a, b) => a + b, 0) / near.length,
          ];
        }),
      );
      layer.sort((a, b) => (wanted.get(a) ?? 0) - (wanted.get(b) ?? 0));
      for (const [index, junction] of layer.entries()) rank.set(junction, index);
    }
  }
}
