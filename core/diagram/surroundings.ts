/** All wires of a drawing laid together, so that each keeps clear of symbols, of dots and of the wires laid before it. */
import type { JunctionId, Part, PartId } from '../job/part.ts';
import type { DrawnPart, Surroundings } from './drawPart.ts';
import { barOf, drawPart, entriesOf } from './drawPart.ts';
import { type Laid, layWires, wiresToLay } from './layWires.ts';
import type { Point, Positions } from './point.ts';
import { EARTH } from './point.ts';
import type { Box, PlaceOf } from './pose.ts';
import { BOX_REACH, isConductor, LINK_REACH, POLE_REACH, poseOf, terminalPlaces } from './pose.ts';
import { WireRoom } from './wireRoom.ts';

/** How far a symbol reaches, leads included, a hair less: what touches its edge does not cross it. */
const HAIR = 1;

/** The surroundings of a drawing as it was laid: given to the next laying, only wires near what has changed are laid anew. */
export interface LaidSurroundings extends Surroundings {
  readonly laid: Laid;
}

/**
 * What `drawPart` needs to know of the rest of the drawing: where junctions stand and the routes of all wires. `last` saves work
 * and changes nothing of the outcome.
 */
export function surroundingsOf(
  parts: readonly Part[],
  positions: Positions,
  last?: LaidSurroundings,
): LaidSurroundings {
  const placeOf: PlaceOf = (junction) => positions.junctions.get(junction);
  const entries = entriesOf(parts, placeOf);
  const entryOf = (junction: JunctionId) => entries.get(junction) ?? 'any';
  const laid = layWires(roomFor(parts, positions), wiresToLay(parts, positions, { placeOf, entryOf }), last?.laid);
  return { placeOf, entryOf, routeOf: (part, role) => laid.routes.get(`${part} ${role}`)?.points, laid };
}

/** Every part that has a place, as it is drawn among the others. */
export function drawParts(parts: readonly Part[], positions: Positions): ReadonlyMap<PartId, DrawnPart> {
  const around = surroundingsOf(parts, positions);
  return new Map(
    parts.flatMap((part) => {
      const at = positions.parts.get(part.id);
      return at === undefined ? [] : [[part.id, drawPart(part, at, around)] as const];
    }),
  );
}

/** Symbols, bars and dots of a drawing, without wires. */
export function roomFor(parts: readonly Part[], positions: Positions): WireRoom {
  const room = new WireRoom();
  const placeOf: PlaceOf = (junction) => positions.junctions.get(junction);
  for (const [junction, at] of positions.junctions) if (junction !== EARTH) room.addDot(at, junction);
  for (const part of parts) {
    const at = positions.parts.get(part.id);
    if (at === undefined) continue;
    if (part.kind === 'busbar') room.addBar(barOf(part, at, placeOf), part.junctions);
    else if (!isConductor(part)) {
      room.addSymbol(symbolBox(part, at, placeOf));
      // The place where a lead begins is part of the symbol: a wire of another junction there would seem joined to it.
      for (const terminal of terminalPlaces(part, at, placeOf)) room.addDot(terminal, terminal.junction);
    }
  }
  return room;
}

/** What no wire but its own leads may enter: the symbol with its leads up to the terminals. */
export function symbolBox(part: Part, at: Point, placeOf: PlaceOf): Box {
  const { halfWidth, up, down } = symbolReach(part, at, placeOf);
  return { x1: at.x - halfWidth, y1: at.y - up, x2: at.x + halfWidth, y2: at.y + down };
}
function symbolReach(
  part: Part,
  at: Point,
  placeOf: PlaceOf,
): { readonly halfWidth: number; readonly up: number; readonly down: number } {
  switch (part.kind) {
    case 'string':
    case 'load':
    case 'inverter':
    case 'array':
    case 'charger':
      return { halfWidth: 30 - HAIR, up: POLE_REACH - HAIR, down: POLE_REACH - HAIR };
    case 'controller':
    case 'converter':
      return { halfWidth: BOX_REACH - HAIR, up: 54, down: 54 };
    case 'bond':
      if (part.from === EARTH || part.to === EARTH) return { halfWidth: 14, up: 10 - HAIR, down: 16 };
      return { halfWidth: 0, up: 0, down: 0 };
    default: {
      const { isUpright } = poseOf(part, placeOf, at);
      const [along, across] = [LINK_REACH - HAIR, 11];
      return isUpright ? { halfWidth: across, up: along, down: along } : { halfWidth: along, up: across, down: across };
    }
  }
}
