/** Both sides of a joint as the sources that settle: Thévenin's of their strings, with charge shared by capacity. */
import { type RcModel, rcModel } from '../../battery/rc.ts';
import { factsOf, stringEmfAtCharge } from '../../battery/stringSource.ts';
import type { PartId, StringPart } from '../../job/part.ts';
import type { Tables } from '../../tables/tables.ts';
import { capacityOf, type Piece, splitOver, stringsOfPiece } from './joinPiece.ts';
import type { JoinSide, SideContext } from './joinSide.ts';
import { type JoinWay, wayBetween } from './joinWay.ts';
import { restCurve } from './restCurve.ts';
import { chargeLine, type SettlingSide } from './settling.ts';
import { type StraightLine, sumOfLines, valueAt } from './straightLine.ts';

export interface JoinSources {
  readonly a: SettlingSide;
  readonly b: SettlingSide;
  /** Part of the current in each string. */
  readonly shares: ReadonlyMap<PartId, number>;
  /** By the drawing; `undefined` where the two do not meet in it. */
  readonly way: JoinWay | undefined;
}

/** By string; its links belong to the resistance of the first instant. */
type Models = ReadonlyMap<PartId, RcModel>;

export function joinSources(
  { a, b }: { readonly a: JoinSide; readonly b: JoinSide },
  context: SideContext,
  tables: Tables,
): JoinSources {
  const models = new Map([...modelsOf(a, context), ...modelsOf(b, context)]);
  // Blocks of their own are in no drawing.
  const drawn = a.drawn.length > 0 && b.drawn.length > 0;
  const ohmOf = (id: PartId) => models.get(id)!.instantOhm;
  const { job, ambientDegC } = context;
  const way = drawn ? wayBetween({ job, tables, a: a.piece, b: b.piece, ohmOf, ambientDegC }) : undefined;
  const shares = way?.shares ?? new Map([...sharesAlone(a.piece, models), ...sharesAlone(b.piece, models)]);
  const source = ({ piece }: JoinSide) => sourceOf(piece, { context, models, shares });
  return { a: source(a), b: source(b), shares, way };
}

function modelsOf({ piece }: JoinSide, context: SideContext): Models {
  return new Map(
    stringsOfPiece(piece).map((string) => {
      const model = rcModel(string, context);
      return [string.id, { ...model, instantOhm: model.instantOhm + string.linkOhm }];
    }),
  );
}

/** As the strings' own conductances share it. */
function sharesAlone(piece: Piece, models: Models): ReadonlyMap<PartId, number> {
  const ohmOf = (one: Piece): number => {
    if (one.kind === 'string') return models.get(one.string.id)!.instantOhm;
    const each = one.pieces.map(ohmOf);
    if (one.kind === 'series') return each.reduce((sum, ohm) => sum + ohm, 0);
    return 1 / each.reduce((sum, ohm) => sum + 1 / ohm, 0);
  };
  return splitOver(piece, (one) => 1 / ohmOf(one));
}

/**
 * E = sum w_k E_k, R = sum w_k^2 R_k with the shares w_k of the current, and the elements as the resistances; each string gives its
 * part of the charge by capacity. A side is empty when the first of its strings is.
 */
function sourceOf(
  piece: Piece,
  known: { readonly context: SideContext; readonly models: Models; readonly shares: ReadonlyMap<PartId, number> },
): SettlingSide {
  const { context, models, shares } = known;
  const chargeShares = splitOver(piece, capacityOf);
  const each = stringsOfPiece(piece).map((string) => {
    const weight = shares.get(string.id)!;
    const rate = chargeShares.get(string.id)!;
    return { weight, rate, line: emfLine(string, context), model: models.get(string.id)! };
  });
  return {
    emf: sumOfLines(each),
    instantOhm: each.reduce((sum, { weight, model }) => sum + weight * weight * model.instantOhm, 0),
    elements: each.flatMap(({ weight, model }) =>
      model.elements.map(({ resistanceOhm, tauS }) => ({ resistanceOhm: weight * weight * resistanceOhm, tauS })),
    ),
    givesC: Math.min(...each.map(({ line, rate }) => line.at(-1)!.x / rate)),
  };
}

/** Rest voltage against charge given, the curve moved through the string's own figure. */
function emfLine(string: StringPart, context: SideContext): StraightLine {
  const facts = factsOf(string, context);
  const curve = restCurve(facts, context.tables);
  const shiftV = stringEmfAtCharge(facts, string.stateOfCharge, context.tables) - valueAt(curve, string.stateOfCharge);
  return chargeLine(
    curve.map(({ x, y }) => ({ x, y: y + shiftV })),
    string,
  );
}
