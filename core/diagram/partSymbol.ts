/** The symbol of a part in screen units about its own middle, leads to its terminals included: one set of symbols for paper and screen. */
import type { Part, PartKind } from '../job/part.ts';
import { placeShapes } from './placeShapes.ts';
import type { Pose } from './pose.ts';
import { BOX_REACH, LINK_REACH, POLE_REACH } from './pose.ts';
import type { Shape } from './shape.ts';
import * as symbols from './symbols.ts';
import { line, U } from './symbols.ts';

/** Screen units to a point of the paper drawing. */
export const SCREEN_SCALE = 8 / 3;
const O = { x: 0, y: 0 };
/** Reaches in the measure of the paper symbols. */
const LINK_PT = LINK_REACH / SCREEN_SCALE;
const POLE_PT = POLE_REACH / SCREEN_SCALE;

/** What a contact shows: as the answer or the drawing has it. */
export interface SymbolState {
  readonly isClosed: boolean;
}

/** Conductors and busbars have no symbol of their own on the drawing: they are their line. */
export function partSymbol(part: Part, { isUpright, isTurned }: Pose, state: SymbolState): readonly Shape[] {
  if (isBetweenPoles(part)) {
    const quarters = isTurned ? 2 : 0;
    return placeShapes(deviceShapes(part), { scale: SCREEN_SCALE, quarters, to: O });
  }
  switch (part.kind) {
    case 'controller':
    case 'converter':
      return boxShapes(isTurned);
    case 'cable':
    case 'pair':
    case 'busbar':
      return [];
    case 'bond':
      if (part.from === 'earth' || part.to === 'earth') {
        return placeShapes(symbols.earthSymbol({ x: 0, y: -10 / SCREEN_SCALE }), {
          scale: SCREEN_SCALE,
          quarters: 0,
          to: O,
        });
      }
      return [];
    default: {
      const turn = (isUpright ? 1 : 0) + (isTurned && part.kind === 'diode' ? 2 : 0);
      const lead = hasGap(part, state) ? leads() : [line(-LINK_PT, 0, LINK_PT, 0)];
      return placeShapes([...lead, ...linkShapes(part, state)], {
        scale: SCREEN_SCALE,
        quarters: turn as 0 | 1 | 2 | 3,
        to: O,
      });
    }
  }
}

type DevicePart = Extract<Part, { readonly plus: unknown }>;
function isBetweenPoles(part: Part): part is DevicePart {
  return 'plus' in part;
}

/** An open contact interrupts its line. */
function hasGap(part: Part, { isClosed }: SymbolState): boolean {
  return !isClosed && (part.kind === 'switch' || part.kind === 'breaker' || part.kind === 'fuse');
}
function leads(): readonly Shape[] {
  return [line(-LINK_PT, 0, -1.2 * U, 0), line(1.2 * U, 0, LINK_PT, 0)];
}

function linkShapes(part: Part, { isClosed }: SymbolState): readonly Shape[] {
  switch (part.kind) {
    case 'fuse':
      return isClosed ? symbols.fuseSymbol(O) : symbols.shuntSymbol(O).slice(0, 1);
    case 'breaker':
      return symbols.breakerSymbol(O, isClosed);
    case 'switch':
      return symbols.switchSymbol(O, part.loadBreak === true, isClosed);
    case 'shunt':
      return symbols.shuntSymbol(O);
    case 'diode':
      return symbols.diodeSymbol(O, 1);
    case 'joint':
      return symbols.jointSymbol(O);
    default:
      return [];
  }
}

function deviceShapes({ kind }: DevicePart): readonly Shape[] {
  switch (kind) {
    case 'string':
      // The plus sign of the paper symbol is left to the screen, which signs both poles.
      return symbols.batterySymbol(0, -POLE_PT, POLE_PT).filter(({ shape }) => shape !== 'text');
    case 'array':
      return symbols.arraySymbol(0, -POLE_PT, POLE_PT);
    case 'inverter':
      return [line(0, -POLE_PT, 0, POLE_PT), ...symbols.converterSymbol(O, { from: 'DC', to: 'AC' })];
    case 'charger':
      return [line(0, -POLE_PT, 0, POLE_PT), ...symbols.converterSymbol(O, { from: 'AC', to: 'DC' })];
    default:
      return symbols.loadSymbol(0, -POLE_PT, POLE_PT);
  }
}

function boxShapes(isTurned: boolean): readonly Shape[] {
  const box = placeShapes(symbols.twoPortSymbol(0, -POLE_PT, POLE_PT), {
    scale: SCREEN_SCALE,
    quarters: isTurned ? 2 : 0,
    to: O,
  });
  const half = 3 * U * SCREEN_SCALE;
  const stubs = [-POLE_REACH, POLE_REACH].flatMap((y) => [line(-BOX_REACH, y, -half, y), line(half, y, BOX_REACH, y)]);
  return [...box, ...stubs];
}

/** A small picture of a kind for lists, in points about its middle, within 30 × 22. */
export function kindSymbol(kind: PartKind): readonly Shape[] {
  const through = line(-2.6 * U, 0, 2.6 * U, 0);
  switch (kind) {
    case 'string':
      return symbols.batterySymbol(0, -2.4 * U, 2.4 * U).filter(({ shape }) => shape !== 'text');
    case 'load':
      return symbols.loadSymbol(0, -2.5 * U, 2.5 * U);
    case 'array':
      return symbols.arraySymbol(0, -2.4 * U, 2.4 * U);
    case 'inverter':
      return symbols.converterSymbol(O, { from: 'DC', to: 'AC' });
    case 'charger':
      return symbols.converterSymbol(O, { from: 'AC', to: 'DC' });
    case 'controller':
    case 'converter':
      return symbols.converterSymbol(O, { from: 'DC', to: 'DC' });
    case 'cable':
      return symbols.cableSymbol(O);
    case 'pair':
      return symbols.pairSymbol(O);
    case 'busbar':
      return symbols.busbarSymbol(O);
    case 'fuse':
      return [through, ...symbols.fuseSymbol(O)];
    case 'breaker':
      return [through, ...symbols.breakerSymbol(O)];
    case 'switch':
      return [through, ...symbols.switchSymbol(O, true)];
    case 'shunt':
      return [through, ...symbols.shuntSymbol(O)];
    case 'diode':
      return [through, ...symbols.diodeSymbol(O, 1)];
    case 'joint':
      return [through, ...symbols.jointSymbol(O)];
    case 'bond':
      return symbols.earthSymbol({ x: 0, y: -1.2 * U });
  }
}
